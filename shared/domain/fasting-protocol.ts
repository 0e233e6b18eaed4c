/**
 * A clinic's fasting protocol: least and longest hours by age band, versioned, effective from a
 * day and signed by a clinician. Published sources disagree (3 to 10 hours), so that no hour is
 * written anywhere but in a protocol.
 */
import { cautions, type Caution } from './cautions';
import type { Day, LocalTime } from './day';

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

/** Comforts that a protocol may allow while nothing goes down by mouth. */
export const allowableItems = ['pacifier', 'cuddling', 'moist-lips', 'tooth-brushing'] as const;
export type AllowableItem = (typeof allowableItems)[number];

export interface FastingBand {
  /** Completed months on the day of the morning, first of the band. */
  readonly fromMonths: number;
  /** Last completed month of the band, inclusive; null has no end. */
  readonly toMonths: number | null;
  /** A clinician composes the plan; the hours are then null. */
  readonly individualPlan: boolean;
  readonly leastHours: Readonly<Record<Item, number>> | null;
  readonly longestHours: number | null;
  /**
   * Nothing at all from this clock time of the night before the arrival, where the clinic's rule
   * is a clock time; the earlier of it and the hours counts. Families never read midnight.
   */
  readonly nothingFrom: LocalTime | null;
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
  /** What a child may have during the fast, because nothing of it reaches the stomach. */
  readonly allowedItems: readonly AllowableItem[];
  /** Conditions that hold the standard plan until a clinician has composed one for the child. */
  readonly individualPlanCautions: readonly Caution[];
  /** Advice: collect within so many minutes of waking; null where the clinic gives none. */
  readonly wakeToCollectionMinutes: number | null;
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
    nothingFrom: null,
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
  allowedItems: ['pacifier'],
  individualPlanCautions: cautions,
  wakeToCollectionMinutes: null,
  bands: [
    {
      fromMonths: 0,
      toMonths: 2,
      individualPlan: true,
      leastHours: null,
      longestHours: null,
      nothingFrom: null,
    },
    band(3, 5, 4, 6),
    band(6, 11, 4, 8),
    band(12, 23, 6, 12),
    band(24, 59, 6, 13),
    band(60, null, 6, 14),
  ],
};

/** What a version stored before these fields were known holds: the shipped value of each. */
export const protocolDefaults = {
  allowedItems: startingProtocol.allowedItems,
  individualPlanCautions: startingProtocol.individualPlanCautions,
  wakeToCollectionMinutes: startingProtocol.wakeToCollectionMinutes,
} as const satisfies Partial<FastingProtocol>;

export function bandFor(protocol: FastingProtocol, ageMonths: number): FastingBand | null {
  return (
    protocol.bands.find(
      (candidate) =>
        ageMonths >= candidate.fromMonths &&
        (candidate.toMonths === null || ageMonths <= candidate.toMonths),
    ) ?? null
  );
}
