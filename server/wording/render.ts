import { IntlMessageFormat } from 'intl-messageformat';
import type { Sequelize, Transaction } from 'sequelize';
import { isLanguageId, languageOf, type Language } from '../../shared/languages/languages';
import { hasProfile, profileOf, type LanguageProfile } from '../../shared/languages/profiles';
import { currentWordings, type CurrentWording } from './current-wording';

export type WordingParams = Readonly<Record<string, string | number | undefined>>;

/** A text was asked for that this language does not have; a family is never told it in another language. */
export class UnknownWording extends Error {
  constructor(key: string, language: string) {
    super(`No wording ${key} in ${language}`);
    this.name = 'UnknownWording';
  }
}

export class MissingParameter extends Error {
  constructor(key: string, reason: string) {
    super(`Wording ${key} cannot be rendered: ${reason}`);
    this.name = 'MissingParameter';
  }
}

export interface Wording {
  readonly language: string;
  readonly dir: Language['dir'];
  /** For familyTime and familyDay. */
  readonly profile: LanguageProfile;
  has(key: string): boolean;
  /** @throws UnknownWording, MissingParameter. */
  text(key: string, params?: WordingParams): string;
  /** 'Yusuf', 'Yusuf and Maryam', 'Amina, Yusuf and Maryam'. */
  list(names: readonly string[]): string;
  version(key: string): number;
  versions(keys: readonly string[]): Record<string, number>;
  /** Whether the version in use of every one of these texts is signed off. */
  isSignedOff(keys: readonly string[]): boolean;
  /** The notice that words are a draft; null when all of these texts (all texts by default) are signed off. */
  draftNotice(keys?: readonly string[]): string | null;
}

/** Whether families can be told anything at all in this language here: it has a profile to tell times with. */
export const canSpeak = (language: string): boolean =>
  isLanguageId(language) && hasProfile(language);

/** A text of one version never changes, so that what was parsed once holds for ever. */
const parsed = new Map<string, IntlMessageFormat>();
const mostParsed = 10_000;

function parse(body: string, intlTag: string): IntlMessageFormat {
  const id = `${intlTag}\n${body}`;
  const known = parsed.get(id);
  if (known) return known;
  if (parsed.size >= mostParsed) parsed.clear();
  const format = new IntlMessageFormat(body, intlTag, undefined, { ignoreTag: true });
  parsed.set(id, format);
  return format;
}

/** One text with its parameters, as ICU MessageFormat. @throws MissingParameter. */
export function renderText(
  key: string,
  body: string,
  intlTag: string,
  params: WordingParams,
): string {
  const empty = Object.entries(params).find(([, value]) => value === undefined || value === null);
  if (empty) throw new MissingParameter(key, `${empty[0]} is empty`);
  try {
    return String(parse(body, intlTag).format({ ...params }));
  } catch (error) {
    throw new MissingParameter(key, error instanceof Error ? error.message : String(error));
  }
}

/**
 * The words of a language as they are in use now.
 * @throws RangeError when the language has no profile: times could not be told in it.
 */
export async function loadWording(
  db: Sequelize,
  language: string,
  transaction?: Transaction,
): Promise<Wording> {
  if (!isLanguageId(language)) throw new RangeError(`Not a language: ${language}`);
  return wordingFrom(language, await currentWordings(db, language, transaction));
}

export function wordingFrom(
  language: string,
  current: ReadonlyMap<string, CurrentWording>,
): Wording {
  if (!isLanguageId(language)) throw new RangeError(`Not a language: ${language}`);
  const { dir, intlTag } = languageOf(language);
  const entry = (key: string): CurrentWording => {
    const found = current.get(key);
    if (!found) throw new UnknownWording(key, language);
    return found;
  };
  const text = (key: string, params: WordingParams = {}): string =>
    renderText(key, entry(key).body, intlTag, params);
  const list = (names: readonly string[]): string => {
    const [first = '', second, ...more] = names;
    if (second === undefined) return first;
    if (more.length === 0) return text('list.two', { first, second });
    return text('list.more', { first, rest: list([second, ...more]) });
  };
  const isSignedOff = (keys: readonly string[]): boolean =>
    keys.every((key) => current.get(key)?.isSignedOff === true);
  return {
    language,
    dir,
    profile: profileOf(language),
    has: (key) => current.has(key),
    text,
    list,
    version: (key) => entry(key).version,
    versions: (keys) => Object.fromEntries(keys.map((key) => [key, entry(key).version])),
    isSignedOff,
    draftNotice: (keys = [...current.keys()]) => (isSignedOff(keys) ? null : text('draft-notice')),
  };
}
