/**
 * A clinic's fasting protocol: least and longest hours by age band, versioned, effective from a
 * day and signed by a clinician. Published sources disagree (3 to 10 hours), so that no hour is
 * written anywhere but in a protocol.
 */
import type { Day } from './day';

export const items = [
  'solid-food',
  'cows-milk',
  'formula',
  'breast-milk',
  'water',
  'tube-feed',
  'other',
] as const;
export type Item = (typeof items)[number];

export interface FastingBand {
  /** Completed months on the day of the morning, first of the band. */
  readonly fromMonths: number;
  /** Last completed month of the band, inclusive; null has no end. */
  readonly toMonths: number | null;
  /** A clinician composes the plan; the hours are then null. */
  readonly individualPlan: boolean;
  readonly leastHours: Readonly<Record<Item, number>> | null;
  readonly longestHours: number | null;
}

export interface FastingProtocol {
  readonly version: number;
  readonly effectiveOn: Day;
  readonly title: string;
  /** Shipped values that no clinician of this clinic has confirmed yet. */
  readonly isStartingValues: boolean;
  readonly signedBy: string | null;
  readonly signedOn: Day | null;
  /** From arrival to collection. */
  readonly usualWaitMinutes: number;
  /** From collection until the child may eat and drink. */
  readonly eatAgainAfterMinutes: number;
  readonly bands: readonly FastingBand[];
}

function everythingByMouth(hours: number): Record<Item, number> {
  return Object.fromEntries(items.map((item) => [item, hours])) as Record<Item, number>;
}

function band(fromMonths: number, toMonths: number | null, least: number, longest: number) {
  return {
    fromMonths,
    toMonths,
    individualPlan: false,
    leastHours: everythingByMouth(least),
    longestHours: longest,
  };
}

/**
 * Starting values, to be confirmed by the clinic. Least hours lie in the range of published
 * sources: 3 to 4 h for infants and 6 to 8 h for older children (Curry International TB Center,
 * gastric aspirate glossary), 6 h (Bettercare Childhood TB, 3-17). The longest hours have no
 * source for this procedure; they stay inside the limits of fasts monitored in hospital, 8 h under
 * 6 months, 12 h to 8 months, 16 h to 12 months, 18 h to 2 years, 20 h to 7 years (Medscape
 * 921936). The usual wait and the minutes to the next feed have no source and are the clinic's.
 */
export const startingProtocol: FastingProtocol = {
  version: 1,
  effectiveOn: '2026-01-01',
  title: 'Starting values, to be confirmed by the clinic',
  isStartingValues: true,
  signedBy: null,
  signedOn: null,
  usualWaitMinutes: 30,
  eatAgainAfterMinutes: 15,
  bands: [
    { fromMonths: 0, toMonths: 2, individualPlan: true, leastHours: null, longestHours: null },
    band(3, 5, 4, 6),
    band(6, 11, 4, 8),
    band(12, 23, 6, 12),
    band(24, 59, 6, 13),
    band(60, null, 6, 14),
  ],
};

export function bandFor(protocol: FastingProtocol, ageMonths: number): FastingBand | null {
  return (
    protocol.bands.find(
      (candidate) =>
        ageMonths >= candidate.fromMonths &&
        (candidate.toMonths === null || ageMonths <= candidate.toMonths),
    ) ?? null
  );
}

export type ProtocolProblemCode =
  | 'no-bands'
  | 'not-from-birth'
  | 'gap'
  | 'overlap'
  | 'open-band-not-last'
  | 'not-to-the-end'
  | 'months-reversed'
  | 'hours-missing'
  | 'hours-not-positive'
  | 'longest-not-above-least'
  | 'wait-passes-longest'
  | 'under-3-months-without-individual-plan'
  | 'minutes-negative';

export interface ProtocolProblem {
  readonly path: string;
  readonly code: ProtocolProblemCode;
  readonly message: string;
}

/** Everything that must be mended before a clinician may sign; empty when the protocol holds. */
export function validateProtocol(protocol: FastingProtocol): ProtocolProblem[] {
  const { bands, usualWaitMinutes, eatAgainAfterMinutes } = protocol;
  const problems: ProtocolProblem[] = [];
  const add = (path: string, code: ProtocolProblemCode, message: string): void => {
    problems.push({ path, code, message });
  };
  if (!(usualWaitMinutes >= 0)) {
    add('usualWaitMinutes', 'minutes-negative', 'The usual wait cannot be negative.');
  }
  if (!(eatAgainAfterMinutes >= 0)) {
    add('eatAgainAfterMinutes', 'minutes-negative', 'The time to the next feed is negative.');
  }
  const first = bands[0];
  if (!first) {
    add('bands', 'no-bands', 'Add at least one age band.');
    return problems;
  }
  if (first.fromMonths !== 0) {
    add('bands.0.fromMonths', 'not-from-birth', 'The first band must begin at 0 months.');
  }
  bands.forEach((current, index) => {
    problems.push(...bandProblems(current, `bands.${index}`, protocol));
    const next = bands[index + 1];
    if (next) problems.push(...seamProblems(current, next, index));
  });
  if (bands[bands.length - 1]?.toMonths !== null) {
    add(
      `bands.${bands.length - 1}.toMonths`,
      'not-to-the-end',
      'The last band must have no upper age.',
    );
  }
  return problems;
}

function seamProblems(current: FastingBand, next: FastingBand, index: number): ProtocolProblem[] {
  const path = `bands.${index + 1}.fromMonths`;
  if (current.toMonths === null) {
    return [
      {
        path: `bands.${index}.toMonths`,
        code: 'open-band-not-last',
        message: 'Only the last band may be without an upper age.',
      },
    ];
  }
  const expected = current.toMonths + 1;
  if (next.fromMonths > expected) {
    const message = `No band holds ${expected} to ${next.fromMonths - 1} months.`;
    return [{ path, code: 'gap', message }];
  }
  if (next.fromMonths < expected) {
    const message = `Two bands hold ${next.fromMonths} to ${current.toMonths} months.`;
    return [{ path, code: 'overlap', message }];
  }
  return [];
}

function bandProblems(
  current: FastingBand,
  path: string,
  protocol: FastingProtocol,
): ProtocolProblem[] {
  const problems: ProtocolProblem[] = [];
  const add = (field: string, code: ProtocolProblemCode, message: string): void => {
    problems.push({ path: `${path}.${field}`, code, message });
  };
  if (current.toMonths !== null && current.toMonths < current.fromMonths) {
    add('toMonths', 'months-reversed', 'The band ends before it begins.');
  }
  if (current.individualPlan) return problems;
  if (current.fromMonths < 3) {
    add(
      'individualPlan',
      'under-3-months-without-individual-plan',
      'Children under 3 months always get an individual plan.',
    );
  }
  if (!current.leastHours) add('leastHours', 'hours-missing', 'Give the least hours.');
  if (current.longestHours === null) {
    add('longestHours', 'hours-missing', 'Give the longest fast.');
  }
  if (!current.leastHours || current.longestHours === null) return problems;
  for (const item of items) {
    const least = current.leastHours[item];
    const field = `leastHours.${item}`;
    if (!(least > 0)) {
      add(field, 'hours-not-positive', 'Hours must be more than 0.');
    } else if (current.longestHours <= least) {
      add('longestHours', 'longest-not-above-least', `Must be longer than ${least} hours.`);
      break;
    } else if (current.longestHours * 60 < least * 60 + protocol.usualWaitMinutes) {
      add('longestHours', 'wait-passes-longest', 'The usual wait alone would pass it.');
      break;
    }
  }
  return problems;
}
