import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { MorningQuestion } from '../../../../shared/contracts/family-morning';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';

/** Ill, late, not coming: under an outcome, or as a page of its own from a question. */
@Component({
  selector: 'td-change-rows',
  imports: [PageHeading, PictureMark, RouterLink],
  templateUrl: './change-rows.html',
  host: { class: 'section no-print' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangeRows {
  readonly words = input.required<MorningQuestion['changes']>();
  readonly isPage = input(false);
}
