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
} from '../../../../shared/contracts/series';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SeriesClient } from '../../../common/api/clinic/series-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { dayIn, DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { RunWeeks } from './run-weeks';

interface Escort {
  readonly id: number;
  readonly says: string;
  readonly mayConsent: boolean;
}

/** Choose a run of mornings in a row: runs with places left, refused days with their reason, what the family is told. */
@Component({
  selector: 'td-plan-series',
  imports: [RouterLink, SheetStates, RunWeeks, DayPipe, MomentPipe],
  templateUrl: './plan-series.html',
  styleUrl: './plan-series.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PlanSeries {
  private readonly client = inject(SeriesClient);
  private readonly childrenClient = inject(ChildrenClient);
  private readonly router = inject(Router);
  private readonly clock = inject(ClinicClock);

  /** Ids of the orders planned together, '12' or '12,13'; from the address, like the two choices below. */
  readonly orders = input.required<string>();
  readonly from = input<string>();
  readonly mornings = input<string>();

  protected readonly zone = inject(ClinicUser).zone;
  protected readonly orderIds = computed(() =>
    this.orders().split(',').map(Number).filter(Boolean),
  );
  protected readonly today = computed(() => localDay(this.clock.now(), this.zone()));
  protected readonly fromDay = computed(() => this.from() ?? this.today());
  protected readonly morningsPlanned = computed(() => Number(this.mornings() ?? 3));
  protected readonly loaded = new Loaded(() =>
    this.client.propose({
      orderIds: this.orderIds(),
      from: this.fromDay(),
      morningsPlanned: this.morningsPlanned(),
    }),
  );
  protected readonly proposal = this.loaded.value;
  protected readonly chosen = signal<ProposedRun | null>(null);
  protected readonly preview = signal<PreviewSeriesAnswer | null>(null);
  protected readonly escorts = signal<readonly Escort[]>([]);
  /** Who brings the children, by day. */
  protected readonly brings = signal<ReadonlyMap<string, number>>(new Map());
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  protected readonly planned = signal<PlanSeriesAnswer | null>(null);
  protected readonly names = computed(() =>
    (this.proposal()?.children ?? []).map((child) => `${child.fullName}, ${child.ageInWords}`),
  );
  protected readonly siblings = signal<
    readonly { readonly orderId: number; readonly says: string }[]
  >([]);

  constructor() {
    effect(() => {
      this.orderIds();
      this.fromDay();
      this.morningsPlanned();
      untracked(() => void this.propose());
    });
  }

  protected choose(run: ProposedRun): void {
    this.chosen.set(run);
    this.failure.set(null);
    void this.look(run);
  }

  protected change(query: { from?: string; mornings?: string; orders?: string }): void {
    void this.router.navigate([], { queryParams: query, queryParamsHandling: 'merge' });
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
    return this.escorts().some((escort) => escort.id === id && !escort.mayConsent);
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
      if (failure.status === 409) await this.propose();
    } finally {
      this.isBusy.set(false);
    }
  }

  private async propose(): Promise<void> {
    this.chosen.set(null);
    this.preview.set(null);
    await this.loaded.again();
    const [child] = this.proposal()?.children ?? [];
    if (child) await this.learnFamily(child.childId);
  }

  private async learnFamily(childId: number): Promise<void> {
    try {
      const record = await this.childrenClient.record(childId);
      this.escorts.set(
        record.familyMembers.map((member) => ({
          id: member.id,
          says: `${member.fullName}, ${member.relationship}`,
          mayConsent: member.mayConsent,
        })),
      );
      const { orders } = await this.childrenClient.orders();
      const siblings = new Set(record.siblings.map((sibling) => sibling.id));
      this.siblings.set(
        orders
          .filter((order) => siblings.has(order.childId) && order.stillNeeded.length === 0)
          .filter((order) => order.seriesId === null && !this.orderIds().includes(order.id))
          .map((order) => ({ orderId: order.id, says: order.childName })),
      );
    } catch {
      // Without the family the mornings can still be chosen; who brings the child is asked later.
    }
  }

  private async look(run: ProposedRun): Promise<void> {
    try {
      const preview = await this.client.preview(this.request(run));
      if (this.chosen() === run) this.preview.set(preview);
    } catch (error) {
      this.failure.set(clinicFailure(error).message);
    }
  }

  private request(run: ProposedRun): PlanSeriesRequest {
    const days = new Set(run.days.map((day) => day.on));
    return {
      orderIds: this.orderIds(),
      days: run.days,
      escorts: [...this.brings()]
        .filter(([on]) => days.has(on))
        .map(([on, familyMemberId]) => ({ on, familyMemberId })),
    };
  }

  protected dayOf(at: string): string {
    return dayIn(at, this.zone());
  }
}

/** 'YYYY-MM-DD' of the instant in the zone. */
const localDay = (at: number, zone: string): string =>
  new Intl.DateTimeFormat('en-CA', { timeZone: zone }).format(new Date(at));
