export const roleWords: readonly { readonly role: string; readonly says: string }[] = [
  { role: 'nurse-coordinator', says: $localize`:@@clinic.role.nurse:Nurse coordinator` },
  { role: 'clinician', says: $localize`:@@clinic.role.clinician:Clinician` },
  { role: 'lead-clinician', says: $localize`:@@clinic.role.lead:Lead clinician` },
  { role: 'front-desk', says: $localize`:@@clinic.role.front-desk:Front desk` },
  {
    role: 'language-reviewer',
    says: $localize`:@@clinic.role.language-reviewer:Language reviewer`,
  },
  { role: 'outreach-nurse', says: $localize`:@@clinic.role.outreach:Outreach nurse` },
  { role: 'administrator', says: $localize`:@@clinic.role.administrator:Administrator` },
];

export const roleSays = (role: string): string =>
  roleWords.find((word) => word.role === role)?.says ?? role;
