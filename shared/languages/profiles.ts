/**
 * How each language tells days and times to a family. Data only: adding a language is adding a
 * profile, never code. Months and weekdays are written out, because what Intl knows differs from
 * phone to phone and has no Haitian Creole at all.
 */
import { arabic } from './profiles/arabic';
import { english } from './profiles/english';
import { spanish } from './profiles/spanish';
import type { LanguageId } from './languages';

export interface DayPart {
  /** Hours of the local clock: from inclusive, until exclusive. */
  readonly fromHour: number;
  readonly untilHour: number;
  readonly words: string;
}

export interface LanguageProfile {
  readonly id: LanguageId;
  /** h12 counts 1 to 12 with the part of the day; h23 counts 0 to 23. */
  readonly hourCycle: 'h12' | 'h23';
  /** Monday first. */
  readonly weekdays: readonly string[];
  readonly months: readonly string[];
  readonly dayParts: readonly DayPart[];
  readonly patterns: {
    /** {day} {month}, such as "9 December". */
    readonly date: string;
    /** {weekday} {date}. */
    readonly dayText: string;
    /** {clock} {dayPart}. */
    readonly time: string;
    /** The same where one o'clock takes other words: Spanish "la 1:00" beside "las 7:00". */
    readonly timeAtOne?: string;
    /** {dayText} {time}. */
    readonly text: string;
  };
}

const profiles: Readonly<Partial<Record<LanguageId, LanguageProfile>>> = {
  en: english,
  es: spanish,
  ar: arabic,
};

export function hasProfile(id: LanguageId): boolean {
  return profiles[id] !== undefined;
}

/** Throws where a language has no profile: a family is never told a time in another language. */
export function profileOf(id: LanguageId): LanguageProfile {
  const profile = profiles[id];
  if (!profile) throw new RangeError(`No language profile: ${id}`);
  return profile;
}
