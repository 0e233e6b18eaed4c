import Holidays from 'date-holidays';
import { addDays, weekdayOf, type Day } from '../../shared/domain/day';

export interface PublicHoliday {
  readonly on: Day;
  readonly name: string;
}

const cache = new Map<string, readonly PublicHoliday[]>();

/**
 * The days of a year on which a country, or a region of it, has a public holiday by law, in order; substitute days for
 * a Saturday or a Sunday are days of their own. Names come in the language where they are known in it.
 * @param region ISO 3166-2 without the country ("WA"); one that the list does not know counts as none.
 */
export function publicHolidays(
  country: string,
  region: string | null,
  year: number,
  language = 'en',
): readonly PublicHoliday[] {
  const key = `${country}:${region ?? ''}:${year}:${language}`;
  const known = cache.get(key);
  if (known) return known;
  const holidays = computed(country, region, year, language);
  // A century of every language and site stays small; a caller's odd years must not fill the memory.
  if (cache.size > 400) cache.clear();
  cache.set(key, holidays);
  return holidays;
}

/** Regions of a country by code, for the choice in Set-up; empty where the list has none. */
export function regionsOf(country: string, language = 'en'): Readonly<Record<string, string>> {
  return new Holidays().getStates(country, language) ?? {};
}

/** Countries whose holidays are known, by code. */
export function countriesOf(language = 'en'): Readonly<Record<string, string>> {
  return new Holidays().getCountries(language);
}

const dayMs = 86_400_000;

function computed(
  country: string,
  region: string | null,
  year: number,
  language: string,
): readonly PublicHoliday[] {
  const place = region !== null && region in regionsOf(country) ? [country, region] : [country];
  const almanac = new Holidays(place[0] ?? country, place[1] ?? '', {
    types: ['public'],
    languages: [language, 'en'],
  });
  const names = new Map<Day, string>();
  for (const { date, start, end, name } of almanac.getHolidays(year) ?? []) {
    const written = date.slice(0, 10);
    // A holiday that begins at sunset is the day that follows; some last for several days.
    const first = Number(date.slice(11, 13)) >= 12 ? addDays(written, 1) : written;
    const days = Math.max(1, Math.round((end.getTime() - start.getTime()) / dayMs));
    for (let index = 0; index < days; index += 1) {
      const on = addDays(first, index);
      if (!names.has(on)) names.set(on, name);
    }
  }
  if (country === 'US') keepVeteransDay(names, year);
  return [...names]
    .map(([on, name]) => ({ on, name }))
    .sort((left, right) => (left.on < right.on ? -1 : 1));
}

/**
 * The list has Veterans Day on 11 November alone; 5 U.S.C. 6103(b) keeps it on Friday when it is a Saturday, Executive
 * Order 11582 on Monday when it is a Sunday, as every other legal holiday.
 */
function keepVeteransDay(names: Map<Day, string>, year: number): void {
  const on = `${year}-11-11`;
  const name = names.get(on);
  const weekday = weekdayOf(on);
  if (name === undefined || weekday < 6) return;
  const kept = addDays(on, weekday === 6 ? -1 : 1);
  if (!names.has(kept)) names.set(kept, name);
}
