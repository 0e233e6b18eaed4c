import type { NextMorning, PathStep } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { addDays, instantOf } from '../../shared/domain/zone';
import type { MorningPlan } from '../series/morning-plans';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { leaveAtOf } from './night-path';

const minute = 60_000;
const atTheDoorSoonMinutes = 10;

interface Moment {
  readonly at: Instant;
  readonly says: string;
  readonly stepKeyLike: string | null;
}

/**
 * The sentence of the moment, each with the instant from which it holds. Only these change by themselves on a page that
 * was opened once; everything else names its day.
 */
export function nightMoments(
  night: HouseholdNight,
  steps: readonly PathStep[],
  words: FamilyWords,
): NextMorning['moments'] {
  const found = [...untilTheStops(night, words), ...fromGettingUp(night, words)].sort(
    (left, right) => left.at - right.at,
  );
  return found.map(({ at, says, stepKeyLike }) => ({
    from: new Date(at).toISOString(),
    stepKey: stepKeyLike === null ? null : (keyAt(steps, at, stepKeyLike) ?? null),
    says,
  }));
}

const keyAt = (steps: readonly PathStep[], at: Instant, like: string): string | undefined =>
  (
    steps.find(({ key, time }) => key.startsWith(like) && Date.parse(time.at) === at) ??
    steps.find(({ key }) => key.startsWith(like))
  )?.key;

function untilTheStops(night: HouseholdNight, words: FamilyWords): Moment[] {
  const children = night.children.filter((child) => standardPlanOf(child) !== null);
  if (children.length === 0) return [];
  const names = words.list(children);
  const dayBefore = addDays(night.on, -1);
  const moments: Moment[] = [
    {
      at: instantOf({ on: dayBefore, time: '05:00', zone: night.zone }),
      says: words.text('moment.may-eat', { children: names }),
      stepKeyLike: null,
    },
    {
      at: instantOf({ on: dayBefore, time: '18:00', zone: night.zone }),
      says: words.text('moment.supper', { children: names }),
      stepKeyLike: 'supper',
    },
  ];
  for (const at of instants(children, (child) => standardPlanOf(child)?.lastFeedAt ?? null)) {
    const feeding = children.filter((child) => standardPlanOf(child)?.lastFeedAt === at);
    const stopAt = Math.min(...feeding.map((child) => standardPlanOf(child)?.mealStopAt ?? at));
    moments.push({
      at,
      says: words.text('moment.last-feed', {
        children: words.list(feeding),
        time: words.stopTime(stopAt),
      }),
      stepKeyLike: 'last-feed',
    });
  }
  for (const at of instants(children, (child) => standardPlanOf(child)?.nothingAt ?? null))
    moments.push(afterStop(at, children, words));
  return moments;
}

function afterStop(at: Instant, children: readonly MorningPlan[], words: FamilyWords): Moment {
  const stopOf = (child: MorningPlan): Instant => standardPlanOf(child)?.nothingAt ?? at;
  const empty = children.filter((child) => stopOf(child) <= at);
  const full = children.filter((child) => stopOf(child) > at);
  const stepKeyLike = 'stop';
  if (full.length === 0)
    return { at, says: words.text('moment.nothing', { children: words.list(empty) }), stepKeyLike };
  const time = words.stopTime(Math.min(...full.map(stopOf)));
  return {
    at,
    says: words.text('moment.some-may-eat', {
      empty: words.list(empty),
      full: words.list(full),
      time,
    }),
    stepKeyLike,
  };
}

function fromGettingUp(night: HouseholdNight, words: FamilyWords): Moment[] {
  const { site, children, firstArrivalAt } = night;
  const names = words.list(children);
  const leaveAt = leaveAtOf(night);
  const eatAgainAt = Math.max(
    firstArrivalAt + site.usualWaitMinutes * minute,
    ...children.map((child) => standardPlanOf(child)?.eatAgainAt ?? 0),
  );
  const arriveSoonAt = Math.max(leaveAt + minute, firstArrivalAt - atTheDoorSoonMinutes * minute);
  return [
    {
      at: night.questionOpensAt,
      says: words.text('moment.answer', { time: words.time(night.callListAt) }),
      stepKeyLike: 'answer',
    },
    ...leaving(children, leaveAt, words),
    {
      at: arriveSoonAt,
      says: words.text('moment.arrive', { door: site.door, time: words.time(firstArrivalAt) }),
      stepKeyLike: 'arrive',
    },
    {
      at: firstArrivalAt + minute,
      says: words.text('moment.waiting', { children: names }),
      stepKeyLike: 'arrive',
    },
    {
      at: eatAgainAt,
      says: words.text('moment.eat-again', { children: names }),
      stepKeyLike: 'eat-again',
    },
  ];
}

/** A child whose own plan nobody has composed is never told to go on without food. */
function leaving(children: readonly MorningPlan[], at: Instant, words: FamilyWords): Moment[] {
  const fasting = children.filter((child) => standardPlanOf(child) !== null);
  if (fasting.length === 0) return [];
  const says = words.text('moment.leave', { children: words.list(fasting) });
  return [{ at, says, stepKeyLike: 'leave' }];
}

const instants = (
  children: readonly MorningPlan[],
  atOf: (child: MorningPlan) => Instant | null,
): Instant[] => [...new Set(children.map(atOf).filter((at) => at !== null))].sort((a, b) => a - b);
