import { readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { letters, sentenceKeys } from '../../shared/domain/letter-choice';
import { messageSegments } from '../../shared/domain/message-segments';
import { builtLanguages } from '../../shared/languages/languages';
import { MissingParameter, UnknownWording } from '../../server/wording/render';
import { shippedClinicWords } from '../../server/wording/shipped-words';
import {
  englishWording,
  keysOwedIn,
  parametersOf,
  sampleParams,
  shippedLanguages,
  shippedWords,
  wordingIn,
} from '../support/words';
import { toAvoid } from '../support/words-to-avoid';

const english = shippedWords('en');
const wording = englishWording();
const keys = Object.keys(english);

/** Whatever leaves the clinic, or stands where nobody has signed in. */
const outside = keys.filter((key) => /^(message|calendar|link|code|phone)\./.test(key));
const texts = keys.filter((key) => key.startsWith('message.') && !/\.(mail|subject)$/.test(key));
const forFamilies = keys.filter((key) => !/^(call|letter\.(why|says|reason|condition))/.test(key));
/** 47 CFR 64.1200(a)(10) and the message providers want the words there; nowhere else. */
const saysLegalWords = new Set([
  'message.invitation.text',
  'message.help',
  'message.opt-in-confirmed',
]);
/** Written with the letters of the short alphabet of text messages. */
const languagesOfTwoParts = new Set(['en', 'es']);

describe('the English words', () => {
  test('a missing, an empty and an unknown are refused', () => {
    expect(() => wording.text('outcome.come.heading', { door: 'Door B' })).toThrow(
      MissingParameter,
    );
    expect(() => wording.text('outcome.come.heading', { door: 'Door B', time: undefined })).toThrow(
      MissingParameter,
    );
    expect(() => wording.text('outcome.nowhere')).toThrow(UnknownWording);
  });

  test('plurals are whole sentences in both numbers', () => {
    expect(wording.text('step.answer.title', { count: 1 })).toBe(
      'Answer 1 short question on this phone.',
    );
    expect(wording.text('step.answer.title', { count: 2 })).toBe(
      'Answer 2 short questions on this phone.',
    );
  });

  test('names are listed without grammar in the code', () => {
    expect(wording.list(['Yusuf'])).toBe('Yusuf');
    expect(wording.list(['Yusuf', 'Maryam'])).toBe('Yusuf and Maryam');
    expect(wording.list(['Sami', 'Yusuf', 'Maryam'])).toBe('Sami, Yusuf and Maryam');
  });

  test('every language that is built is shipped', () => {
    expect(builtLanguages.filter(({ id }) => !shippedLanguages.includes(id))).toEqual([]);
  });

  test('every key named in the server exists', () => {
    const named = sources('server').flatMap((file) =>
      [
        ...readFileSync(file, 'utf8').matchAll(
          /\b(?:text|says)\(\s*'([a-z][a-z0-9-]*(?:\.[a-z0-9-]+)+)'/g,
        ),
      ].map((match) => match[1] ?? ''),
    );
    expect(named.length).toBeGreaterThan(50);
    const known = { ...english, ...shippedClinicWords('en') };
    expect([...new Set(named)].filter((key) => !(key in known))).toEqual([]);
  });

  test('every letter and sentence that results can ask for has its words', () => {
    const wanted = [
      ...letters.flatMap((letter) => [`letter.title.${letter}`, `letter.says.${letter}`]),
      ...sentenceKeys.map((key) => `letter.why.${key}`),
      ...sentenceKeys
        .filter((key) => key !== 'medicines' && key !== 'next-visit')
        .map((key) => `letter.sentence.${key}`),
    ];
    expect(wanted.filter((key) => !(key in english))).toEqual([]);
  });
});

describe.each(shippedLanguages)('the words in %s', (language) => {
  const words = shippedWords(language);
  const own = wordingIn(language);
  const owed = keysOwedIn(language);
  const rendered = (key: string, counts?: number): string =>
    own.text(key, sampleParams(words[key] ?? '', counts, language));

  test('are all there, each with the parameters of the English', () => {
    expect(Object.keys(words).sort()).toEqual([...owed].sort());
    // Names alone: where English writes a number as it is, another language may need its plural.
    const parameters = (body = ''): string[] => [...parametersOf(body).keys()].sort();
    const differing = owed.filter(
      (key) => parameters(words[key]).join() !== parameters(english[key]).join(),
    );
    expect(differing).toEqual([]);
  });

  test.each(owed)('%s renders', (key) => {
    for (const counts of [0, 1, 2, 3, 11]) {
      const text = rendered(key, counts);
      expect(text.trim()).not.toBe('');
      expect(text).not.toMatch(/[{}]|undefined|null|NaN/);
    }
  });

  test('have a form of their own for every number', () => {
    const { pluralCategories } = new Intl.PluralRules(language).resolvedOptions();
    const plurals = owed.flatMap((key) => pluralFormsOf(words[key] ?? ''));
    for (const forms of plurals) expect(forms).toEqual(expect.arrayContaining(pluralCategories));
  });

  test.each(outside)('%s names no disease, test or result', (key) => {
    expect(rendered(key)).not.toMatch(toAvoid(language, 'medical'));
  });

  test.each(outside)('%s takes neither a name nor a birth date', (key) => {
    const given = [...parametersOf(words[key] ?? '').keys()];
    const ofCalendarPage = /^calendar\.row/.test(key);
    if (!ofCalendarPage)
      expect(given.filter((name) => /name|born|children|who|record/i.test(name))).toEqual([]);
  });

  test.each(texts.filter((key) => !saysLegalWords.has(key)))('%s switches no texts off', (key) => {
    expect(rendered(key)).not.toMatch(toAvoid(language, 'commands'));
  });

  test.each(owed.filter((key) => forFamilies.includes(key)))(
    '%s says nothing relative and no midnight',
    (key) => {
      expect(rendered(key)).not.toMatch(toAvoid(language, 'relative'));
    },
  );

  test.each(texts)('%s costs few parts', (key) => {
    const { encoding, segments } = messageSegments(rendered(key));
    const isLatin = languagesOfTwoParts.has(language);
    // Other scripts take 67 letters a part.
    expect(isLatin ? encoding : 'gsm-7').toBe('gsm-7');
    expect(segments).toBeLessThanOrEqual(isLatin ? 2 : 3);
  });
});

/** The categories of every plural of a text. */
function pluralFormsOf(body: string): string[][] {
  return [...body.matchAll(/, plural, ((?:[=\w]+ \{[^{}]*\} ?)+)/g)].map(([, forms = '']) =>
    [...forms.matchAll(/([=\w]+) \{/g)].map(([, category = '']) => category),
  );
}

function sources(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) return sources(path);
    return path.endsWith('.ts') && !path.endsWith('.spec.ts') ? [path] : [];
  });
}
