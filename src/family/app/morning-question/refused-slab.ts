import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { FamilySession } from '../../../../shared/contracts/family-session';
import type { ProblemDocument } from '../../../../shared/contracts/problem';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';

/** The clinic has read the answer and did not take it: why, and that the telephone is next. */
@Component({
  selector: 'td-refused-slab',
  imports: [PageHeading, PictureMark],
  templateUrl: './refused-slab.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RefusedSlab {
  readonly problem = input<ProblemDocument | null>(null);
  readonly clinic = input<FamilySession['clinic'] | null>(null);
  readonly again = output();
}
