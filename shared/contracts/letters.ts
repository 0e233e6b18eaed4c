import * as z from 'zod';
import { day, id, instant } from './common';
import { specimen } from './specimens';

export const paragraph = z.object({
  key: z.string(),
  /** 'fixed', 'must-be-there', 'may-be-left-out', 'still-missing'. */
  standing: z.enum(['fixed', 'must-be-there', 'may-be-left-out', 'still-missing']),
  why: z.string(),
  clinicHeading: z.string(),
  clinicText: z.string(),
  familyHeading: z.string(),
  familyText: z.string(),
});
export type Paragraph = z.infer<typeof paragraph>;

export const medicines = z.enum(['keep-giving', 'start-on', 'none-now', 'decided-on']);

/** The choices a clinician makes before a letter can be signed. */
export const letterChoices = z.object({
  medicines: medicines.nullable().default(null),
  medicinesOn: day.nullable().default(null),
  nextVisitAt: instant.nullable().default(null),
  leftOut: z.array(z.string()).max(20).default([]),
});
export type LetterChoices = z.input<typeof letterChoices>;

export const letterDesk = z.object({
  seriesId: id,
  childId: id,
  childName: z.string(),
  ageInWords: z.string(),
  specimens: z.array(specimen),
  /** Which letter the results allow, and why. */
  letter: z.string(),
  letterSays: z.string(),
  whyNoOther: z.array(z.string()),
  clinicLanguage: z.string(),
  recipients: z.array(
    z.object({
      familyMemberId: id,
      fullName: z.string(),
      language: z.string(),
      languageName: z.string(),
      dir: z.enum(['ltr', 'rtl']),
      isSignedOff: z.boolean(),
    }),
  ),
  paragraphs: z.array(paragraph),
  /** Conditions, met or not: 'Three final results', 'Call about the positive result', 'Next visit'. */
  conditions: z.array(
    z.object({
      key: z.string(),
      says: z.string(),
      isMet: z.boolean(),
      field: z.string().nullable(),
    }),
  ),
  canBeSigned: z.boolean(),
  earlier: z.array(
    z.object({
      id,
      letter: z.string(),
      state: z.string(),
      signedAt: instant,
      releasedAt: instant.nullable(),
    }),
  ),
  wordingSays: z.string(),
  laboratorySays: z.string(),
});
export type LetterDesk = z.infer<typeof letterDesk>;

export const signLetterRequest = z.object({
  choices: letterChoices,
  /** Re-entered at signing. */
  password: z.string().min(1, 'Enter your password to sign.').max(512),
  release: z.boolean(),
  /** Guards against doubles and against results that changed under the reader. */
  resultsSeen: z.array(id),
});
export type SignLetterRequest = z.input<typeof signLetterRequest>;

export const letterListItem = z.object({
  id: id.nullable(),
  seriesId: id,
  childId: id,
  childName: z.string(),
  letter: z.string(),
  letterSays: z.string(),
  state: z.enum(['to-write', 'not-yet', 'signed', 'released']),
  signedAt: instant.nullable(),
  releasedAt: instant.nullable(),
  openedBy: z.array(z.object({ fullName: z.string(), openedAt: instant.nullable() })),
});
export const letterList = z.object({ letters: z.array(letterListItem) });
export type LetterList = z.infer<typeof letterList>;
export const letterSigned = z.object({ letterId: id, state: z.enum(['signed', 'released']) });
export type LetterSigned = z.infer<typeof letterSigned>;
