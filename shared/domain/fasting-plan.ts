/**
 * From the arrival, the child's age on that day, the feeding and the signed protocol: when each
 * thing may last be taken, when to wake, leave and arrive, and when the child eats again. Hours
 * are elapsed hours; on the night a clock changes the wall clock shows another difference.
 */
import { items, bandFor, type FastingProtocol, type Item } from './fasting-protocol';
import { ageOn, dayOf, localPartsOf, millisecondsPerMinute, type Day, type Instant } from './zone';

export const feedings = ['breast', 'formula', 'breast-and-formula', 'family-food'] as const;
export type Feeding = (typeof feedings)[number];

/** Circumstances in which a clinician composes the plan (clinical facts 1.4; product rules). */
export const cautions = [
  'diabetes',
  'metabolic-disease',
  'low-blood-sugar',
  'severe-malnutrition',
  'prematurity',
  'tube-feeding',
  'morning-medicine',
] as const;
export type Caution = (typeof cautions)[number];

export type IndividualReason =
  | Caution
  | 'under-3-months'
  /** The clinic's own protocol asks for an individual plan at this age. */
  | 'age-band'
  | 'not-in-protocol'
  /** The least hours and the usual wait together pass the longest fast. */
  | 'fast-too-long';

export interface FastingStop {
  readonly item: Item;
  readonly stopAt: Instant;
  readonly leastMinutes: number;
}

export interface StandardPlan {
  readonly kind: 'standard';
  /** Where the hours come from: the signed protocol, or a clinician's plan for this child. */
  readonly basis: 'protocol' | 'individual';
  readonly protocolVersion: number;
  readonly ageMonths: number;
  /** Under 12 months: the last feed is planned to the minute. */
  readonly isInfant: boolean;
  readonly stops: readonly FastingStop[];
  /** The earliest of the stops: nothing at all from here on. */
  readonly stopAt: Instant;
  readonly allSame: boolean;
  /** Of the strictest thing. */
  readonly leastMinutes: number;
  readonly longestMinutes: number;
  /** The last moment at which a meal or feed may be finished; equals stopAt. */
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
}

export interface IndividualPlan {
  readonly kind: 'individual';
  readonly reason: IndividualReason;
  readonly reasons: readonly IndividualReason[];
  readonly ageMonths: number;
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
}

export interface ComposedPlanRequest {
  readonly arrivalAt: Instant;
  readonly ageMonths: number;
  readonly feeding: Feeding;
  readonly leastMinutes: Readonly<Partial<Record<Item, number>>>;
  readonly longestMinutes: number;
  readonly travelMinutes: number;
  readonly readyMinutes: number;
  readonly usualWaitMinutes: number;
  readonly eatAgainAfterMinutes: number;
  readonly protocolVersion: number;
  readonly bedtimeAt?: Instant;
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
  reasons.push(...request.cautions);
  if (!band) reasons.push('not-in-protocol');
  if (band?.leastHours && band.longestHours !== null) {
    const leastMinutes = minutesByItem(band.leastHours);
    const strictest = Math.max(...Object.values(leastMinutes));
    if (strictest + usualWaitMinutes > band.longestHours * 60) reasons.push('fast-too-long');
    if (reasons.length === 0) {
      return standardPlan('protocol', {
        ...request,
        ageMonths,
        leastMinutes,
        longestMinutes: band.longestHours * 60,
        usualWaitMinutes,
        eatAgainAfterMinutes: protocol.eatAgainAfterMinutes,
        protocolVersion: protocol.version,
      });
    }
  }
  const reason = reasons[0] ?? 'not-in-protocol';
  return { kind: 'individual', reason, reasons: reasons.length ? reasons : [reason], ageMonths };
}

/** The plan a clinician composed for one child; messages then go as for everybody else. */
export function composedPlan(request: ComposedPlanRequest): StandardPlan {
  return standardPlan('individual', request);
}

/** Children on tube feeds have an individual plan, so that no standard plan names them. */
function minutesByItem(hours: Readonly<Record<Item, number>>): Partial<Record<Item, number>> {
  return Object.fromEntries(
    items.filter((item) => item !== 'tube-feed').map((item) => [item, hours[item] * 60]),
  );
}

function standardPlan(basis: StandardPlan['basis'], request: ComposedPlanRequest): StandardPlan {
  const before = (instant: Instant, minutes: number): Instant =>
    instant - minutes * millisecondsPerMinute;
  const { arrivalAt, leastMinutes: byItem, longestMinutes } = request;
  const stops = items.flatMap((item): FastingStop[] => {
    const leastMinutes = byItem[item];
    if (leastMinutes === undefined) return [];
    return [{ item, leastMinutes, stopAt: before(arrivalAt, leastMinutes) }];
  });
  if (stops.length === 0) throw new RangeError('A plan needs hours for at least one item.');
  const leastMinutes = Math.max(...stops.map((stop) => stop.leastMinutes));
  const stopAt = before(arrivalAt, leastMinutes);
  const likelyCollectionAt = before(arrivalAt, -request.usualWaitMinutes);
  const isInfant = request.ageMonths < 12;
  const leaveAt = before(arrivalAt, request.travelMinutes);
  const bedtimeAt = Math.min(request.bedtimeAt ?? stopAt, stopAt);
  return {
    kind: 'standard',
    basis,
    protocolVersion: request.protocolVersion,
    ageMonths: request.ageMonths,
    isInfant,
    stops,
    stopAt,
    allSame: stops.every((stop) => stop.stopAt === stopAt),
    leastMinutes,
    longestMinutes,
    latestIntakeAt: stopAt,
    earliestLastMealAt: before(likelyCollectionAt, longestMinutes),
    lastFeedAt: isInfant ? before(stopAt, infantReminderMinutes) : null,
    stopReminderAt: isInfant
      ? before(stopAt, infantReminderMinutes)
      : before(bedtimeAt, bedtimeReminderMinutes),
    wakeAt: before(leaveAt, request.readyMinutes),
    leaveAt,
    arriveAt: arrivalAt,
    likelyCollectionAt,
    eatAgainAt: before(likelyCollectionAt, -request.eatAgainAfterMinutes),
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
