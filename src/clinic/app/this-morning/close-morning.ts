import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { auditTime, filter } from 'rxjs';
import {
  closeMorningRequest,
  type CloseReason,
  type Closing,
} from '../../../../shared/contracts/closing';
import { isDay } from '../../../../shared/domain/day';
import { dayOf } from '../../../../shared/domain/zone';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClosingClient } from '../../../common/api/clinic/closing-client';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe, longDay } from '../../../common/ui/clinic-times';
import { issuesByPath } from '../../../common/ui/form/form-faults';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

type Family = Closing['families'][number];

const settleMs = 400;
const topics = ['mornings', 'calls', 'messages', 'clock', 'opened'];

/** One action from a telephone at four in the morning: why, who hears how, and yes. */
@Component({
  selector: 'td-close-morning',
  imports: [MomentPipe, RouterLink, SheetStates],
  templateUrl: './close-morning.html',
  styleUrl: './close-morning.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CloseMorning {
  private readonly client = inject(ClosingClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  private readonly confirming = viewChild<ElementRef<HTMLElement>>('confirming');
  private readonly outcome = viewChild<ElementRef<HTMLElement>>('outcome');

  /** A calendar day from the address; today when there is none. */
  readonly on = input<string>();

  protected readonly day = computed(() => {
    const on = this.on();
    return on !== undefined && isDay(on) ? on : dayOf(this.clock.time(), this.user.zone());
  });
  protected readonly loaded = new Loaded(() => this.client.look(this.day()));
  protected readonly closing = this.loaded.value;
  protected readonly heading = computed(() => longDay(this.day()));
  protected readonly reasons = reasonWords;
  protected readonly reason = signal<CloseReason | null>(null);
  protected readonly says = signal('');
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly isAsking = signal(false);
  protected readonly isBusy = signal(false);
  protected readonly texted = computed(() => this.by((family) => family.how === 'text'));
  protected readonly called = computed(() =>
    this.by((family) => family.how === 'call' || family.how === 'text-and-call'),
  );
  protected readonly closed = computed(() => this.by((family) => family.isClosed));
  protected readonly openCount = computed(() => this.texted().length + this.called().length);

  constructor() {
    effect(() => {
      this.day();
      untracked(() => void this.loaded.again());
    });
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => topics.includes(topic)),
        auditTime(settleMs),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected choose(reason: CloseReason): void {
    this.reason.set(reason);
    this.faults.set(new Map());
  }

  /** First what it means, then the act: it cannot be undone. */
  protected ask(event: Event): void {
    event.preventDefault();
    if (this.request() === null) return;
    this.isAsking.set(true);
    setTimeout(() => this.confirming()?.nativeElement.focus());
  }

  protected async close(): Promise<void> {
    const request = this.request();
    if (request === null || this.isBusy()) return;
    this.isBusy.set(true);
    try {
      this.loaded.show(await this.client.close(this.day(), request));
      this.isAsking.set(false);
      setTimeout(() => this.outcome()?.nativeElement.focus());
    } catch (error) {
      const failure = clinicFailure(error);
      this.faults.set(new Map([['', failure.message], ...failure.fields]));
      await this.loaded.again();
    } finally {
      this.isBusy.set(false);
    }
  }

  protected namesOf({ children }: Family): string {
    return children.map(({ fullName, arrivalTime }) => `${arrivalTime} ${fullName}`).join(', ');
  }

  private by(belongs: (family: Family) => boolean): readonly Family[] {
    return (this.closing()?.families ?? []).filter(belongs);
  }

  private request() {
    const parsed = closeMorningRequest.safeParse({ reason: this.reason(), says: this.says() });
    if (parsed.success) {
      this.faults.set(new Map());
      return parsed.data;
    }
    const faults = issuesByPath(parsed.error.issues);
    if (this.reason() === null)
      faults.set('reason', $localize`:@@clinic.close.choose:Choose why the clinic stays closed.`);
    this.faults.set(faults);
    return null;
  }
}

/** Five: read and tapped half asleep. */
const reasonWords: readonly { readonly reason: CloseReason; readonly says: string }[] = [
  { reason: 'snow', says: $localize`:@@clinic.close.snow:Snow or ice` },
  { reason: 'courier', says: $localize`:@@clinic.close.courier:No courier` },
  { reason: 'laboratory', says: $localize`:@@clinic.close.laboratory:Laboratory cannot receive` },
  { reason: 'ventilation', says: $localize`:@@clinic.close.ventilation:No ventilation` },
  { reason: 'other', says: $localize`:@@clinic.close.other:Another reason` },
];
