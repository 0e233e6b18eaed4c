import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { FormArray, FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { addChildRequest } from '../../../../shared/contracts/children';
import type { Caution, Feeding } from '../../../../shared/contracts/common';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import { cautionWords, feedingWords } from './child-words';
import { FamilyMemberFields } from './family-member-fields';
import { familyMemberGroup, familyMemberValue, type FamilyMemberGroup } from './family-member-form';

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });

/** A new child with the adults around it, on one form: everything that one call can settle. */
@Component({
  selector: 'td-add-child',
  imports: [
    ReactiveFormsModule,
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    RouterLink,
    FamilyMemberFields,
  ],
  templateUrl: './add-child.html',
  styleUrls: ['../../../common/ui/form/fields.scss', '../../../common/ui/form/form-page.scss'],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddChild {
  private readonly client = inject(ChildrenClient);
  private readonly router = inject(Router);
  private readonly summary = viewChild<ElementRef<HTMLElement>>('summary');
  /** One key a form: sending it again after a lost answer makes no second child. */
  private readonly submissionKey = crypto.randomUUID();

  /** A brother or sister who is known; then the household is the same. */
  protected readonly householdId =
    Number(inject(ActivatedRoute).snapshot.queryParams['household']) || null;
  protected readonly feedings = feedingWords;
  protected readonly cautions = cautionWords;
  protected readonly faultOf = faultOf;
  protected readonly isBusy = signal(false);
  protected readonly says = signal<readonly string[]>([]);
  protected readonly knownId = signal<number | null>(null);
  protected readonly members = new FormArray<FamilyMemberGroup>(
    this.householdId === null ? [familyMemberGroup()] : [],
  );
  protected readonly form = new FormGroup({
    fullName: control(''),
    callMe: control(''),
    familyLabel: control(''),
    bornOn: control(''),
    recordNumber: control(''),
    feeding: control<Feeding>('family-food'),
    cautions: control<Caution[]>([]),
    travelMinutes: control(45),
    familyMembers: this.members,
  });

  protected addMember(): void {
    this.members.push(familyMemberGroup());
  }

  protected dropMember(index: number): void {
    this.members.removeAt(index);
  }

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const parsed = addChildRequest.safeParse({
      ...this.form.getRawValue(),
      familyMembers: this.members.controls.map(familyMemberValue),
      householdId: this.householdId,
      submissionKey: this.submissionKey,
    });
    if (!parsed.success) {
      this.show(issuesByPath(parsed.error.issues), []);
      return;
    }
    this.isBusy.set(true);
    try {
      const child = await this.client.add(parsed.data);
      await this.router.navigate(['/children', child.id]);
    } catch (error) {
      const failure = clinicFailure(error);
      const known = failure.problem?.['childId'];
      this.knownId.set(typeof known === 'number' ? known : null);
      this.show(failure.fields, [failure.message]);
    } finally {
      this.isBusy.set(false);
    }
  }

  private show(faults: ReadonlyMap<string, string>, says: readonly string[]): void {
    const rest = showFaults(this.form, faults);
    const all = [...says, ...rest];
    this.says.set(
      all.length > 0 ? all : [$localize`:@@clinic.form.check:Some answers need another look.`],
    );
    setTimeout(() => this.summary()?.nativeElement.focus());
  }
}
