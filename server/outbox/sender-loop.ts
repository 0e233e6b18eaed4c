import { setMaxListeners } from 'node:events';
import type { Logger } from 'pino';
import type { Sender } from './sender';

/** Work that runs again and again beside the sending, for example sealing. */
export interface PeriodicJob {
  readonly name: string;
  readonly everyMs: number;
  run(): Promise<unknown>;
}

export interface SenderLoop {
  /** Takes nothing more, finishes what is in flight and what runs. */
  stop(): Promise<void>;
}

export interface SenderLoopParts {
  readonly sender: Sender;
  readonly log: Logger;
  /** Before each look: reads the business clock. */
  readonly refresh: () => Promise<void>;
  readonly jobs?: readonly PeriodicJob[];
  readonly idleMs?: number;
}

const pauseAfterErrorMs = 2_000;
const handsMs = 10;

/** Sends what falls due until it is stopped. An error is logged and the loop goes on: the next look may succeed. */
export function runSender(parts: SenderLoopParts): SenderLoop {
  const { sender, log, refresh } = parts;
  const idleMs = parts.idleMs ?? 400;
  const stopping = new AbortController();
  const { signal } = stopping;
  // One listener a job and one for the sending itself.
  setMaxListeners(0, signal);

  async function sending(): Promise<void> {
    while (!signal.aborted) {
      try {
        // With every hand busy a look would find nothing and rest, although much is due.
        await sender.handFree();
        await refresh();
        const taken = await sender.tick();
        if (taken === 0) await pause(idleMs, signal);
        // Gives the hands that are busy a moment before the next look.
        else await pause(handsMs, signal);
      } catch (error) {
        log.error({ err: error }, 'The outbox could not be read');
        await pause(pauseAfterErrorMs, signal);
      }
    }
    await sender.settled();
  }

  async function repeating(job: PeriodicJob): Promise<void> {
    while (!signal.aborted) {
      try {
        await job.run();
      } catch (error) {
        log.error({ err: error, job: job.name }, 'A periodic job failed');
      }
      await pause(job.everyMs, signal);
    }
  }

  const running = Promise.all([sending(), ...(parts.jobs ?? []).map(repeating)]);
  return {
    stop: async () => {
      stopping.abort();
      await running;
    },
  };
}

/** Waits, or ends at once when stopped. */
function pause(ms: number, signal: AbortSignal): Promise<void> {
  if (signal.aborted) return Promise.resolve();
  return new Promise((resolve) => {
    const end = () => {
      clearTimeout(timer);
      signal.removeEventListener('abort', end);
      resolve();
    };
    const timer = setTimeout(end, ms);
    signal.addEventListener('abort', end);
  });
}
