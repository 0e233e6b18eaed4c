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

export interface SeriesChild {
  readonly id: number;
  readonly bornOn: Day;
  readonly leastMinutes: number;
  readonly longestMinutes: number;
  /** When the child last eats before a morning, night feeds included; at the stop when absent. */
  readonly usualLastMealTime?: LocalTime;
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
}

export type MorningPlaces =
  | { readonly ok: true; readonly places: readonly ChildPlace[]; readonly neighbouring: boolean }
  | { readonly ok: false; readonly childId: number };

/**
 * The earliest neighbouring places, the youngest child in the first of them; where no neighbouring
 * ones are left, the earliest free ones. Fails with the child whose longest fast no place keeps.
 */
export function morningPlaces(request: MorningPlacesRequest): MorningPlaces {
  const children = [...request.children].sort(
    (left, right) => compareDays(right.bornOn, left.bornOn) || left.id - right.id,
  );
  const all = [...request.places].sort(
    (left, right) =>
      left.arrivalTime.localeCompare(right.arrivalTime) || left.roomId - right.roomId,
  );
  const fits = (child: SeriesChild, place: Place | undefined): boolean =>
    place !== undefined && !request.isTaken(place) && keepsLongestFast(request, child, place);
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
  for (const child of children) {
    const place = all.find((candidate) => !scattered.includes(candidate) && fits(child, candidate));
    if (!place) return { ok: false, childId: child.id };
    scattered.push(place);
  }
  return assign(scattered, false);
}

/** The child is collected, after the usual wait, before its longest fast is over. */
function keepsLongestFast(
  { zone, on, usualWaitMinutes }: MorningPlacesRequest,
  child: SeriesChild,
  { arrivalTime }: Place,
): boolean {
  const arrivalAt = instantOf({ on, time: arrivalTime, zone });
  const stopAt = arrivalAt - child.leastMinutes * millisecondsPerMinute;
  const collectionAt = arrivalAt + usualWaitMinutes * millisecondsPerMinute;
  const lastMealAt = lastMealBefore(stopAt, arrivalAt, child.usualLastMealTime, on, zone);
  return collectionAt - lastMealAt <= child.longestMinutes * millisecondsPerMinute;
}

/**
 * The usual last meal, on the morning's own day or the evening before. One between stop and arrival
 * falls away; the family then feeds the child at the stop instead, as without a usual time.
 */
function lastMealBefore(
  stopAt: Instant,
  arrivalAt: Instant,
  usualTime: LocalTime | undefined,
  on: Day,
  zone: string,
): Instant {
  if (usualTime === undefined) return stopAt;
  const inTheMorning = instantOf({ on, time: usualTime, zone }, 'earlier');
  if (inTheMorning < arrivalAt) return Math.min(inTheMorning, stopAt);
  return Math.min(instantOf({ on: addDays(on, -1), time: usualTime, zone }, 'earlier'), stopAt);
}
