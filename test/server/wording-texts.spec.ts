import { readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { letters, sentenceKeys } from '../../shared/domain/letter-choice';
import { messageSegments } from '../../shared/domain/message-segments';
import { builtLanguages } from '../../shared/languages/languages';
import { MissingParameter, UnknownWording } from '../../server/wording/render';
import { englishWording, parametersOf, sampleParams, shippedWords } from '../support/words';

const english = shippedWords('en');
const wording = englishWording();
const keys = Object.keys(english);
const rendered = (key: string): string => wording.text(key, sampleParams(english[key] ?? ''));

/** Whatever leaves the clinic, or stands where nobody has signed in. */
const outside = keys.filter((key) => /^(message|calendar|link|code|phone)\./.test(key));
const texts = keys.filter((key) => key.startsWith('message.') && !/\.(mail|subject)$/.test(key));
/** 47 CFR 64.1200(a)(10) and the message providers want the words there; nowhere else. */
const saysLegalWords = new Set([
  'message.invitation.text',
  'message.help',
  'message.opt-in-confirmed',
]);

describe('the English words', () => {
  test.each(keys)('%s renders', (key) => {
    const text = rendered(key);
    expect(text.trim()).not.toBe('');
    expect(text).not.toMatch(/[{}]|undefined|null|NaN/);
  });

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

  test('every language that is built has every key, with the same parameters', () => {
    for (const { id } of builtLanguages) {
      const words = shippedWords(id);
      expect(Object.keys(words).sort()).toEqual([...keys].sort());
      for (const key of keys)
        expect([key, ...parametersOf(words[key] ?? '').keys()].sort()).toEqual(
          [key, ...parametersOf(english[key] ?? '').keys()].sort(),
        );
    }
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
    expect([...new Set(named)].filter((key) => !(key in english))).toEqual([]);
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

describe('what leaves the clinic', () => {
  test.each(outside)('%s names no disease, test or result', (key) => {
    expect(rendered(key)).not.toMatch(
      /\b(tb|tuberculosis|culture|aspirates?|tubes?|specimens?|sputum|tests?|results?|germs?|laboratory|stomach|positive|negative|medicines?|isoniazid|rifampicin)\b/i,
    );
  });

  test.each(outside)('%s takes neither a name nor a birth date', (key) => {
    const given = [...parametersOf(english[key] ?? '').keys()];
    const ofCalendarPage = /^calendar\.row/.test(key);
    if (!ofCalendarPage)
      expect(given.filter((name) => /name|born|children|who|record/i.test(name))).toEqual([]);
  });

  test.each(texts.filter((key) => !saysLegalWords.has(key)))('%s switches no texts off', (key) => {
    expect(rendered(key)).not.toMatch(
      /\b(stop|quit|end|cancel|revoke|unsubscribe|opt[ -]?out|yes)\b/i,
    );
  });

  test.each(texts)('%s costs at most two parts', (key) => {
    const { encoding, segments } = messageSegments(rendered(key));
    expect({ encoding, isShort: segments <= 2 }).toEqual({ encoding: 'gsm-7', isShort: true });
  });
});

describe('what can be read later', () => {
  const forFamilies = keys.filter(
    (key) => !/^(call|letter\.(why|says|reason|condition))/.test(key),
  );
  test.each(forFamilies)('%s says nothing relative and no midnight', (key) => {
    expect(rendered(key)).not.toMatch(
      /\b(today|tonight|tomorrow|yesterday|midnight|noon|12:00)\b/i,
    );
  });
});

function sources(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) return sources(path);
    return path.endsWith('.ts') && !path.endsWith('.spec.ts') ? [path] : [];
  });
}
