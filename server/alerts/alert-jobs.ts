import type { Context } from '../context';
import { beat } from './heartbeat';
import { lookAtOutbox, noneLate } from './outbox-alerts';
import { alertOverdue } from './overdue-alerts';
import { passOnAlerts } from './pass-on-alerts';

interface AlertJob {
  readonly name: string;
  readonly everyMs: number;
  run(): Promise<unknown>;
}

const lookEveryMs = 45_000;

/** What the sender does so that whoever is not looking at a screen hears of what cannot wait. */
export function alertJobs(context: Pick<Context, 'db' | 'clock' | 'settings' | 'log'>): AlertJob[] {
  const { settings, log } = context;
  let late = noneLate;
  let isHealthy = false;
  let beatAt = 0;
  return [
    { name: 'passing alerts on', everyMs: 5_000, run: () => passOnAlerts(context) },
    { name: 'late reports', everyMs: 10 * 60_000, run: () => alertOverdue(context) },
    {
      name: 'what stands still',
      everyMs: lookEveryMs,
      run: async () => {
        // Until the look succeeds, nobody outside hears that all is well.
        isHealthy = false;
        ({ late, isHealthy } = await lookAtOutbox(context, late));
        const { heartbeat } = settings;
        // By the real clock: who watches from outside knows no other.
        if (heartbeat === null || !isHealthy || Date.now() - beatAt < heartbeat.everyMs) return;
        beatAt = Date.now();
        await beat(heartbeat.url, log);
      },
    },
  ];
}
