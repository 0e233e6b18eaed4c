/** Days, times and ages as staff read them. */
import { ageOn, daysBetween, type Day, type Instant } from '../domain/day';
import { localPartsOf } from '../domain/zone';
import { familyDay } from './family-time';
import { english } from './profiles/english';

const plural = (count: number, one: string): string => `${count} ${one}${count === 1 ? '' : 's'}`;

/** Weeks under 3 months, months under 2 years, then years. */
export function ageInWords(bornOn: Day, on: Day): string {
  const { months, years } = ageOn(bornOn, on);
  if (months < 3) return plural(Math.floor(daysBetween(bornOn, on) / 7), 'week');
  return months < 24 ? plural(months, 'month') : plural(years, 'year');
}

/** "Tuesday, 13 April". */
export const dayInWords = (day: Day): string => familyDay(day, english).text;

/** "Tuesday 01:45": the weekday says which side of midnight is meant. */
export function timeInWords(at: Instant, zone: string): string {
  const { on, time } = localPartsOf(at, zone);
  return `${familyDay(on, english).weekday} ${time}`;
}

/** "4 hours", "5 hours 30 minutes". */
export function minutesInWords(minutes: number): string {
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  return [
    hours > 0 ? plural(hours, 'hour') : '',
    rest > 0 || hours === 0 ? plural(rest, 'minute') : '',
  ]
    .filter(Boolean)
    .join(' ');
}

/** "A", "A and B", "A, B and C". */
export function listInWords(items: readonly string[]): string {
  const last = items.at(-1) ?? '';
  return items.length < 2 ? last : `${items.slice(0, -1).join(', ')} and ${last}`;
}
