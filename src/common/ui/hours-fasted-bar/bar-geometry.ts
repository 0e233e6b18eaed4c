import type { Instant } from '../../../../shared/domain/zone';
import { isOnRuler, minuteOn, type RulerScale } from '../ruler/ruler-scale';

/** What a child's bar is drawn from; instants as they come on the wire. */
export interface BarFacts {
  readonly fromAt: string;
  readonly isPlanOnly: boolean;
  readonly isUnsure: boolean;
  readonly leastAt: string;
  readonly longestAt: string;
  readonly likelyCollectionAt: string;
  readonly collectedAt: string | null;
}

/** A stop of the specimen on its way. */
export interface BarStop {
  readonly at: string;
  readonly isDue: boolean;
}

export interface BarGeometry {
  /** Minutes on the ruler. */
  readonly from: number;
  readonly to: number;
  readonly least: number;
  readonly longest: number;
  readonly until: number | null;
  readonly stops: readonly { readonly minute: number; readonly isDue: boolean }[];
  readonly hasStart: boolean;
  readonly hasLeast: boolean;
  readonly hasLongest: boolean;
  /** Too near the end of the ruler for words on its right. */
  readonly isLongestAtEnd: boolean;
  readonly hasAhead: boolean;
}

const labelMinutes = 75;

/** Where the parts of a bar stand. A collection that is late is likely now. */
export function barGeometry(
  bar: BarFacts,
  { scale, now, stops = [] }: { scale: RulerScale; now: Instant; stops?: readonly BarStop[] },
): BarGeometry {
  const at = (instant: string): number => minuteOn(scale, Date.parse(instant));
  const isOn = (instant: string): boolean => isOnRuler(scale, Date.parse(instant));
  const isSpent = bar.collectedAt !== null;
  const endAt = isSpent
    ? Date.parse(bar.collectedAt ?? '')
    : Math.max(Date.parse(bar.likelyCollectionAt), now);
  const to = minuteOn(scale, endAt);
  const longest = at(bar.longestAt);
  const placed = stops.map((stop) => ({ minute: at(stop.at), isDue: stop.isDue }));
  return {
    from: Math.min(at(bar.fromAt), to),
    to,
    least: at(bar.leastAt),
    longest,
    until: isSpent && placed.length > 0 ? Math.max(...placed.map(({ minute }) => minute)) : null,
    stops: isSpent ? placed : [],
    hasStart: isOn(bar.fromAt),
    hasLeast: isOn(bar.leastAt),
    hasLongest: !isSpent && isOn(bar.longestAt),
    isLongestAtEnd: longest > scale.minutes - labelMinutes,
    hasAhead: !isSpent && !bar.isPlanOnly && now < endAt,
  };
}
