import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from '@playwright/test';

const folder = join(__dirname, '..', '..', '..', 'locales');
/** What is filled in at run time: a value, or a tag of the page. */
const filled = '{}';

const plain = (text: string): string =>
  text
    .replace(/<ph\b[^>]*\/>/g, filled)
    .replace(/<\/?pc\b[^>]*>/g, '')
    .replace(/&lt;/g, '<')
    .replace(/&gt;/g, '>')
    .replace(/&quot;/g, '"')
    .replace(/&amp;/g, '&')
    .replace(/\s+/g, ' ')
    .trim();

type Application = 'family' | 'clinic';

/** English frame words with those of the language, as they are built into an application. */
function frameWords(application: Application, language: string): [string, string][] {
  const file = readFileSync(join(folder, 'ui', `${application}.${language}.xlf`), 'utf8');
  const units = file.matchAll(/<source>([^]*?)<\/source>\s*<target>([^]*?)<\/target>/g);
  return [...units].map(([, source = '', target = '']) => [plain(source), plain(target)]);
}

/** What the server says on the clinic's screens. */
function clinicWords(language: string): [string, string][] {
  const wordsOf = (id: string, file: string): Record<string, string> =>
    JSON.parse(readFileSync(join(folder, 'messages', id, file), 'utf8')) as Record<string, string>;
  const shown = (text: string): string => text.replace(/\{[^{}]*\}/g, filled);
  return readdirSync(join(folder, 'messages', 'en'))
    .filter((file) => /^clinic-|-clinic\.json$/.test(file))
    .flatMap((file) => {
      const translated = wordsOf(language, file);
      return Object.entries(wordsOf('en', file)).map(([key, english]): [string, string] => [
        shown(english),
        shown(translated[key] ?? ''),
      ]);
    });
}

/** By application and language. */
const read = new Map<string, ReadonlyMap<string, string>>();

function told(page: Page, english: string): string {
  const [, clinic, language] = /^\/(clinic\/)?([^/]+)\//.exec(new URL(page.url()).pathname) ?? [];
  if (language === undefined) throw new Error(`${page.url()} has no language.`);
  if (language === 'en') return english;
  const application = clinic ? 'clinic' : 'family';
  const key = `${application}.${language}`;
  const words =
    read.get(key) ??
    new Map([...(clinic ? clinicWords(language) : []), ...frameWords(application, language)]);
  read.set(key, words);
  const says = words.get(english);
  if (says === undefined) throw new Error(`The ${key} words lack "${english}".`);
  return says;
}

/**
 * A button, a label or a heading in the language of the page, by its English words; `{}` stands for each value that is
 * filled in. A test that uses it proves the translation on the way.
 */
export function say(page: Page, english: string, ...values: readonly (string | number)[]): string {
  const left = [...values];
  return told(page, english).replaceAll(filled, () => String(left.shift() ?? ''));
}

/** The same, whatever is filled in, for words that begin a text. */
export function sayLike(page: Page, english: string): RegExp {
  const literal = told(page, english).replace(/[.*+?^$()|[\]\\]/g, '\\$&');
  return new RegExp(`^\\s*${literal.replaceAll(filled, '.*')}`);
}
