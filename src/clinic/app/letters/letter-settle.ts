import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import type { LetterChoices, LetterDesk, LetterSigned } from '../../../../shared/contracts/letters';
import { instantOf, isDay, isTime } from '../../../../shared/domain/zone';
import type { ClinicFailure } from '../../../common/api/clinic/clinic-http';

type Medicines = NonNullable<LetterChoices['medicines']>;

/** What the clinician decides before signing. The sign button stays active and leads to what is missing. */
@Component({
  selector: 'td-letter-settle',
  imports: [ReactiveFormsModule],
  templateUrl: './letter-settle.html',
  styleUrl: './letter-settle.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LetterSettle {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly desk = input.required<LetterDesk>();
  readonly zone = input.required<string>();
  readonly maySign = input(false);
  readonly isBusy = input(false);
  readonly failure = input<ClinicFailure | null>(null);
  readonly signed = input<LetterSigned | null>(null);
  readonly chosen = output<LetterChoices>();
  readonly sign = output<{ password: string; release: boolean }>();

  protected readonly form = inject(NonNullableFormBuilder).group({
    medicines: '',
    medicinesOn: '',
    visitDay: '',
    visitTime: '',
    password: '',
  });
  protected readonly missingPassword = signal(false);
  protected readonly medicines: readonly {
    readonly value: Medicines;
    readonly says: string;
    readonly needsDay: boolean;
  }[] = [
    {
      value: 'keep-giving',
      says: $localize`:@@clinic.letter-settle.keep:Keep giving all of them`,
      needsDay: false,
    },
    {
      value: 'start-on',
      says: $localize`:@@clinic.letter-settle.start:Start on a date`,
      needsDay: true,
    },
    {
      value: 'none-now',
      says: $localize`:@@clinic.letter-settle.none:None now`,
      needsDay: false,
    },
    {
      value: 'decided-on',
      says: $localize`:@@clinic.letter-settle.decided:Will be decided on a date`,
      needsDay: true,
    },
  ];

  protected needsDay(): boolean {
    const value = this.form.controls.medicines.value;
    return this.medicines.some((one) => one.value === value && one.needsDay);
  }

  protected tell(): void {
    const { medicines, medicinesOn, visitDay, visitTime } = this.form.getRawValue();
    const hasVisit = isDay(visitDay) && isTime(visitTime);
    this.chosen.emit({
      medicines: medicines === '' ? null : (medicines as Medicines),
      medicinesOn: this.needsDay() && isDay(medicinesOn) ? medicinesOn : null,
      nextVisitAt: hasVisit
        ? new Date(instantOf({ on: visitDay, time: visitTime, zone: this.zone() })).toISOString()
        : null,
    });
  }

  protected submit(release: boolean): void {
    const missing = this.desk().conditions.find((condition) => !condition.isMet);
    const { password } = this.form.getRawValue();
    this.missingPassword.set(missing === undefined && password === '');
    if (missing !== undefined || password === '') {
      const target = missing === undefined ? 'password' : (missing.field ?? 'conditions');
      this.element.nativeElement.querySelector<HTMLElement>(`[data-field="${target}"]`)?.focus();
      return;
    }
    this.sign.emit({ password, release });
    this.form.controls.password.reset();
  }
}
