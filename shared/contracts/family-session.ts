import * as z from 'zod';
import { day, instant, languageId } from './common';

const token = z.string().regex(/^[A-Za-z0-9_-]{16,64}$/);

/** What a link is for. Tells nothing about the child; asking does not use the link up. */
export const describeLinkRequest = z.object({ token });
export type DescribeLinkRequest = z.infer<typeof describeLinkRequest>;
export const linkDescription = z.object({
  kind: z.enum(['invitation', 'household']),
  state: z.enum(['open', 'expired', 'used', 'locked', 'unknown']),
  /** 'nothing' on a remembered phone with a household link: it opens at once. */
  needs: z.enum(['birth-date', 'nothing']),
  clinic: z.object({
    shortName: z.string(),
    phone: z.string(),
    phoneSays: z.string(),
    emergencyNumber: z.string(),
  }),
});
export type LinkDescription = z.infer<typeof linkDescription>;

export const openLinkRequest = z.object({
  token,
  /** Birth date of any child of the household; not needed on a remembered phone. */
  bornOn: day.nullable().default(null),
  isRemembered: z.boolean().default(false),
});
export type OpenLinkRequest = z.input<typeof openLinkRequest>;

/**
 * How far a family's session reaches: 'household' = the instructions and the morning question, 'fresh' = a code was
 * entered within the last minutes, letters too.
 */
export const familySession = z.object({
  reach: z.enum(['household', 'fresh']),
  isRemembered: z.boolean(),
  freshUntil: instant.nullable(),
  standing: z.enum(['guardian', 'helper']),
  language: languageId,
  maySeeLetters: z.boolean(),
  /** Where a code would go, shortened: 'text to ...0142'. */
  codeGoesTo: z.array(z.object({ channel: z.enum(['sms', 'mail']), says: z.string() })),
  clinic: z.object({
    shortName: z.string(),
    phone: z.string(),
    phoneSays: z.string(),
    emergencyNumber: z.string(),
  }),
  now: instant,
  opens: z.enum(['next-morning', 'morning-question']),
});
export type FamilySession = z.infer<typeof familySession>;

/** With an address when nobody is signed in; the answer is the same whether the address is known or not. */
export const sendCodeRequest = z.object({
  channel: z.enum(['sms', 'mail']),
  address: z.string().trim().min(5).max(254).nullable().default(null),
});
export type SendCodeRequest = z.input<typeof sendCodeRequest>;
export const checkCodeRequest = z.object({
  code: z
    .string()
    .transform((text) => text.replace(/\s/g, ''))
    .pipe(z.string().regex(/^\d{6}$/, 'The code has 6 digits.')),
  address: z.string().trim().min(5).max(254).nullable().default(null),
  isRemembered: z.boolean().default(false),
});
export type CheckCodeRequest = z.input<typeof checkCodeRequest>;
