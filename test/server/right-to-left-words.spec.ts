import { messageSegments } from '../../shared/domain/message-segments';
import { languageOf } from '../../shared/languages/languages';
import {
  keysOwedIn,
  parametersOf,
  sampleParams,
  shippedLanguages,
  shippedWords,
  wordingIn,
} from '../support/words';

/** Unicode's isolates, by which a run keeps its own direction: left to right, by its first letter, and the end. */
const [leftToRight, byFirstLetter, end] = ['\u2066', '\u2068', '\u2069'];
const languages = shippedLanguages.filter((language) => languageOf(language).dir === 'rtl');
const links = 'https://visits.example.org/m/AbCdEfGhIjKlMnOpQrStUv';

describe.each(languages)('a text from right to left, in %s', (language) => {
  const words = shippedWords(language);
  const wording = wordingIn(language);
  const sample = (key: string) => sampleParams(words[key] ?? '', 2, language);
  const holding = (...names: string[]): string[] =>
    keysOwedIn(language).filter((key) =>
      [...parametersOf(words[key] ?? '').keys()].some((name) => names.includes(name)),
    );

  test.each(keysOwedIn(language))('%s closes every isolate that it opens', (key) => {
    let open = 0;
    for (const sign of wording.text(key, sample(key))) {
      if (sign === leftToRight || sign === byFirstLetter) open += 1;
      if (sign === end) open -= 1;
      expect(open).toBeGreaterThanOrEqual(0);
    }
    expect(open).toBe(0);
  });

  // A hyphen between digits beside Arabic letters turns "206-555-0142" into "0142-555-206" (Unicode
  // Standard Annex 9, W2 and W4).
  test.each(holding('phone'))('%s keeps the digits of the telephone number in order', (key) => {
    expect(wording.text(key, { ...sample(key), phone: '206-555-0142' })).toContain(
      `${leftToRight}206-555-0142${end}`,
    );
  });

  test.each(holding('clinic', 'door', 'label', 'name', 'children', 'signer', 'directions'))(
    '%s keeps names in another script to themselves',
    (key) => {
      const names = ['clinic', 'door', 'label', 'name', 'children', 'signer', 'directions'];
      const text = words[key] ?? '';
      for (const name of names.filter((one) => parametersOf(text).has(one)))
        expect(text.replaceAll(`${byFirstLetter}{${name}}${end}`, '')).not.toContain(`{${name}}`);
    },
  );

  // Some telephones turn a whole line by its first letter, isolated or not.
  test.each(
    keysOwedIn(language).filter(
      (key) => /^message\./.test(key) && /^.?[\u2068{]/.test(words[key] ?? ''),
    ),
  )('%s begins from the right, also with a name in front', (key) => {
    expect(words[key]).toMatch(/^\u200f/);
  });

  // Telephones take letters beyond ASCII into a link, an invisible mark too, and the page would not open.
  test.each(holding('url'))('%s lets nothing but space touch the link', (key) => {
    const text = wording.text(key, { ...sample(key), url: links });
    expect(text).toMatch(new RegExp(`(?:^|\\s)${links}(?:\\s|$)`));
  });

  test('the evening and the morning text for two children stay in hand', () => {
    const lines = (key: string): string =>
      ['Baby', 'Big boy'].map((label) => wording.text(key, { ...sample(key), label })).join('\n');
    const ask = wording.text('message.evening.ask-text', sample('message.evening.ask-text'));
    const evening = wording.text('message.evening.text', {
      ...sample('message.evening.text'),
      lines: lines('message.evening.line'),
      ask,
    });
    const morning = wording.text('message.morning.text', {
      ...sample('message.morning.text'),
      lines: lines('message.morning.line'),
    });
    expect(messageSegments(evening).segments).toBeLessThanOrEqual(4);
    expect(messageSegments(morning).segments).toBeLessThanOrEqual(3);
  });
});
