/**
 * The same questions about clocks asked of Temporal, a second implementation. It reads the same zone
 * data of the machine, so that clock-change dates as published stand in a table of their own.
 */
import { Temporal } from '@js-temporal/polyfill';
import { readings, type Day, type Instant, type LocalTime } from '../../../shared/domain/zone';

export const plainDay = (on: Day): Temporal.PlainDate => {
  const [year = 0, month = 0, day = 0] = on.split('-').map(Number);
  return new Temporal.PlainDate(year, month, day);
};

export function wallClock(on: Day, time: LocalTime): Temporal.PlainDateTime {
  const [hour = 0, minute = 0] = time.split(':').map(Number);
  return plainDay(on).toPlainDateTime(new Temporal.PlainTime(hour, minute));
}

export const read = (
  on: Day,
  time: LocalTime,
  zone: string,
  disambiguation: 'earlier' | 'later' | 'reject',
): Temporal.ZonedDateTime => wallClock(on, time).toZonedDateTime(zone, { disambiguation });

export const inZone = (instant: Instant, zone: string): Temporal.ZonedDateTime =>
  Temporal.Instant.fromEpochMilliseconds(instant).toZonedDateTimeISO(zone);

export interface Transition {
  readonly at: Instant;
  readonly shiftMinutes: number;
}

/** Every change of a zone's clock that begins in these years of UTC. */
export function transitionsOf(zone: string, fromYear: number, toYear: number): Transition[] {
  const found: Transition[] = [];
  const until = Date.UTC(toYear + 1, 0);
  let at = inZone(Date.UTC(fromYear, 0) - 1, zone).getTimeZoneTransition('next');
  while (at !== null && at.epochMilliseconds < until) {
    const before = at.subtract({ minutes: 1 });
    const shiftMinutes = (at.offsetNanoseconds - before.offsetNanoseconds) / 60e9;
    // A change of the zone's name alone moves no clock.
    if (shiftMinutes !== 0) found.push({ at: at.epochMilliseconds, shiftMinutes });
    at = at.getTimeZoneTransition('next');
  }
  return found;
}

/** The newest instant before the arrival at which a clock shows this time; the first of two. */
export function newestBefore(arrival: Temporal.ZonedDateTime, time: LocalTime): Instant {
  const today = arrival.toPlainDate();
  const readings = [today.subtract({ days: 1 }), today].map(
    (on) => read(on.toString(), time, arrival.timeZoneId, 'earlier').epochMilliseconds,
  );
  return Math.max(...readings.filter((instant) => instant < arrival.epochMilliseconds));
}

/** What was compared, our answer and the other one. */
export type Sides = readonly [string, unknown, unknown];

/** The first differences as words, so that a failure shows what and where; empty when all agree. */
export function differences(count: number, compare: (index: number) => Sides): string[] {
  const found: string[] = [];
  for (let index = 0; index < count && found.length < 5; index += 1) {
    const [what, ours, theirs] = compare(index);
    const [left, right] = [JSON.stringify(ours), JSON.stringify(theirs)];
    if (left !== right) found.push(`${what}: ${left}, and Temporal ${right}`);
  }
  return found;
}

/** Both readings of a wall clock beside those of Temporal, which refuses one that is not read once. */
export function readingsDiffer(
  on: Day,
  time: LocalTime,
  zone: string,
): { readonly kind: 'once' | 'twice' | 'never'; readonly sides: Sides } {
  const ours = readings({ on, time, zone });
  const what = `${on} ${time} ${zone}`;
  const mine = [ours.kind, ours.earlier, ours.later];
  if (ours.kind === 'once') {
    const only = read(on, time, zone, 'reject').epochMilliseconds;
    return { kind: ours.kind, sides: [what, mine, ['once', only, only]] };
  }
  const [earlier, later] = [read(on, time, zone, 'earlier'), read(on, time, zone, 'later')];
  const shows = later.toPlainTime().toString({ smallestUnit: 'minute' }) === time;
  const kind = earlier.equals(later) ? 'once' : shows ? 'twice' : 'never';
  const theirs = [kind, earlier.epochMilliseconds, later.epochMilliseconds];
  return { kind: ours.kind, sides: [what, mine, theirs] };
}
