/**
 * A time as a family hears it: weekday, date, clock and part of the day together, never relative,
 * never "midnight" or "12:00" for a stop. The zone is the clinic's.
 */
import { wallClockForFamily } from '../domain/fasting-plan';
import {
  addDays,
  localPartsOf,
  readings,
  validateDay,
  weekdayOf,
  type Day,
  type Instant,
} from '../domain/zone';
import type { LanguageProfile } from './profiles';

export interface FamilyDay {
  readonly weekday: string;
  readonly date: string;
  /** "Wednesday, 9 December". */
  readonly text: string;
}

export interface FamilyTime {
  /** "7:00". */
  readonly clock: string;
  readonly dayPart: string;
  /** "7:00 in the morning". */
  readonly time: string;
  readonly weekday: string;
  readonly date: string;
  /** "Wednesday, 9 December, 7:00 in the morning". */
  readonly text: string;
  /** The two weekdays around the night, evening first; null by day. */
  readonly nightBetween: readonly [string, string] | null;
  /** Whether the wall clock shows this twice that night, and which time it is. */
  readonly occurs: 'once' | 'first' | 'second';
}

/** From 18:00 to 5:00 the time belongs to a night between two days. */
const nightFromHour = 18;
const nightUntilHour = 5;

export function familyDay(day: Day, profile: LanguageProfile): FamilyDay {
  const [, month, dayOfMonth] = validateDay(day).split('-').map(Number);
  const weekday = nth(profile.weekdays, weekdayOf(day) - 1);
  const date = fill(profile.patterns.date, {
    day: String(dayOfMonth),
    month: nth(profile.months, (month ?? 0) - 1),
  });
  return { weekday, date, text: fill(profile.patterns.dayText, { weekday, date }) };
}

export function familyTime(instant: Instant, zone: string, profile: LanguageProfile): FamilyTime {
  const { on, time: localTime, hour, minute } = localPartsOf(instant, zone);
  const day = familyDay(on, profile);
  const shownHour = profile.hourCycle === 'h12' ? hour % 12 || 12 : hour;
  const clock = `${shownHour}:${String(minute).padStart(2, '0')}`;
  const dayPart = dayPartAt(hour, profile);
  const { timeAtOne = profile.patterns.time } = profile.patterns;
  const time = fill(shownHour === 1 ? timeAtOne : profile.patterns.time, { clock, dayPart });
  const both = readings({ on, time: localTime, zone });
  // Seconds do not show; compare whole minutes.
  const isFirst = instant < both.later;
  return {
    clock,
    dayPart,
    time,
    weekday: day.weekday,
    date: day.date,
    text: fill(profile.patterns.text, { dayText: day.text, time }),
    nightBetween: nightBetween(on, hour, profile),
    occurs: both.kind !== 'twice' ? 'once' : isFirst ? 'first' : 'second',
  };
}

/** The time of a stop, so that it never reads 12:00: 00:00 is told as 11:59 the evening before. */
export function familyStopTime(
  stopAt: Instant,
  zone: string,
  profile: LanguageProfile,
): FamilyTime {
  return familyTime(wallClockForFamily(stopAt, zone), zone, profile);
}

function nightBetween(on: Day, hour: number, profile: LanguageProfile): FamilyTime['nightBetween'] {
  const weekdayWords = (day: Day): string => nth(profile.weekdays, weekdayOf(day) - 1);
  if (hour >= nightFromHour) return [weekdayWords(on), weekdayWords(addDays(on, 1))];
  if (hour < nightUntilHour) return [weekdayWords(addDays(on, -1)), weekdayWords(on)];
  return null;
}

function dayPartAt(hour: number, profile: LanguageProfile): string {
  const part = profile.dayParts.find(
    ({ fromHour, untilHour }) => hour >= fromHour && hour < untilHour,
  );
  if (!part) throw new RangeError(`No part of the day at ${hour}:00 in ${profile.id}`);
  return part.words;
}

function nth(words: readonly string[], index: number): string {
  const word = words[index];
  if (word === undefined) throw new RangeError(`A language profile lacks word ${index + 1}.`);
  return word;
}

function fill(pattern: string, values: Readonly<Record<string, string>>): string {
  return pattern.replace(/\{(\w+)\}/g, (_, name: string) => values[name] ?? '');
}
