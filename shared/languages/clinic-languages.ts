import type { LanguageId } from './languages';

/** The languages in which staff can work, in the order in which they are offered; the first is the source. */
export const clinicLanguages = ['en', 'es'] as const satisfies readonly LanguageId[];
export type ClinicLanguage = (typeof clinicLanguages)[number];

export const isClinicLanguage = (text: string): text is ClinicLanguage =>
  (clinicLanguages as readonly string[]).includes(text);
