import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { languages } from '../../../../shared/languages/languages';
import { faultOf } from '../../../common/ui/form/form-faults';
import type { FamilyMemberGroup } from './family-member-form';
import { LanguageNamePipe } from '../../../common/ui/language-name';

/** One adult of the family: who, how reached, in which language, and what this person agreed to. */
@Component({
  selector: 'td-family-member-fields',
  imports: [
    ReactiveFormsModule,
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    LanguageNamePipe,
  ],
  templateUrl: './family-member-fields.html',
  styleUrl: '../../../common/ui/form/fields.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FamilyMemberFields {
  readonly group = input.required<FamilyMemberGroup>();
  protected readonly languages = languages;
  protected readonly faultOf = faultOf;
}
