import * as z from 'zod';
import {
  caution,
  day,
  feeding,
  id,
  instant,
  languageId,
  morningState,
  optionalText,
  shortText,
  version,
} from './common';

const phone = z
  .string()
  .trim()
  .regex(/^\+?[0-9 ().-]{7,24}$/, 'Give a telephone number with its area code.');

export const familyMemberInput = z
  .object({
    fullName: shortText(160),
    standing: z.enum(['guardian', 'helper']),
    relationship: shortText(60),
    legalBasis: optionalText(120),
    mayConsent: z.boolean(),
    seesResults: z.boolean(),
    phone: phone.nullable().default(null),
    email: z
      .string()
      .trim()
      .pipe(z.email('Give an e-mail address.').max(254))
      .nullable()
      .default(null),
    readsLanguage: languageId,
    readsHow: z.enum(['well', 'little', 'no']),
    speaksLanguage: shortText(60),
    needsInterpreter: z.boolean(),
    agreesToTexts: z.boolean(),
    agreesToEarlyTexts: z.boolean(),
    agreesToMail: z.boolean(),
  })
  .refine((member) => member.phone !== null || member.email !== null, {
    path: ['phone'],
    message: 'Give a telephone number or an e-mail address.',
  })
  .refine((member) => member.standing === 'guardian' || !member.seesResults, {
    path: ['seesResults'],
    message: 'A helper brings the child and answers in the morning, but sees no results.',
  });
export type FamilyMemberInput = z.input<typeof familyMemberInput>;

/** Texts go over open networks and other people's screens: they never say the name (product rule 2). */
const labelIsNoName = {
  path: ['familyLabel'],
  message: 'This goes into texts, so it must not be the name. For example “Baby” or “Big girl”.',
};
const hasNamelessLabel = ({ fullName, familyLabel }: { fullName: string; familyLabel: string }) => {
  const words = (text: string): readonly string[] =>
    text.toLocaleLowerCase('en').match(/[\p{L}\p{M}\p{N}]+/gu) ?? [];
  const label = words(familyLabel);
  const name = words(fullName);
  return name.length === 0 || !name.every((word) => label.includes(word));
};

export const addChildRequest = z
  .object({
    /** Present when a brother or sister is already known. */
    householdId: id.nullable().default(null),
    fullName: shortText(160),
    callMe: shortText(80),
    /** What the family calls this child in texts; never the name. For example 'Baby'. */
    familyLabel: shortText(40),
    bornOn: day,
    recordNumber: optionalText(40),
    feeding,
    cautions: z.array(caution).max(7),
    travelMinutes: z.number().int().min(0).max(360),
    familyMembers: z.array(familyMemberInput).max(8),
    /** Repeats with the same key make one child. */
    submissionKey: z.uuid(),
  })
  .refine(hasNamelessLabel, labelIsNoName);
export type AddChildRequest = z.input<typeof addChildRequest>;
export const addFamilyMemberRequest = familyMemberInput;

export const changeChildRequest = z
  .object({
    version,
    fullName: shortText(160),
    callMe: shortText(80),
    familyLabel: shortText(40),
    bornOn: day,
    recordNumber: optionalText(40),
    feeding,
    cautions: z.array(caution).max(7),
  })
  .refine(hasNamelessLabel, labelIsNoName);
export type ChangeChildRequest = z.input<typeof changeChildRequest>;

export const childListItem = z.object({
  id,
  fullName: z.string(),
  bornOn: day,
  recordNumber: z.string().nullable(),
  languages: z.array(z.string()),
  /** What stands next for this child, in words. */
  next: z.string(),
});
export const childList = z.object({ children: z.array(childListItem), total: z.number().int() });
export type ChildList = z.infer<typeof childList>;

export const familyMember = z.object({
  id,
  fullName: z.string(),
  standing: z.enum(['guardian', 'helper']),
  relationship: z.string(),
  legalBasis: z.string().nullable(),
  mayConsent: z.boolean(),
  seesResults: z.boolean(),
  phone: z.string().nullable(),
  email: z.string().nullable(),
  readsLanguage: z.string(),
  readsHow: z.enum(['well', 'little', 'no']),
  speaksLanguage: z.string(),
  needsInterpreter: z.boolean(),
  agreesToTexts: z.boolean(),
  agreesToEarlyTexts: z.boolean(),
  agreesToMail: z.boolean(),
  hasOptedOut: z.boolean(),
  invitation: z.enum(['none', 'sent', 'used']),
});
export type FamilyMember = z.infer<typeof familyMember>;

export const happening = z.object({
  at: instant,
  /** Kind for the icon: 'order', 'consent', 'message', 'answer', 'door-check', 'collection', 'specimen', 'result', 'letter', 'call', 'seen'. */
  kind: z.string(),
  says: z.string(),
  by: z.string().nullable(),
});

export const childRecord = z.object({
  id,
  version,
  householdId: id,
  fullName: z.string(),
  callMe: z.string(),
  familyLabel: z.string(),
  bornOn: day,
  ageInWords: z.string(),
  recordNumber: z.string().nullable(),
  feeding,
  cautions: z.array(caution),
  travelMinutes: z.number().int(),
  siblings: z.array(z.object({ id, fullName: z.string(), bornOn: day })),
  familyMembers: z.array(familyMember),
  orders: z.array(
    z.object({
      id,
      orderedBy: z.string(),
      reason: z.string(),
      morningsPlanned: z.number().int(),
      signedAt: instant.nullable(),
      signedBy: z.string().nullable(),
      hasConsent: z.boolean(),
      reportingDueOn: day.nullable(),
      seriesId: id.nullable(),
    }),
  ),
  series: z.array(
    z.object({
      id,
      state: z.enum(['planned', 'collecting', 'awaiting-results', 'closed']),
      mornings: z.array(
        z.object({
          id,
          number: z.number().int(),
          plannedOn: day,
          arrivalTime: z.string(),
          state: morningState,
        }),
      ),
    }),
  ),
  /** Newest first. */
  happenings: z.array(happening),
});
export type ChildRecord = z.infer<typeof childRecord>;

export const sendInvitationAnswer = z.object({
  /** Channels by which the invitation is on its way. */
  channels: z.array(z.enum(['sms', 'mail'])),
  /** Set when nothing could be sent and somebody needs to call instead. */
  callReason: z.string().nullable(),
});
export type SendInvitationAnswer = z.infer<typeof sendInvitationAnswer>;
