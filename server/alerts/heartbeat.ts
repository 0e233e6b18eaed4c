import type { Logger } from 'pino';

/** The watching service gets this long to answer. */
const answersWithinMs = 10_000;

/**
 * Tells a service outside that messages go out. It is that service which alarms when it hears nothing: of a sender that
 * is dead nothing inside could tell. A failure is logged and nothing more. No word about the clinic travels with it.
 */
export async function beat(address: string, log: Logger): Promise<boolean> {
  try {
    const answer = await fetch(address, {
      redirect: 'error',
      signal: AbortSignal.timeout(answersWithinMs),
      headers: { 'User-Agent': 'threedawn' },
    });
    await answer.body?.cancel();
    if (answer.ok) return true;
    log.warn({ status: answer.status }, 'The heartbeat was not taken');
  } catch (error) {
    // The address holds the secret of whoever watches: it stays out of the log.
    log.warn(
      { says: error instanceof Error ? error.name : 'unknown' },
      'The heartbeat did not arrive',
    );
  }
  return false;
}
