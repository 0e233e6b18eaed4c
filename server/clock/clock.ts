import type { Sequelize } from 'sequelize';
import { select } from '../database/connection';

/**
 * The business clock: due times, mornings, messages. In rehearsal it can be moved; its offset lives in the database,
 * so that web, sender and stand-ins agree. Sessions, codes and limits use the real clock and never this one.
 */
export interface Clock {
  /** Epoch milliseconds. */
  now(): number;
  /** Reads the offset again; called by the poller and after a move. */
  refresh(): Promise<void>;
}

export function realClock(): Clock {
  return { now: () => Date.now(), refresh: () => Promise.resolve() };
}

export function movableClock(db: Sequelize): Clock {
  let offsetMs = 0;
  return {
    now: () => Date.now() + offsetMs,
    refresh: async () => {
      const [row] = await select<{ offset_ms: number }>(
        db,
        'SELECT offset_ms FROM clock WHERE id = 1',
      );
      offsetMs = row?.offset_ms ?? 0;
    },
  };
}
