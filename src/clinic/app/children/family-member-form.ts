import { FormControl, FormGroup, type FormArray } from '@angular/forms';

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });

/** The fields of one adult of the family, as FamilyMemberInput reads them. */
export function familyMemberGroup() {
  return new FormGroup({
    fullName: control(''),
    standing: control<'guardian' | 'helper'>('guardian'),
    relationship: control(''),
    legalBasis: control(''),
    mayConsent: control(true),
    seesResults: control(true),
    phone: control(''),
    email: control(''),
    readsLanguage: control('en'),
    readsHow: control<'well' | 'little' | 'no'>('well'),
    speaksLanguage: control('English'),
    needsInterpreter: control(false),
    agreesToTexts: control(false),
    agreesToEarlyTexts: control(false),
    agreesToMail: control(false),
  });
}

export type FamilyMemberGroup = ReturnType<typeof familyMemberGroup>;
export type FamilyMemberArray = FormArray<FamilyMemberGroup>;

/** Empty contact fields are absent ones; a helper never sees results and cannot consent. */
export function familyMemberValue(group: FamilyMemberGroup) {
  const value = group.getRawValue();
  const isGuardian = value.standing === 'guardian';
  return {
    ...value,
    phone: value.phone.trim() === '' ? null : value.phone,
    email: value.email.trim() === '' ? null : value.email,
    mayConsent: isGuardian && value.mayConsent,
    seesResults: isGuardian && value.seesResults,
    agreesToEarlyTexts: value.agreesToTexts && value.agreesToEarlyTexts,
  };
}
