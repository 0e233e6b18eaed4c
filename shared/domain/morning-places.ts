/** Which child gets which place on one morning. */
import type { Place } from './places-of-morning';
import {
  addDays,
  compareDays,
  instantOf,
  millisecondsPerMinute,
  type Day,
  type Instant,
  type LocalTime,
} from './zone';

export interface FastingLimits {
  readonly leastMinutes: number;
  readonly longestMinutes: number;
  /** Nothing from this clock time of the night, where the protocol says so; the earlier of both counts. */
  readonly nothingFrom?: LocalTime | null;
}

export interface SeriesChild extends FastingLimits {
  readonly id: number;
  readonly bornOn: Day;
  /** The usual last meal of the evening; without any usual time the child is taken to eat at the stop. */
  readonly usualLastMealTime?: LocalTime;
  /** Usual feeds of the night, in any order. */
  readonly nightFeedTimes?: readonly LocalTime[];
  /** Limits of a later age, each from its day on, in order of days. */
  readonly laterLimits?: readonly (FastingLimits & { readonly from: Day })[];
}

export interface ChildPlace {
  readonly childId: number;
  readonly arrivalTime: LocalTime;
  readonly roomId: number;
}

export interface MorningPlacesRequest {
  readonly zone: string;
  readonly on: Day;
  /** Every place of the morning, taken ones included, since they lie between neighbours. */
  readonly places: readonly Place[];
  readonly isTaken: (place: Place) => boolean;
  readonly children: readonly SeriesChild[];
  readonly usualWaitMinutes: number;
  /** Places that do not lie side by side will do as well. */
  readonly siblingsMayPart?: boolean;
}

export interface TooLongFast {
  readonly childId: number;
  /** At the earliest place that is free, usual wait included. */
  readonly minutes: number;
  readonly longestMinutes: number;
}

export type MorningPlaces =
  | { readonly ok: true; readonly places: readonly ChildPlace[]; readonly neighbouring: boolean }
  | {
      readonly ok: false;
      readonly because: 'fast-too-long';
      readonly fasts: readonly TooLongFast[];
    }
  | { readonly ok: false; readonly because: 'siblings-apart' };

/** The child's hours on that day. */
export function limitsOn(child: SeriesChild, on: Day): FastingLimits {
  return child.laterLimits?.filter(({ from }) => from <= on).at(-1) ?? child;
}

/**
 * The earliest neighbouring places, the youngest child in the first of them; where no neighbouring ones are left and
 * the children may be parted, the earliest free ones. Fails with every child whose longest fast no place keeps.
 */
export function morningPlaces(request: MorningPlacesRequest): MorningPlaces {
  const children = [...request.children].sort(
    (left, right) => compareDays(right.bornOn, left.bornOn) || left.id - right.id,
  );
  const all = [...request.places].sort(
    (left, right) =>
      left.arrivalTime.localeCompare(right.arrivalTime) || left.roomId - right.roomId,
  );
  const fastOf = fastsOf(request);
  const fits = (child: SeriesChild, place: Place | undefined): boolean =>
    place !== undefined &&
    !request.isTaken(place) &&
    fastOf(child, place) <= limitsOn(child, request.on).longestMinutes;
  const assign = (chosen: readonly Place[], neighbouring: boolean): MorningPlaces => ({
    ok: true,
    neighbouring,
    places: children.flatMap((child, index) => {
      const place = chosen[index];
      return place ? [{ childId: child.id, ...place }] : [];
    }),
  });
  for (let start = 0; start + children.length <= all.length; start += 1) {
    const window = all.slice(start, start + children.length);
    if (children.every((child, index) => fits(child, window[index]))) return assign(window, true);
  }
  const scattered: Place[] = [];
  const left: SeriesChild[] = [];
  for (const child of children) {
    const place = all.find((candidate) => !scattered.includes(candidate) && fits(child, candidate));
    if (place) scattered.push(place);
    else left.push(child);
  }
  if (left.length > 0) {
    const earliest = all.find((place) => !request.isTaken(place));
    const fasts = left.map((child) => ({
      childId: child.id,
      minutes: earliest ? fastOf(child, earliest) : 0,
      longestMinutes: limitsOn(child, request.on).longestMinutes,
    }));
    return { ok: false, because: 'fast-too-long', fasts };
  }
  if (!request.siblingsMayPart) return { ok: false, because: 'siblings-apart' };
  return assign(scattered, false);
}

/** Minutes from the last meal to the collection after the usual wait; each clock time is converted once. */
function fastsOf({ zone, on, usualWaitMinutes }: MorningPlacesRequest) {
  const converted = clockOf(zone);
  const known = new Map<string, number>();
  return (child: SeriesChild, { arrivalTime }: Place): number => {
    const key = `${child.id}:${arrivalTime}`;
    const before = known.get(key);
    if (before !== undefined) return before;
    const arrivalAt = converted(on, arrivalTime, 'later');
    const { leastMinutes, nothingFrom } = limitsOn(child, on);
    /** The newest instant before the arrival at which a clock shows this time. */
    const inTheNight = (time: LocalTime): Instant => {
      const inTheMorning = converted(on, time, 'earlier');
      return inTheMorning < arrivalAt ? inTheMorning : converted(addDays(on, -1), time, 'earlier');
    };
    const byHours = arrivalAt - leastMinutes * millisecondsPerMinute;
    const stopAt = nothingFrom ? Math.min(byHours, inTheNight(nothingFrom)) : byHours;
    const lastMealAt = lastMealBefore(stopAt, child, inTheNight);
    const minutes = (arrivalAt - lastMealAt) / millisecondsPerMinute + usualWaitMinutes;
    known.set(key, minutes);
    return minutes;
  };
}

/** A clock that remembers: brothers and sisters share times, and each place asks for the same ones. */
function clockOf(zone: string) {
  const known = new Map<string, Instant>();
  return (on: Day, time: LocalTime, pick: 'earlier' | 'later'): Instant => {
    const key = `${on} ${time} ${pick}`;
    const instant = known.get(key) ?? instantOf({ on, time, zone }, pick);
    known.set(key, instant);
    return instant;
  };
}

/**
 * The last usual meal or feed before the stop, on the morning's own day or the evening before. One between stop and
 * arrival falls away; the family then feeds the child at the stop instead. A time that occurs twice is read as the
 * earlier one, which makes the fast longer.
 */
function lastMealBefore(
  stopAt: Instant,
  { usualLastMealTime, nightFeedTimes = [] }: SeriesChild,
  inTheNight: (time: LocalTime) => Instant,
): Instant {
  const times = [
    ...(usualLastMealTime === undefined ? [] : [usualLastMealTime]),
    ...nightFeedTimes,
  ];
  const meals = times.map(inTheNight);
  if (meals.length === 0 || meals.some((at) => at >= stopAt)) return stopAt;
  return Math.max(...meals);
}
