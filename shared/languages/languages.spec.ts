import {
  builtLanguages,
  isLanguageId,
  languageIds,
  languageOf,
  languages,
  type LanguageId,
} from './languages';
import { hasProfile, profileOf } from './profiles';

describe('the languages', () => {
  it('are twelve, each once, English built', () => {
    expect(languages.map(({ id }) => id)).toEqual([...languageIds]);
    expect(new Set(languages.map(({ nativeName }) => nativeName)).size).toBe(12);
    expect(builtLanguages.map(({ id }) => id)).toContain('en');
  });

  // Communication facts 8.4, L6.
  it('run right to left in Arabic and Dari alone', () => {
    expect(languages.filter(({ dir }) => dir === 'rtl').map(({ id }) => id)).toEqual([
      'ar',
      'fa-AF',
    ]);
  });

  // Communication facts 2.4: digits and calendars differ by default; 8.4, L5.
  it.each(languages.map((language) => [language.id, language] as const))(
    '%s formats with Latin digits in the Gregorian calendar',
    (_, { intlTag, tag }) => {
      expect(Intl.getCanonicalLocales(tag)).toEqual([tag]);
      expect(Intl.DateTimeFormat.supportedLocalesOf(intlTag)).toHaveLength(1);
      const { calendar, numberingSystem } = new Intl.DateTimeFormat(intlTag).resolvedOptions();
      expect({ calendar, numberingSystem }).toEqual({
        calendar: 'gregory',
        numberingSystem: 'latn',
      });
      const year = new Intl.DateTimeFormat(intlTag, { year: 'numeric', timeZone: 'UTC' });
      expect(year.format(Date.UTC(2026, 11, 9))).toContain('2026');
    },
  );

  it('are found by their id only', () => {
    expect(languageOf('fa-AF').nativeName).toBe('دری');
    expect(isLanguageId('en')).toBe(true);
    expect(isLanguageId('en-US')).toBe(false);
    expect(isLanguageId('toString')).toBe(false);
    expect(() => languageOf('xx' as LanguageId)).toThrow('Not a language');
  });
});

describe('the profile of a built language', () => {
  it.each(builtLanguages.map(({ id }) => [id]))('%s is whole', (id) => {
    const profile = profileOf(id);
    expect(profile.id).toBe(id);
    expect(profile.weekdays).toHaveLength(7);
    expect(profile.months).toHaveLength(12);
    for (let hour = 0; hour < 24; hour += 1) {
      const parts = profile.dayParts.filter(
        ({ fromHour, untilHour }) => hour >= fromHour && hour < untilHour,
      );
      expect([hour, parts.length]).toEqual([hour, 1]);
    }
    const { date, dayText, time, text } = profile.patterns;
    expect(date).toMatch(/\{day\}.*\{month\}|\{month\}.*\{day\}/);
    expect(dayText).toMatch(/\{weekday\}.*\{date\}|\{date\}.*\{weekday\}/);
    expect(time).toMatch(/\{clock\}.*\{dayPart\}|\{dayPart\}.*\{clock\}/);
    expect(text).toMatch(/\{dayText\}.*\{time\}|\{time\}.*\{dayText\}/);
  });

  it('is never replaced by another language’s', () => {
    for (const { id } of languages.filter(({ id }) => !hasProfile(id))) {
      expect(() => profileOf(id)).toThrow('No language profile');
    }
  });
});
