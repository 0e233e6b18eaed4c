import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { FamilySession } from '../../../shared/contracts/family-session';
import { PictureMark } from '../../common/ui/picture/picture-mark';

/** The telephone and the interpreter, on every page in the same place. */
@Component({
  selector: 'td-reach-bar',
  imports: [PictureMark, RouterLink],
  templateUrl: './reach-bar.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReachBar {
  readonly clinic = input.required<FamilySession['clinic']>();
  protected readonly dial = computed(() => 'tel:' + this.clinic().phone.replace(/[^+\d]/g, ''));
}
