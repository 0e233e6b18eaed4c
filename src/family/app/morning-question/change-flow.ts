import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { MorningQuestion } from '../../../../shared/contracts/family-morning';
import type { FamilySession } from '../../../../shared/contracts/family-session';
import { TimeInWords } from '../../../common/ui/night-path/time-in-words';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import type { ChangeKind } from './morning-view';

export type ChangeChoice =
  | { kind: 'ill'; isAwake: boolean }
  | { kind: 'late'; newArrivalAt: string }
  | { kind: 'not-coming' };

/** A child is ill, the family is late, or it does not come. */
@Component({
  selector: 'td-change-flow',
  imports: [PageHeading, PictureMark, TimeInWords],
  templateUrl: './change-flow.html',
  host: { class: 'ask' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangeFlow {
  readonly change = input.required<ChangeKind>();
  readonly words = input.required<MorningQuestion['changes']>();
  readonly clinic = input<FamilySession['clinic'] | null>(null);
  readonly chosen = output<ChangeChoice>();
  readonly back = output();
}
