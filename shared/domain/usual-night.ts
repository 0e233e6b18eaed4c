/**
 * What a family told about its usual nights when the mornings were planned, laid over a plan: which
 * feed of the night falls away, and whether supper is too early for the longest fast.
 */
import type { LocalTime } from './day';
import { lastBefore } from './fasting-stops';
import type { Instant } from './zone';

export interface UsualNight {
  readonly lastMealTime: LocalTime | null;
  readonly nightFeedTimes: readonly LocalTime[];
}

export interface NightFeed {
  readonly at: Instant;
  /** After the stop, or at it: it could not be finished in time. */
  readonly fallsAway: boolean;
}

export interface NightOfPlan {
  /** The usual last meal of the day, moved so that it fits the plan; null when not asked. */
  readonly lastMealAt: Instant | null;
  /** The usual feeds of the night before the arrival, in order of time. */
  readonly nightFeeds: readonly NightFeed[];
}

export function nightOfPlan(
  usual: UsualNight | undefined,
  plan: {
    readonly arrivalAt: Instant;
    readonly mealStopAt: Instant;
    /** With a last meal before this the longest fast would pass. */
    readonly earliestLastMealAt: Instant;
    readonly zone: string;
  },
): NightOfPlan {
  const { arrivalAt, mealStopAt, earliestLastMealAt, zone } = plan;
  const mealAt = usual?.lastMealTime ? lastBefore(mealStopAt, usual.lastMealTime, zone) : null;
  return {
    lastMealAt: mealAt === null ? null : Math.max(mealAt, earliestLastMealAt),
    nightFeeds: (usual?.nightFeedTimes ?? [])
      .map((time) => lastBefore(arrivalAt, time, zone))
      .sort((left, right) => left - right)
      .map((at) => ({ at, fallsAway: at >= mealStopAt })),
  };
}
