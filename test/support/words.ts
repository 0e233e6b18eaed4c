import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { IntlMessageFormat } from 'intl-messageformat';
import { isClinicLanguage } from '../../shared/languages/clinic-languages';
import { familyTime } from '../../shared/languages/family-time';
import { isLanguageId, type LanguageId } from '../../shared/languages/languages';
import { profileOf } from '../../shared/languages/profiles';
import { shippedWords } from '../../server/wording/shipped-words';
import { wordingFrom, type Wording } from '../../server/wording/render';

type Elements = ReturnType<IntlMessageFormat['getAst']>;
/** Kinds of element in a parsed text, as the parser numbers them. */
const kinds = { argument: 1, number: 2, select: 5, plural: 6 } as const;

/** Parameters of a text, with the kind of value each takes. */
export function parametersOf(body: string): Map<string, 'words' | 'number'> {
  const found = new Map<string, 'words' | 'number'>();
  const walk = (elements: Elements): void => {
    for (const element of elements) {
      const kind: number = element.type;
      if (kind === kinds.argument && 'value' in element) found.set(element.value, 'words');
      if ((kind === kinds.plural || kind === kinds.number) && 'value' in element)
        found.set(element.value, 'number');
      if ((kind === kinds.plural || kind === kinds.select) && 'options' in element)
        for (const option of Object.values(element.options)) walk(option.value);
    }
  };
  walk(new IntlMessageFormat(body, 'en', undefined, { ignoreTag: true }).getAst());
  return found;
}

/** Languages whose words are shipped, built or not. */
export const shippedLanguages: readonly LanguageId[] = readdirSync(
  join(__dirname, '../../locales/messages'),
).filter(isLanguageId);

/** Only staff reads these files: a language in which only families read need not have them. */
const clinicFiles = ['alerts.json', 'calls.json', 'letters-clinic.json', 'staff.json'];

/** The keys that a language must have. */
export function keysOwedIn(language: LanguageId): string[] {
  const all = Object.keys(shippedWords('en'));
  if (isClinicLanguage(language)) return all;
  const forStaff = new Set(
    clinicFiles.flatMap((file) => {
      const path = join(__dirname, '../../locales/messages/en', file);
      return Object.keys(JSON.parse(readFileSync(path, 'utf8')) as object);
    }),
  );
  return all.filter((key) => !forStaff.has(key));
}

/** Sample values in the shapes that the server hands in: no value is a name where texts take a family label. */
const samples: Readonly<Record<string, string>> = {
  address: '18 Harbor Street',
  clinic: 'Harbor Street',
  code: '123456',
  door: 'Door B',
  emergency: '911',
  label: 'Baby',
  phone: '206-555-0142',
  url: 'https://visits.example.org/m/AbCdEfGhIjKlMnOpQrStUv',
};

const timesKnown = new Map<LanguageId, Record<string, string>>();

/** Wednesday, 9 December 2026, 7:00 in the morning, as the language tells it. */
function sampleTimes(language: LanguageId): Record<string, string> {
  const known = timesKnown.get(language) ?? tellSampleTimes(language);
  timesKnown.set(language, known);
  return known;
}

function tellSampleTimes(language: LanguageId): Record<string, string> {
  const told = (at: string) => familyTime(Date.parse(at), 'UTC', profileOf(language));
  const arrival = told('2026-12-09T07:00:00Z');
  const day = `${arrival.weekday}, ${arrival.date}`;
  return {
    date: arrival.date,
    dayText: day,
    day,
    from: told('2026-12-08T07:00:00Z').weekday,
    time: arrival.time,
    askTime: told('2026-12-09T05:00:00Z').time,
    fromTime: told('2026-12-09T03:20:00Z').time,
    weCallBy: told('2026-12-09T05:30:00Z').time,
    to: arrival.weekday,
    weekday: arrival.weekday,
  };
}

export function sampleParams(
  body: string,
  counts = 2,
  language: LanguageId = 'en',
): Record<string, string | number> {
  const known = { ...samples, ...sampleTimes(language) };
  return Object.fromEntries(
    [...parametersOf(body)].map(([name, kind]) => [
      name,
      kind === 'number' ? counts : (known[name] ?? `<${name}>`),
    ]),
  );
}

/** The shipped words of a language without a database. */
export function wordingIn(language: LanguageId, { isSignedOff = true } = {}): Wording {
  const words = Object.entries(shippedWords(language));
  return wordingFrom(
    language,
    new Map(words.map(([key, body]) => [key, { key, body, version: 1, isSignedOff }])),
  );
}

export const englishWording = (options?: { isSignedOff?: boolean }): Wording =>
  wordingIn('en', options);

export { shippedWords };
