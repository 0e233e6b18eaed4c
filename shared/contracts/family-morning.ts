import * as z from 'zod';
import { day, id, instant } from './common';

/** A time ready to be shown: the phone converts no zones. */
export const shownTime = z.object({
  at: instant,
  /** '7:00' */
  clock: z.string(),
  /** 'in the morning' */
  dayPart: z.string(),
});
export type ShownTime = z.infer<typeof shownTime>;

export const sky = z.enum(['evening', 'night', 'first-light', 'morning']);
export const picture = z.object({ name: z.string(), caption: z.string() });
export const sun = z.enum(['done', 'next', 'later', 'lost']);
/** What a child's lane on the night path does at this step. */
export const mouth = z.enum(['starts', 'full', 'ends', 'empty', 'begins', 'none']);

export const pathChild = z.object({
  childId: id,
  morningId: id,
  callMe: z.string(),
  face: z.enum(['baby', 'toddler', 'child']),
  /** Sentence at the head of the lane: 'Maryam may drink until' */
  headSays: z.string(),
  stopAt: shownTime.nullable(),
  /** Set when a clinician has to compose an individual plan; then no hours are shown. */
  individualPlanSays: z.string().nullable(),
});

export const pathStep = z.object({
  key: z.string(),
  part: z.enum(['evening', 'night', 'morning']),
  time: shownTime,
  isAbout: z.boolean(),
  isLoud: z.boolean(),
  title: z.string(),
  lines: z.array(z.string()),
  pictures: z.array(picture),
  /** Children whose step this is; all of them when it is everyone's. */
  childIds: z.array(id),
  mouths: z.array(z.object({ childId: id, mouth })),
});
export type PathStep = z.infer<typeof pathStep>;

/** Everything the home page of a family shows, in its language, ready to be kept on the phone. */
export const nextMorning = z.object({
  now: instant,
  state: z.enum(['planned', 'none', 'finished']),
  heading: z.string(),
  subheading: z.string(),
  on: day.nullable(),
  suns: z.array(sun),
  sunsSay: z.string(),
  /** The sky by the clinic's clock: each holds from its instant on. */
  skies: z.array(z.object({ from: instant, sky })),
  /** The sentence of the moment: each holds from its instant on. */
  moments: z.array(z.object({ from: instant, stepKey: z.string().nullable(), says: z.string() })),
  children: z.array(pathChild),
  steps: z.array(pathStep),
  /** Headings of the night's parts: 'Night from Tuesday to Wednesday'. */
  parts: z.array(z.object({ part: z.enum(['evening', 'night', 'morning']), says: z.string() })),
  bring: z.array(picture),
  visit: z.array(picture),
  door: z.object({ says: z.array(z.string()), address: z.string() }).nullable(),
  whoBrings: z.array(z.string()),
  mornings: z.array(
    z.object({
      morningId: id,
      childId: id,
      callMe: z.string(),
      number: z.number().int(),
      on: day,
      says: z.string(),
      sun,
    }),
  ),
  question: z.object({ opensAt: instant, closesAt: instant }).nullable(),
  /** 'These times follow the fasting rules of ..., version 3, signed by ...' */
  protocolSays: z.string(),
  /** Present while the wording is a draft that nobody has signed off. */
  draftSays: z.string().nullable(),
  /** The label of the link to the questions about the plan; a page kept by an older application has none. */
  sayItBack: z.string().nullable().optional(),
});
export type NextMorning = z.infer<typeof nextMorning>;

export const fastingAnswer = z.enum(['nothing', 'sip', 'feed', 'unsure']);
export type FastingAnswer = z.infer<typeof fastingAnswer>;

export const outcomeKind = z.enum([
  'come',
  'come-and-wait',
  'call-us',
  'come-nurse-decides',
  'stay-we-call',
  'feed-now-and-call',
  'food-first',
  'emergency',
  'not-coming',
  'late-noted',
]);
export type OutcomeKind = z.infer<typeof outcomeKind>;

/** What the family is told after an answer. */
export const morningOutcome = z.object({
  receivedAt: instant,
  kind: outcomeKind,
  heading: z.string(),
  lines: z.array(z.string()),
  /** 'We have your answer, 5:14 in the morning.' */
  receivedSays: z.string(),
  youToldUs: z.array(z.object({ morningId: id, childId: id, says: z.string() })),
  canChangeUntil: instant,
});
export type MorningOutcome = z.infer<typeof morningOutcome>;

export const morningQuestion = z.object({
  now: instant,
  on: day,
  state: z.enum(['open', 'too-early', 'closed']),
  stateSays: z.string(),
  skies: z.array(z.object({ from: instant, sky })),
  suns: z.array(sun),
  sunsSay: z.string(),
  /** Youngest first, one screen each. */
  questions: z.array(
    z.object({
      morningId: id,
      childId: id,
      callMe: z.string(),
      face: z.enum(['baby', 'toddler', 'child']),
      asks: z.string(),
      hint: z.string(),
      choices: z.array(z.object({ answer: fastingAnswer, picture: z.string(), says: z.string() })),
      whenAsks: z.string(),
      whenHint: z.string(),
      /** Labelled instants, so that no hour is ambiguous or skipped; the later counts. */
      whenChoices: z.array(z.object({ at: instant.nullable(), says: z.string(), sky })),
    }),
  ),
  /** Said while the answer waits on the phone; never 'come'. */
  saved: z.object({ heading: z.string(), lines: z.array(z.string()), textInstead: z.string() }),
  changes: z.object({
    ill: z.object({
      says: z.string(),
      hint: z.string(),
      asks: z.string(),
      choices: z.array(z.object({ isAwake: z.boolean(), says: z.string() })),
    }),
    late: z.object({
      says: z.string(),
      asks: z.string(),
      choices: z.array(z.object({ at: instant, says: z.string() })),
    }),
    notComing: z.object({ says: z.string(), asks: z.string(), confirm: z.string() }),
  }),
  /** The last outcome, when this household has answered before. */
  outcome: morningOutcome.nullable(),
  protocolSays: z.string(),
});
export type MorningQuestion = z.infer<typeof morningQuestion>;

/** Accepted for as long as a phone may keep an old application: fields are only ever added, never required anew. */
export const fastingCheckRequest = z.object({
  submissionKey: z.uuid(),
  on: day,
  answers: z
    .array(
      z.object({
        morningId: id,
        answer: fastingAnswer,
        lastIntakeAt: instant.nullable().default(null),
      }),
    )
    .min(1)
    .max(8),
  deviceAt: instant,
});
export type FastingCheckRequest = z.input<typeof fastingCheckRequest>;

export const morningChangeRequest = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('late'),
    submissionKey: z.uuid(),
    on: day,
    newArrivalAt: instant,
    deviceAt: instant,
  }),
  z.object({
    kind: z.literal('ill'),
    submissionKey: z.uuid(),
    on: day,
    isAwake: z.boolean(),
    deviceAt: instant,
  }),
  z.object({
    kind: z.literal('not-coming'),
    submissionKey: z.uuid(),
    on: day,
    deviceAt: instant,
  }),
]);
export type MorningChangeRequest = z.input<typeof morningChangeRequest>;

export const familyCalendar = z.object({
  mornings: z.array(
    z.object({ morningId: id, says: z.string(), arrives: z.string(), isCancelled: z.boolean() }),
  ),
  downloadSays: z.string(),
});
export type FamilyCalendar = z.infer<typeof familyCalendar>;
