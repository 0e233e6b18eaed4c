import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { type FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { faultOf } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import type { FieldSpec, SiteGroup } from './site-form';

/** Plain fields of a site, each with its sentence beside it. */
@Component({
  selector: 'td-site-fields',
  imports: [MatFormFieldModule, MatInputModule, ReactiveFormsModule],
  template: `<div class="fields">
    @for (field of fields(); track field.path) {
      <mat-form-field [class.wide]="field.isWide">
        <mat-label>{{ field.says }}</mat-label>
        <input
          matInput
          [type]="field.type"
          [formControl]="controlOf(field)"
          [attr.dir]="field.type === 'tel' ? 'ltr' : null"
          autocomplete="off"
        />
        @if (field.hint) {
          <mat-hint>{{ field.hint }}</mat-hint>
        }
        <mat-error>{{ faultOf(controlOf(field)) }}</mat-error>
      </mat-form-field>
    }
    <ng-content />
  </div>`,
  styleUrl: '../../../common/ui/form/fields.scss',
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SiteFields {
  readonly form = input.required<SiteGroup>();
  readonly fields = input.required<readonly FieldSpec[]>();
  protected readonly faultOf = faultOf;

  protected controlOf({ path }: FieldSpec): FormControl {
    return this.form().get(path) as FormControl;
  }
}
