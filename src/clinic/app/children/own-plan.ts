import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { FormsModule } from '@angular/forms';
import { RouterLink } from '@angular/router';
import {
  signIndividualPlanRequest,
  type IndividualPlanPreview,
  type IndividualPlans,
  type SignIndividualPlanRequest,
} from '../../../../shared/contracts/individual-plans';
import { items } from '../../../../shared/domain/fasting-protocol';
import { medicineWays, planPhrases } from '../../../../shared/domain/individual-plan';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { IndividualPlansClient } from '../../../common/api/clinic/individual-plans-client';
import { DayPipe } from '../../../common/ui/clinic-times';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { OwnPlanDraft } from './own-plan-draft';
import { fieldOfPath } from './own-plan-form';
import { itemWords, phraseWords, wayWords } from './own-plan-words';

/** A clinician composes a plan for one child from hours, clock times and signed phrases, looks at it, and signs. */
@Component({
  selector: 'td-own-plan',
  imports: [FormsModule, RouterLink, SheetStates, DayPipe],
  templateUrl: './own-plan.html',
  styleUrl: './own-plan.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OwnPlan {
  private readonly client = inject(IndividualPlansClient);
  private readonly summary = viewChild<ElementRef<HTMLElement>>('summary');

  readonly childId = input.required({ transform: numberAttribute });
  protected readonly loaded = new Loaded(() => this.client.ofChild(this.childId()));
  protected readonly plans = this.loaded.value;
  protected readonly draft = new OwnPlanDraft();
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly says = signal<readonly string[]>([]);
  protected readonly signed = signal(false);
  protected readonly isBusy = signal(false);
  protected readonly preview = signal<IndividualPlanPreview | null>(null);
  /** What the look ahead was made of; after a change it has to be looked at again. */
  private readonly shownBody = signal('');
  protected readonly isShown = computed(
    () =>
      this.preview()?.problems.length === 0 &&
      this.shownBody() === JSON.stringify(this.draft.body()),
  );
  protected readonly items = items;
  protected readonly phrases = planPhrases;
  protected readonly ways = medicineWays;
  protected readonly itemWords = itemWords;
  protected readonly phraseWords = phraseWords;
  protected readonly wayWords = wayWords;
  private submissionKey = crypto.randomUUID();

  constructor() {
    effect(() => {
      this.childId();
      untracked(() => void this.open());
    });
  }

  protected look(event: Event): void {
    event.preventDefault();
    void this.act(async (request) => {
      const { seriesId, body } = request;
      const preview = await this.client.preview(this.childId(), { seriesId, body });
      this.preview.set(preview);
      this.shownBody.set(JSON.stringify(this.draft.body()));
      this.showFaults(preview.problems.map(({ path, message }) => [path, message]));
    });
  }

  protected sign(): void {
    void this.act(async (request) => {
      this.take(await this.client.sign(this.childId(), request));
      this.signed.set(true);
      this.preview.set(null);
    });
  }

  protected end(event: Event, planId: number, reason: string): void {
    event.preventDefault();
    if (reason.trim() === '') return;
    void this.attempt(async () => this.take(await this.client.end(planId, reason)));
  }

  private async open(): Promise<void> {
    await this.loaded.again();
    const plans = this.plans();
    if (plans) this.take(plans);
  }

  private take(plans: IndividualPlans): void {
    this.loaded.show(plans);
    this.submissionKey = crypto.randomUUID();
    this.draft.start(plans);
  }

  private async act(work: (request: SignIndividualPlanRequest) => Promise<void>): Promise<void> {
    const parsed = signIndividualPlanRequest.safeParse({
      ...this.draft.mornings(),
      afterVersion: this.plans()?.versions[0]?.version ?? 0,
      body: this.draft.body(),
      submissionKey: this.submissionKey,
    });
    if (!parsed.success) {
      this.showFaults(
        parsed.error.issues.map(({ path, message }) => [path.join('.'), schemaSentence(message)]),
      );
      return;
    }
    await this.attempt(() => work(parsed.data));
  }

  private async attempt(work: () => Promise<void>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.signed.set(false);
    this.says.set([]);
    this.faults.set(new Map());
    try {
      await work();
    } catch (error) {
      const failure = clinicFailure(error);
      this.showFaults([...failure.fields]);
      if (failure.fields.size === 0) this.tell([failure.message]);
      // What was typed stays; the versions beside it are the ones of now.
      if (failure.code === 'changed-meanwhile') await this.loaded.again();
    } finally {
      this.isBusy.set(false);
    }
  }

  private showFaults(faults: readonly (readonly [path: string, says: string])[]): void {
    const body = this.draft.body();
    this.faults.set(new Map(faults.map(([path, says]) => [fieldOfPath(path, body), says])));
    if (faults.length > 0) this.tell([...new Set(faults.map(([, says]) => says))]);
  }

  private tell(lines: readonly string[]): void {
    this.says.set(lines);
    setTimeout(() => this.summary()?.nativeElement.focus());
  }
}
