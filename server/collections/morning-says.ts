import type { Caution } from '../../shared/contracts/common';
import type { Instant } from '../../shared/domain/day';
import type { NextReason } from '../../shared/domain/order-of-morning';
import { durationInWords, minutesInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';
import type { FastSoFar } from './fast-so-far';
import type { AdultRow, DoorCheckRow, MorningFacts, SaidRow } from './morning-facts';

/** Sentences of the clinic's sheet. Families never read these; their words come from the wording. */

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

export const ageInWords = (
  words: ClinicWords,
  { years, months }: { years: number; months: number },
): string =>
  months < 24
    ? words.text('clinic.age.months', { count: months })
    : words.text('clinic.age.years', { count: years });

export const cautionSays = (words: ClinicWords, caution: Caution): string =>
  words.text(`clinic.caution.${caution}`);

export const sourceSays = (words: ClinicWords, source: SaidRow['source']): string =>
  words.text(`clinic.said.source.${source}`);

/** The answer in clinic words, what the family read and chose word for word, and what it was told. */
export function saidSays(words: ClinicWords, row: SaidRow, zone: string): string {
  const key = `clinic.said.outcome.${row.outcome}`;
  return words.text('clinic.said.told', {
    answer: answerSays(words, row, zone),
    words: row.said.answer.says,
    outcome: words.has(key) ? words.text(key) : row.outcome,
  });
}

function answerSays(words: ClinicWords, row: SaidRow, zone: string): string {
  const hasTime = row.answer === 'sip' || row.answer === 'feed';
  if (!hasTime) return words.text(`clinic.said.${row.answer}`);
  return row.last_intake_at
    ? words.text(`clinic.said.${row.answer}`, {
        at: words.clock(row.last_intake_at.getTime(), zone),
      })
    : words.text(`clinic.said.${row.answer}-unknown`);
}

export function doorSays(words: ClinicWords, check: DoorCheckRow, zone: string): string {
  const at = (key: string, time: Date | null): string | null =>
    time && words.text(`clinic.door.${key}`, { at: words.clock(time.getTime(), zone) });
  const taken = (key: 'food' | 'drink', time: Date | null, item: string | null): string | null =>
    time && item !== null
      ? words.text('clinic.door.item', {
          item: words.text(`clinic.item.${item}`),
          at: words.clock(time.getTime(), zone),
        })
      : at(key, time);
  const withoutTime = check.verdict === 'cannot-tell' ? 'unknown' : 'nothing';
  const parts = [
    taken('food', check.last_food_at, check.food_item),
    taken('drink', check.last_drink_at, check.drink_item),
    check.last_food_at || check.last_drink_at ? null : words.text(`clinic.door.${withoutTime}`),
    check.medicine ? words.text('clinic.door.medicine', { medicine: check.medicine }) : null,
    at('woke', check.woke_at),
    words.text(check.is_well === 1 ? 'clinic.door.well' : 'clinic.door.not-well'),
    check.blood_glucose_mg_dl === null
      ? null
      : words.text('clinic.door.glucose', { value: check.blood_glucose_mg_dl }),
    words.text('clinic.door.with', { who: check.brought_by }),
    check.go_on_reason ? words.text('clinic.door.going-on', { reason: check.go_on_reason }) : null,
  ];
  return words.text('clinic.door.all', {
    parts: capital(parts.filter((part) => part !== null).join(', ')),
  });
}

export function verdictSays(
  words: ClinicWords,
  facts: MorningFacts,
  fast: FastSoFar,
  now: Instant,
): string {
  const { zone, plan } = facts.plan;
  const say = (key: string, params: Readonly<Record<string, string | number>> = {}): string =>
    words.text(`clinic.verdict.${key}`, params);
  const sayAt = (key: string, at: Instant): string => say(key, { at: words.clock(at, zone) });
  const noReason = words.text('clinic.no-reason');
  if (facts.specimen) {
    const specimen = {
      number: facts.specimen.number,
      volume: String(Number(facts.specimen.volume_ml)),
    };
    return fast.fastedMinutes === null
      ? say('specimen', specimen)
      : say('specimen-after', {
          ...specimen,
          duration: durationInWords(words, fast.fastedMinutes),
        });
  }
  if (facts.collection?.outcome === 'not-collected')
    return say('not-collected', { reason: facts.collection.not_collected_reason ?? noReason });
  if (facts.plan.state === 'lost')
    return say('lost', { reason: facts.plan.lostReason ?? noReason });
  if (facts.plan.fedAt !== null) return sayAt('fed', facts.plan.fedAt);
  if (plan.kind === 'individual') return say('individual');
  if (fast.ceiling === 'feed' && fast.longestAt !== null)
    return sayAt('longest-passed', fast.longestAt);
  if (fast.ceiling === 'collect-or-feed' && fast.longestAt !== null) {
    const minutes = Math.max(1, Math.round((fast.longestAt - now) / 60_000));
    return say('longest-near', {
      minutes: minutesInWords(words, minutes),
      at: words.clock(fast.longestAt, zone),
    });
  }
  if (fast.isPlanOnly) return say('unknown');
  if (fast.isUnsure || fast.verdict === 'cannot-tell') return say('cannot-tell');
  if (fast.readyAt !== null && fast.readyAt > now)
    return sayAt(fast.verdict === 'not-long-enough' ? 'not-until' : 'long-enough-at', fast.readyAt);
  return say('long-enough');
}

export function escortOf(facts: MorningFacts): AdultRow | null {
  const { escortFamilyMemberId } = facts.plan;
  return facts.adults.find(({ id }) => id === escortFamilyMemberId) ?? null;
}

export function warningsOf(
  words: ClinicWords,
  facts: MorningFacts,
  likeNames: readonly string[],
): string[] {
  const escort = escortOf(facts);
  const say = (key: string, params: Readonly<Record<string, string>> = {}): string =>
    words.text(`clinic.warning.${key}`, params);
  const warnings: string[] = [];
  if (facts.consentBy === null) warnings.push(say('no-consent'));
  else if (escort && escort.may_consent === 0)
    warnings.push(
      say('cannot-consent', { who: capital(escort.relationship), consentBy: facts.consentBy }),
    );
  if (likeNames.length > 0) warnings.push(say('like-name', { names: likeNames.join(', ') }));
  const newest = facts.said.at(-1);
  if (newest?.answer === 'ill' || facts.doorCheck?.is_well === 0) warnings.push(say('not-well'));
  if (newest?.answer === 'not-coming' && facts.plan.state === 'planned')
    warnings.push(say('not-coming'));
  return warnings;
}

export interface MorningCounts {
  readonly all: number;
  readonly collected: number;
  readonly notCollected: number;
  readonly collecting: number;
  readonly here: number;
  readonly onTheWay: number;
  readonly silent: number;
  readonly lost: number;
}

const countsInOrder = [
  'collected',
  'notCollected',
  'collecting',
  'here',
  'onTheWay',
  'silent',
  'lost',
] as const satisfies readonly (keyof MorningCounts)[];

/** 'Five children: one collected, two here, two heard from, not here yet.' */
export function summarySays(words: ClinicWords, counts: MorningCounts): string {
  if (counts.all === 0) return words.text('clinic.summary.none');
  const number = (count: number): string => words.text('clinic.number', { count });
  const parts = countsInOrder
    .filter((name) => counts[name] > 0)
    .map((name) => words.text(`clinic.summary.${name}`, { number: number(counts[name]) }));
  return words.text('clinic.summary.all', {
    number: capital(number(counts.all)),
    count: counts.all,
    parts: parts.join(', '),
  });
}

export const reasonSays = (words: ClinicWords, reason: NextReason): string =>
  capital(words.text(`clinic.next.reason.${reason}`));

export function suggestionSays(
  words: ClinicWords,
  request: {
    readonly callMe: string;
    readonly roomName: string;
    readonly reason: NextReason;
    readonly fast: FastSoFar;
    readonly zone: string;
  },
): string {
  const { callMe: name, roomName: room, reason, fast, zone } = request;
  if (fast.ceiling === 'feed') return words.text('clinic.next.feed', { name });
  const said = { name, room, reason: reasonSays(words, reason) };
  const says =
    reason.includes('longest') && fast.longestAt !== null
      ? words.text('clinic.next.child-limit', { ...said, at: words.clock(fast.longestAt, zone) })
      : words.text('clinic.next.child', said);
  return fast.ceiling === 'collect-or-feed'
    ? words.text('clinic.next.collect-or-feed', { says })
    : says;
}
