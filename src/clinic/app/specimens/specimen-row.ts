import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { Specimen, SpecimenStepRequest } from '../../../../shared/contracts/specimens';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClockPipe, MomentPipe } from '../../../common/ui/clinic-times';

type Step = SpecimenStepRequest['step'];

/** One specimen: where it is, what its clock says, and the next step in one tap. */
@Component({
  // eslint-disable-next-line @angular-eslint/component-selector -- a list item stays a list item
  selector: 'li[tdSpecimenRow]',
  imports: [ClockPipe, MomentPipe, RouterLink],
  templateUrl: './specimen-row.html',
  styleUrl: './specimen-row.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SpecimenRow {
  private readonly clock = inject(ClinicClock);

  readonly specimen = input.required<Specimen>();
  readonly zone = input.required<string>();
  readonly mayWrite = input(false);
  readonly isBusy = input(false);
  readonly says = input<readonly string[]>([]);
  readonly step = output<SpecimenStepRequest>();

  protected readonly rejecting = signal(false);
  protected readonly next = computed<Step | null>(() => {
    const one = this.specimen();
    if (one.rejectedAt !== null || one.receivedAt !== null) return null;
    if (one.neutralisedAt === null) return 'neutralised';
    if (one.label === null) return 'labelled';
    return one.handedOverAt === null ? 'handed-over' : 'received';
  });

  protected now(step: 'handed-over'): void {
    this.step.emit({ step, version: this.specimen().version, at: this.clock.instant() });
  }

  protected neutralised(agent: string): void {
    const version = this.specimen().version;
    this.step.emit({ step: 'neutralised', version, at: this.clock.instant(), with: agent });
  }

  protected label(event: Event, text: string): void {
    event.preventDefault();
    this.step.emit({ step: 'labelled', version: this.specimen().version, label: text });
  }

  protected received(event: Event, laboratoryNumber: string): void {
    event.preventDefault();
    const version = this.specimen().version;
    this.step.emit({ step: 'received', version, at: this.clock.instant(), laboratoryNumber });
  }

  protected reject(event: Event, reason: string): void {
    event.preventDefault();
    const version = this.specimen().version;
    this.step.emit({ step: 'rejected', version, at: this.clock.instant(), reason });
    this.rejecting.set(false);
  }
}
