/**
 * A morning was lost. The specimens already taken stay valid and keep their numbers; the clinic
 * may take the next possible morning, plan a new run, or close with fewer. No source says that a
 * series must restart (clinical facts 6.2); a clinician chooses and says why.
 */
import { morningOn, proposeRuns, type Run, type RunDay, type SeriesRequest } from './series-dates';
import { addDays, daysBetween, type Day } from './day';

export interface SeriesMorning {
  /** Number of the specimen within the series, from 1; never given twice. */
  readonly number: number;
  readonly on: Day;
  readonly state: 'collected' | 'planned' | 'lost';
}

export interface ReplanRequest {
  readonly lostOn: Day;
  readonly plannedCount: number;
  readonly mornings: readonly SeriesMorning[];
  /** As for proposeRuns; from and count are replaced. */
  readonly search: Omit<SeriesRequest, 'from' | 'count'>;
  /** The clinic's longest gap between two mornings of one series. */
  readonly longestGapDays: number;
}

export type ReplanOffer =
  | {
      readonly kind: 'next-possible-morning';
      readonly number: number;
      readonly day: RunDay;
      /** Days since the last collected or planned morning; 1 is the very next day. */
      readonly gapDays: number;
      readonly isConsecutive: boolean;
      readonly isBeyondGap: boolean;
    }
  | { readonly kind: 'new-run'; readonly numbers: readonly number[]; readonly run: Run }
  | { readonly kind: 'close-with-fewer'; readonly collected: number; readonly planned: number };

export function replanOffers(request: ReplanRequest): ReplanOffer[] {
  const { lostOn, plannedCount, mornings, search, longestGapDays } = request;
  const kept = mornings.filter(({ state }) => state !== 'lost');
  const collected = mornings.filter(({ state }) => state === 'collected');
  const lostNumber = mornings.find(({ on, state }) => on === lostOn && state === 'lost')?.number;
  const lastKeptOn = kept
    .map(({ on }) => on)
    .sort()
    .at(-1);
  const from = addDays([lostOn, lastKeptOn ?? lostOn].sort().at(-1) ?? lostOn, 1);
  const offers: ReplanOffer[] = [];

  const day = firstPossible({ ...search, from, count: 1 });
  if (day) {
    const gapDays = daysBetween(lastKeptOn ?? lostOn, day.on);
    offers.push({
      kind: 'next-possible-morning',
      number: lostNumber ?? highest(mornings) + 1,
      day,
      gapDays,
      isConsecutive: gapDays === 1,
      isBeyondGap: gapDays > longestGapDays,
    });
  }
  const missing = Math.max(plannedCount - collected.length, 0);
  if (missing > 0) {
    const [run] = proposeRuns({ ...search, from: addDays(lostOn, 1), count: missing }).runs;
    if (run) offers.push({ kind: 'new-run', numbers: freeNumbers(collected, missing), run });
  }
  if (collected.length > 0) {
    offers.push({
      kind: 'close-with-fewer',
      collected: collected.length,
      planned: plannedCount,
    });
  }
  return offers;
}

function firstPossible(request: SeriesRequest): RunDay | null {
  for (let ahead = 0; ahead < request.weeks * 7; ahead += 1) {
    const { morning } = morningOn(request, addDays(request.from, ahead));
    if (morning) return morning;
  }
  return null;
}

function highest(mornings: readonly SeriesMorning[]): number {
  return Math.max(0, ...mornings.map(({ number }) => number));
}

/** The lowest numbers that no collected specimen has. */
function freeNumbers(collected: readonly SeriesMorning[], count: number): number[] {
  const taken = new Set(collected.map(({ number }) => number));
  const free: number[] = [];
  for (let number = 1; free.length < count; number += 1) {
    if (!taken.has(number)) free.push(number);
  }
  return free;
}
