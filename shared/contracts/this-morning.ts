import * as z from 'zod';
import {
  clockTime,
  day,
  feeding,
  id,
  instant,
  morningState,
  optionalText,
  shortText,
  verdict,
} from './common';
import { explanation } from './explanation';

/** The hours-fasted bar of one child: instants on one ruler. */
export const fastingBar = z.object({
  /** Last intake as told (door check before phone), or by the plan when nobody has told. */
  fromAt: instant,
  isPlanOnly: z.boolean(),
  isUnsure: z.boolean(),
  leastAt: instant,
  longestAt: instant,
  likelyCollectionAt: instant,
  collectedAt: instant.nullable(),
});

export const morningRow = z.object({
  morningId: id,
  version: z.number().int(),
  childId: id,
  fullName: z.string(),
  ageInWords: z.string(),
  feeding,
  number: z.number().int(),
  ofPlanned: z.number().int(),
  /** States of all mornings of the series in order, for the suns. */
  suns: z.array(z.enum(['done', 'next', 'later', 'lost'])),
  arrivalTime: clockTime,
  arrivalAt: instant,
  expectedAt: instant.nullable(),
  arrivedAt: instant.nullable(),
  state: morningState,
  room: z.object({ id, name: z.string() }),
  speaks: z.string(),
  needsInterpreter: z.boolean(),
  escort: z.string().nullable(),
  /** Whom to call, the first number first. */
  phones: z.array(z.object({ name: z.string(), relationship: z.string(), phone: z.string() })),
  cautions: z.array(z.string()),
  /** A helper who cannot consent brings the child, a caution, ...: complete sentences. */
  warnings: z.array(z.string()),
  /** What the family said, oldest first, word for word. */
  said: z.array(z.object({ at: instant, source: z.string(), says: z.string() })),
  /** The newest answer about food and drink, with which the door check starts. */
  told: z
    .object({
      answer: z.enum(['nothing', 'sip', 'feed', 'unsure']),
      lastIntakeAt: instant.nullable(),
    })
    .nullable(),
  /** From when on the plan says nothing by mouth; null with an individual plan. */
  planStopAt: instant.nullable(),
  verdict: verdict.nullable(),
  verdictSays: z.string(),
  fastedMinutes: z.number().int().nullable(),
  readyAt: instant.nullable(),
  ceiling: z.enum(['ok', 'collect-or-feed', 'feed']),
  bar: fastingBar.nullable(),
  /** How plan, fast and verdict were reached, each as data and as a line for staff. */
  explains: z.array(explanation),
  doorCheck: z.object({ at: instant, by: z.string(), says: z.string(), verdict }).nullable(),
  collection: z
    .object({
      begunAt: instant,
      begunBy: z.string(),
      endedAt: instant.nullable(),
      outcome: z.enum(['collected', 'not-collected']).nullable(),
    })
    .nullable(),
  specimen: z
    .object({
      id,
      version: z.number().int(),
      number: z.number().int(),
      label: z.string().nullable(),
      volumeMl: z.number(),
      collectedAt: instant,
      neutralisedAt: instant.nullable(),
      neutraliseBy: instant,
      receiptBy: instant,
      handedOverAt: instant.nullable(),
      receivedAt: instant.nullable(),
    })
    .nullable(),
  fedAt: instant.nullable(),
  leftAt: instant.nullable(),
});
export type MorningRow = z.infer<typeof morningRow>;

export const thisMorning = z.object({
  site: z.object({ id, name: z.string(), door: z.string(), zone: z.string() }),
  on: day,
  now: instant,
  /** 'Five children: one collected, two here, ...' */
  summary: z.string(),
  suggestion: z
    .object({ morningId: id, roomId: id, says: z.string(), explains: explanation })
    .nullable(),
  rooms: z.array(z.object({ id, name: z.string(), opensAt: instant.nullable(), says: z.string() })),
  rows: z.array(morningRow),
  /** Days that have mornings around this one, for going back and forth. */
  otherDays: z.array(day),
  protocolSays: z.string(),
  laboratorySays: z.string(),
});
export type ThisMorning = z.infer<typeof thisMorning>;

export const arriveRequest = z.object({ version: z.number().int() });
export const doorCheckRequest = z.object({
  version: z.number().int(),
  /** Food, milk or a feed: hunger counts from here. */
  lastFoodAt: instant.nullable(),
  foodItem: z
    .enum(['solid-food', 'cows-milk', 'formula', 'breast-milk', 'tube-feed'])
    .nullable()
    .default(null),
  /** Water, or a drink that is no meal: it starts the least hours again, never the longest fast. */
  lastDrinkAt: instant.nullable(),
  drinkItem: z.enum(['water', 'other']).nullable().default(null),
  isNothingSincePlan: z.boolean(),
  medicine: optionalText(200),
  wokeAt: instant.nullable(),
  isWell: z.boolean(),
  bloodGlucoseMgDl: z
    .number()
    .int('Between 10 and 1000 mg/dL.')
    .min(10, 'Between 10 and 1000 mg/dL.')
    .max(1000, 'Between 10 and 1000 mg/dL.')
    .nullable()
    .default(null),
  broughtBy: shortText(160),
  /** A clinician's reason to go on although the fast is not long enough, or too long. */
  goOnReason: optionalText(300),
});
export type DoorCheckRequest = z.input<typeof doorCheckRequest>;
export const beginCollectionRequest = z.object({
  version: z.number().int(),
  roomId: id,
  /** A clinician's reason to go on although the longest fast has passed. */
  ceilingReason: optionalText(300),
});
export type BeginCollectionRequest = z.input<typeof beginCollectionRequest>;

export const endCollectionRequest = z.discriminatedUnion('outcome', [
  z.object({
    version: z.number().int(),
    outcome: z.literal('collected'),
    collectedAt: instant,
    volumeMl: z.number().min(0.1, 'Between 0.1 and 100 mL.').max(100, 'Between 0.1 and 100 mL.'),
    tubeSizeFr: z.number().min(4).max(20).nullable().default(null),
    positionCheck: optionalText(80),
    rinseFluid: optionalText(40),
    rinseMl: z.number().min(0).max(100).nullable().default(null),
    tries: z.number().int().min(1).max(9).nullable().default(null),
    tolerance: optionalText(200),
    label: optionalText(40),
    neutralisedAt: instant.nullable().default(null),
    neutralisedWith: optionalText(80),
  }),
  z.object({
    version: z.number().int(),
    outcome: z.literal('not-collected'),
    reason: shortText(200),
  }),
]);
export type EndCollectionRequest = z.input<typeof endCollectionRequest>;
export const feedRequest = z.object({ version: z.number().int(), event: z.enum(['fed', 'left']) });
export type FeedRequest = z.infer<typeof feedRequest>;
/** Gentle warnings outside the clinic's protocol; care is never blocked by them. */
export const morningChanged = z.object({
  row: morningRow,
  warnings: z.array(z.string()),
});
export type MorningChanged = z.infer<typeof morningChanged>;
/** A server-sent event: a topic and an id, nothing about a child. */
export const liveEvent = z.object({ topic: z.string(), refId: z.number().int().nullable() });
export type LiveEvent = z.infer<typeof liveEvent>;
