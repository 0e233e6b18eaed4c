// What the person at the terminal reads while something is under way.

/** A failure told in words; the stack would not help whoever reads it. */
export class PlainFailure extends Error {
  constructor(message, exitCode = 1) {
    super(message);
    this.name = 'PlainFailure';
    this.exitCode = exitCode;
  }
}

const heartbeatMs = 10_000;

export function seconds(ms) {
  return `${(ms / 1000).toFixed(1)} s`;
}

export function say(line = '') {
  process.stdout.write(`${line}\n`);
}

/**
 * Runs a step and says how long it took; a long one says every ten seconds that it still runs.
 * `quietBelowMs` keeps steps that had nothing to do off the screen.
 */
export async function step(title, work, { quietBelowMs = 0 } = {}) {
  const startedAt = Date.now();
  if (quietBelowMs === 0) say(`  ${title} ...`);
  const heartbeat = setInterval(
    () => say(`  ${title}: still at it after ${Math.round((Date.now() - startedAt) / 1000)} s`),
    heartbeatMs,
  );
  try {
    const result = await work();
    const tookMs = Date.now() - startedAt;
    if (tookMs >= quietBelowMs) say(`  ${title}: done in ${seconds(tookMs)}`);
    return result;
  } finally {
    clearInterval(heartbeat);
  }
}
