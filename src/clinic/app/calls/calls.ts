import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  computed,
  inject,
  input,
  signal,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router, RouterLink } from '@angular/router';
import { auditTime, filter } from 'rxjs';
import type { CallDoneRequest, CallList } from '../../../../shared/contracts/calls';
import { CallsClient } from '../../../common/api/clinic/calls-client';
import { clinicFailure, type ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { ClockPipe, clockIn, dayIn } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { PhonePipe } from '../../../common/ui/phone-words';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import { CallSheet } from './call-sheet';
import { callGroups, callMark, outcomeWords, urgentWords } from './call-words';

/** Calls to make, the most urgent first; the open one is in the address. */
@Component({
  selector: 'td-calls',
  imports: [CallSheet, ClockPipe, PhonePipe, RouterLink, SheetStates, StateMark],
  templateUrl: './calls.html',
  styleUrl: './calls.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Calls {
  private readonly client = inject(CallsClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  private readonly router = inject(Router);
  private readonly document = inject(DOCUMENT);

  /** The open call's id, from the address. */
  readonly call = input<string>();

  protected readonly loaded = new Loaded<CallList>(() => this.client.list());
  protected readonly zone = this.user.zone;
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<{ callId: number; problem: ClinicFailure } | null>(null);
  protected readonly said = signal('');
  protected readonly mayWrite = computed(() => this.user.has('calls.write'));
  protected readonly mayOpenChild = computed(() => this.user.has('children.read'));
  protected readonly me = computed(() => this.user.session()?.staff.fullName ?? '');
  protected readonly today = computed(() => {
    const now = new Date(this.clock.time()).toISOString();
    return `${clockIn(now, this.zone())}, ${dayIn(now, this.zone())}`;
  });
  protected readonly groups = computed(() =>
    callGroups(this.loaded.value()?.open ?? [], this.clock.time(), this.zone()),
  );
  protected readonly inOrder = computed(() => this.groups().flatMap(({ calls }) => calls));
  protected readonly chosen = computed(() => {
    const calls = this.inOrder();
    return calls.find(({ id }) => String(id) === this.call()) ?? calls[0] ?? null;
  });
  protected readonly after = computed(() => {
    const calls = this.inOrder();
    const at = calls.findIndex(({ id }) => id === this.chosen()?.id);
    return at < 0 ? null : (calls[at + 1] ?? null);
  });
  protected readonly done = computed(() => this.loaded.value()?.done ?? []);
  protected readonly callMark = callMark;
  protected readonly outcomeWords = outcomeWords;

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => ['calls', 'clock', 'opened'].includes(topic)),
        auditTime(300),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected urgent(call: CallList['open'][number]): string {
    return urgentWords(call, this.clock.time(), this.zone());
  }

  protected showResult(event: Event): void {
    event.preventDefault();
    this.document.querySelector('#result')?.scrollIntoView({ block: 'start' });
    this.document.querySelector<HTMLElement>('#result [type=radio]')?.focus();
  }

  protected async claim(callId: number): Promise<void> {
    await this.change(callId, () => this.client.claim(callId));
  }

  protected async finish(callId: number, request: CallDoneRequest): Promise<void> {
    const next = this.after();
    const isKept = await this.change(callId, () => this.client.done(callId, request));
    if (!isKept) return;
    this.said.set(
      $localize`:@@clinic.calls.kept-says:Kept: ${outcomeWords(request.outcome)}:outcome:.`,
    );
    await this.router.navigate([], { queryParams: { call: next?.id ?? null } });
    this.document.querySelector<HTMLElement>('#who-now, h1')?.focus();
  }

  private async change(callId: number, send: () => Promise<CallList>): Promise<boolean> {
    if (this.isBusy()) return false;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      this.loaded.show(await send());
      return true;
    } catch (error) {
      const problem = clinicFailure(error);
      this.failure.set({ callId, problem });
      if (problem.status === 409) await this.loaded.again();
      return false;
    } finally {
      this.isBusy.set(false);
    }
  }
}
