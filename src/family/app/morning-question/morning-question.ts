import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import type {
  FastingAnswer,
  MorningChangeRequest,
} from '../../../../shared/contracts/family-morning';
import { FamilyAnswers } from '../../../common/session/family-answers';
import { FamilyClock } from '../../../common/session/family-clock';
import { FamilyDocuments } from '../../../common/session/family-documents';
import { isQuestionOpen } from '../../../common/session/family-question-open';
import { FamilyVisit } from '../../../common/session/family-visit';
import { placeOf } from '../../../common/ui/night-path/path-rows';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { skyOf } from '../../../common/ui/sky-band/sky-of';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';
import { SlimSuns } from '../../../common/ui/suns/slim-suns';
import {
  checkRequest,
  stepAfter,
  stepName,
  type AnswerSheet,
  type GivenAnswer,
  type QuestionStep,
} from './answer-sheet';
import { AskEaten } from './ask-eaten';
import { AskWhen } from './ask-when';
import { ChangeFlow, type ChangeChoice } from './change-flow';
import { ChangeRows } from './change-rows';
import { morningView, newestOutcome } from './morning-view';
import { OutcomeSlab } from './outcome-slab';
import { RefusedSlab } from './refused-slab';
import { SavedSlab } from './saved-slab';
import { submissionKey } from './submission-key';

/** The dawn question: one question a screen, then what to do now. Works with no signal. */
@Component({
  selector: 'td-morning-question',
  imports: [
    AskEaten,
    AskWhen,
    ChangeFlow,
    ChangeRows,
    OutcomeSlab,
    PageHeading,
    PageSkeleton,
    PageTrouble,
    PictureMark,
    RefusedSlab,
    RouterLink,
    SavedSlab,
    SkyBand,
    SlimSuns,
  ],
  templateUrl: './morning-question.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MorningQuestionPage {
  private readonly documents = inject(FamilyDocuments);
  private readonly router = inject(Router);
  private readonly visit = inject(FamilyVisit);
  private readonly clock = inject(FamilyClock);
  protected readonly answers = inject(FamilyAnswers);

  /** From the address, so that 'back' on the phone leads to the question before. */
  readonly step = input<string>();

  protected readonly sheet = signal<AnswerSheet>(new Map());
  protected readonly question = computed(() => this.documents.question()?.data ?? null);
  protected readonly failure = this.documents.failure;
  protected readonly clinic = this.visit.clinic;
  protected readonly sky = computed(() => skyOf(this.question()?.skies ?? [], this.clock.now()));
  protected readonly morning = computed(() => {
    const morning = this.documents.nextMorning()?.data ?? null;
    return morning?.on === this.question()?.on ? morning : null;
  });
  /** Each child keeps the lane it has on the night path. */
  protected readonly lanes = computed<ReadonlyMap<number, number>>(() => {
    const children = this.morning()?.children ?? this.question()?.questions ?? [];
    return new Map(children.map(({ childId }, index) => [childId, placeOf(index)]));
  });
  protected readonly now = this.clock.now;
  private readonly isOpen = computed(() => {
    const question = this.question();
    if (this.documents.question()?.isFresh) return question?.state === 'open';
    const hours = this.morning()?.question;
    return hours ? isQuestionOpen(hours, this.clock.now()) : question?.state === 'open';
  });
  protected readonly view = computed(() => {
    const question = this.question();
    return question === null
      ? null
      : morningView({
          question,
          step: this.step(),
          isOpen: this.isOpen(),
          sheet: this.sheet(),
          waiting: this.answers.waiting(),
          isSending: this.answers.isSending(),
          hasFailed: this.answers.failure() !== null,
          refused: this.answers.refused(),
          outcome: newestOutcome(question, this.answers.outcome()),
        });
  });

  constructor() {
    void this.load();
    // An outcome moves the rest of the morning: who goes first, when each child eats again.
    effect(() => {
      if (this.answers.outcome() !== null) untracked(() => void this.documents.loadNextMorning());
    });
  }

  protected async load(): Promise<void> {
    if (this.visit.session() === null) await this.visit.load().catch(() => null);
    await this.answers.start();
    await this.documents.loadQuestion();
    if (this.documents.nextMorning() === null) await this.documents.loadNextMorning();
  }

  protected answer(step: QuestionStep, answer: FastingAnswer, lastIntakeAt: string | null): void {
    const question = this.question();
    const asked = question?.questions[step.index];
    if (!question || !asked) return;
    const given: GivenAnswer = { answer, lastIntakeAt };
    this.sheet.update((sheet) => new Map(sheet).set(asked.morningId, given));
    const next = stepAfter(step, answer, question.questions);
    if (next) this.goTo(stepName(next));
    else void this.handIn();
  }

  protected laneOf(childId: number): number {
    return this.lanes().get(childId) ?? 1;
  }

  protected goTo(step: string | null): void {
    void this.router.navigate(['/morning'], { queryParams: step ? { step } : {} });
  }

  protected changeAnswer(): void {
    this.sheet.set(new Map());
    this.goTo('q1');
  }

  protected async change(choice: ChangeChoice): Promise<void> {
    const question = this.question();
    if (!question) return;
    const request: MorningChangeRequest = {
      ...choice,
      submissionKey: submissionKey(),
      on: question.on,
      deviceAt: this.clock.instant(),
    };
    const sent = this.answers.handIn({ kind: 'change', request });
    await this.router.navigate(['/morning'], { replaceUrl: true });
    await sent;
  }

  private async handIn(): Promise<void> {
    const question = this.question();
    if (!question) return;
    const request = checkRequest(question, this.sheet(), submissionKey(), this.clock.instant());
    const sent = this.answers.handIn({ kind: 'check', request });
    await this.router.navigate(['/morning'], { replaceUrl: true });
    await sent;
  }
}
