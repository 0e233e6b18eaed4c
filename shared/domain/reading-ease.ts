/** Words, sentences and syllables of a text. */
export interface ReadingCounts {
  readonly sentences: number;
  readonly words: number;
  readonly syllables: number;
}

/**
 * Flesch-Kincaid grade: 0.39 words a sentence + 11.8 syllables a word - 15.59 (Kincaid and others 1975).
 * @returns NaN when there is nothing to score
 */
export function fleschKincaidGrade({ sentences, words, syllables }: ReadingCounts): number {
  if (sentences === 0 || words === 0) return NaN;
  return 0.39 * (words / sentences) + 11.8 * (syllables / words) - 15.59;
}

/**
 * Szigriszt-Pazos perspicuity, read on the INFLESZ scale: 206.835 - 62.3 syllables a word - words a sentence
 * (Szigriszt-Pazos 1993; Barrio-Cantalejo and others 2008: 65 to 80 quite easy, over 80 very easy).
 * @returns NaN when there is nothing to score
 */
export function inflesz({ sentences, words, syllables }: ReadingCounts): number {
  if (sentences === 0 || words === 0) return NaN;
  return 206.835 - 62.3 * (syllables / words) - words / sentences;
}

const wordPattern = /[\p{L}\p{M}]+(?:['’-][\p{L}\p{M}]+)*/gu;

/**
 * Sentences end at a full stop, question or exclamation mark, colon, semicolon or the end of a line, as Flesch counted
 * units of thought. Numbers and what has no
 * letters (telephone numbers, times) are no words: the formulas were made for prose.
 */
export function readingCounts(text: string, syllablesOf: (word: string) => number): ReadingCounts {
  const read = text.replace(/https?:\S+/g, '').replace(/\b([ap])\.m\./gi, '$1m');
  const sentences = read
    .split(/[.!?¿¡:;\n]+/u)
    .map((sentence) => sentence.match(wordPattern) ?? [])
    .filter((words) => words.length > 0);
  const words = sentences.flat();
  return {
    sentences: sentences.length,
    words: words.length,
    syllables: words.reduce((sum, word) => sum + syllablesOf(word), 0),
  };
}

/** Endings in which the written e is silent (times, asked, nurse; not pages, needed, bottle), and a y before a vowel. */
const silent = [
  /(?<![aeiouyszxcg]|[cs]h|[^aeiouy]l)es$/,
  /(?<![aeiouytd]|[^aeiouy]l)ed$/,
  /(?<![aeiouy]|[^aeiouy]l)e$/,
  /^y(?=[aeiou])/,
];
/** Groups of vowels that are said as two. */
const saidAsTwo = [
  /i[ao](?!n)/g,
  /(?:^|[^q])u[aeio](?=[lt])/g,
  /eo/g,
  /[aeiouy]ing/g,
  /[^l]lien/g,
  /ism$/g,
];

/** Words on which the rule is wrong, from the texts and from the published check words. */
const exceptions: Readonly<Record<string, number>> = {
  area: 3,
  wednesday: 2,
  every: 2,
  evening: 2,
  everything: 3,
  everybody: 4,
  people: 2,
  someone: 2,
  something: 2,
  sometimes: 2,
  somebody: 3,
  safety: 2,
  diapers: 3,
  diaper: 3,
  science: 2,
  quiet: 2,
  being: 2,
  medicines: 3,
  breastfeed: 2,
  breastfeeding: 3,
  afterwards: 3,
  anyone: 3,
  idea: 3,
};

/** Syllables of an English word by groups of vowels; at least 1. */
export function englishSyllables(word: string): number {
  const parts = word.toLowerCase().split(/[-’']/);
  return Math.max(
    1,
    parts.reduce((sum, part) => sum + syllablesOfPart(part), 0),
  );
}

function syllablesOfPart(part: string): number {
  const known = exceptions[part];
  if (known !== undefined) return known;
  // What stands after an apostrophe ('s, 'll, 't) is said with the word before it.
  if (!/[aeiouy]/.test(part)) return 0;
  const spoken = silent.reduce((left, ending) => left.replace(ending, ''), part);
  const groups = spoken.match(/[aeiouy]+/g)?.length ?? 0;
  const more = saidAsTwo.reduce((sum, pair) => sum + (spoken.match(pair)?.length ?? 0), 0);
  return Math.max(1, groups + more);
}

const strong = 'aeoáéóíú';

/**
 * Syllables of a Spanish word: two strong vowels, and a stressed i or u beside one, are apart; every other group of
 * vowels is one. The u of que, qui, gue and gui is silent. At least 1.
 */
export function spanishSyllables(word: string): number {
  const said = word
    .toLowerCase()
    .normalize('NFC')
    .replace(/qu(?=[eiéí])/g, 'q')
    .replace(/gu(?=[eiéí])/g, 'g')
    .replace(/y(?=[aeiouáéíóú])/g, 'j')
    .replace(/y/g, 'i')
    .replace(/(?<=[aeiouáéíóúü])h(?=[aeiouáéíóúü])/g, '');
  let count = 0;
  for (const [group] of said.matchAll(/[aeiouáéíóúü]+/g)) {
    count += 1;
    for (let at = 1; at < group.length; at += 1)
      if (strong.includes(group[at] ?? '') && strong.includes(group[at - 1] ?? '')) count += 1;
  }
  return Math.max(1, count);
}

/**
 * How easily a text reads, to one decimal: the grade of an English text (lower is easier), the INFLESZ of a Spanish one
 * (higher is easier). Null for a language without a published formula that fits texts like these, Arabic among them,
 * and for a text without words.
 */
export function readingEase(language: string, text: string): number | null {
  const value =
    language === 'en'
      ? fleschKincaidGrade(readingCounts(text, englishSyllables))
      : language === 'es'
        ? inflesz(readingCounts(text, spanishSyllables))
        : NaN;
  return Number.isNaN(value) ? null : Math.round(value * 10) / 10;
}

/** Where the brace that opens at `from` closes; the end of the text when it does not. */
function closing(body: string, from: number): number {
  let deep = 0;
  for (let at = from; at < body.length; at += 1) {
    if (body[at] === '{') deep += 1;
    if (body[at] === '}') deep -= 1;
    if (deep === 0) return at;
  }
  return body.length;
}

/** A text as it is kept, read without its parameters; of a choice by number or kind the last form is read. */
export function plainWords(body: string): string {
  const open = body.indexOf('{');
  if (open === -1) return body.replaceAll('#', '');
  const close = closing(body, open);
  const inside = body.slice(open + 1, close);
  const lastForm = inside.lastIndexOf('{') === -1 ? '' : plainWords(lastFormOf(inside));
  return `${body.slice(0, open).replaceAll('#', '')}${lastForm}${plainWords(body.slice(close + 1))}`;
}

function lastFormOf(inside: string): string {
  let form = '';
  for (let at = inside.indexOf('{'); at !== -1;) {
    const close = closing(inside, at);
    form = inside.slice(at + 1, close);
    at = inside.indexOf('{', close);
  }
  return form;
}
