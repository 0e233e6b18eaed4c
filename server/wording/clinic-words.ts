import type { Sequelize, Transaction } from 'sequelize';
import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import { localPartsOf } from '../../shared/domain/zone';
import { familyDay } from '../../shared/languages/family-time';
import { languageOf } from '../../shared/languages/languages';
import { profileOf, type LanguageProfile } from '../../shared/languages/profiles';
import { currentWordings } from './current-wording';
import {
  renderText,
  UnknownWording,
  wordingFrom,
  type Wording,
  type WordingParams,
} from './render';
import { sentenceIn } from './sentences';
import { shippedClinicWords, shippedWords, type ShippedWords } from './shipped-words';

/** What the clinic's screens say in one language. No family reads it, so that nobody signs it. */
export interface ClinicWords {
  readonly language: ClinicLanguage;
  readonly profile: LanguageProfile;
  has(key: string): boolean;
  /** @throws UnknownWording when English has no such key either, MissingParameter. */
  text(key: string, params?: WordingParams): string;
  /** A sentence that was written in English, kept or thrown, in this language. */
  sentence(english: string): string;
  /** 'A', 'A and B', 'A, B and C'. */
  list(items: readonly string[]): string;
  /** '06:22' in a zone: the clinic counts hours to 23 in every language. */
  clock(at: number, zone: string): string;
  /** 'Tuesday, 6 April' of a calendar day. */
  day(day: string): string;
  /** 1 for Monday. */
  weekday(weekday: number): string;
}

const made = new Map<ClinicLanguage, ClinicWords>();

/** The words of the clinic's screens; read once a language. */
export function clinicWords(language: ClinicLanguage): ClinicWords {
  const known = made.get(language);
  if (known) return known;
  const words = wordsOf(language, shippedClinicWords(language), shippedClinicWords('en'));
  made.set(language, words);
  return words;
}

function wordsOf(language: ClinicLanguage, own: ShippedWords, english: ShippedWords): ClinicWords {
  const { intlTag } = languageOf(language);
  const profile = profileOf(language);
  const text = (key: string, params: WordingParams = {}): string => {
    const body = own[key] ?? english[key];
    if (body === undefined) throw new UnknownWording(key, language);
    // Tests hold the languages level; should one slip, the clinic reads English and is not stopped.
    if (own[key] === undefined) process.emitWarning(`No words ${key} in ${language}`);
    return renderText(
      key,
      body,
      own[key] === undefined ? languageOf('en').intlTag : intlTag,
      params,
    );
  };
  const list = (items: readonly string[]): string => {
    const last = items.at(-1) ?? '';
    return items.length < 2
      ? last
      : text('clinic.list', { first: items.slice(0, -1).join(', '), last });
  };
  return {
    language,
    profile,
    has: (key) => key in own || key in english,
    text,
    sentence: (sentence) => sentenceIn(language, sentence),
    list,
    clock: (at, zone) => localPartsOf(at, zone).time,
    day: (day) => familyDay(day, profile).text,
    weekday: (weekday) => profile.weekdays[weekday - 1] ?? '',
  };
}

/**
 * Wording that staff reads: call scripts and letters in the language of the screen. Where the clinic has none of a
 * language in use yet, it is the shipped draft; what a family gets is still what was signed.
 */
export async function clinicWording(
  db: Sequelize,
  language: ClinicLanguage,
  transaction?: Transaction,
): Promise<Wording> {
  const inUse = await currentWordings(db, language, transaction);
  if (language === 'en') return wordingFrom(language, inUse);
  const drafts = Object.entries(shippedWords(language)).map(
    ([key, body]) => [key, { key, version: 0, body, isSignedOff: false }] as const,
  );
  return wordingFrom(language, new Map([...drafts, ...inUse]));
}
