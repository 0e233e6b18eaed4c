import * as z from 'zod';
import { items } from '../domain/fasting-protocol';
import { medicineWays, planPhrases } from '../domain/individual-plan';
import { clockTime, day, id, instant, shortText } from './common';
import { explanation } from './explanation';

const hours = z
  .number()
  .multipleOf(0.25, 'Give hours in quarters, such as 4.5.')
  .min(0.25, 'Between a quarter of an hour and 24 hours.')
  .max(24, 'Between a quarter of an hour and 24 hours.');

/** What a clinician puts together for one child: hours, clock times and signed phrases, never free sentences. */
export const individualPlanBody = z.object({
  stops: z
    .array(
      z.object({
        item: z.enum(items),
        leastHours: hours.nullable().default(null),
        nothingFrom: clockTime.nullable().default(null),
      }),
    )
    .max(items.length),
  longestHours: hours,
  lastFeedTime: clockTime.nullable().default(null),
  phrases: z
    .array(
      z.object({
        key: z.enum(planPhrases),
        glucoseMgDl: z
          .number()
          .int()
          .min(20, 'Between 20 and 400 mg/dL.')
          .max(400, 'Between 20 and 400 mg/dL.')
          .nullable()
          .default(null),
      }),
    )
    .max(planPhrases.length),
  medicines: z
    .array(
      z.object({
        name: shortText(60),
        way: z.enum(medicineWays),
        time: clockTime.nullable().default(null),
        sipMl: z
          .number()
          .int()
          .min(1, 'Between 1 and 50 mL.')
          .max(50, 'Between 1 and 50 mL.')
          .nullable()
          .default(null),
      }),
    )
    .max(10),
});
export type IndividualPlanBodyInput = z.input<typeof individualPlanBody>;

export const previewIndividualPlanRequest = z.object({
  seriesId: id.nullable().default(null),
  body: individualPlanBody,
});
export type PreviewIndividualPlanRequest = z.input<typeof previewIndividualPlanRequest>;

export const signIndividualPlanRequest = z
  .object({
    /** One series, or days; with neither it holds for every morning. */
    seriesId: id.nullable().default(null),
    from: day.nullable().default(null),
    until: day.nullable().default(null),
    /** The newest version that the screen showed, 0 when there was none. */
    afterVersion: z.number().int().min(0),
    body: individualPlanBody,
    submissionKey: z.uuid(),
  })
  .refine(({ seriesId, from, until }) => seriesId === null || (from === null && until === null), {
    path: ['from'],
    message: 'Give a series or days, not both.',
  })
  .refine(({ from, until }) => from === null || until === null || from <= until, {
    path: ['until'],
    message: 'The last day comes before the first.',
  });
export type SignIndividualPlanRequest = z.input<typeof signIndividualPlanRequest>;

export const endIndividualPlanRequest = z.object({ reason: shortText(200) });

/** What the family will read, language by language. */
export const individualPlanPreview = z.object({
  problems: z.array(z.object({ path: z.string(), message: z.string() })),
  /** Which morning the times are shown for. */
  on: day,
  arrivalTime: clockTime,
  /** Set when no morning is planned and an example is shown. */
  exampleSays: z.string().nullable(),
  explains: z.array(explanation),
  languages: z.array(
    z.object({
      language: z.string(),
      dir: z.enum(['ltr', 'rtl']),
      /** Whether every phrase is signed in this language; a person calls otherwise. */
      isSigned: z.boolean(),
      says: z.string(),
      lines: z.array(z.string()),
    }),
  ),
});
export type IndividualPlanPreview = z.infer<typeof individualPlanPreview>;

export const individualPlans = z.object({
  childId: id,
  fullName: z.string(),
  /** Why no standard plan is made for the next morning; empty when one is. */
  neededBecause: z.array(z.string()),
  /** A morning to come waits for a plan. */
  isMissing: z.boolean(),
  /** How the plan of the next morning was reached. */
  explains: z.array(explanation),
  /** Newest first. */
  versions: z.array(
    z.object({
      id,
      version: z.number().int(),
      says: z.string(),
      effectiveSays: z.string(),
      seriesId: id.nullable(),
      from: day.nullable(),
      until: day.nullable(),
      signedAt: instant,
      isInForce: z.boolean(),
      endedSays: z.string().nullable(),
      body: individualPlanBody,
    }),
  ),
  series: z.array(z.object({ id, startsOn: day })),
});
export type IndividualPlans = z.infer<typeof individualPlans>;
