import * as z from 'zod';
import { allowableItems, items } from '../domain/fasting-protocol';
import { resultStages } from '../domain/specimen-clocks';
import { caution, clockTime, day, id, instant, languageId, version } from './common';

const minutes = (max: number) =>
  z.number('Give a number of minutes.').int('Give whole minutes.').min(0).max(max);
const months = z.number('Give a number of months.').int('Give whole months.').min(0).max(1200);
const hours = z
  .number('Give a number of hours.')
  .min(0, 'Hours cannot be negative.')
  .max(36, 'At most 36 hours.')
  .multipleOf(0.25, 'Give hours in quarters, such as 4.5.');
const title = z.string().trim().max(160, 'At most 160 characters.');
const weekday = z.union([
  z.literal(1),
  z.literal(2),
  z.literal(3),
  z.literal(4),
  z.literal(5),
  z.literal(6),
  z.literal(7),
]);
const timesByWeekday = z.partialRecord(z.enum(['1', '2', '3', '4', '5', '6', '7']), clockTime);

export const fastingBand = z.object({
  fromMonths: months,
  toMonths: months.nullable(),
  individualPlan: z.boolean(),
  leastHours: z.record(z.enum(items), hours).nullable(),
  longestHours: hours.nullable(),
  nothingFrom: clockTime.nullable(),
});

/** What a version of a fasting protocol holds; a draft may still have gaps. */
export const protocolValues = z.object({
  title,
  effectiveOn: day,
  usualWaitMinutes: minutes(600),
  eatAgainAfterMinutes: minutes(600),
  allowedItems: z.array(z.enum(allowableItems)).max(allowableItems.length),
  individualPlanCautions: z.array(caution).max(caution.options.length),
  wakeToCollectionMinutes: minutes(1440).nullable(),
  bands: z.array(fastingBand).max(16, 'At most 16 age bands.'),
});
export type ProtocolValues = z.infer<typeof protocolValues>;

/** What a version of a laboratory profile holds. Days of the week go from 1, Monday, to 7. */
export const profileValues = z.object({
  name: title,
  effectiveOn: day,
  receivingWeekdays: z.array(weekday).max(7),
  receivingFromTimes: timesByWeekday,
  cutOffTimes: timesByWeekday,
  minutesToLaboratory: minutes(1440),
  neutraliseWithinMinutes: minutes(1440).nullable(),
  receiptWithinMinutes: minutes(10_080),
  minimumVolumeMl: z.number('Give a volume in mL.').min(0).max(100).multipleOf(0.5),
  maximumVolumeMl: z.number('Give a volume in mL.').min(0).max(100).multipleOf(0.5),
  resultDays: z.record(z.enum(resultStages), z.number().int('Give whole days.').min(0).max(365)),
});
export type ProfileValues = z.infer<typeof profileValues>;

/** 'draft', signed but not yet in force, in force today, or overtaken by a later version. */
export const versionState = z.enum(['draft', 'to-come', 'in-force', 'past']);
export type VersionState = z.infer<typeof versionState>;

export const signedVersion = z.object({
  id,
  version: z.number().int(),
  title: z.string(),
  state: versionState,
  effectiveOn: day,
  isStartingValues: z.boolean(),
  signedBy: z.string().nullable(),
  signedAt: instant.nullable(),
  changedBy: z.string().nullable(),
  changedAt: instant.nullable(),
});
export type SignedVersion = z.infer<typeof signedVersion>;

export const versionList = z.object({ today: day, versions: z.array(signedVersion) });
export type VersionList = z.infer<typeof versionList>;

export const fieldProblem = z.object({ path: z.string(), message: z.string() });
export type FieldProblem = z.infer<typeof fieldProblem>;

const detail = { ...signedVersion.shape, draftVersion: version, problems: z.array(fieldProblem) };
export const protocolDetail = z.object({ ...detail, values: protocolValues });
export type ProtocolDetail = z.infer<typeof protocolDetail>;
export const profileDetail = z.object({ ...detail, values: profileValues });
export type ProfileDetail = z.infer<typeof profileDetail>;

/** A draft is made from the version in force, or from starting values where there is none. */
export const makeDraftRequest = z.object({ submissionKey: z.uuid() });
export type MakeDraftRequest = z.infer<typeof makeDraftRequest>;
export const saveProtocolRequest = z.object({ draftVersion: version, values: protocolValues });
export type SaveProtocolRequest = z.input<typeof saveProtocolRequest>;
export const saveProfileRequest = z.object({ draftVersion: version, values: profileValues });
export type SaveProfileRequest = z.input<typeof saveProfileRequest>;
export const discardDraftRequest = z.object({ draftVersion: version });
export const signVersionRequest = z.object({
  draftVersion: version,
  password: z.string().min(1, 'Enter your password to sign.').max(512),
});
export type SignVersionRequest = z.infer<typeof signVersionRequest>;

/** One line of what changes against the version that is in force on the draft's first day. */
export const difference = z.object({
  says: z.string(),
  before: z.string().nullable(),
  after: z.string().nullable(),
});
export type Difference = z.infer<typeof difference>;

/** What signing changes, told before it is done. */
export const consequences = z.object({
  draftVersion: version,
  against: z.string().nullable(),
  differences: z.array(difference),
  /** Whole sentences: planned mornings that change, and by how much. */
  mornings: z.array(z.object({ says: z.string(), needsCare: z.boolean() })),
  plannedMornings: z.number().int(),
  changedMornings: z.number().int(),
  problems: z.array(fieldProblem),
});
export type Consequences = z.infer<typeof consequences>;

export const publishedHours = z.object({ source: z.string(), says: z.string() });
/** What is published for the ages of one band, beside its row. */
export const bandBeside = z.object({
  age: z.string(),
  leastSays: z.string(),
  longestSays: z.string(),
  sources: z.array(publishedHours),
});
export type BandBeside = z.infer<typeof bandBeside>;

/** A night that can be looked at: tonight, and the next nights on which the clock changes. */
export const previewNight = z.object({
  /** The day of the morning. */
  on: day,
  says: z.string(),
});
export const previewStep = z.object({
  time: z.string(),
  dayPart: z.string(),
  title: z.string(),
  lines: z.array(z.string()),
  isLoud: z.boolean(),
});
export const bandPreview = z.object({
  band: z.number().int(),
  age: z.string(),
  feeding: z.string().nullable(),
  feedingSays: z.string().nullable(),
  /** Null with the steps: a clinician composes the plan, and `individualSays` tells why. */
  steps: z.array(previewStep).nullable(),
  individualSays: z.string().nullable(),
  /** The line of this child in the evening text. */
  text: z.string().nullable(),
});
export type BandPreview = z.infer<typeof bandPreview>;

export const checkProtocolRequest = z.object({
  values: protocolValues,
  preview: z
    .object({ language: languageId, arrivalTime: clockTime, on: day.nullable() })
    .nullable()
    .default(null),
});
export type CheckProtocolRequest = z.input<typeof checkProtocolRequest>;

export const protocolCheck = z.object({
  problems: z.array(fieldProblem),
  bands: z.array(bandBeside),
  anaesthesia: z.array(z.string()),
  preview: z
    .object({
      language: languageId,
      dir: z.enum(['ltr', 'rtl']),
      on: day,
      nightSays: z.string(),
      draftNotice: z.string().nullable(),
      nights: z.array(previewNight),
      bands: z.array(bandPreview),
    })
    .nullable(),
  languages: z.array(z.object({ id: languageId, name: z.string() })),
});
export type ProtocolCheck = z.infer<typeof protocolCheck>;

export const checkProfileRequest = z.object({
  /** Of the draft, as the example names it. */
  version: z.number().int().positive(),
  values: profileValues,
});
export type CheckProfileRequest = z.input<typeof checkProfileRequest>;
export const profileCheck = z.object({
  problems: z.array(fieldProblem),
  published: z.array(z.object({ field: z.string(), source: z.string(), says: z.string() })),
  /** A specimen of tomorrow's first arrival with these numbers, explained line by line. */
  example: z.array(z.string()),
});
export type ProfileCheck = z.infer<typeof profileCheck>;
