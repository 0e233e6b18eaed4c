import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  DestroyRef,
  LOCALE_ID,
  computed,
  inject,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import { FamilyAnswers } from '../../../common/session/family-answers';
import { FamilyClock } from '../../../common/session/family-clock';
import { FamilyDocuments } from '../../../common/session/family-documents';
import { FamilyVisit } from '../../../common/session/family-visit';
import { LaneHeads } from '../../../common/ui/night-path/lane-heads';
import { NightPath } from '../../../common/ui/night-path/night-path';
import { stepsPast } from '../../../common/ui/night-path/path-rows';
import { phoneTime } from '../../../common/ui/night-path/short-time';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { holdingAt, skyOf } from '../../../common/ui/sky-band/sky-of';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';
import { HorizonSuns } from '../../../common/ui/suns/horizon-suns';
import { isQuestionOpen } from '../../../common/session/family-question-open';
import { MorningPractical } from './morning-practical';
import { MoreLinks } from './more-links';

/** Home: what to do now, tonight and in the morning. Readable with no signal once opened. */
@Component({
  selector: 'td-next-morning',
  imports: [
    HorizonSuns,
    LaneHeads,
    MoreLinks,
    MorningPractical,
    NightPath,
    PageHeading,
    PageSkeleton,
    PageTrouble,
    PictureMark,
    RouterLink,
    SkyBand,
  ],
  templateUrl: './next-morning.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NextMorningPage {
  private readonly documents = inject(FamilyDocuments);
  private readonly document = inject(DOCUMENT);
  private readonly locale = inject(LOCALE_ID);
  protected readonly clock = inject(FamilyClock);
  protected readonly answers = inject(FamilyAnswers);
  private readonly visit = inject(FamilyVisit);

  protected readonly kept = this.documents.nextMorning;
  protected readonly failure = this.documents.failure;
  protected readonly clinicName = computed(() => this.visit.clinic()?.shortName ?? '');
  protected readonly sky = computed(() => skyOf(this.kept()?.data.skies ?? [], this.clock.now()));
  protected readonly moment = computed(() =>
    holdingAt(this.kept()?.data.moments ?? [], this.clock.now()),
  );
  /** True once the path has begun: then 'now' is a flag further down, and the sentence leads to it. */
  protected readonly hasBegun = computed(
    () => stepsPast(this.kept()?.data.steps ?? [], this.clock.now()) > 0,
  );
  protected readonly isOver = computed(() => {
    const steps = this.kept()?.data.steps ?? [];
    return steps.length > 0 && stepsPast(steps, this.clock.now()) === steps.length;
  });
  protected readonly mayAnswer = computed(() =>
    isQuestionOpen(this.kept()?.data.question ?? null, this.clock.now()),
  );
  /** The day under each sun: brothers and sisters share their days. */
  protected readonly days = computed(() => {
    const days = [...new Set(this.kept()?.data.mornings.map((morning) => morning.on))].sort();
    return days.slice(-(this.kept()?.data.suns.length ?? 0));
  });
  protected readonly keptAt = computed(() => {
    const at = this.kept()?.keptAt;
    return at ? phoneTime(at, this.locale) : '';
  });

  constructor() {
    void this.load();
    const again = () => {
      if (this.document.visibilityState === 'visible') void this.load();
    };
    const window = this.document.defaultView;
    this.document.addEventListener('visibilitychange', again);
    window?.addEventListener('online', again);
    inject(DestroyRef).onDestroy(() => {
      this.document.removeEventListener('visibilitychange', again);
      window?.removeEventListener('online', again);
    });
  }

  protected async load(): Promise<void> {
    if (this.visit.session() === null) await this.visit.load().catch(() => null);
    await this.documents.loadNextMorning();
  }

  protected toNow(event: Event): void {
    event.preventDefault();
    this.document.getElementById('now')?.scrollIntoView({ block: 'center' });
  }
}
