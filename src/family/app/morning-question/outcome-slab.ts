import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type {
  MorningOutcome,
  MorningQuestion,
  NextMorning,
} from '../../../../shared/contracts/family-morning';
import type { FamilySession } from '../../../../shared/contracts/family-session';
import { NightPath } from '../../../common/ui/night-path/night-path';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { ChildFace } from '../../../common/ui/picture/child-face';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { outcomeLook } from './outcome-look';

/** What happens now: one picture, one sentence, then the rest of the path and what the family told us. */
@Component({
  selector: 'td-outcome-slab',
  imports: [ChildFace, NightPath, PageHeading, PictureMark],
  templateUrl: './outcome-slab.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OutcomeSlab {
  readonly outcome = input.required<MorningOutcome>();
  readonly question = input.required<MorningQuestion>();
  readonly morning = input<NextMorning | null>(null);
  readonly lanes = input.required<ReadonlyMap<number, number>>();
  readonly clinic = input<FamilySession['clinic'] | null>(null);
  readonly now = input.required<number>();
  readonly changeAnswer = output();

  protected readonly look = computed(() => outcomeLook(this.outcome().kind));
  protected readonly hasPath = computed(
    () =>
      this.look().showsPath &&
      (this.morning()?.steps.some((step) => Date.parse(step.time.at) > this.now()) ?? false),
  );
  protected readonly mayChange = computed(
    () => this.now() < Date.parse(this.outcome().canChangeUntil),
  );
  protected readonly told = computed(() =>
    this.outcome().youToldUs.map((told) => ({
      ...told,
      face: this.question().questions.find(({ childId }) => childId === told.childId)?.face,
      place: this.lanes().get(told.childId) ?? 1,
    })),
  );
}
