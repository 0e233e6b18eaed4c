/**
 * Calendar days and wall-clock times without any zone. Free of libraries, so that the family's
 * phone may use it. Days are counted by calendar math, never by adding 24 hours.
 */

/** Milliseconds since 1970-01-01T00:00Z. */
export type Instant = number;
/** 'YYYY-MM-DD' of the Gregorian calendar. */
export type Day = string;
/** 'HH:mm', 00:00 to 23:59. */
export type LocalTime = string;
/** ISO 8601: 1 is Monday, 7 is Sunday. */
export type Weekday = 1 | 2 | 3 | 4 | 5 | 6 | 7;

export const millisecondsPerMinute = 60_000;
const millisecondsPerDay = 86_400_000;

export class InvalidDay extends RangeError {
  constructor(readonly day: string) {
    super(`Not a calendar day: ${day}`);
    this.name = 'InvalidDay';
  }
}

export class InvalidTime extends RangeError {
  constructor(readonly time: string) {
    super(`Not a time of day: ${time}`);
    this.name = 'InvalidTime';
  }
}

function startOfDayUtc(day: string): number | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day);
  if (!match) return null;
  const [year, month, dayOfMonth] = [Number(match[1]), Number(match[2]), Number(match[3])];
  const utc = Date.UTC(year, month - 1, dayOfMonth);
  return new Date(utc).toISOString().startsWith(day) ? utc : null;
}

export function isDay(text: string): boolean {
  return startOfDayUtc(text) !== null;
}

/** The same day; throws InvalidDay for 29 February of a common year and any other shape. */
export function validateDay(day: string): Day {
  return dayFromUtc(utcOf(day));
}

function utcOf(day: Day): number {
  const utc = startOfDayUtc(day);
  if (utc === null) throw new InvalidDay(day);
  return utc;
}

function dayFromUtc(utc: number): Day {
  return new Date(utc).toISOString().slice(0, 10);
}

export function isTime(text: string): boolean {
  return /^([01]\d|2[0-3]):[0-5]\d$/.test(text);
}

export function validateTime(time: string): LocalTime {
  if (!isTime(time)) throw new InvalidTime(time);
  return time;
}

export function addDays(day: Day, days: number): Day {
  return dayFromUtc(utcOf(day) + days * millisecondsPerDay);
}

/** Whole days from the first to the second; negative when the second comes before. */
export function daysBetween(from: Day, to: Day): number {
  return Math.round((utcOf(to) - utcOf(from)) / millisecondsPerDay);
}

export function compareDays(left: Day, right: Day): number {
  return daysBetween(right, left);
}

export function weekdayOf(day: Day): Weekday {
  const sundayIsZero = new Date(utcOf(day)).getUTCDay();
  return (sundayIsZero === 0 ? 7 : sundayIsZero) as Weekday;
}

export interface Age {
  readonly years: number;
  /** All completed months since birth, years included. */
  readonly months: number;
}

/**
 * Age in completed years and completed months on a day. A child born on 29 February (or on the
 * 31st) completes the month on the first day after the shorter month: the cautious reading, since
 * an older age never means a shorter fast.
 */
export function ageOn(bornOn: Day, on: Day): Age {
  if (daysBetween(bornOn, on) < 0) throw new InvalidDay(on);
  const [bornYear, bornMonth, bornDay] = partsOf(bornOn);
  const [year, month, dayOfMonth] = partsOf(on);
  const begun = (year - bornYear) * 12 + (month - bornMonth);
  const months = dayOfMonth < bornDay ? begun - 1 : begun;
  return { years: Math.floor(months / 12), months };
}

function partsOf(day: Day): [number, number, number] {
  const date = new Date(utcOf(day));
  return [date.getUTCFullYear(), date.getUTCMonth() + 1, date.getUTCDate()];
}

/** Minutes after 00:00 on the wall clock. */
export function minutesOfTime(time: LocalTime): number {
  const valid = validateTime(time);
  return Number(valid.slice(0, 2)) * 60 + Number(valid.slice(3));
}

export function timeOfMinutes(minutes: number): LocalTime {
  if (!Number.isInteger(minutes) || minutes < 0 || minutes >= 24 * 60) {
    throw new InvalidTime(String(minutes));
  }
  const two = (value: number): string => String(value).padStart(2, '0');
  return `${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
