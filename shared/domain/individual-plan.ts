/**
 * A plan that a clinician composed for one child: hours or clock times for each thing, the longest
 * fast, and signed phrases. It holds only keys of phrases with numbers and times, so that every
 * language says the same.
 */
import {
  composedPlan,
  type ComposedPlanRequest,
  type FastingPlan,
  type StandardPlan,
} from './fasting-plan';
import type { Item } from './fasting-protocol';
import type { StopRule } from './fasting-stops';
import { isTime, type LocalTime } from './day';

/** What may be said beside the times; each is a wording `own-plan.phrase.<key>`. */
export const planPhrases = [
  'finish-last-feed',
  'let-sleep',
  'glucose-on-waking',
  'glucose-low-feed-and-call',
  'come-straight-in',
  'tube-pump-off',
  'tube-open-nothing-through',
] as const;
export type PlanPhrase = (typeof planPhrases)[number];

/** Where on the night path a phrase stands. */
export const phrasePlaces: Readonly<Record<PlanPhrase, 'last-feed' | 'stop' | 'wake' | 'arrive'>> =
  {
    'finish-last-feed': 'last-feed',
    'let-sleep': 'wake',
    'glucose-on-waking': 'wake',
    'glucose-low-feed-and-call': 'wake',
    'come-straight-in': 'arrive',
    'tube-pump-off': 'stop',
    'tube-open-nothing-through': 'stop',
  };

/** The one phrase with a number: the sugar under which the child is fed, in mg/dL. */
export const phrasesWithGlucose: readonly PlanPhrase[] = ['glucose-low-feed-and-call'];

export const medicineWays = ['after-the-test', 'usual-time-with-sip', 'clinician-decides'] as const;
export type MedicineWay = (typeof medicineWays)[number];

export interface PlanStop {
  readonly item: Item;
  /** Elapsed hours before the arrival, in quarters; null where the clock time alone counts. */
  readonly leastHours: number | null;
  /** Nothing from this clock time of the night; with hours too the earlier counts. */
  readonly nothingFrom: LocalTime | null;
}

export interface PlanMedicine {
  readonly name: string;
  readonly way: MedicineWay;
  /** With 'usual-time-with-sip' only: when, and with how much water at the most. */
  readonly time: LocalTime | null;
  readonly sipMl: number | null;
}

export interface IndividualPlanBody {
  readonly stops: readonly PlanStop[];
  readonly longestHours: number;
  /** When the last feed begins; null leaves it to the usual 40 minutes before the stop. */
  readonly lastFeedTime: LocalTime | null;
  readonly phrases: readonly { readonly key: PlanPhrase; readonly glucoseMgDl: number | null }[];
  readonly medicines: readonly PlanMedicine[];
}

export interface PlanProblem {
  /** Dotted path into the body. */
  readonly path: string;
  /** A complete English sentence; the clinic's languages know it. */
  readonly message: string;
}

/** Everything that must be mended before a clinician may sign, whatever the morning. */
export function individualPlanProblems(body: IndividualPlanBody): PlanProblem[] {
  const problems: PlanProblem[] = [];
  const add = (path: string, message: string): void => {
    problems.push({ path, message });
  };
  if (body.stops.length === 0) add('stops', 'Give hours or a clock time for at least one thing.');
  body.stops.forEach(({ item, leastHours, nothingFrom }, index) => {
    if (leastHours === null && nothingFrom === null)
      add(`stops.${index}.leastHours`, 'Give hours or a clock time.');
    if (leastHours !== null && !(leastHours > 0))
      add(`stops.${index}.leastHours`, 'Hours must be more than 0.');
    if (leastHours !== null && leastHours >= body.longestHours)
      add('longestHours', `Must be longer than ${leastHours} hours.`);
    if (body.stops.findIndex((other) => other.item === item) !== index)
      add(`stops.${index}.item`, 'This thing is named twice.');
  });
  if (!(body.longestHours > 0)) add('longestHours', 'Hours must be more than 0.');
  body.phrases.forEach(({ key, glucoseMgDl }, index) => {
    if (phrasesWithGlucose.includes(key) && glucoseMgDl === null)
      add(`phrases.${index}.glucoseMgDl`, 'Give the blood sugar under which the child is fed.');
    if (body.phrases.findIndex((other) => other.key === key) !== index)
      add(`phrases.${index}.key`, 'This sentence is chosen twice.');
  });
  body.medicines.forEach(({ way, time, sipMl }, index) => {
    if (way !== 'usual-time-with-sip') return;
    if (time === null || !isTime(time)) add(`medicines.${index}.time`, 'Give the usual time.');
    if (sipMl === null || !(sipMl > 0))
      add(`medicines.${index}.sipMl`, 'Give the most water in mL.');
  });
  return problems;
}

export type ComposedFor = Omit<
  ComposedPlanRequest,
  'rules' | 'longestMinutes' | 'lastFeedTime' | 'individualVersion'
>;

/** The plan's times of one morning. */
export function individualPlanOf(
  body: IndividualPlanBody,
  version: number,
  morning: ComposedFor,
): StandardPlan {
  return composedPlan({
    ...morning,
    rules: Object.fromEntries(
      body.stops.map(({ item, leastHours, nothingFrom }) => [
        item,
        {
          leastMinutes: leastHours === null ? null : Math.round(leastHours * 60),
          nothingFrom,
        } satisfies StopRule,
      ]),
    ),
    longestMinutes: Math.round(body.longestHours * 60),
    lastFeedTime: body.lastFeedTime,
    individualVersion: version,
  });
}

/** What only shows on a given morning: the wait passes the ceiling, or the last feed ends too late. */
export function morningProblems(plan: StandardPlan): PlanProblem[] {
  const problems: PlanProblem[] = [];
  if (plan.earliestLastMealAt > plan.mealStopAt)
    problems.push({
      path: 'longestHours',
      message: 'The usual wait at the clinic alone would pass the longest fast.',
    });
  return problems;
}

/**
 * What a morning goes by: the clinician's plan, unless its longest fast would pass while the child waits, for example
 * after the arrival moved. Then nobody is told to go on fasting, and a clinician composes again.
 */
export function ownPlanOfMorning(
  body: IndividualPlanBody,
  version: number,
  morning: ComposedFor,
): FastingPlan {
  const plan = individualPlanOf(body, version, morning);
  if (morningProblems(plan).length === 0) return plan;
  const reason = 'fast-too-long';
  const { ageMonths, explanation } = plan;
  return {
    kind: 'individual',
    reason,
    reasons: [reason],
    ageMonths,
    explanation: {
      rule: 'fasting-plan.individual-plan-missing',
      inputs: { ...explanation.inputs, reasons: reason },
    },
  };
}

/**
 * Which version counts for a morning: the newest for its series or day. Where that one was ended
 * none does: an older plan was superseded by a clinician and does not come back by itself.
 */
export function effectiveVersion<
  Version extends {
    readonly version: number;
    readonly seriesId: number | null;
    readonly from: string | null;
    readonly until: string | null;
    readonly isEnded: boolean;
  },
>(
  versions: readonly Version[],
  morning: { readonly seriesId: number; readonly on: string },
): Version | null {
  const fits = versions.filter(({ seriesId, from, until }) =>
    seriesId === null
      ? (from === null || from <= morning.on) && (until === null || morning.on <= until)
      : seriesId === morning.seriesId,
  );
  const newest = fits.sort((left, right) => right.version - left.version)[0];
  return newest && !newest.isEnded ? newest : null;
}
