import type { MoveClockRequest } from '../../shared/contracts/rehearsal';
import { moveClock } from '../clock/move-clock';
import type { Context } from '../context';
import { select } from '../database/connection';

/** Messages this close together go out in one step. */
const sameStepMs = 10 * 60_000;
const stepWaitsAtMostMs = 4_000;
const moveTakesAtMostMs = 25_000;
const looksEveryMs = 100;

/**
 * Moves the clock, stopping wherever a message falls due on the way until it has gone out: a night that is skipped over
 * would otherwise leave messages whose time had passed. When nothing goes out, the rest is jumped.
 * @throws Problem 422 when the moment is not still to come.
 */
export async function moveThrough(
  context: Context,
  request: MoveClockRequest,
): Promise<{ done: true }> {
  const { clock } = context;
  await clock.refresh();
  const to = 'to' in request ? Date.parse(request.to) : clock.now() + request.minutes * 60_000;
  // Refused like any other move when it would go backward.
  if (to <= clock.now()) await moveClock(context, to);
  const mayStepUntil = performance.now() + moveTakesAtMostMs;
  while (to > clock.now() && performance.now() < mayStepUntil) {
    const stop = await nextStop(context, to);
    if (stop === null) break;
    if (stop > clock.now()) await moveClock(context, stop);
    if (!(await isDrained(context))) break;
  }
  // The steps themselves take a few seconds; a short move may be over by now.
  if (to > clock.now()) await moveClock(context, to);
  return { done: true };
}

interface Waiting {
  readonly nextTryAt: Date;
  readonly lastUsefulAt: Date;
}

/** Where to stop next: late enough for messages that are due close together, in time for each of them. */
async function nextStop({ db }: Context, to: number): Promise<number | null> {
  const waiting = await select<Waiting>(
    db,
    `SELECT next_try_at AS nextTryAt, last_useful_at AS lastUsefulAt FROM messages
     WHERE state = 'queued' AND next_try_at < :to ORDER BY next_try_at, id LIMIT 200`,
    { to: new Date(to) },
  );
  const [first] = waiting;
  if (!first) return null;
  let stop = first.nextTryAt.getTime();
  let latest = first.lastUsefulAt.getTime();
  for (const { nextTryAt, lastUsefulAt } of waiting) {
    const at = nextTryAt.getTime();
    latest = Math.min(latest, lastUsefulAt.getTime());
    if (at > first.nextTryAt.getTime() + sameStepMs || at > latest) break;
    stop = Math.max(stop, at);
  }
  return stop;
}

/** Waits until nothing is due any more. @returns false when that takes too long: the sender may not be running. */
async function isDrained({ db, clock }: Context): Promise<boolean> {
  const giveUpAt = performance.now() + stepWaitsAtMostMs;
  while (performance.now() < giveUpAt) {
    const due = await select(
      db,
      `SELECT id FROM messages WHERE state IN ('queued', 'sending') AND next_try_at <= :now LIMIT 1`,
      { now: new Date(clock.now()) },
    );
    if (due.length === 0) return true;
    await new Promise((resolve) => setTimeout(resolve, looksEveryMs));
  }
  return false;
}
