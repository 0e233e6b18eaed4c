/**
 * Hours of single things: which least hours count for what was taken, and when hunger began. A sip
 * of water starts the least hours of water again, never the longest fast.
 */
import type { Item } from './fasting-protocol';
import type { StandardPlan } from './fasting-plan';
import { millisecondsPerMinute, type Instant } from './day';
import { isMeal } from './intake';

/**
 * The least minutes of what was taken. Where the item is not known it is everything that the answer
 * can mean: water for a sip, every meal and feed of the plan for a feed, anything otherwise.
 */
export function leastMinutesOf(
  plan: Pick<StandardPlan, 'stops' | 'leastMinutes'>,
  kind: 'nothing' | 'sip' | 'feed' | 'unsure',
  item?: Item,
): { readonly strictest: number; readonly mildest: number } {
  const isMeant = (candidate: Item): boolean => {
    if (item !== undefined) return candidate === item;
    if (kind === 'sip') return candidate === 'water';
    return kind === 'feed' ? isMeal(candidate) : true;
  };
  const minutes = plan.stops.filter((stop) => isMeant(stop.item)).map((stop) => stop.leastMinutes);
  if (minutes.length === 0) return { strictest: plan.leastMinutes, mildest: plan.leastMinutes };
  return { strictest: Math.max(...minutes), mildest: Math.min(...minutes) };
}

/** Practice: half an hour before the longest fast two things weigh the same, collecting and feeding. */
const collectBeforeCeilingMinutes = 30;

export type HungerCeiling = 'ok' | 'collect-or-feed' | 'feed';

/**
 * What the row of a child offers. From half an hour before the longest fast: collect now or feed;
 * at the ceiling: feed. Give the earlier reading of a doubtful time.
 */
export function hungerCeiling(request: {
  readonly lastIntakeAt: Instant;
  readonly longestMinutes: number;
  readonly now: Instant;
}): HungerCeiling {
  const { lastIntakeAt, longestMinutes, now } = request;
  const minutesLeft = longestMinutes - (now - lastIntakeAt) / millisecondsPerMinute;
  if (minutesLeft <= 0) return 'feed';
  return minutesLeft <= collectBeforeCeilingMinutes ? 'collect-or-feed' : 'ok';
}
