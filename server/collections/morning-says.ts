import type { Caution } from '../../shared/contracts/common';
import type { Instant } from '../../shared/domain/day';
import type { NextReason } from '../../shared/domain/order-of-morning';
import { clinicClock } from '../specimens/specimen-says';
import type { FastSoFar } from './fast-so-far';
import type { AdultRow, DoorCheckRow, MorningFacts, SaidRow } from './morning-facts';

/** Sentences of the clinic's sheet. Families never read these; their words come from the wording. */

const numbers = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
];
const inWords = (count: number): string => numbers[count] ?? String(count);
const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** '9 h 54 min' */
export const duration = (minutes: number): string => {
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  return hours === 0 ? `${rest} min` : `${hours} h ${String(rest).padStart(2, '0')} min`;
};

export const ageInWords = ({ years, months }: { years: number; months: number }): string => {
  if (months < 24) return months === 1 ? '1 month' : `${months} months`;
  return `${years} years`;
};

const cautionWords: Readonly<Record<Caution, string>> = {
  diabetes: 'Diabetes: the clinician’s own plan.',
  'metabolic-disease': 'Metabolic disease: the clinician’s own plan.',
  'low-blood-sugar': 'Low blood sugar before: the clinician’s own plan.',
  'severe-malnutrition': 'Severe malnutrition: the clinician’s own plan.',
  prematurity: 'Born early: the clinician’s own plan.',
  'tube-feeding': 'Fed by tube: the clinician’s own plan.',
  'morning-medicine': 'Medicine due in the morning: ask before the collection.',
};
export const cautionSays = (caution: Caution): string => cautionWords[caution];

const sources: Readonly<Record<SaidRow['source'], string>> = {
  web: 'On the page',
  text: 'By text',
  call: 'By telephone',
};
export const sourceSays = (source: SaidRow['source']): string => sources[source];

const outcomes: Readonly<Record<string, string>> = {
  come: 'come',
  'come-and-wait': 'come and wait',
  'call-us': 'call us before you leave',
  'come-nurse-decides': 'come, the nurse decides',
  'stay-we-call': 'stay by the phone, we call',
  'feed-now-and-call': 'feed now, then call us',
  'food-first': 'the child may eat now',
  emergency: 'call the emergency number',
  'not-coming': 'the child may eat now, we call',
  'late-noted': 'we have the new time',
};

/** The answer in clinic words, what the family read and chose word for word, and what it was told. */
export function saidSays(row: SaidRow, zone: string): string {
  const told = outcomes[row.outcome] ?? row.outcome;
  return `${answerSays(row, zone)} “${row.said.answer.says}” Told: ${told}.`;
}

function answerSays(row: SaidRow, zone: string): string {
  const at = row.last_intake_at ? clinicClock(row.last_intake_at.getTime(), zone) : null;
  switch (row.answer) {
    case 'nothing':
      return 'Nothing since the plan’s time.';
    case 'sip':
      return at ? `A sip or medicine at ${at}.` : 'A sip or medicine, time not known.';
    case 'feed':
      return at ? `Milk or food, finished at ${at}.` : 'Milk or food, time not known.';
    case 'unsure':
      return 'Not sure.';
    case 'not-coming':
      return 'Not coming.';
    case 'ill':
      return 'The child is ill.';
    case 'late':
      return 'Late.';
  }
}

export function doorSays(check: DoorCheckRow, zone: string): string {
  const clock = (at: Date): string => clinicClock(at.getTime(), zone);
  const parts = [
    check.last_food_at ? `food at ${clock(check.last_food_at)}` : null,
    check.last_drink_at ? `drink at ${clock(check.last_drink_at)}` : null,
    check.last_food_at || check.last_drink_at
      ? null
      : check.verdict === 'cannot-tell'
        ? 'time not known'
        : 'nothing since the plan’s time',
    check.medicine ? `medicine: ${check.medicine}` : null,
    check.woke_at ? `woke ${clock(check.woke_at)}` : null,
    check.is_well === 1 ? 'well' : 'not well',
    `with ${check.brought_by}`,
    check.go_on_reason ? `going on: ${check.go_on_reason}` : null,
  ];
  return `${capital(parts.filter((part) => part !== null).join(', '))}.`;
}

export function verdictSays(facts: MorningFacts, fast: FastSoFar, now: Instant): string {
  const { zone, plan } = facts.plan;
  const clock = (at: Instant): string => clinicClock(at, zone);
  if (facts.specimen) {
    const after = fast.fastedMinutes === null ? '' : `, after ${duration(fast.fastedMinutes)}`;
    return `Specimen ${facts.specimen.number}, ${Number(facts.specimen.volume_ml)} mL${after}`;
  }
  if (facts.collection?.outcome === 'not-collected')
    return `Not collected: ${facts.collection.not_collected_reason ?? 'no reason given'}`;
  if (facts.plan.state === 'lost') return `Lost: ${facts.plan.lostReason ?? 'no reason given'}`;
  if (facts.plan.fedAt !== null) return `Fed at ${clock(facts.plan.fedAt)}`;
  if (plan.kind === 'individual') return 'Individual plan: a clinician decides';
  if (fast.ceiling === 'feed' && fast.longestAt !== null)
    return `Longest fast passed at ${clock(fast.longestAt)}: feed`;
  if (fast.ceiling === 'collect-or-feed' && fast.longestAt !== null)
    return `Longest fast in ${Math.max(1, Math.round((fast.longestAt - now) / 60_000))} minutes, at ${clock(fast.longestAt)}`;
  if (fast.isPlanOnly) return 'Not known';
  if (fast.isUnsure || fast.verdict === 'cannot-tell') return 'Cannot tell';
  if (fast.readyAt !== null && fast.readyAt > now && fast.verdict === 'not-long-enough')
    return `Not long enough until ${clock(fast.readyAt)}`;
  if (fast.readyAt !== null && fast.readyAt > now) return `Long enough at ${clock(fast.readyAt)}`;
  return 'Long enough';
}

export function escortOf(facts: MorningFacts): AdultRow | null {
  const { escortFamilyMemberId } = facts.plan;
  return facts.adults.find(({ id }) => id === escortFamilyMemberId) ?? null;
}

export function warningsOf(facts: MorningFacts, likeNames: readonly string[]): string[] {
  const escort = escortOf(facts);
  const warnings: string[] = [];
  if (facts.consentBy === null)
    warnings.push('No consent is on file: no collection before a guardian has consented.');
  else if (escort && escort.may_consent === 0)
    warnings.push(
      `${capital(escort.relationship)} cannot consent: the consent of ${facts.consentBy} is on file.`,
    );
  if (likeNames.length > 0)
    warnings.push(`Like name today: ${likeNames.join(', ')}. Scan and look again.`);
  const newest = facts.said.at(-1);
  if (newest?.answer === 'ill' || facts.doorCheck?.is_well === 0)
    warnings.push('The child is not well: a clinician decides.');
  if (newest?.answer === 'not-coming' && facts.plan.state === 'planned')
    warnings.push('The family says it is not coming.');
  return warnings;
}

/** 'Five children: one collected, two here, two on the way, one not heard from.' */
export function summarySays(counts: {
  readonly all: number;
  readonly collected: number;
  readonly notCollected: number;
  readonly collecting: number;
  readonly here: number;
  readonly onTheWay: number;
  readonly silent: number;
  readonly lost: number;
}): string {
  if (counts.all === 0) return 'No children are planned for this day.';
  const parts: [number, string][] = [
    [counts.collected, 'collected'],
    [counts.notCollected, 'not collected'],
    [counts.collecting, 'in a room'],
    [counts.here, 'here'],
    [counts.onTheWay, 'heard from, not here yet'],
    [counts.silent, 'not heard from'],
    [counts.lost, 'lost'],
  ];
  const told = parts
    .filter(([count]) => count > 0)
    .map(([count, words]) => `${inWords(count)} ${words}`);
  return `${capital(inWords(counts.all))} ${counts.all === 1 ? 'child' : 'children'}: ${told.join(', ')}.`;
}

const reasons: Readonly<Record<NextReason, string>> = {
  'longest-fast-near': 'near the longest fast',
  'nearest-to-longest-fast': 'has least time left before the longest fast',
  youngest: 'the youngest of those who are ready',
  'booked-first': 'booked first of those who are ready',
  'only-one-ready': 'here, checked and fasted long enough',
};

export function suggestionSays(request: {
  readonly callMe: string;
  readonly roomName: string;
  readonly reason: NextReason;
  readonly fast: FastSoFar;
  readonly zone: string;
}): string {
  const { callMe, roomName, reason, fast, zone } = request;
  if (fast.ceiling === 'feed')
    return `Feed ${callMe} now: the longest fast has passed. Going on needs a clinician and a reason.`;
  const limit = fast.longestAt === null ? '' : ` (${clinicClock(fast.longestAt, zone)})`;
  const near = fast.ceiling === 'collect-or-feed' ? ' Collect now, or feed.' : '';
  return `Next: ${callMe}, ${roomName}. ${capital(reasons[reason])}${reason.includes('longest') ? limit : ''}.${near}`;
}
