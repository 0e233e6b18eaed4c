import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { auditTime, filter } from 'rxjs';
import type { AlertList, StaffAlert } from '../../../../shared/contracts/alerts';
import { AlertsClient } from '../../../common/api/clinic/alerts-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { ClockPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

const minuteMs = 60_000;

/** What cannot wait: take it, or pass it on. Nothing here names a child. */
@Component({
  selector: 'td-alerts',
  imports: [ClockPipe, MomentPipe, RouterLink, SheetStates, StateMark],
  templateUrl: './alerts.html',
  styleUrl: './alerts.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Alerts {
  private readonly client = inject(AlertsClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);

  protected readonly loaded = new Loaded(() => this.client.list());
  private readonly all = computed(() => this.loaded.value()?.alerts ?? []);
  protected readonly waiting = computed(() =>
    this.all().filter(({ takenBy, endedAt }) => takenBy === null && endedAt === null),
  );
  protected readonly rest = computed(() =>
    this.all().filter(({ takenBy, endedAt }) => takenBy !== null || endedAt !== null),
  );
  protected readonly maySetUp = computed(() => this.user.has('set-up.read'));
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => ['alerts', 'clock', 'opened'].includes(topic)),
        auditTime(150),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  /** Whole minutes since it was raised. */
  protected age({ raisedAt }: StaffAlert): number {
    return Math.max(0, Math.floor((this.clock.time() - Date.parse(raisedAt)) / minuteMs));
  }

  protected mayOpen({ opens }: StaffAlert): boolean {
    return this.user.has(`${opens}.read`);
  }

  protected take({ id }: StaffAlert): Promise<void> {
    return this.act(() => this.client.take(id));
  }

  protected passOn({ id }: StaffAlert): Promise<void> {
    return this.act(() => this.client.passOn(id));
  }

  private async act(work: () => Promise<AlertList>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      this.loaded.show(await work());
    } catch (error) {
      this.failure.set(clinicFailure(error).message);
      void this.loaded.again();
    } finally {
      this.isBusy.set(false);
    }
  }
}
