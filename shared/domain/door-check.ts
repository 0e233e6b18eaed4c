/**
 * What the nurse heard at the door, laid over the plan: since when the child is hungry, when the
 * least hours are over, and the verdict. Times are instants; a doubtful clock time is settled by
 * the nurse before it comes here.
 */
import type { Explanation } from './explanation';
import type { Item } from './fasting-protocol';
import { hungerCeiling, leastMinutesOf, type HungerCeiling } from './fasting-hours';
import type { FastingPlan, StandardPlan } from './fasting-plan';
import { millisecondsPerMinute, type Instant } from './day';

export interface Taken {
  readonly at: Instant;
  /** Null where nobody said what it was: the strictest hours count, and hunger is not eased. */
  readonly item: Item | null;
}

export interface DoorFastRequest {
  /** The last food, milk or feed. */
  readonly food: Taken | null;
  /** The last drink that is no meal: water, or something else. */
  readonly drink: Taken | null;
  readonly isNothingSincePlan: boolean;
  readonly plan: FastingPlan;
  readonly now: Instant;
}

export interface DoorFast {
  readonly verdict: 'long-enough' | 'not-long-enough' | 'cannot-tell';
  readonly readyAt: Instant | null;
  /** The newest thing by mouth; the plan's stop when all went as planned. */
  readonly lastIntakeAt: Instant | null;
  /** The longest fast counts from here: a sip of water does not move it. */
  readonly hungryFromAt: Instant | null;
  readonly ceiling: HungerCeiling;
  readonly explanation: Explanation;
}

export function doorFast(request: DoorFastRequest): DoorFast {
  const { plan, now } = request;
  if (plan.kind === 'individual') return unknown(request, 'individual-plan-missing', null);
  const { food, drink, isNothingSincePlan } = request;
  if (!food && !drink && !isNothingSincePlan) return unknown(request, 'time-not-known', null);
  const newest = Math.max(food?.at ?? 0, drink?.at ?? 0);
  if (isNothingSincePlan && newest > plan.nothingAt)
    return unknown(request, 'contradictory', newest);

  const ready = [
    ...(food ? [food.at + leastOf(plan, food, 'feed')] : plannedReady(plan, drink)),
    ...(drink ? [drink.at + leastOf(plan, drink, 'sip')] : []),
  ];
  const readyAt = Math.max(...ready);
  const hungryFromAt = food?.at ?? Math.min(plan.mealStopAt, drink?.at ?? plan.mealStopAt);
  const isEnough = readyAt <= now;
  return {
    verdict: isEnough ? 'long-enough' : 'not-long-enough',
    readyAt,
    lastIntakeAt: newest === 0 ? plan.mealStopAt : newest,
    hungryFromAt,
    ceiling: hungerCeiling({
      lastIntakeAt: hungryFromAt,
      longestMinutes: plan.longestMinutes,
      now,
    }),
    explanation: explained(request, isEnough ? 'long-enough' : 'not-long-enough', {
      readyAt,
      hungryFromAt,
      longestEndsAt: hungryFromAt + plan.longestMinutes * millisecondsPerMinute,
    }),
  };
}

/** A sip alone says nothing of meals: they ended by the plan, or before the sip. */
function plannedReady(plan: StandardPlan, drink: Taken | null): Instant[] {
  if (drink && drink.at < plan.mealStopAt) return [];
  return plan.stops.map((stop) => stop.stopAt + stop.leastMinutes * millisecondsPerMinute);
}

function leastOf(plan: StandardPlan, { item }: Taken, kind: 'feed' | 'sip'): number {
  const minutes =
    item === null
      ? kind === 'feed'
        ? leastMinutesOf(plan, 'feed').strictest
        : plan.leastMinutes
      : leastMinutesOf(plan, kind, item).strictest;
  return minutes * millisecondsPerMinute;
}

function unknown(request: DoorFastRequest, why: string, newest: Instant | null): DoorFast {
  return {
    verdict: 'cannot-tell',
    readyAt: null,
    lastIntakeAt: newest ?? (Math.max(request.food?.at ?? 0, request.drink?.at ?? 0) || null),
    hungryFromAt: request.food?.at ?? null,
    ceiling: ceilingWithout(request),
    explanation: explained(request, why, {
      readyAt: null,
      hungryFromAt: request.food?.at ?? null,
      longestEndsAt: null,
    }),
  };
}

/** Without a known time the plan's last meal still presses: a child that stopped early is hungry. */
function ceilingWithout({ plan, food, now }: DoorFastRequest): HungerCeiling {
  if (plan.kind === 'individual') return 'ok';
  const lastIntakeAt = food?.at ?? plan.mealStopAt;
  return hungerCeiling({ lastIntakeAt, longestMinutes: plan.longestMinutes, now });
}

function explained(
  { food, drink, plan, now }: DoorFastRequest,
  rule: string,
  found: {
    readonly readyAt: Instant | null;
    readonly hungryFromAt: Instant | null;
    readonly longestEndsAt: Instant | null;
  },
): Explanation {
  const standard = plan.kind === 'standard' ? plan : null;
  return {
    rule: `door-check.${rule}`,
    inputs: {
      foodAt: food?.at ?? null,
      foodItem: food?.item ?? null,
      drinkAt: drink?.at ?? null,
      drinkItem: drink?.item ?? null,
      stopAt: standard?.stopAt ?? null,
      leastMinutes: standard?.leastMinutes ?? null,
      longestMinutes: standard?.longestMinutes ?? null,
      now,
      ...found,
    },
  };
}
