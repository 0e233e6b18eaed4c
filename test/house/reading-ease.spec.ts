import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { IntlMessageFormat } from 'intl-messageformat';
import {
  englishSyllables,
  readingCounts,
  readingEase,
  spanishSyllables,
} from '../../shared/domain/reading-ease';
import { parametersOf, sampleParams } from '../support/words';

const folder = (language: string): string => join(__dirname, '../../locales/messages', language);
/** Read aloud or handled by staff, not read by families. */
const forStaff = ['alerts.json', 'calls.json', 'letters-clinic.json', 'staff.json'];
const files = readdirSync(folder('en')).filter(
  (file) => !file.startsWith('clinic-') && !forStaff.includes(file),
);

/** Instructions and texts, letters: the grade may be at most, the INFLESZ must be at least. */
const bounds = {
  en: { texts: 4, letters: 6, isEasyEnough: (value: number, bound: number) => value <= bound },
  es: { texts: 65, letters: 65, isEasyEnough: (value: number, bound: number) => value >= bound },
};
type Scored = keyof typeof bounds;
const languages: readonly Scored[] = ['en', 'es'];
const boundOf = (language: Scored, file: string): number =>
  bounds[language][file === 'letters.json' ? 'letters' : 'texts'];

/** The formulas were made for running words: a caption of three words has no grade of its own. */
const leastWords = 10;
/** Lines of data, not sentences: number, weekday, date and time of a visit. The passage around them is scored. */
const isDataLine = (key: string): boolean => /^(morning|calendar|letter\.morning)\b/.test(key);

/** As a family reads it; a value of unknown shape counts no words. */
function readTexts(language: Scored, file: string): { key: string; text: string }[] {
  const bodies = JSON.parse(readFileSync(join(folder(language), file), 'utf8')) as Record<
    string,
    string
  >;
  return Object.entries(bodies).map(([key, body]) => {
    const params = sampleParams(body, 2, language);
    for (const [name] of parametersOf(body))
      if (`${params[name]}`.startsWith('<')) params[name] = '';
    const format = new IntlMessageFormat(body, language, undefined, { ignoreTag: true });
    return { key, text: String(format.format(params)) };
  });
}

describe.each(languages)('what families read in %s', (language) => {
  const { isEasyEnough } = bounds[language];
  const syllablesOf = language === 'en' ? englishSyllables : spanishSyllables;

  it.each(files)('%s as a whole is easy enough', (file) => {
    const value = readingEase(
      language,
      readTexts(language, file)
        .map(({ text }) => text)
        .join('\n'),
    );
    expect(value).not.toBeNull();
    expect({ value, isEasyEnough: isEasyEnough(value ?? NaN, boundOf(language, file)) }).toEqual({
      value,
      isEasyEnough: true,
    });
  });

  it.each(files.filter((file) => file !== 'letters.json'))(
    'every longer text of %s is easy enough by itself',
    (file) => {
      const tooHard = readTexts(language, file).flatMap(({ key, text }) => {
        if (isDataLine(key) || readingCounts(text, syllablesOf).words < leastWords) return [];
        const value = readingEase(language, text) ?? NaN;
        return isEasyEnough(value, boundOf(language, file)) ? [] : [`${value} ${key}: ${text}`];
      });
      expect(tooHard).toEqual([]);
    },
  );
});

it('tells an easy text from a hard one', () => {
  const hard =
    'Abstain from all nutritional consumption following midnight preceding the aspiration procedure.';
  expect(readingEase('en', hard)).toBe(17.7);
});
