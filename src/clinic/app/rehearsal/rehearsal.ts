import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router } from '@angular/router';
import { auditTime, filter } from 'rxjs';
import type { MoveClockRequest, RehearsalState } from '../../../../shared/contracts/rehearsal';
import { addDays, dayOf, instantOf } from '../../../../shared/domain/zone';
import { clinicFailure, type ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { RehearsalClient } from '../../../common/api/clinic/rehearsal-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe, clockIn, dayIn } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { PretendMailbox } from './pretend-mailbox';
import { PretendPhone } from './pretend-phone';

/** The pretended phones and mailboxes of the demo families, and a clock that can be moved on. */
@Component({
  selector: 'td-rehearsal',
  imports: [MomentPipe, PretendMailbox, PretendPhone, SheetStates],
  templateUrl: './rehearsal.html',
  styleUrl: './rehearsal.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Rehearsal {
  private readonly client = inject(RehearsalClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  private readonly router = inject(Router);

  /** The number of the open phone, from the address. */
  readonly phone = input<string>();

  protected readonly loaded = new Loaded<RehearsalState>(() => this.fetch());
  protected readonly zone = this.user.zone;
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<ClinicFailure | null>(null);
  /** Counts the texts that were kept, so that the phone clears its box then and only then. */
  protected readonly sent = signal(0);
  protected readonly state = this.loaded.value;
  protected readonly phones = computed(() => this.state()?.phones ?? []);
  protected readonly chosen = computed(
    () => this.phones().find(({ phone }) => phone === this.phone()) ?? this.phones()[0] ?? null,
  );
  protected readonly mailbox = computed(
    () => this.state()?.mailboxes.find(({ name }) => name === this.chosen()?.name) ?? null,
  );
  protected readonly now = computed(() => new Date(this.clock.time()).toISOString());
  protected readonly time = computed(() => clockIn(this.now(), this.zone()));
  protected readonly day = computed(() => dayIn(this.now(), this.zone()));
  protected readonly moments = computed(() =>
    (this.state()?.moments ?? []).filter(({ at }) => at > this.now()).slice(0, 8),
  );

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(auditTime(400), takeUntilDestroyed())
      .subscribe(() => void this.loaded.again());
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => topic === 'clock'),
        takeUntilDestroyed(),
      )
      .subscribe(() => this.failure.set(null));
  }

  protected choose(phone: string): void {
    void this.router.navigate([], { queryParams: { phone } });
  }

  protected move(request: MoveClockRequest): Promise<boolean> {
    return this.change(() => this.client.moveClock(request));
  }

  protected toEvening(): Promise<boolean> {
    const zone = this.zone();
    const now = this.clock.now();
    const today = dayOf(now, zone);
    const evening = (on: string): number => instantOf({ on, time: '18:00', zone });
    const to = evening(today) > now ? evening(today) : evening(addDays(today, 1));
    return this.move({ to: new Date(to).toISOString() });
  }

  protected async reply(phone: string, body: string): Promise<void> {
    const isSent = await this.change(() => this.client.reply({ phone, body }));
    if (isSent) this.sent.update((count) => count + 1);
  }

  private async change(send: () => Promise<RehearsalState>): Promise<boolean> {
    if (this.isBusy()) return false;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      const state = await send();
      this.clock.follow(state.now);
      this.loaded.show(state);
      return true;
    } catch (error) {
      this.failure.set(clinicFailure(error));
      return false;
    } finally {
      this.isBusy.set(false);
    }
  }

  private async fetch(): Promise<RehearsalState> {
    const state = await this.client.state();
    this.clock.follow(state.now);
    return state;
  }
}
