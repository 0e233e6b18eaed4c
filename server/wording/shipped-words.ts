import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

/** The words that come with the product, key to text: unsigned drafts until a clinic signs them. */
export type ShippedWords = Readonly<Record<string, string>>;

/** The folder lies at the top of the installation, above this file whether it is compiled or not. */
function messagesFolder(from = __dirname): string {
  const folder = join(from, 'locales', 'messages');
  if (existsSync(folder)) return folder;
  const above = dirname(from);
  if (above === from) throw new Error('The folder locales/messages is missing');
  return messagesFolder(above);
}

/** @throws when the language has no words, or when two files hold the same key. */
export function shippedWords(language: string): ShippedWords {
  const folder = join(messagesFolder(), language);
  if (!/^[A-Za-z-]+$/.test(language) || !existsSync(folder))
    throw new RangeError(`No words are shipped in this language: ${language}`);
  const words: Record<string, string> = {};
  for (const file of readdirSync(folder).sort()) {
    const part = JSON.parse(readFileSync(join(folder, file), 'utf8')) as Record<string, string>;
    for (const [key, text] of Object.entries(part)) {
      if (key in words) throw new Error(`The key ${key} stands in two files`);
      words[key] = text;
    }
  }
  return words;
}

/** What a version remembers of the English text it was written from; another hash makes it stale. */
export const sourceHash = (english: string): string =>
  createHash('sha256').update(english, 'utf8').digest('hex');
