/**
 * What published sources say about the fast before a gastric aspirate, for the clinician who sets
 * the clinic's own hours. They disagree, from 2 to 10 hours. No plan is ever computed from these
 * rows; sources that were not read at the page are left out.
 */
import type { FastingBand } from './fasting-protocol';

export interface PublishedFast {
  /** Of the source as it is cited; the words for staff hold its title. */
  readonly id: string;
  readonly source: string;
  /** Hours, by the age the source gives them for. */
  readonly infants: PublishedHours;
  readonly older: PublishedHours;
}

export interface PublishedHours {
  readonly from: number;
  /** The same as `from` where the source gives one number; null where it says "at least". */
  readonly to: number | null;
}

const atLeast = (from: number): PublishedHours => ({ from, to: null });
const between = (from: number, to: number): PublishedHours => ({ from, to });

/** Least hours before the collection. */
export const publishedFasts: readonly PublishedFast[] = [
  {
    id: 'curry-glossary',
    source: 'Curry International TB Center, gastric aspirate glossary',
    infants: between(3, 4),
    older: between(6, 8),
  },
  {
    // "After midnight" for all ages: at least 7 hours for a collection at 07:00.
    id: 'curry-step-1',
    source: 'Curry International TB Center, step 1',
    infants: atLeast(7),
    older: atLeast(7),
  },
  {
    id: 'medline-plus',
    source: 'National Library of Medicine, MedlinePlus 003378',
    infants: between(8, 10),
    older: between(8, 10),
  },
  {
    id: 'bettercare',
    source: 'Bettercare Childhood TB, 3-17',
    infants: atLeast(6),
    older: atLeast(6),
  },
  {
    id: 'rutgers',
    source: 'Rutgers Global TB Institute, course 2.13b',
    infants: between(2, 3),
    older: between(2, 3),
  },
  {
    id: 'quest-indiana',
    source: 'Indiana Regional laboratory, 908547',
    infants: atLeast(8),
    older: atLeast(8),
  },
  {
    id: 'time-and-temperature',
    source: 'Study of time, temperature and pH in 865 patients, India',
    infants: atLeast(6),
    older: atLeast(6),
  },
];

export interface MonitoredFast {
  readonly fromMonths: number;
  /** Inclusive; null has no end. */
  readonly toMonths: number | null;
  readonly hours: number;
}

/**
 * The longest diagnostic fasts under close watch in hospital (Medscape 921936). No permission for
 * a fast at home: an upper alarm only. The source's "8 to 12 months" begins here at 8.
 */
export const monitoredFasts: readonly MonitoredFast[] = [
  { fromMonths: 0, toMonths: 5, hours: 8 },
  { fromMonths: 6, toMonths: 7, hours: 12 },
  { fromMonths: 8, toMonths: 11, hours: 16 },
  { fromMonths: 12, toMonths: 23, hours: 18 },
  { fromMonths: 24, toMonths: 83, hours: 20 },
  { fromMonths: 84, toMonths: null, hours: 24 },
];

/**
 * Fasting before anaesthesia, for comparison only: there clear drinks are allowed to prevent harm,
 * here even water spoils the specimen (ESAIC 2021/22; South African table).
 */
export const anaesthesiaFasts = [
  { id: 'clear-drinks', hours: between(1, 2) },
  { id: 'breast-milk', hours: between(3, 4) },
  { id: 'formula', hours: between(4, 6) },
  { id: 'solid-food', hours: between(6, 8) },
] as const;

export interface PublishedForBand {
  readonly least: readonly { readonly id: string; readonly hours: PublishedHours }[];
  /** From the lowest to the highest number that any source gives for this age. */
  readonly leastRange: { readonly from: number; readonly to: number };
  /** The strictest monitored limit of the ages in the band. */
  readonly monitoredHours: number;
}

/** What is published for the ages of a band; a band across both ages is read as infants. */
export function publishedFor(band: Pick<FastingBand, 'fromMonths' | 'toMonths'>): PublishedForBand {
  const least = publishedFasts.map(({ id, infants, older }) => ({
    id,
    hours: band.fromMonths < 12 ? infants : older,
  }));
  const numbers = least.flatMap(({ hours }) => [hours.from, hours.to ?? hours.from]);
  const touched = monitoredFasts.filter(
    ({ fromMonths, toMonths }) =>
      (toMonths === null || toMonths >= band.fromMonths) &&
      (band.toMonths === null || fromMonths <= band.toMonths),
  );
  return {
    least,
    leastRange: { from: Math.min(...numbers), to: Math.max(...numbers) },
    monitoredHours: Math.min(...touched.map(({ hours }) => hours)),
  };
}
