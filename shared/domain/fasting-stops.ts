/**
 * The stops of a plan: when each thing may last be taken. Hours count back from the arrival; a
 * clock time is the newest one before the arrival; where a rule has both, the earlier counts.
 */
import { items, type Item } from './fasting-protocol';
import { addDays, dayOf, instantOf, millisecondsPerMinute, type Instant } from './zone';
import type { LocalTime } from './day';

export interface FastingStop {
  readonly item: Item;
  readonly stopAt: Instant;
  /** Elapsed minutes that this thing needs, whenever it was taken. */
  readonly leastMinutes: number;
  /** Set where a clock time, not the hours, made the stop. */
  readonly clock: LocalTime | null;
}

/** What a plan asks of one thing; at least one of both is given. */
export interface StopRule {
  readonly leastMinutes: number | null;
  readonly nothingFrom: LocalTime | null;
}

/**
 * The newest instant before `arrivalAt` at which a clock shows this time. On the night it shows it
 * twice the first counts, so that a stop is never told too late.
 */
export function lastBefore(arrivalAt: Instant, time: LocalTime, zone: string): Instant {
  const today = dayOf(arrivalAt, zone);
  const at = instantOf({ on: today, time, zone }, 'earlier');
  return at < arrivalAt ? at : instantOf({ on: addDays(today, -1), time, zone }, 'earlier');
}

/** @throws RangeError for a rule with neither hours nor a clock time, or without a single item. */
export function stopsOf(
  rules: Readonly<Partial<Record<Item, StopRule>>>,
  arrivalAt: Instant,
  zone: string,
): FastingStop[] {
  const stops = items.flatMap((item): FastingStop[] => {
    const rule = rules[item];
    return rule ? [{ item, ...stopOf(rule, arrivalAt, zone) }] : [];
  });
  if (stops.length === 0) throw new RangeError('A plan needs hours for at least one item.');
  return stops;
}

function stopOf(
  { leastMinutes, nothingFrom }: StopRule,
  arrivalAt: Instant,
  zone: string,
): Omit<FastingStop, 'item'> {
  const byHours = leastMinutes === null ? null : arrivalAt - leastMinutes * millisecondsPerMinute;
  const byClock = nothingFrom === null ? null : lastBefore(arrivalAt, nothingFrom, zone);
  if (byHours !== null && (byClock === null || byHours <= byClock))
    return { stopAt: byHours, leastMinutes: leastMinutes ?? 0, clock: null };
  if (byClock === null) throw new RangeError('A stop needs hours or a clock time.');
  return {
    stopAt: byClock,
    leastMinutes: leastMinutes ?? Math.round((arrivalAt - byClock) / millisecondsPerMinute),
    clock: nothingFrom,
  };
}

/** Things that end in the same minute, the earliest first. */
export interface StopGroup {
  readonly stopAt: Instant;
  readonly items: readonly Item[];
}

export function stopGroups(stops: readonly FastingStop[]): StopGroup[] {
  const groups = new Map<Instant, Item[]>();
  for (const { item, stopAt } of stops) groups.set(stopAt, [...(groups.get(stopAt) ?? []), item]);
  return [...groups]
    .map(([stopAt, together]) => ({ stopAt, items: together }))
    .sort((left, right) => left.stopAt - right.stopAt);
}
