/**
 * A morning was lost. The specimens already taken stay valid and keep their numbers; the clinic
 * may take the next possible morning, plan a new run, or close with fewer. No source says that a
 * series must restart (clinical facts 6.2); a clinician chooses and says why.
 */
import { morningsOf, proposeRuns, type Run, type RunDay, type SeriesRequest } from './series-dates';
import { addDays, daysBetween, type Day } from './day';

export interface SeriesMorning {
  /** Number of the specimen within the series, from 1; one that was collected never changes it. */
  readonly number: number;
  readonly on: Day;
  /** 'collected' has a specimen or is about to; 'lost' never will have one. */
  readonly state: 'collected' | 'planned' | 'lost';
}

/** What becomes of one morning. */
export interface AfterMorning<Entry extends SeriesMorning = SeriesMorning> extends SeriesMorning {
  readonly change: 'kept' | 'moved' | 'renumbered' | 'new' | 'given-up';
  /** How it stood before; null for a new one. */
  readonly was: Entry | null;
}

/** One child's series as it stands. */
export interface SeriesToReplan<Entry extends SeriesMorning = SeriesMorning> {
  readonly childId: number;
  readonly plannedCount: number;
  readonly mornings: readonly Entry[];
}

export interface ReplanRequest {
  /** One series, or those of brothers and sisters. */
  readonly series: readonly SeriesToReplan[];
  /** As for proposeRuns, without the places of these series; count is replaced. */
  readonly search: Omit<SeriesRequest, 'count'>;
  /** The clinic's longest gap between two mornings of one series. */
  readonly longestGapDays: number;
}

export interface AfterSeries<Entry extends SeriesMorning = SeriesMorning> {
  readonly childId: number;
  /** In order of days. */
  readonly mornings: readonly AfterMorning<Entry>[];
  /** From the first to the last specimen all days follow each other. */
  readonly isConsecutive: boolean;
  readonly longestGapDays: number;
  readonly isBeyondGap: boolean;
  /** Mornings that the order asks for and nobody has planned. */
  readonly stillMissing: number;
}

export type ReplanKind = 'next-possible-morning' | 'new-run' | 'close-with-fewer';

export type ReplanOffer =
  | {
      readonly kind: 'next-possible-morning';
      readonly day: RunDay;
      readonly after: readonly AfterSeries[];
    }
  | { readonly kind: 'new-run'; readonly run: Run; readonly after: readonly AfterSeries[] }
  | {
      readonly kind: 'close-with-fewer';
      readonly collected: number;
      readonly planned: number;
      readonly after: readonly AfterSeries[];
    };

const held = ({ state }: SeriesMorning): boolean => state !== 'lost';
const inOrder = (left: SeriesMorning, right: SeriesMorning): number =>
  left.on.localeCompare(right.on) || left.number - right.number;

/** Mornings of the order that nobody has planned. */
export const missingOf = ({ plannedCount, mornings }: SeriesToReplan): number =>
  Math.max(plannedCount - mornings.filter(held).length, 0);

/** Mornings that have no specimen yet, planned or not. */
export const withoutSpecimen = ({ plannedCount, mornings }: SeriesToReplan): number =>
  Math.max(plannedCount - mornings.filter(({ state }) => state === 'collected').length, 0);

/**
 * Numbers of the mornings to come: in order of days the lowest that no specimen has. What was collected keeps its
 * number, and so does what was lost, as the number it would have had.
 */
export function numberMornings<Entry extends SeriesMorning>(mornings: readonly Entry[]): Entry[] {
  const taken = new Set(
    mornings.filter(({ state }) => state === 'collected').map(({ number }) => number),
  );
  let next = 1;
  return [...mornings].sort(inOrder).map((morning) => {
    if (morning.state !== 'planned') return morning;
    while (taken.has(next)) next += 1;
    const number = next;
    next += 1;
    return { ...morning, number };
  });
}

/**
 * A series once its planned mornings lie on the wanted days. A morning on a wanted day stays; the others move in order
 * of days, so that a family's calendar entry moves with its morning; what is too many is given up, what is missing is
 * new. What was collected or lost is never touched.
 */
export function afterChange<Entry extends SeriesMorning>(
  series: SeriesToReplan<Entry>,
  wantedDays: readonly Day[],
  longestGapDays: number,
): AfterSeries<Entry> {
  const { childId, plannedCount, mornings } = series;
  const planned = mornings.filter(({ state }) => state === 'planned').sort(inOrder);
  const leaving = planned.filter(({ on }) => !wantedDays.includes(on));
  const plannedOn = new Set(planned.map(({ on }) => on));
  const open = [...new Set(wantedDays)].filter((on) => !plannedOn.has(on)).sort();
  const changed = mornings.map((was): AfterMorning<Entry> => {
    const { number, on, state } = was;
    const place = leaving.indexOf(was);
    const to = open[place];
    if (place < 0) return { number, on, state, change: 'kept', was };
    if (to === undefined) return { number, on, state: 'lost', change: 'given-up', was };
    return { number, on: to, state, change: 'moved', was };
  });
  const added = open.slice(leaving.length).map((on): AfterMorning<Entry> => ({
    number: 0,
    on,
    state: 'planned',
    change: 'new',
    was: null,
  }));
  const numbered = numberMornings([...changed, ...added]).map((morning) =>
    morning.change === 'kept' && morning.number !== morning.was?.number
      ? { ...morning, change: 'renumbered' as const }
      : morning,
  );
  const days = numbered.filter(held).map(({ on }) => on);
  const gaps = days.slice(1).map((on, index) => daysBetween(days[index] ?? on, on));
  const longest = Math.max(0, ...gaps);
  return {
    childId,
    mornings: numbered,
    longestGapDays: longest,
    isConsecutive: longest <= 1,
    isBeyondGap: longest > longestGapDays,
    stillMissing: Math.max(plannedCount - days.length, 0),
  };
}

/** What can be done about mornings that are missing; also with nothing lost, when a family asks for other days. */
export function replanOffers(request: ReplanRequest): ReplanOffer[] {
  const { series, longestGapDays } = request;
  const offers: ReplanOffer[] = [];
  const day = nextPossibleMorning(request);
  if (day) {
    const comes = new Set(day.places.map(({ childId }) => childId));
    offers.push({
      kind: 'next-possible-morning',
      day,
      after: series.map((one) =>
        afterChange(
          one,
          [...plannedDays(one), ...(comes.has(one.childId) ? [day.on] : [])],
          longestGapDays,
        ),
      ),
    });
  }
  const run = newRun(request);
  if (run) {
    const wanted = run.days.map(({ on }) => on);
    offers.push({
      kind: 'new-run',
      run,
      after: series.map((one) => afterChange(one, wanted, longestGapDays)),
    });
  }
  if (series.some((one) => withoutSpecimen(one) > 0)) {
    offers.push({
      kind: 'close-with-fewer',
      collected: sumOf(series, ({ mornings }) => mornings.filter(isCollected).length),
      planned: sumOf(series, ({ plannedCount }) => plannedCount),
      after: series.map((one) => afterChange(one, [], longestGapDays)),
    });
  }
  return offers;
}

const isCollected = ({ state }: SeriesMorning): boolean => state === 'collected';
export const plannedDays = ({ mornings }: SeriesToReplan): Day[] =>
  mornings.filter(({ state }) => state === 'planned').map(({ on }) => on);
const sumOf = (series: readonly SeriesToReplan[], count: (one: SeriesToReplan) => number): number =>
  series.reduce((sum, one) => sum + count(one), 0);

/** Not before the day after the last one that was lost, so that nobody replans into the past of the series. */
export function searchFrom({ series, search }: ReplanRequest): Day {
  const lost = series.flatMap(({ mornings }) =>
    mornings.filter(({ state }) => state === 'lost').map(({ on }) => addDays(on, 1)),
  );
  const collected = series.flatMap(({ mornings }) =>
    mornings.filter(isCollected).map(({ on }) => addDays(on, 1)),
  );
  return [search.from, ...lost, ...collected].sort().at(-1) ?? search.from;
}

/** For every child that misses one, on a day on which none of them comes anyway. */
function nextPossibleMorning(request: ReplanRequest): RunDay | null {
  const { series, search } = request;
  const missing = series.filter((one) => missingOf(one) > 0);
  if (missing.length === 0) return null;
  const ids = new Set(missing.map(({ childId }) => childId));
  const children = search.children.filter(({ id }) => ids.has(id));
  const heldDays = missing.flatMap(({ mornings }) => mornings.filter(held).map(({ on }) => on));
  const look = morningsOf({ ...search, heldDays, children, count: 1 });
  const from = searchFrom(request);
  for (let ahead = 0; ahead < search.weeks * 7; ahead += 1) {
    const on = addDays(from, ahead);
    const { morning } = look(on);
    if (morning) return morning;
  }
  return null;
}

/** Only where all the children still need the same number of mornings: brothers and sisters come together. */
function newRun(request: ReplanRequest): Run | null {
  const { series, search } = request;
  const [count = 0, ...others] = series.map(withoutSpecimen);
  if (count === 0 || others.some((other) => other !== count)) return null;
  return proposeRuns({ ...search, from: searchFrom(request), count }).runs[0] ?? null;
}
