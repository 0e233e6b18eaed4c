import {
  ChangeDetectionStrategy,
  Component,
  inject,
  input,
  numberAttribute,
  signal,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { Router } from '@angular/router';
import { addFamilyMemberRequest } from '../../../../shared/contracts/children';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import { FamilyMemberFields } from './family-member-fields';
import { familyMemberGroup, familyMemberValue } from './family-member-form';

/** Another adult for a child who is known. */
@Component({
  selector: 'td-add-family-member',
  imports: [ReactiveFormsModule, FamilyMemberFields],
  template: `
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.add-member.heading">Add an adult</h1>
    </div>
    <form class="sheet part" (submit)="$event.preventDefault(); submit()" novalidate>
      <p class="field-says" role="alert">{{ says() }}</p>
      <td-family-member-fields [group]="group" />
      <button class="do first" [disabled]="isBusy()" i18n="@@clinic.add-member.keep">
        Keep this adult
      </button>
    </form>
  `,
  styleUrl: '../../../common/ui/form/form-page.scss',
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddFamilyMember {
  private readonly client = inject(ChildrenClient);
  private readonly router = inject(Router);

  readonly childId = input.required({ transform: numberAttribute });
  protected readonly group = familyMemberGroup();
  protected readonly isBusy = signal(false);
  protected readonly says = signal('');

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const parsed = addFamilyMemberRequest.safeParse(familyMemberValue(this.group));
    if (!parsed.success) {
      this.says.set(showFaults(this.group, issuesByPath(parsed.error.issues)).join(' '));
      return;
    }
    this.isBusy.set(true);
    try {
      await this.client.addFamilyMember(this.childId(), parsed.data);
      await this.router.navigate(['/children', this.childId()]);
    } catch (error) {
      const failure = clinicFailure(error);
      this.says.set([failure.message, ...showFaults(this.group, failure.fields)].join(' '));
    } finally {
      this.isBusy.set(false);
    }
  }
}
