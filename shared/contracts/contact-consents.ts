import * as z from 'zod';
import { id, instant } from './common';

const channel = z.enum(['sms', 'mail']);

/** What one person agrees to at one number or address. */
export const agreedAt = z.object({
  channel,
  address: z.string(),
  visits: z.boolean(),
  letters: z.boolean(),
  earlyMorning: z.boolean(),
  /** Said by text, and holds for everybody who shares the number. */
  hasOptedOut: z.boolean(),
});
export type AgreedAt = z.infer<typeof agreedAt>;

export const contactConsents = z.object({
  familyMember: z.object({
    id,
    fullName: z.string(),
    childId: id,
    childName: z.string(),
    language: z.string(),
  }),
  ways: z.array(agreedAt),
  /** What is read out, in the language of the screen and in that of the family where it is signed off. */
  asked: z.array(
    z.object({ channel, says: z.string(), saysInFamilyLanguage: z.string().nullable() }),
  ),
  history: z.array(z.object({ at: instant, says: z.string(), by: z.string().nullable() })),
});
export type ContactConsents = z.infer<typeof contactConsents>;

export const consentHow = z.enum(['in-person', 'by-telephone', 'on-paper']);
export const setContactConsentsRequest = z
  .object({
    channel,
    /** The number or address that was asked about: another one is asked again. */
    address: z.string().min(3).max(254),
    visits: z.boolean(),
    letters: z.boolean(),
    earlyMorning: z.boolean(),
    how: consentHow,
  })
  .refine(({ visits, letters, earlyMorning }) => visits || (!letters && !earlyMorning), {
    path: ['visits'],
    message: 'Letters and early texts need a yes to messages about visits.',
  })
  .refine(({ channel: way, earlyMorning }) => way === 'sms' || !earlyMorning, {
    path: ['earlyMorning'],
    message: 'Only texts can come too early.',
  });
export type SetContactConsentsRequest = z.input<typeof setContactConsentsRequest>;
