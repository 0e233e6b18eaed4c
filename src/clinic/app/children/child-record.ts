import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { debounceTime, filter } from 'rxjs';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { SeriesClient } from '../../../common/api/clinic/series-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { PhonePipe } from '../../../common/ui/phone-words';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { cautionSays, feedingSays } from './child-words';
import { OwnPlanSummary } from './own-plan-summary';

/** One child: family, orders, series, and everything that happened in one column of time. */
@Component({
  selector: 'td-child-record',
  imports: [RouterLink, SheetStates, DayPipe, MomentPipe, OwnPlanSummary, PhonePipe],
  templateUrl: './child-record.html',
  styleUrl: './child-record.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChildRecordScreen {
  private readonly client = inject(ChildrenClient);
  private readonly series = inject(SeriesClient);
  private readonly user = inject(ClinicUser);

  readonly childId = input.required({ transform: numberAttribute });
  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.record(this.childId()));
  protected readonly child = this.loaded.value;
  protected readonly isBusy = signal(false);
  protected readonly says = signal<string | null>(null);
  protected readonly failure = signal<string | null>(null);
  /** The morning that is about to be given up. */
  protected readonly losing = signal<number | null>(null);
  protected readonly mayWrite = computed(() => this.user.has('children.write'));
  protected readonly mayOrder = computed(() => this.user.has('orders.write'));
  protected readonly mayPlan = computed(() => this.user.has('series.plan'));
  protected readonly maySeePlan = computed(() => this.user.has('orders.read'));
  protected readonly maySeeAccess = computed(() => this.user.has('access-record.read'));
  protected readonly feedingSays = feedingSays;
  protected readonly cautions = computed(() =>
    (this.child()?.cautions ?? []).map(cautionSays).join(', '),
  );
  /** Signed orders with consent that wait for their mornings. */
  protected readonly plannable = computed(() =>
    (this.child()?.orders ?? []).filter(
      (order) => order.signedAt && order.hasConsent && order.seriesId === null,
    ),
  );

  constructor() {
    effect(() => {
      this.childId();
      untracked(() => void this.loaded.again());
    });
    inject(LiveClient)
      .news.pipe(
        filter((news) => news.topic !== 'clock'),
        debounceTime(500),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected invite(familyMemberId: number): Promise<void> {
    return this.act(async () => {
      const { channels, callReason } = await this.client.invite(familyMemberId);
      this.says.set(
        channels.length > 0
          ? $localize`:@@clinic.child.invited:The invitation is on its way.`
          : (callReason ??
              $localize`:@@clinic.child.not-invited:Nothing could be sent. Call this person.`),
      );
    });
  }

  protected lose(event: Event, morningId: number, reason: string): void {
    event.preventDefault();
    void this.act(async () => {
      await this.series.loseMorning(morningId, reason);
      this.losing.set(null);
      this.says.set(
        $localize`:@@clinic.child.lost:The place is free again and the family is told.`,
      );
    });
  }

  protected stateSays(state: string): string {
    return stateWords[state] ?? state;
  }

  private async act(work: () => Promise<void>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.says.set(null);
    this.failure.set(null);
    try {
      await work();
    } catch (error) {
      const failure = clinicFailure(error);
      this.failure.set([failure.message, ...failure.fields.values()].join(' '));
    } finally {
      this.isBusy.set(false);
      await this.loaded.again();
    }
  }
}

const stateWords: Record<string, string> = {
  planned: $localize`:@@clinic.morning.planned:planned`,
  here: $localize`:@@clinic.morning.here:here`,
  collecting: $localize`:@@clinic.morning.collecting:being collected`,
  collected: $localize`:@@clinic.morning.collected:collected`,
  'not-collected': $localize`:@@clinic.morning.not-collected:not collected`,
  lost: $localize`:@@clinic.morning.lost:lost`,
};
