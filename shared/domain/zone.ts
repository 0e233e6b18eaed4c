/**
 * The edge between wall clocks and instants, and the only place of the domain that knows zones.
 * Everything else works on instants and minutes.
 */
import { IANAZone } from 'luxon';
import {
  millisecondsPerMinute,
  validateDay,
  validateTime,
  weekdayOf,
  type Day,
  type Instant,
  type LocalTime,
  type Weekday,
} from './day';

export * from './day';

export class InvalidZone extends RangeError {
  constructor(readonly zone: string) {
    super(`Not a time zone: ${zone}`);
    this.name = 'InvalidZone';
  }
}

export interface WallClock {
  readonly on: Day;
  readonly time: LocalTime;
  /** IANA name, such as America/Chicago. */
  readonly zone: string;
}

export interface Readings {
  readonly kind: 'once' | 'twice' | 'never';
  readonly earlier: Instant;
  readonly later: Instant;
}

export interface LocalParts {
  readonly on: Day;
  readonly time: LocalTime;
  readonly year: number;
  readonly month: number;
  readonly day: number;
  readonly weekday: Weekday;
  readonly hour: number;
  readonly minute: number;
}

export function validateZone(zone: string): string {
  return placeOf(zone).name;
}

/** Luxon keeps every zone it has met; to ask anew whether one exists costs more than a conversion. */
function placeOf(zone: string): IANAZone {
  const place = IANAZone.create(zone);
  if (!place.isValid) throw new InvalidZone(zone);
  return place;
}

/**
 * Both ways to read a wall-clock time. On the night a clock goes back a time occurs twice; on the
 * night it goes forward some times never occur, and are read with the offset before and the offset
 * after the change (02:30 on 2026-03-08 in Chicago: 03:30 after it, or 01:30 before it).
 */
export function readings(wallClock: WallClock): Readings {
  const zone = placeOf(wallClock.zone);
  const asIfUtc = Date.parse(
    `${validateDay(wallClock.on)}T${validateTime(wallClock.time)}:00.000Z`,
  );
  // No zone has moved its clock twice within a day around one instant; a day on either side
  // therefore holds the offset before and the offset after.
  const dayLong = 24 * 60 * millisecondsPerMinute;
  const [before, after] = [zone.offset(asIfUtc - dayLong), zone.offset(asIfUtc + dayLong)];
  const byOffset = (minutes: number): Instant => asIfUtc - minutes * millisecondsPerMinute;
  if (before === after) return { kind: 'once', earlier: byOffset(before), later: byOffset(after) };
  const instants = [byOffset(before), byOffset(after)];
  const real = instants.filter(
    (instant) => instant + zone.offset(instant) * millisecondsPerMinute === asIfUtc,
  );
  const chosen = real.length > 0 ? real : instants;
  const earlier = Math.min(...chosen);
  const later = Math.max(...chosen);
  if (real.length === 0) return { kind: 'never', earlier, later };
  return { kind: earlier === later ? 'once' : 'twice', earlier, later };
}

/** The instant of a wall-clock time; a doubtful one is read as the later unless told otherwise. */
export function instantOf(wallClock: WallClock, pick: 'earlier' | 'later' = 'later'): Instant {
  return readings(wallClock)[pick];
}

export function localPartsOf(instant: Instant, zone: string): LocalParts {
  const shiftMinutes = placeOf(zone).offset(instant);
  // The wall clock written as if it were UTC.
  const shown = new Date(instant + shiftMinutes * millisecondsPerMinute);
  const [on, time] = [shown.toISOString().slice(0, 10), shown.toISOString().slice(11, 16)];
  return {
    on,
    time,
    year: shown.getUTCFullYear(),
    month: shown.getUTCMonth() + 1,
    day: shown.getUTCDate(),
    weekday: weekdayOf(on),
    hour: shown.getUTCHours(),
    minute: shown.getUTCMinutes(),
  };
}

export function dayOf(instant: Instant, zone: string): Day {
  return localPartsOf(instant, zone).on;
}

export function localTimeOf(instant: Instant, zone: string): LocalTime {
  return localPartsOf(instant, zone).time;
}

export interface ClockChange {
  /** First instant with the new offset. */
  readonly at: Instant;
  /** +60 when the clock goes forward, -60 when it goes back. */
  readonly shiftMinutes: number;
}

/** The first change of the clock after `from` and not after `until`, to the minute. */
export function clockChangeBetween(
  from: Instant,
  until: Instant,
  zone: string,
): ClockChange | null {
  const place = placeOf(zone);
  if (until < from) throw new RangeError('The end comes before the beginning.');
  const before = place.offset(from);
  const after = place.offset(until);
  if (before === after) return null;
  let low = from;
  let high = until;
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (place.offset(middle) === before) low = middle;
    else high = middle;
  }
  return { at: high, shiftMinutes: after - before };
}
