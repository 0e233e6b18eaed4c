/** After this many attempts a person is told instead. */
export const mostAttempts = 5;

const firstPauseMs = 15_000;
const growth = 3;
const longestPauseMs = 15 * 60_000;

/**
 * Pause after a failed attempt, in milliseconds: 15 s, 45 s, 2 min 15 s, 6 min 45 s, each up to a fifth longer or
 * shorter so that many messages that failed together do not come back together.
 * @param chance from 0 to 1.
 */
export function pauseAfter(attempts: number, chance: number): number {
  const pause = Math.min(firstPauseMs * growth ** Math.max(0, attempts - 1), longestPauseMs);
  return Math.round(pause * (0.8 + 0.4 * chance));
}
