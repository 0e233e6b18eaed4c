import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { pauseMorningRequest, type ReplanProposal } from '../../../../shared/contracts/replan';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SeriesClient } from '../../../common/api/clinic/series-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { reasonFault } from './reason-fault';

type Child = ReplanProposal['children'][number];

/** A child that is ill on the day: no visit, the specimens stay, and somebody asks again in the afternoon. */
@Component({
  selector: 'td-pause-morning',
  template: `
    @for (one of today(); track one.morningId) {
      <form novalidate (submit)="pause($event, one.morningId, reason.value)">
        <h3 i18n="@@clinic.replan.ill">{{ one.name }} is ill today</h3>
        <p class="told" i18n="@@clinic.replan.pause-says">
          No visit today, the child may eat now. Specimens and later mornings stay. At 16:00 the
          call list asks how the child is.
        </p>
        <label [attr.for]="'pause-' + one.morningId" i18n="@@clinic.replan.pause-why"
          >What is it</label
        >
        <input
          #reason
          [id]="'pause-' + one.morningId"
          maxlength="200"
          required
          autocomplete="off"
          [attr.aria-invalid]="fault() ? true : null"
          [attr.aria-describedby]="'pause-says-' + one.morningId"
        />
        <span class="field-says" [id]="'pause-says-' + one.morningId">{{ fault() }}</span>
        <button class="do" [disabled]="isBusy()" i18n="@@clinic.replan.pause">
          Pause and tell the family
        </button>
      </form>
    }
  `,
  styles: `
    form {
      display: grid;
      gap: var(--space-1);
      justify-items: start;
      padding-top: var(--space-3);
      border-top: var(--rule);
    }
    h3 {
      font-size: var(--step-0);
    }
    input {
      width: 100%;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PauseMorning {
  private readonly client = inject(SeriesClient);
  private readonly clock = inject(ClinicClock);
  private readonly zone = inject(ClinicUser).zone;

  readonly children = input.required<readonly Child[]>();
  readonly paused = output<string>();

  protected readonly isBusy = signal(false);
  protected readonly fault = signal('');
  protected readonly today = computed(() => {
    const day = new Intl.DateTimeFormat('en-CA', { timeZone: this.zone() }).format(
      new Date(this.clock.now()),
    );
    return this.children().flatMap(({ fullName, mornings }) =>
      mornings
        .filter(({ on, state }) => on === day && (state === 'planned' || state === 'here'))
        .map(({ morningId }) => ({ morningId, name: fullName })),
    );
  });

  protected async pause(event: Event, morningId: number, reason: string): Promise<void> {
    event.preventDefault();
    if (this.isBusy()) return;
    this.fault.set(reasonFault(pauseMorningRequest.shape.reason, reason) ?? '');
    if (this.fault() !== '') return;
    this.isBusy.set(true);
    try {
      const { askedAgainSays } = await this.client.pause(morningId, reason);
      this.paused.emit(askedAgainSays);
    } catch (error) {
      const failure = clinicFailure(error);
      this.fault.set([...failure.fields.values()].join(' ') || failure.message);
    } finally {
      this.isBusy.set(false);
    }
  }
}
