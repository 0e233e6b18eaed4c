import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { NextMorning } from '../../../../shared/contracts/family-morning';
import { PictureMark } from '../../../common/ui/picture/picture-mark';

/** What to bring, what happens, where the door is, who brings the child, and what to do when something changed. */
@Component({
  selector: 'td-morning-practical',
  imports: [PictureMark, RouterLink],
  templateUrl: './morning-practical.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MorningPractical {
  readonly morning = input.required<NextMorning>();
}
