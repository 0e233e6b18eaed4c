import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  inject,
  input,
  numberAttribute,
  signal,
  viewChild,
} from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { Router } from '@angular/router';
import { addOrderRequest } from '../../../../shared/contracts/orders';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });

/** A new order. The stop card comes first: any "yes" there is not bookable, the physician is telephoned. */
@Component({
  selector: 'td-add-order',
  imports: [
    ReactiveFormsModule,
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
  ],
  templateUrl: './add-order.html',
  styleUrls: ['../../../common/ui/form/fields.scss', '../../../common/ui/form/form-page.scss'],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddOrder {
  private readonly client = inject(ChildrenClient);
  private readonly router = inject(Router);
  private readonly summary = viewChild<ElementRef<HTMLElement>>('summary');
  private readonly submissionKey = crypto.randomUUID();

  /** The child's id, from the address. */
  readonly child = input.required({ transform: numberAttribute });
  protected readonly faultOf = faultOf;
  protected readonly isBusy = signal(false);
  protected readonly says = signal<readonly string[]>([]);
  protected readonly form = new FormGroup({
    orderedByName: control(''),
    answerTo: control(''),
    reason: control(''),
    morningsPlanned: control(3),
    intendsToTreat: control(false),
    stopCard: new FormGroup({
      hasSuspectedMeningitis: control(false),
      hasSuspectedMiliaryDisease: control(false),
      hasBreathingDistress: control(false),
      isDrowsy: control(false),
      canBringUpSputum: control(false),
    }),
    details: new FormGroup({
      weightKg: control<number | null>(null),
      sourceCase: control<'known' | 'not-known'>('not-known'),
      sourceSusceptibility: control<'susceptible' | 'resistant' | 'not-known'>('not-known'),
      medicines: control(''),
      medicinesSince: control(''),
      hasBleedingHistory: control(false),
      hasNoseOrAirwayTrouble: control(false),
      hasRecentSurgery: control(false),
      hasInfectiousContactAtHome: control(false),
      note: control(''),
    }),
  });

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const value = this.form.getRawValue();
    const parsed = addOrderRequest.safeParse({
      ...value,
      details: { ...value.details, medicinesSince: value.details.medicinesSince || null },
      childId: this.child(),
      submissionKey: this.submissionKey,
    });
    if (!parsed.success) {
      const faults = issuesByPath(parsed.error.issues);
      if (value.details.weightKg === null)
        faults.set(
          'details.weightKg',
          $localize`:@@clinic.add-order.weight-missing:Give the weight.`,
        );
      this.show(faults, []);
      return;
    }
    this.isBusy.set(true);
    try {
      const order = await this.client.addOrder(parsed.data);
      await this.router.navigate(['/orders', order.id]);
    } catch (error) {
      const failure = clinicFailure(error);
      const detail = failure.problem?.detail;
      this.show(failure.fields, detail ? [failure.message, detail] : [failure.message]);
    } finally {
      this.isBusy.set(false);
    }
  }

  private show(faults: ReadonlyMap<string, string>, says: readonly string[]): void {
    const all = [...says, ...showFaults(this.form, faults)];
    this.says.set(
      all.length > 0 ? all : [$localize`:@@clinic.form.check:Some answers need another look.`],
    );
    setTimeout(() => this.summary()?.nativeElement.focus());
  }
}
