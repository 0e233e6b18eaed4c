import type { Transaction } from 'sequelize';
import type { ShownTime } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { ageOn } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { wallClockForFamily } from '../../shared/domain/fasting-plan';
import { familyDay, familyStopTime, familyTime } from '../../shared/languages/family-time';
import type { Context } from '../context';
import { Problem } from '../http/problem';
import type { StoredProtocol } from '../protocols/protocols';
import type { MorningPlan } from '../series/morning-plans';
import type { Site } from '../sites/sites';
import { canSpeak, loadWording, type Wording, type WordingParams } from '../wording/render';

/** Words and times of one family in its language and its clinic's zone; remembers which texts it used. */
export interface FamilyWords {
  readonly wording: Wording;
  readonly zone: string;
  /** Keys used so far, with the version of each: what the family read can be found again word for word. */
  used(): Record<string, number>;
  text(key: string, params?: WordingParams): string;
  /** '7:00 in the morning' */
  time(at: Instant): string;
  /** Never 12:00. */
  stopTime(at: Instant): string;
  weekday(at: Instant): string;
  date(at: Instant): string;
  list(plans: readonly MorningPlan[]): string;
  shown(at: Instant): ShownTime;
  shownStop(at: Instant): ShownTime;
}

/**
 * @throws Problem 409 'language-by-telephone' when nothing can be told in this language: a person calls with an
 * interpreter, and nobody is told in another language without asking.
 */
export async function familyWords(
  { db }: Pick<Context, 'db'>,
  language: string,
  site: Site | null,
  transaction?: Transaction,
): Promise<FamilyWords> {
  if (!canSpeak(language))
    throw new Problem(
      409,
      'language-by-telephone',
      'The clinic tells you everything by telephone, in your language.',
      { language, phone: site?.phone ?? null },
    );
  return wordsFrom(await loadWording(db, language, transaction), site?.zone ?? 'UTC');
}

export function wordsFrom(wording: Wording, zone: string): FamilyWords {
  const used = new Set<string>();
  const { profile } = wording;
  const occursIn = (at: Instant): string => {
    const { time, occurs } = familyTime(at, zone, profile);
    return occurs === 'once' ? time : text(`time.${occurs}`, { time });
  };
  const text = (key: string, params: WordingParams = {}): string => {
    used.add(key);
    return wording.text(key, params);
  };
  const shown = (at: Instant): ShownTime => {
    const { clock, dayPart } = familyTime(at, zone, profile);
    return { at: new Date(at).toISOString(), clock, dayPart };
  };
  return {
    wording,
    zone,
    used: () => wording.versions([...used].sort()),
    text,
    time: occursIn,
    stopTime: (at) =>
      wallClockForFamily(at, zone) === at ? occursIn(at) : familyStopTime(at, zone, profile).time,
    weekday: (at) => familyTime(at, zone, profile).weekday,
    date: (at) => familyTime(at, zone, profile).date,
    list: (plans) => wording.list(plans.map(({ callMe }) => callMe)),
    shown,
    shownStop: (at) => ({ ...shown(wallClockForFamily(at, zone)), at: new Date(at).toISOString() }),
  };
}

/** Whose hours the family reads, in its own words. */
export function protocolSays(words: FamilyWords, site: Site, protocol: StoredProtocol): string {
  const { version, signedBy, signedOn } = protocol;
  if (protocol.isStartingValues)
    return words.text('protocol.starting-values', { clinic: site.name, version });
  if (signedBy === null || signedOn === null)
    return words.text('protocol.unsigned', { clinic: site.name, version });
  const date = familyDay(signedOn, words.wording.profile).date;
  return words.text('protocol.signed', { clinic: site.name, version, signer: signedBy, date });
}

/** The protocols that times of these children follow; a child's own plan follows none. */
export const protocolsOf = (children: readonly MorningPlan[]): Map<number, StoredProtocol> =>
  new Map(
    children
      .filter(({ individualPlan }) => individualPlan === null)
      .map(({ protocol }) => [protocol.id, protocol]),
  );

/** Whose own plans these are, and who signed them. */
export const ownPlansSay = (words: FamilyWords, children: readonly MorningPlan[]): string[] =>
  children.flatMap(({ callMe, individualPlan, zone }) => {
    if (!individualPlan) return [];
    const { date } = familyDay(dayOf(individualPlan.signedAt, zone), words.wording.profile);
    return [words.text('own-plan.signed', { name: callMe, signer: individualPlan.signedBy, date })];
  });

export function faceOf({ bornOn, on }: MorningPlan): 'baby' | 'toddler' | 'child' {
  const { months } = ageOn(bornOn, on);
  return months < 12 ? 'baby' : months < 36 ? 'toddler' : 'child';
}
