/** Places that are gone: booked already, or free of people but within a turnover. */
import { minutesOfTime, type Day, type LocalTime } from './day';
import type { Place, Room } from './places-of-morning';

export interface BookedPlace {
  readonly on: Day;
  readonly arrivalTime: LocalTime;
  /** Without a room every place at that time is taken. */
  readonly roomId?: number;
}

/** What a child keeps busy beside its own place. */
export interface Turnover {
  readonly rooms: readonly Room[];
  readonly staffPairs: number;
  readonly minutesPerChild: number;
  /** The clinic's own ceiling for a morning. */
  readonly limit: number;
}

export type Obstacle = 'taken' | 'turnover';

/** Entries by day, where given from a day on, so that a search looks at each of them once and not once a day. */
export function byDay<Entry extends { readonly on: Day }>(
  entries: readonly Entry[],
  from?: Day,
): ReadonlyMap<Day, readonly Entry[]> {
  const days = new Map<Day, Entry[]>();
  for (const entry of entries) {
    const { on } = entry;
    if (from !== undefined && on < from) continue;
    const known = days.get(on);
    if (known) known.push(entry);
    else days.set(on, [entry]);
  }
  return days;
}

/**
 * Why a place cannot be had on a day with these bookings; null when it can. A room stays closed after each child, and
 * a pair looks after one child at a time; bookings may lie beside the places of today, because hours were changed.
 */
export function obstacleAt(
  place: Place,
  booked: readonly BookedPlace[],
  turnover?: Turnover,
): Obstacle | null {
  const isRoomOf = ({ roomId }: BookedPlace): boolean => (roomId ?? place.roomId) === place.roomId;
  if (booked.some((other) => other.arrivalTime === place.arrivalTime && isRoomOf(other)))
    return 'taken';
  if (!turnover) return null;
  const { rooms, staffPairs, minutesPerChild } = turnover;
  const start = minutesOfTime(place.arrivalTime);
  const closureMinutes = rooms.find(({ id }) => id === place.roomId)?.closureMinutes ?? 0;
  const isInRoom = booked.some(
    (other) =>
      isRoomOf(other) &&
      Math.abs(minutesOfTime(other.arrivalTime) - start) < minutesPerChild + closureMinutes,
  );
  if (isInRoom) return 'turnover';
  const starts = booked.map(({ arrivalTime }) => minutesOfTime(arrivalTime));
  const busyAt = (minute: number): number =>
    starts.filter((other) => other <= minute && minute < other + minutesPerChild).length;
  const moments = [start, ...starts.filter((at) => at > start && at < start + minutesPerChild)];
  return moments.some((minute) => busyAt(minute) >= staffPairs) ? 'turnover' : null;
}
