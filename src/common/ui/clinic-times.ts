import { Pipe, type PipeTransform } from '@angular/core';

/** How an instant or a day is written on the clinic's side: exact, 24 hours, in the site's zone. */
const clock = (zone: string): Intl.DateTimeFormat =>
  new Intl.DateTimeFormat('en-GB', { timeZone: zone, hour: '2-digit', minute: '2-digit' });

const formats = new Map<string, Intl.DateTimeFormat>();
function format(key: string, make: () => Intl.DateTimeFormat): Intl.DateTimeFormat {
  const known = formats.get(key);
  if (known) return known;
  const made = make();
  formats.set(key, made);
  return made;
}

/** '06:22' in the site's zone. */
export const clockIn = (at: string, zone: string): string =>
  format(`clock ${zone}`, () => clock(zone)).format(new Date(at));

/** 'Tue, Apr 6' of an instant in the site's zone. */
export const dayIn = (at: string, zone: string): string =>
  format(
    `day ${zone}`,
    () =>
      new Intl.DateTimeFormat($localize.locale ?? 'en', {
        timeZone: zone,
        weekday: 'short',
        month: 'short',
        day: 'numeric',
      }),
  ).format(new Date(at));

/** 'Tue, Apr 6' of a calendar day. */
export const dayOnly = (day: string): string => dayIn(`${day}T12:00:00Z`, 'UTC');

/** 'April 6, 2025' of a calendar day. */
const dayWithYear = (day: string): string =>
  format(
    'year',
    () => new Intl.DateTimeFormat($localize.locale ?? 'en', { timeZone: 'UTC', dateStyle: 'long' }),
  ).format(new Date(`${day}T12:00:00Z`));

/** 'Tuesday, April 6' of a calendar day, for a heading. */
export const longDay = (day: string): string =>
  format(
    'long',
    () =>
      new Intl.DateTimeFormat($localize.locale ?? 'en', {
        timeZone: 'UTC',
        weekday: 'long',
        month: 'long',
        day: 'numeric',
      }),
  ).format(new Date(`${day}T12:00:00Z`));

@Pipe({ name: 'tdClock' })
export class ClockPipe implements PipeTransform {
  transform(at: string | null | undefined, zone: string): string {
    return at ? clockIn(at, zone) : '';
  }
}

@Pipe({ name: 'tdDay' })
export class DayPipe implements PipeTransform {
  transform(day: string | null | undefined, hasYear = false): string {
    if (!day) return '';
    return hasYear ? dayWithYear(day) : dayOnly(day);
  }
}

@Pipe({ name: 'tdMoment' })
export class MomentPipe implements PipeTransform {
  transform(at: string | null | undefined, zone: string): string {
    return at ? `${dayIn(at, zone)}, ${clockIn(at, zone)}` : '';
  }
}
