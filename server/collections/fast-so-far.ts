import type { MorningRow } from '../../shared/contracts/this-morning';
import type { Verdict } from '../../shared/contracts/common';
import { doorFast, type DoorFastRequest } from '../../shared/domain/door-check';
import type { Explanation } from '../../shared/domain/explanation';
import { longestEndsAt } from '../../shared/domain/fasting-plan';
import { millisecondsPerMinute, type Instant } from '../../shared/domain/day';
import type { DoorCheckRow, MorningFacts, SaidRow } from './morning-facts';

/** What is known of a child's fast: the nurse's door check before the family's answer before the plan. */
export interface FastSoFar {
  readonly verdict: Verdict | null;
  readonly lastIntakeAt: Instant | null;
  /** The longest fast counts from here; a sip of water does not move it. */
  readonly hungryFromAt: Instant | null;
  readonly isPlanOnly: boolean;
  readonly isUnsure: boolean;
  readonly readyAt: Instant | null;
  readonly longestAt: Instant | null;
  readonly fastedMinutes: number | null;
  readonly ceiling: MorningRow['ceiling'];
  readonly bar: MorningRow['bar'];
  readonly explanation: Explanation;
}

export type Heard = Pick<DoorFastRequest, 'food' | 'drink' | 'isNothingSincePlan'>;

const iso = (at: Instant): string => new Date(at).toISOString();

/** What the door check names; "nothing since the plan" where it names no time and could tell. */
export function heardAtTheDoor(
  check: Pick<
    DoorCheckRow,
    'last_food_at' | 'food_item' | 'last_drink_at' | 'drink_item' | 'verdict'
  >,
): Heard {
  const food = check.last_food_at && { at: check.last_food_at.getTime(), item: check.food_item };
  const drink = check.last_drink_at && {
    at: check.last_drink_at.getTime(),
    item: check.drink_item,
  };
  return { food, drink, isNothingSincePlan: !food && !drink && check.verdict !== 'cannot-tell' };
}

/** The newest answer about food and drink; "late", "ill" and "not coming" say nothing of it. */
export function newestAnswer(said: readonly SaidRow[]): SaidRow | null {
  return said.filter(({ answer }) => isAboutFood(answer)).at(-1) ?? null;
}

const isAboutFood = (answer: SaidRow['answer']): boolean =>
  answer === 'nothing' || answer === 'sip' || answer === 'feed' || answer === 'unsure';

/** The same of the family's answer: a sip is water, milk or food is a meal of no known kind. */
function heardFrom(answer: SaidRow): Heard {
  const at = answer.last_intake_at?.getTime() ?? null;
  const taken = at === null ? null : { at, item: null };
  const isSip = answer.answer === 'sip';
  return {
    food: isSip ? null : taken,
    drink: isSip && at !== null ? { at, item: 'water' } : null,
    isNothingSincePlan: at === null && answer.answer === 'nothing',
  };
}

const heardNothing: Heard = { food: null, drink: null, isNothingSincePlan: false };

export function fastSoFar(facts: MorningFacts, now: Instant): FastSoFar {
  const { plan } = facts.plan;
  const standard = plan.kind === 'standard' ? plan : null;
  const answer = newestAnswer(facts.said);
  const isTold = facts.doorCheck !== null || answer !== null;
  const heard = facts.doorCheck
    ? heardAtTheDoor(facts.doorCheck)
    : answer
      ? heardFrom(answer)
      : heardNothing;
  const endAt = facts.specimen?.collected_at.getTime() ?? facts.plan.fedAt ?? now;
  const fast = doorFast({ ...heard, plan, now: endAt });
  const { lastIntakeAt } = fast;
  const verdict = facts.doorCheck?.verdict ?? answer?.verdict ?? null;
  const common = {
    verdict,
    lastIntakeAt,
    hungryFromAt: fast.hungryFromAt,
    isPlanOnly: !isTold,
    isUnsure: isTold && (verdict === 'cannot-tell' || lastIntakeAt === null),
    fastedMinutes:
      lastIntakeAt === null || endAt < lastIntakeAt
        ? null
        : Math.floor((endAt - lastIntakeAt) / millisecondsPerMinute),
    explanation: fast.explanation,
  };
  if (!standard) return { ...common, readyAt: null, longestAt: null, ceiling: 'ok', bar: null };

  const fromAt = lastIntakeAt ?? standard.mealStopAt;
  const readyAt = fast.readyAt ?? fromAt + standard.leastMinutes * millisecondsPerMinute;
  const longestAt = longestEndsAt(fast.hungryFromAt ?? fromAt, standard);
  const isOver = facts.specimen !== null || facts.plan.fedAt !== null || isEnded(facts);
  return {
    ...common,
    readyAt: lastIntakeAt === null ? null : readyAt,
    longestAt,
    // By the plan alone the ceiling presses too: a family that is not heard from may have stopped early.
    ceiling: isOver ? 'ok' : fast.ceiling,
    bar: {
      fromAt: iso(fromAt),
      isPlanOnly: !isTold,
      isUnsure: common.isUnsure,
      leastAt: iso(readyAt),
      longestAt: iso(longestAt),
      likelyCollectionAt: iso(likelyCollectionAt(facts, Math.min(readyAt, longestAt), now)),
      collectedAt: facts.specimen?.collected_at.toISOString() ?? null,
    },
  };
}

/** After the usual wait from the arrival as it is or is expected, never before the child is ready. */
function likelyCollectionAt(
  { plan, collection }: MorningFacts,
  readyAt: Instant,
  now: Instant,
): Instant {
  const isWaiting = plan.state === 'here' && collection === null;
  const arrivesAt = plan.arrivedAt ?? plan.expectedAt ?? plan.arrivalAt;
  const usualAt = arrivesAt + plan.site.usualWaitMinutes * millisecondsPerMinute;
  return Math.max(usualAt, readyAt, isWaiting ? now : 0);
}

const isEnded = ({ plan }: MorningFacts): boolean =>
  plan.state === 'lost' || plan.state === 'not-collected' || plan.leftAt !== null;
