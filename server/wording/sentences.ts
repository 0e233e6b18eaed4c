import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import { shippedSentences } from './shipped-words';

interface Pattern {
  readonly matches: RegExp;
  readonly names: readonly string[];
  readonly translation: string;
}

interface Sentences {
  readonly exact: ReadonlyMap<string, string>;
  readonly patterns: readonly Pattern[];
}

const placeholder = /\{(\w+)\}/g;
const read = new Map<ClinicLanguage, Sentences>();

function sentencesOf(language: ClinicLanguage): Sentences {
  const known = read.get(language);
  if (known) return known;
  const all = Object.entries(shippedSentences(language));
  const sentences = {
    exact: new Map(all.filter(([english]) => !english.includes('{'))),
    patterns: all.filter(([english]) => english.includes('{')).map(patternOf),
  };
  read.set(language, sentences);
  return sentences;
}

/** '{name} is calling.' finds 'Ana Torres is calling.' */
function patternOf([english, translation]: [string, string]): Pattern {
  const names = [...english.matchAll(placeholder)].map(([, name]) => name ?? '');
  const fixed = english.split(/\{\w+\}/).map((part) => part.replace(/[.*+?^${}()|[\]\\]/g, '\\$&'));
  return { matches: new RegExp(`^${fixed.join('(.+?)')}$`, 's'), names, translation };
}

/**
 * A sentence that code writes in English, such as the title of a problem, in a language of the clinic. One without a
 * translation stays as it is: a person who reads it in English is better off than one who reads nothing.
 */
export function sentenceIn(language: ClinicLanguage, english: string): string {
  if (language === 'en') return english;
  const { exact, patterns } = sentencesOf(language);
  const found = exact.get(english);
  if (found !== undefined) return found;
  for (const { matches, names, translation } of patterns) {
    const values = matches.exec(english)?.slice(1);
    if (values)
      return translation.replace(placeholder, (whole, name: string) => {
        const value = values[names.indexOf(name)];
        return value === undefined ? whole : (exact.get(value) ?? value);
      });
  }
  return english;
}
