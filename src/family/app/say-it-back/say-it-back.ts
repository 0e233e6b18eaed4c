import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import type {
  SayBackAnswered,
  SayBackAnswerRequest,
  SayItBack,
} from '../../../../shared/contracts/say-it-back';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { SayItBackClient } from '../../../common/api/family/say-it-back-client';
import { FamilyClock } from '../../../common/session/family-clock';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { ChildFace } from '../../../common/ui/picture/child-face';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';

/** Has the clinic told the plan well? One question a screen; each answer is explained. Needs signal. */
@Component({
  selector: 'td-say-it-back',
  imports: [ChildFace, PageHeading, PageSkeleton, PageTrouble, PictureMark, RouterLink, SkyBand],
  templateUrl: './say-it-back.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SayItBackPage {
  private readonly client = inject(SayItBackClient);
  private readonly clock = inject(FamilyClock);
  private readonly visit = inject(FamilyVisit);

  protected readonly clinicName = computed(() => this.visit.clinic()?.shortName ?? '');
  protected readonly page = signal<SayItBack | null>(null);
  protected readonly answered = signal<SayBackAnswered | null>(null);
  protected readonly failure = signal<FamilyFailure | null>(null);
  protected readonly isSending = signal(false);
  /** What was tapped and has not come through. */
  private readonly unsent = signal<SayBackAnswerRequest | null>(null);
  protected readonly question = computed(() => this.page()?.questions[0] ?? null);
  /** From 1; a question that is asked again has no place of its own. */
  protected readonly place = computed(() => {
    const page = this.page();
    if (!page || (this.question()?.tries ?? 0) > 0) return null;
    return page.total - page.questions.filter(({ tries }) => tries === 0).length + 1;
  });

  constructor() {
    void this.load();
  }

  protected async again(): Promise<void> {
    const unsent = this.unsent();
    await (unsent ? this.send(unsent) : this.load());
  }

  protected choose(choice: string): void {
    const [page, question] = [this.page(), this.question()];
    if (!page?.on || !question || this.isSending()) return;
    void this.send({
      submissionKey: crypto.randomUUID(),
      on: page.on,
      question: question.question,
      tries: question.tries,
      choice,
      deviceAt: this.clock.instant(),
    });
  }

  protected goOn(): void {
    const answered = this.answered();
    if (!answered) return;
    this.page.set(answered.next);
    this.answered.set(null);
  }

  private async load(): Promise<void> {
    this.failure.set(null);
    try {
      if (this.visit.session() === null) await this.visit.load().catch(() => null);
      this.page.set(await this.client.questions());
    } catch (error) {
      this.failure.set(familyFailure(error));
    }
  }

  private async send(request: SayBackAnswerRequest): Promise<void> {
    this.isSending.set(true);
    this.failure.set(null);
    this.unsent.set(request);
    try {
      this.answered.set(await this.client.answer(request));
      this.unsent.set(null);
    } catch (error) {
      const failure = familyFailure(error);
      if (!failure.mayPass) this.unsent.set(null);
      this.failure.set(failure);
    } finally {
      this.isSending.set(false);
    }
  }
}
