import type { MorningRow } from '../../shared/contracts/this-morning';
import type { Verdict } from '../../shared/contracts/common';
import { hungerCeiling } from '../../shared/domain/fasting-check';
import { longestEndsAt, type StandardPlan } from '../../shared/domain/fasting-plan';
import { millisecondsPerMinute, type Instant } from '../../shared/domain/day';
import type { DoorCheckRow, MorningFacts, SaidRow } from './morning-facts';

/** What is known of a child's fast: the nurse's door check before the family's answer before the plan. */
export interface FastSoFar {
  readonly verdict: Verdict | null;
  readonly lastIntakeAt: Instant | null;
  readonly isPlanOnly: boolean;
  readonly isUnsure: boolean;
  readonly readyAt: Instant | null;
  readonly longestAt: Instant | null;
  readonly fastedMinutes: number | null;
  readonly ceiling: MorningRow['ceiling'];
  readonly bar: MorningRow['bar'];
}

const iso = (at: Instant): string => new Date(at).toISOString();

/** The newest time by mouth that the door check names; the plan's stop when all went as planned. */
export function doorIntakeAt(
  check: Pick<DoorCheckRow, 'last_food_at' | 'last_drink_at' | 'verdict'>,
  plan: StandardPlan | null,
): Instant | null {
  const told = [check.last_food_at, check.last_drink_at].flatMap((at) =>
    at ? [at.getTime()] : [],
  );
  if (told.length > 0) return Math.max(...told);
  return check.verdict === 'cannot-tell' ? null : (plan?.stopAt ?? null);
}

/** The newest answer about food and drink; "late", "ill" and "not coming" say nothing of it. */
export function newestAnswer(said: readonly SaidRow[]): SaidRow | null {
  return said.filter(({ answer }) => isAboutFood(answer)).at(-1) ?? null;
}

const isAboutFood = (answer: SaidRow['answer']): boolean =>
  answer === 'nothing' || answer === 'sip' || answer === 'feed' || answer === 'unsure';

function intakeOf(facts: MorningFacts, plan: StandardPlan | null): Instant | null {
  if (facts.doorCheck) return doorIntakeAt(facts.doorCheck, plan);
  const answer = newestAnswer(facts.said);
  if (!answer) return null;
  if (answer.last_intake_at) return answer.last_intake_at.getTime();
  return answer.answer === 'nothing' ? (plan?.stopAt ?? null) : null;
}

export function fastSoFar(facts: MorningFacts, now: Instant): FastSoFar {
  const { plan } = facts.plan;
  const standard = plan.kind === 'standard' ? plan : null;
  const answer = newestAnswer(facts.said);
  const verdict = facts.doorCheck?.verdict ?? answer?.verdict ?? null;
  const lastIntakeAt = intakeOf(facts, standard);
  const isTold = facts.doorCheck !== null || answer !== null;
  const isUnsure = isTold && (verdict === 'cannot-tell' || lastIntakeAt === null);
  const endAt = facts.specimen?.collected_at.getTime() ?? facts.plan.fedAt ?? now;
  const fastedMinutes =
    lastIntakeAt === null || endAt < lastIntakeAt
      ? null
      : Math.floor((endAt - lastIntakeAt) / millisecondsPerMinute);
  const none = { readyAt: null, longestAt: null, ceiling: 'ok', bar: null } as const;
  const common = { verdict, lastIntakeAt, isPlanOnly: !isTold, isUnsure, fastedMinutes };
  if (!standard) return { ...common, ...none };

  const fromAt = lastIntakeAt ?? standard.stopAt;
  const readyAt = fromAt + standard.leastMinutes * millisecondsPerMinute;
  // A sip starts the least hours again; hunger goes on from the last meal.
  const isSip = facts.doorCheck === null && answer?.answer === 'sip';
  const hungryFromAt = isSip ? Math.min(fromAt, standard.stopAt) : fromAt;
  const longestAt = longestEndsAt(hungryFromAt, standard);
  const isOver = facts.specimen !== null || facts.plan.fedAt !== null || isEnded(facts);
  return {
    ...common,
    readyAt: lastIntakeAt === null ? null : readyAt,
    longestAt,
    // By the plan alone the ceiling presses too: a family that is not heard from may have stopped early.
    ceiling: isOver
      ? 'ok'
      : hungerCeiling({ lastIntakeAt: hungryFromAt, longestMinutes: standard.longestMinutes, now }),
    bar: {
      fromAt: iso(fromAt),
      isPlanOnly: !isTold,
      isUnsure,
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
