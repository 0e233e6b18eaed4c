import * as z from 'zod';

/** A row's id. */
export const id = z.number().int().positive().max(Number.MAX_SAFE_INTEGER);
export const idInPath = z.coerce.number().int().positive().max(Number.MAX_SAFE_INTEGER);
/** Years in which people live and calendars agree; the tables' dates hold no year below 1000. */
const isOurAge = (text: string): boolean => text >= '1900' && text < '2200';
/**
 * No control characters but line breaks and tabs, and none that turn the direction of what follows (Unicode UAX 9, 2):
 * a name could read as another child's. Joiners, which some scripts need, stay.
 */
const isReadable = (text: string): boolean =>
  !/[^\P{Cc}\t\n\r]|[\u202a-\u202e\u2066-\u2069]/u.test(text);
const unreadable = 'This holds signs that nobody can see. Write it again.';
/** A calendar day, 'YYYY-MM-DD'. Days that do not exist (29 February of a common year) are refused. */
export const day = z.iso
  .date('Give a day that exists, as year-month-day.')
  .refine(isOurAge, 'Give a day that exists, as year-month-day.');
/** A local clock time, 'HH:mm'. */
export const clockTime = z
  .string()
  .regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Give a time between 00:00 and 23:59.');
/** An instant, ISO 8601 in UTC. */
export const instant = z.iso
  .datetime({ precision: 3, error: 'Give a date and time in UTC.' })
  .refine(isOurAge, 'Give a date and time in UTC.');
export const shortText = (max: number) =>
  z
    .string()
    .trim()
    .min(1, 'Fill this in.')
    .max(max, `At most ${max} characters.`)
    .refine(isReadable, unreadable);
export const optionalText = (max: number) =>
  z
    .string()
    .trim()
    .max(max, `At most ${max} characters.`)
    .refine(isReadable, unreadable)
    .transform((text) => (text === '' ? null : text))
    .nullable()
    .default(null);
export const languageId = z.string().regex(/^[a-z]{2,3}(-[A-Za-z]{2,4})?$/);
/** Increases with every change of a row; a write names the version it was made from. */
export const version = z.number().int().positive();
export const done = z.object({ done: z.literal(true) });

export const feeding = z.enum(['breast', 'formula', 'breast-and-formula', 'family-food']);
export type Feeding = z.infer<typeof feeding>;
/** Circumstances for which no standard plan is made; a clinician composes an individual one. */
export const caution = z.enum([
  'diabetes',
  'metabolic-disease',
  'low-blood-sugar',
  'severe-malnutrition',
  'prematurity',
  'tube-feeding',
  'morning-medicine',
]);
export type Caution = z.infer<typeof caution>;
export const verdict = z.enum(['long-enough', 'not-long-enough', 'cannot-tell']);
export type Verdict = z.infer<typeof verdict>;
export const morningState = z.enum([
  'planned',
  'here',
  'collecting',
  'collected',
  'not-collected',
  'lost',
]);
export type MorningState = z.infer<typeof morningState>;
