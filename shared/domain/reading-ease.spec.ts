import {
  englishSyllables,
  fleschKincaidGrade,
  inflesz,
  plainWords,
  readingCounts,
  readingEase,
  spanishSyllables,
} from './reading-ease';

const easy =
  'Stop all food and milk at ten at night. Bring your child to the clinic at six in the morning. Call us if your child eats.';
const hard =
  'Abstain from all nutritional consumption following midnight preceding the aspiration procedure.';
const spanish =
  'No le dé comida ni leche a su hijo después de las diez de la noche. Llegue a la clínica a las seis de la mañana.';

describe('Flesch-Kincaid grade', () => {
  // Values of the published formula; counts by hand.
  it.each([
    ['R3', { sentences: 1, words: 13, syllables: 26 }, 13.08],
    ['R4', { sentences: 5, words: 100, syllables: 150 }, 9.91],
    ['R5', { sentences: 3, words: 26, syllables: 28 }, 0.4977],
    ['R6', { sentences: 1, words: 11, syllables: 27 }, 17.6636],
  ])('%s', (_name, counts, grade) => {
    expect(fleschKincaidGrade(counts)).toBeCloseTo(grade, 4);
  });

  it('counts the easy and the hard text as by hand', () => {
    expect(readingCounts(easy, englishSyllables)).toEqual({
      sentences: 3,
      words: 26,
      syllables: 28,
    });
    expect(readingCounts(hard, englishSyllables)).toEqual({
      sentences: 1,
      words: 11,
      syllables: 27,
    });
  });
});

describe('INFLESZ', () => {
  it.each([
    ['R10', { sentences: 2, words: 26, syllables: 37 }, 105.1773],
    ['R11', { sentences: 5, words: 100, syllables: 200 }, 62.235],
  ])('%s', (_name, counts, value) => {
    expect(inflesz(counts)).toBeCloseTo(value, 4);
  });

  it('counts the Spanish text as by hand', () => {
    expect(readingCounts(spanish, spanishSyllables)).toEqual({
      sentences: 2,
      words: 26,
      syllables: 37,
    });
  });
});

describe('syllables', () => {
  // As the published counters `syllable` 5.0.1 and `silabea` 1.0.0 and a dictionary give them.
  it.each([
    ['tuberculosis', 5],
    ['every', 2],
    ['clinic', 2],
    ['breastfeeding', 3],
    ['water', 2],
    ['nothing', 2],
    ['finished', 2],
    ['needed', 2],
    ['asked', 1],
    ['little', 2],
    ['bottle', 2],
    ['medicine', 3],
    ['questions', 2],
    ['telephone', 3],
    ['nurse', 1],
    ['times', 1],
    ['you', 1],
    ['your', 1],
    ['it’s', 1],
    ['e-mail', 2],
    ['Tuesday', 2],
    ['Wednesday', 2],
    ['baby', 2],
    ['reason', 2],
    ['going', 2],
    ['doctor', 2],
    ['specimen', 3],
    ['laboratory', 5],
    ['results', 2],
    ['used', 1],
    ['pages', 2],
    ['changes', 2],
    ['breathing', 2],
    ['trouble', 2],
    ['people', 2],
  ])('%s has %i', (word, count) => {
    expect(englishSyllables(word)).toBe(count);
  });

  it.each([
    ['leche', 2],
    ['día', 2],
    ['agua', 2],
    ['mañana', 3],
    ['después', 2],
    ['medianoche', 4],
    ['clínica', 3],
    ['estómago', 4],
    ['bebé', 2],
    ['vacío', 3],
    ['pingüino', 3],
    ['tuberculosis', 5],
    ['aún', 2],
    ['construir', 2],
    ['quiere', 2],
    ['guerra', 2],
    ['muy', 1],
    ['ayuno', 3],
    ['y', 1],
    ['niño', 2],
    ['Avísenos', 4],
    ['teléfono', 4],
  ])('%s has %i', (word, count) => {
    expect(spanishSyllables(word)).toBe(count);
  });
});

describe('a text', () => {
  it('without words is not scored: never 0, never 100', () => {
    for (const text of ['', '   ', '6:30', '206-555-0142', 'https://visits.example.org/m/abc'])
      for (const language of ['en', 'es']) expect(readingEase(language, text)).toBeNull();
    expect(fleschKincaidGrade({ sentences: 0, words: 5, syllables: 5 })).toBeNaN();
    expect(inflesz({ sentences: 1, words: 0, syllables: 0 })).toBeNaN();
  });

  it('is scored in English and Spanish only', () => {
    expect(readingEase('en', easy)).toBe(0.5);
    expect(readingEase('es', spanish)).toBe(105.2);
    for (const language of ['ar', 'am', 'my', 'so', 'vi'])
      expect(readingEase(language, easy)).toBeNull();
  });

  it('is read without its parameters, and in the last form of a choice', () => {
    expect(plainWords('Call {phone}.')).toBe('Call .');
    expect(
      plainWords('Only {count, plural, one {the child waits} other {{n} children wait}}.'),
    ).toBe('Only  children wait.');
    expect(
      plainWords('{a, select, x {one} other {# {b, plural, one {two} other {three}}}} and on'),
    ).toBe(' three and on');
    expect(plainWords('Open { and more')).toBe('Open ');
  });
});
