/**
 * Who is next, with the reason. Only a suggestion: staff decide. Ready children first; among them
 * the one nearest its longest fast, then the youngest, then the booked time.
 */
import type { Explanation } from './explanation';
import { compareDays, millisecondsPerMinute, type Day, type Instant } from './day';

export interface WaitingChild {
  readonly childId: number;
  readonly bornOn: Day;
  readonly bookedAt: Instant;
  readonly arrivedAt: Instant | null;
  readonly isDoorChecked: boolean;
  /** When the least hours are over; null when a person still decides. */
  readonly readyAt: Instant | null;
  /** Since when it is hungry, by the earlier reading of a doubtful time; null when not known. */
  readonly hungryFromAt: Instant | null;
  readonly longestMinutes: number;
}

export interface RoomState {
  readonly id: number;
  /** When the air is clean again; null while a child is inside. */
  readonly freeAt: Instant | null;
}

export type NextReason =
  'longest-fast-near' | 'nearest-to-longest-fast' | 'youngest' | 'booked-first' | 'only-one-ready';

export type NextChild = { readonly explanation: Explanation } & (
  | { readonly childId: number; readonly roomId: number; readonly reason: NextReason }
  | { readonly childId: null; readonly reason: 'nobody-ready' | 'no-room-free' }
);

const nearMinutes = 30;
/** Children whose remaining time differs by less than this count as alike. */
const alikeMinutes = 15;

export function nextChild(request: {
  readonly waiting: readonly WaitingChild[];
  readonly rooms: readonly RoomState[];
  readonly now: Instant;
}): NextChild {
  const { waiting, rooms, now } = request;
  const ready = waiting.filter(
    (child) =>
      child.arrivedAt !== null &&
      child.isDoorChecked &&
      child.readyAt !== null &&
      child.readyAt <= now,
  );
  const explained = (rule: string, chosen: WaitingChild | null): Explanation => ({
    rule: `order-of-morning.${rule}`,
    inputs: {
      now,
      waiting: waiting.length,
      ready: ready.length,
      minutesLeft: chosen?.hungryFromAt == null ? null : Math.floor(minutesLeft(chosen, now)),
      bornOn: chosen?.bornOn ?? null,
      bookedAt: chosen?.bookedAt ?? null,
    },
  });
  const [first, ...others] = ready;
  if (!first)
    return {
      childId: null,
      reason: 'nobody-ready',
      explanation: explained('nobody-ready', null),
    };
  const room = rooms
    .filter(({ freeAt }) => freeAt !== null && freeAt <= now)
    .sort((left, right) => (left.freeAt ?? 0) - (right.freeAt ?? 0) || left.id - right.id)[0];
  if (!room)
    return {
      childId: null,
      reason: 'no-room-free',
      explanation: explained('no-room-free', first),
    };
  const suggest = (child: WaitingChild, otherwise: NextReason): NextChild => {
    const reason = minutesLeft(child, now) <= nearMinutes ? 'longest-fast-near' : otherwise;
    return {
      childId: child.childId,
      roomId: room.id,
      reason,
      explanation: explained(reason, child),
    };
  };
  if (others.length === 0) return suggest(first, 'only-one-ready');

  const least = Math.min(...ready.map((child) => minutesLeft(child, now)));
  const nearest = ready.filter(
    (child) => minutesLeft(child, now) === least || minutesLeft(child, now) - least < alikeMinutes,
  );
  const [hungriest] = nearest;
  if (hungriest && nearest.length === 1) return suggest(hungriest, 'nearest-to-longest-fast');
  const byAge = [...nearest].sort(
    (left, right) =>
      compareDays(right.bornOn, left.bornOn) ||
      left.bookedAt - right.bookedAt ||
      left.childId - right.childId,
  );
  const chosen = byAge[0] ?? first;
  return suggest(chosen, chosen.bornOn === byAge[1]?.bornOn ? 'booked-first' : 'youngest');
}

/** Until the longest fast; without a known last intake nothing presses. */
function minutesLeft(child: WaitingChild, now: Instant): number {
  if (child.hungryFromAt === null) return Number.POSITIVE_INFINITY;
  return child.longestMinutes - (now - child.hungryFromAt) / millisecondsPerMinute;
}
