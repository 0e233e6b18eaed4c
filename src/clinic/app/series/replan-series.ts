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
import {
  replanRequest,
  type ReplanChange,
  type ReplanKind,
  type ReplanOutcome,
  type ReplanPreviewRequest,
  type ReplanProposal,
} from '../../../../shared/contracts/replan';
import type { DayPlaces, ProposedRun } from '../../../../shared/contracts/series';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { nextReplanIn, SeriesClient } from '../../../common/api/clinic/series-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { BeforeAfter } from './before-after';
import { PauseMorning } from './pause-morning';
import { reasonFault } from './reason-fault';
import { offerSays } from './replan-words';
import { RunWeeks } from './run-weeks';
import { isSameRun } from './same-run';
import { StandingSeries } from './standing-series';

type Offer = ReplanProposal['offers'][number];

/**
 * What becomes of a series: the next possible morning, a new run, closing with fewer, or planned mornings on other days.
 * What would be, and what the family would hear, stands beside the choice before it is made.
 */
@Component({
  selector: 'td-replan-series',
  imports: [
    RouterLink,
    SheetStates,
    RunWeeks,
    BeforeAfter,
    StandingSeries,
    PauseMorning,
    DayPipe,
    MomentPipe,
  ],
  templateUrl: './replan-series.html',
  styleUrl: './replan-series.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReplanSeries {
  private readonly client = inject(SeriesClient);
  private readonly router = inject(Router);
  private readonly user = inject(ClinicUser);

  /** Ids of the series, of one child or of brothers and sisters; from the address, like the choices below. */
  readonly series = input.required<string>();
  /** Ids of planned mornings that are to lie elsewhere. */
  readonly move = input<string>();
  readonly weeks = input<string>();
  readonly choice = input<string>();

  protected readonly zone = this.user.zone;
  private readonly seriesIds = computed(() => numbersIn(this.series()));
  protected readonly movedIds = computed(() => numbersIn(this.move()));
  protected readonly weeksAhead = computed(() => Number(this.weeks() ?? 4));
  protected readonly loaded = new Loaded(() =>
    this.client.proposeReplan({
      seriesIds: this.seriesIds(),
      movedMorningIds: this.movedIds(),
      weeks: this.weeksAhead(),
    }),
  );
  protected readonly proposal = this.loaded.value;
  protected readonly kind = signal<ReplanKind | null>(null);
  protected readonly run = signal<ProposedRun | null>(null);
  protected readonly preview = signal<ReplanOutcome | null>(null);
  protected readonly reason = signal('');
  protected readonly reasonFault = signal<string | null>(null);
  protected readonly failure = signal<string | null>(null);
  protected readonly paused = signal<string | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly done = signal<ReplanOutcome | null>(null);
  protected readonly offerSays = offerSays;
  protected readonly offer = computed(
    () => this.proposal()?.offers.find(({ kind }) => kind === this.kind()) ?? null,
  );
  /** A coordinator may move; what becomes of a lost morning is the clinician's. */
  protected readonly mayDecide = computed(
    () => this.kind() === 'move' || (this.proposal()?.mayChoose ?? false),
  );
  /** The chosen days are those that are planned already. */
  protected readonly changesNothing = computed(
    () =>
      this.kind() !== 'close-with-fewer' &&
      (this.preview()?.children ?? []).every(({ after }) =>
        after.every(({ change }) => change === 'kept'),
      ),
  );
  protected readonly names = computed(() =>
    (this.proposal()?.children ?? []).map((child) => `${child.fullName}, ${child.ageInWords}`),
  );

  constructor() {
    effect(() => {
      this.seriesIds();
      this.movedIds();
      this.weeksAhead();
      untracked(() => void this.propose());
    });
  }

  protected choose(offer: Offer): void {
    this.kind.set(offer.kind);
    this.run.set(offer.search.runs.find((run) => isSameRun(run, offer)) ?? null);
    this.change({ choice: offer.kind });
    void this.look();
  }

  protected chooseRun(run: ProposedRun): void {
    this.run.set(run);
    void this.look();
  }

  protected change(query: { move?: string | null; weeks?: string; choice?: string }): void {
    void this.router.navigate([], { queryParams: query, queryParamsHandling: 'merge' });
  }

  protected moveThese(morningIds: readonly number[]): void {
    const move = morningIds.join(',');
    this.change(move === '' ? { move: null } : { move, choice: 'move' });
  }

  protected async decide(event: Event): Promise<void> {
    event.preventDefault();
    const asked = this.asked();
    const proposal = this.proposal();
    if (this.isBusy() || !asked || !proposal) return;
    this.failure.set(null);
    this.reasonFault.set(reasonFault(replanRequest.shape.reason, this.reason()));
    if (this.reasonFault() !== null) return;
    this.isBusy.set(true);
    const versions = proposal.children.map(({ seriesId, version }) => ({ seriesId, version }));
    try {
      this.done.set(await this.client.replan({ ...asked, reason: this.reason(), versions }));
    } catch (error) {
      await this.failed(error);
    } finally {
      this.isBusy.set(false);
    }
  }

  protected timesOf({ places }: DayPlaces): string {
    return places.map(({ arrivalTime }) => arrivalTime).join(', ');
  }

  protected async wasPaused(says: string): Promise<void> {
    this.paused.set(says);
    await this.propose();
  }

  /** Somebody was first: what is left comes with the answer, and the reason that was typed stays. */
  private async failed(error: unknown): Promise<void> {
    const failure = clinicFailure(error);
    this.reasonFault.set(failure.fields.get('reason') ?? null);
    if (this.reasonFault() === null)
      this.failure.set(
        [failure.message, failure.problem?.detail ?? '', ...failure.fields.values()]
          .join(' ')
          .trim(),
      );
    const left = nextReplanIn(failure);
    if (left) this.loaded.show(left);
    else if (failure.status === 409) await this.loaded.again();
    if (failure.status === 409) this.startAgain();
  }

  private async propose(): Promise<void> {
    await this.loaded.again();
    this.startAgain();
  }

  private startAgain(): void {
    const wanted = this.kind() ?? this.choice();
    const offer = this.proposal()?.offers.find(({ kind }) => kind === wanted);
    this.preview.set(null);
    if (!offer?.isPossible) {
      this.kind.set(null);
      this.run.set(null);
      return;
    }
    const before = this.run();
    this.kind.set(offer.kind);
    this.run.set(
      offer.search.runs.find((run) => (before ? isSameRun(run, before) : isSameRun(run, offer))) ??
        null,
    );
    void this.look();
  }

  private asked(): (ReplanPreviewRequest & { days: DayPlaces[] }) | null {
    const kind: ReplanChange['kind'] | null = this.kind();
    const run = this.run();
    if (kind === null || (kind !== 'close-with-fewer' && run === null)) return null;
    return {
      kind,
      seriesIds: this.seriesIds(),
      movedMorningIds: kind === 'move' ? this.movedIds() : [],
      days: run && kind !== 'close-with-fewer' ? [...run.days] : [],
    };
  }

  private async look(): Promise<void> {
    const asked = this.asked();
    this.preview.set(null);
    this.failure.set(null);
    if (!asked) return;
    try {
      const preview = await this.client.previewReplan(asked);
      if (JSON.stringify(this.asked()) === JSON.stringify(asked)) this.preview.set(preview);
    } catch (error) {
      await this.failed(error);
    }
  }
}

const numbersIn = (list: string | undefined): number[] =>
  (list ?? '').split(',').map(Number).filter(Boolean);
