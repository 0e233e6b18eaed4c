import {
  ChangeDetectionStrategy,
  Component,
  effect,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import type { FamilyMember } from '../../../../shared/contracts/children';
import {
  procedureConsentRequest,
  type ProcedureConsentRequest,
} from '../../../../shared/contracts/orders';
import { languages } from '../../../../shared/languages/languages';
import type { ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import { LanguageNamePipe } from '../../../common/ui/language-name';

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });

/** Consent for the procedure and for holding: by whom, on what basis, how, in which language, with whom. */
@Component({
  selector: 'td-consent-form',
  imports: [
    ReactiveFormsModule,
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    LanguageNamePipe,
  ],
  templateUrl: './consent-form.html',
  styleUrl: '../../../common/ui/form/fields.scss',
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ConsentForm {
  private readonly clock = inject(ClinicClock);

  /** Guardians who may consent. */
  readonly members = input.required<readonly FamilyMember[]>();
  readonly isBusy = input(false);
  readonly failure = input<ClinicFailure | null>(null);
  readonly given = output<ProcedureConsentRequest>();
  protected readonly languages = languages;
  protected readonly faultOf = faultOf;
  protected readonly says = signal('');
  protected readonly form = new FormGroup({
    familyMemberId: control<number | null>(null),
    legalBasis: control(''),
    how: control<'in-person' | 'telephone'>('in-person'),
    witness: control(''),
    interpreter: control(''),
    language: control('en'),
    formVersion: control(''),
    comfortPlan: control(''),
    hasParentInRoom: control(true),
  });

  constructor() {
    effect(() => {
      const failure = this.failure();
      if (failure) showFaults(this.form, failure.fields);
    });
  }

  protected submit(): void {
    const value = { ...this.form.getRawValue(), givenAt: this.clock.instant() };
    const parsed = procedureConsentRequest.safeParse(value);
    if (parsed.success) {
      this.says.set('');
      this.given.emit(parsed.data);
      return;
    }
    const faults = issuesByPath(parsed.error.issues);
    if (value.familyMemberId === null)
      faults.set('familyMemberId', $localize`:@@clinic.consent.who-missing:Choose who consents.`);
    this.says.set(showFaults(this.form, faults).join(' '));
  }
}
