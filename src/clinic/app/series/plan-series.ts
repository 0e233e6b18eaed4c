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
  PlanSeriesAnswer,
  PlanSeriesRequest,
  PreviewSeriesAnswer,
  ProposedRun,
  UsualNightAnswer,
} from '../../../../shared/contracts/series';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { nextOffersIn, SeriesClient } from '../../../common/api/clinic/series-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { NightFeeds } from './night-feeds';
import { PlanFamily } from './plan-family';
import { RunWeeks } from './run-weeks';
import { isSameRun } from './same-run';

type Query = 'from' | 'mornings' | 'orders' | 'weeks' | 'ride' | 'apart';

/** Choose a run of mornings in a row: runs with places left, refused days with their reason, what the family is told. */
@Component({
  selector: 'td-plan-series',
  imports: [RouterLink, SheetStates, RunWeeks, NightFeeds, DayPipe, MomentPipe],
  templateUrl: './plan-series.html',
  styleUrl: './plan-series.scss',
  providers: [PlanFamily],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PlanSeries {
  private readonly client = inject(SeriesClient);
  private readonly router = inject(Router);
  private readonly clock = inject(ClinicClock);
  protected readonly family = inject(PlanFamily);

  /** Ids of the orders planned together, '12' or '12,13'; from the address, like the choices below. */
  readonly orders = input.required<string>();
  readonly from = input<string>();
  readonly mornings = input<string>();
  readonly weeks = input<string>();
  readonly ride = input<string>();
  readonly apart = input<string>();

  protected readonly zone = inject(ClinicUser).zone;
  protected readonly orderIds = computed(() =>
    this.orders().split(',').map(Number).filter(Boolean),
  );
  protected readonly today = computed(() => localDay(this.clock.now(), this.zone()));
  protected readonly fromDay = computed(() => this.from() ?? this.today());
  protected readonly morningsPlanned = computed(() => Number(this.mornings() ?? 3));
  protected readonly weeksAhead = computed(() => Number(this.weeks() ?? 4));
  protected readonly loaded = new Loaded(() =>
    this.client.propose({
      orderIds: this.orderIds(),
      from: this.fromDay(),
      morningsPlanned: this.morningsPlanned(),
      weeks: this.weeksAhead(),
      needsRide: this.ride() === 'yes',
      siblingsMayPart: this.apart() === 'yes',
      nights: this.nights(),
    }),
  );
  protected readonly proposal = this.loaded.value;
  protected readonly chosen = signal<ProposedRun | null>(null);
  protected readonly preview = signal<PreviewSeriesAnswer | null>(null);
  /** Who brings the children, by day. */
  protected readonly brings = signal<ReadonlyMap<string, number>>(new Map());
  /** What was told about the nights on this screen. */
  private readonly nights = signal<UsualNightAnswer[]>([]);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  protected readonly planned = signal<PlanSeriesAnswer | null>(null);
  protected readonly names = computed(() =>
    (this.proposal()?.children ?? []).map((child) => `${child.fullName}, ${child.ageInWords}`),
  );

  constructor() {
    effect(() => {
      this.orderIds();
      this.fromDay();
      this.morningsPlanned();
      this.weeksAhead();
      this.ride();
      this.apart();
      untracked(() => void this.propose());
    });
  }

  protected choose(run: ProposedRun): void {
    this.chosen.set(run);
    this.preview.set(null);
    this.failure.set(null);
    void this.look(run);
  }

  protected change(query: Partial<Record<Query, string | null>>): void {
    void this.router.navigate([], { queryParams: query, queryParamsHandling: 'merge' });
  }

  protected tell(childId: number, night: Omit<UsualNightAnswer, 'childId'>): void {
    this.nights.update((nights) => [
      ...nights.filter((one) => one.childId !== childId),
      { childId, ...night },
    ]);
    void this.propose();
  }

  protected bring(on: string, familyMemberId: string): void {
    this.brings.update((brings) => {
      const next = new Map(brings);
      if (familyMemberId === '') next.delete(on);
      else next.set(on, Number(familyMemberId));
      return next;
    });
  }

  protected cannotConsent(on: string): boolean {
    const id = this.brings().get(on);
    return this.family.escorts().some((escort) => escort.id === id && !escort.mayConsent);
  }

  protected async plan(run: ProposedRun): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      this.planned.set(await this.client.plan(this.request(run)));
    } catch (error) {
      const failure = clinicFailure(error);
      this.failure.set([failure.message, failure.problem?.detail ?? ''].join(' ').trim());
      const left = nextOffersIn(failure);
      if (left) {
        this.loaded.show(left);
        this.keepChoice(run);
      } else if (failure.status === 409) await this.propose();
    } finally {
      this.isBusy.set(false);
    }
  }

  private async propose(): Promise<void> {
    const before = this.chosen();
    await this.loaded.again();
    this.keepChoice(before);
    const [child] = this.proposal()?.children ?? [];
    if (child) await this.family.learn(child.childId, this.orderIds());
  }

  /** The run that was chosen, where a new search still has it; what was typed stays in any case. */
  private keepChoice(before: ProposedRun | null): void {
    const same = before && this.proposal()?.runs.find((run) => isSameRun(run, before));
    this.chosen.set(same ?? null);
    this.preview.set(null);
    if (same) void this.look(same);
  }

  private async look(run: ProposedRun): Promise<void> {
    try {
      const preview = await this.client.preview(this.request(run));
      if (this.chosen() === run) this.preview.set(preview);
    } catch (error) {
      this.failure.set(clinicFailure(error).message);
    }
  }

  private request({ days }: ProposedRun): PlanSeriesRequest {
    const planned = new Set(days.map((day) => day.on));
    return {
      orderIds: this.orderIds(),
      days,
      nights: this.nights(),
      needsRide: this.ride() === 'yes',
      escorts: [...this.brings()]
        .filter(([on]) => planned.has(on))
        .map(([on, familyMemberId]) => ({ on, familyMemberId })),
    };
  }
}

/** 'YYYY-MM-DD' of the instant in the zone. */
const localDay = (at: number, zone: string): string =>
  new Intl.DateTimeFormat('en-CA', { timeZone: zone }).format(new Date(at));
