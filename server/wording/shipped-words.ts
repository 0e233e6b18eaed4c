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

/** Sentences of the clinic's screens: they belong to the product like its buttons, and nobody signs them. */
const isClinics = (file: string): boolean => file.startsWith('clinic-');
/** English sentences as they stand in code, with their translation. */
const sentencesFile = 'clinic-sentences.json';

/** The wording of a language. @throws when it has no words, or when two files hold the same key. */
export const shippedWords = (language: string): ShippedWords =>
  read(language, (file) => !isClinics(file));

/** What the clinic's screens say in a language, by key. @throws like shippedWords. */
export const shippedClinicWords = (language: string): ShippedWords =>
  read(language, (file) => isClinics(file) && file !== sentencesFile);

/** Translations of the sentences that code writes in English, by that sentence; English has none. */
export const shippedSentences = (language: string): ShippedWords =>
  read(language, (file) => file === sentencesFile);

function read(language: string, isWanted: (file: string) => boolean): ShippedWords {
  const folder = join(messagesFolder(), language);
  if (!/^[A-Za-z-]+$/.test(language) || !existsSync(folder))
    throw new RangeError(`No words are shipped in this language: ${language}`);
  const words: Record<string, string> = {};
  for (const file of readdirSync(folder).filter(isWanted).sort()) {
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
