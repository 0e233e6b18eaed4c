/**
 * From the arrival, the child's age on that day, the feeding and the signed protocol: when each
 * thing may last be taken, when to wake, leave and arrive, and when the child eats again. Hours
 * are elapsed hours; on the night a clock changes the wall clock shows another difference.
 */
import type { Caution } from './cautions';
import type { LocalTime } from './day';
import type { Explanation } from './explanation';
import {
  items,
  bandFor,
  type FastingBand,
  type FastingProtocol,
  type Item,
} from './fasting-protocol';
import { nightOfPlan, type NightOfPlan, type UsualNight } from './usual-night';
import { isMeal } from './intake';
import { lastBefore, stopsOf, type FastingStop, type StopRule } from './fasting-stops';
import { ageOn, dayOf, localPartsOf, millisecondsPerMinute, type Day, type Instant } from './zone';

export const feedings = ['breast', 'formula', 'breast-and-formula', 'family-food'] as const;
export type Feeding = (typeof feedings)[number];

export { cautions, type Caution } from './cautions';

export type IndividualReason =
  | Caution
  | 'under-3-months'
  /** The clinic's own protocol asks for an individual plan at this age. */
  | 'age-band'
  | 'not-in-protocol'
  /** The least hours and the usual wait together pass the longest fast. */
  | 'fast-too-long';

export type { FastingStop } from './fasting-stops';
export type { UsualNight } from './usual-night';

export interface StandardPlan extends NightOfPlan {
  readonly kind: 'standard';
  /** Where the hours come from: the signed protocol, or a clinician's plan for this child. */
  readonly basis: 'protocol' | 'individual';
  readonly protocolVersion: number;
  readonly ageMonths: number;
  /** Under 12 months: the last feed is planned to the minute. */
  readonly isInfant: boolean;
  readonly stops: readonly FastingStop[];
  /** The earliest of the stops. */
  readonly stopAt: Instant;
  /** The last of the stops: nothing at all from here on. */
  readonly nothingAt: Instant;
  /** When the last meal or feed of this child's kind is finished: hunger counts from here. */
  readonly mealStopAt: Instant;
  readonly allSame: boolean;
  /** Of the strictest thing. */
  readonly leastMinutes: number;
  readonly longestMinutes: number;
  /** The last moment at which a meal or feed may be finished; equals mealStopAt. */
  readonly latestIntakeAt: Instant;
  /** With a last meal before this the longest fast would end before the child eats again. */
  readonly earliestLastMealAt: Instant;
  /** When to begin the last feed of an infant; null for older children. */
  readonly lastFeedAt: Instant | null;
  /** When the reminder of the stop goes out, before it. */
  readonly stopReminderAt: Instant;
  readonly wakeAt: Instant;
  readonly leaveAt: Instant;
  readonly arriveAt: Instant;
  readonly likelyCollectionAt: Instant;
  readonly eatAgainAt: Instant;
  readonly explanation: Explanation;
}

export interface IndividualPlan {
  readonly kind: 'individual';
  readonly reason: IndividualReason;
  readonly reasons: readonly IndividualReason[];
  readonly ageMonths: number;
  readonly explanation: Explanation;
}

export type FastingPlan = StandardPlan | IndividualPlan;

export interface FastingPlanRequest {
  readonly arrivalAt: Instant;
  readonly zone: string;
  readonly bornOn: Day;
  readonly feeding: Feeding;
  readonly protocol: FastingProtocol;
  readonly cautions: readonly Caution[];
  readonly travelMinutes: number;
  /** From waking to leaving home. */
  readonly readyMinutes: number;
  /** Of the site; the protocol's when absent. */
  readonly usualWaitMinutes?: number;
  /** The child's usual bedtime that evening, for the reminder. */
  readonly bedtimeAt?: Instant;
  readonly usual?: UsualNight;
}

export interface ComposedPlanRequest {
  readonly arrivalAt: Instant;
  readonly zone: string;
  readonly ageMonths: number;
  readonly feeding: Feeding;
  readonly rules: Readonly<Partial<Record<Item, StopRule>>>;
  readonly longestMinutes: number;
  readonly travelMinutes: number;
  readonly readyMinutes: number;
  readonly usualWaitMinutes: number;
  readonly eatAgainAfterMinutes: number;
  readonly protocolVersion: number;
  /** Of the clinician's plan; null when the hours are the protocol's. */
  readonly individualVersion: number | null;
  /** When the last feed begins, where the clinician set it. */
  readonly lastFeedTime?: LocalTime | null;
  readonly bedtimeAt?: Instant;
  readonly usual?: UsualNight;
}

/** An infant's reminder leaves time for a whole feed; others are told before they go to bed. */
const infantReminderMinutes = 40;
const bedtimeReminderMinutes = 30;

export function fastingPlan(request: FastingPlanRequest): FastingPlan {
  const { arrivalAt, zone, bornOn, protocol } = request;
  const ageMonths = ageOn(bornOn, dayOf(arrivalAt, zone)).months;
  const band = bandFor(protocol, ageMonths);
  const usualWaitMinutes = request.usualWaitMinutes ?? protocol.usualWaitMinutes;
  const reasons: IndividualReason[] = [];
  if (ageMonths < 3) reasons.push('under-3-months');
  else if (band?.individualPlan) reasons.push('age-band');
  const held = request.cautions.filter((one) => protocol.individualPlanCautions.includes(one));
  reasons.push(...held);
  if (!band) reasons.push('not-in-protocol');
  if (band?.leastHours && band.longestHours !== null) {
    const plan = standardPlan('protocol', {
      ...request,
      ageMonths,
      rules: rulesOf(band.leastHours, band.nothingFrom, request.cautions),
      longestMinutes: band.longestHours * 60,
      usualWaitMinutes,
      eatAgainAfterMinutes: protocol.eatAgainAfterMinutes,
      protocolVersion: protocol.version,
      individualVersion: null,
    });
    if (plan.earliestLastMealAt > plan.mealStopAt) reasons.push('fast-too-long');
    if (reasons.length === 0) return plan;
  }
  const reason = reasons[0] ?? 'not-in-protocol';
  return {
    kind: 'individual',
    reason,
    reasons: reasons.length ? reasons : [reason],
    ageMonths,
    explanation: {
      rule: 'fasting-plan.individual-plan-missing',
      inputs: {
        ageMonths,
        reasons: reasons.join(', ') || reason,
        arrivalAt,
        protocolVersion: protocol.version,
      },
    },
  };
}

/** The plan a clinician composed for one child; messages then go as for everybody else. */
export function composedPlan(request: ComposedPlanRequest): StandardPlan {
  return standardPlan('individual', request);
}

/** Tube feeds have hours in every protocol; only the plan of a child that is fed by tube names them. */
function rulesOf(
  hours: NonNullable<FastingBand['leastHours']>,
  nothingFrom: LocalTime | null | undefined,
  cautions: readonly Caution[],
): Partial<Record<Item, StopRule>> {
  return Object.fromEntries(
    items
      .filter((item) => item !== 'tube-feed' || cautions.includes('tube-feeding'))
      .map((item) => [
        item,
        { leastMinutes: hours[item] * 60, nothingFrom: nothingFrom ?? null } satisfies StopRule,
      ]),
  );
}

const feedItems: Readonly<Record<Feeding, readonly Item[]>> = {
  breast: ['breast-milk'],
  formula: ['formula'],
  'breast-and-formula': ['breast-milk', 'formula'],
  'family-food': ['solid-food', 'cows-milk'],
};

/** The stop of what this child usually takes last; of every meal where the plan names none of it. */
function mealStop(stops: readonly FastingStop[], feeding: Feeding): Instant {
  const own = stops.filter(({ item }) => feedItems[feeding].includes(item));
  const meals = own.length > 0 ? own : stops.filter(({ item }) => isMeal(item));
  return Math.min(...(meals.length > 0 ? meals : stops).map(({ stopAt }) => stopAt));
}

function standardPlan(basis: StandardPlan['basis'], request: ComposedPlanRequest): StandardPlan {
  const before = (instant: Instant, minutes: number): Instant =>
    instant - minutes * millisecondsPerMinute;
  const { arrivalAt, zone, longestMinutes, usual } = request;
  const stops = stopsOf(request.rules, arrivalAt, zone);
  const stopAt = Math.min(...stops.map((stop) => stop.stopAt));
  const nothingAt = Math.max(...stops.map((stop) => stop.stopAt));
  const mealStopAt = mealStop(stops, request.feeding);
  const leastMinutes = Math.max(...stops.map((stop) => stop.leastMinutes));
  const likelyCollectionAt = before(arrivalAt, -request.usualWaitMinutes);
  const earliestLastMealAt = before(likelyCollectionAt, longestMinutes);
  const isInfant = request.ageMonths < 12;
  const leaveAt = before(arrivalAt, request.travelMinutes);
  const bedtimeAt = Math.min(request.bedtimeAt ?? stopAt, stopAt);
  const setFeedAt = request.lastFeedTime
    ? lastBefore(mealStopAt, request.lastFeedTime, zone)
    : null;
  const lastFeedAt = setFeedAt ?? (isInfant ? before(mealStopAt, infantReminderMinutes) : null);
  return {
    kind: 'standard',
    basis,
    protocolVersion: request.protocolVersion,
    ageMonths: request.ageMonths,
    isInfant,
    stops,
    stopAt,
    nothingAt,
    mealStopAt,
    allSame: stopAt === nothingAt,
    leastMinutes,
    longestMinutes,
    latestIntakeAt: mealStopAt,
    earliestLastMealAt,
    lastFeedAt,
    stopReminderAt: lastFeedAt ?? before(bedtimeAt, bedtimeReminderMinutes),
    ...nightOfPlan(usual, { arrivalAt, mealStopAt, earliestLastMealAt, zone }),
    wakeAt: before(leaveAt, request.readyMinutes),
    leaveAt,
    arriveAt: arrivalAt,
    likelyCollectionAt,
    eatAgainAt: before(likelyCollectionAt, -request.eatAgainAfterMinutes),
    explanation: {
      rule: `fasting-plan.${basis}`,
      inputs: {
        ageMonths: request.ageMonths,
        arrivalAt,
        likelyCollectionAt,
        leastMinutes,
        longestMinutes,
        stopAt,
        nothingAt,
        clock: stops.find((stop) => stop.stopAt === stopAt)?.clock ?? null,
        protocolVersion: request.protocolVersion,
        individualVersion: request.individualVersion,
      },
    },
  };
}

/** The ceiling of this child's fast, given when it last ate or drank. */
export function longestEndsAt(
  lastIntakeAt: Instant,
  plan: Pick<StandardPlan, 'longestMinutes'>,
): Instant {
  return lastIntakeAt + plan.longestMinutes * millisecondsPerMinute;
}

/**
 * A stop at exactly 12 o'clock is told one minute earlier, because "midnight" and "12:00" do not
 * say which day: 00:00 on Wednesday becomes 23:59 on Tuesday.
 */
export function wallClockForFamily(stopAt: Instant, zone: string): Instant {
  const { hour, minute } = localPartsOf(stopAt, zone);
  return minute === 0 && hour % 12 === 0 ? stopAt - millisecondsPerMinute : stopAt;
}
