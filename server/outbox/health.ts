import type { Sequelize } from 'sequelize';
import { select } from '../database/connection';

export interface OutboxHealth {
  /** Due and not sent yet. */
  readonly waiting: number;
  readonly sending: number;
  /** When the longest waiting message was due, epoch milliseconds. */
  readonly oldestDueAt: number | null;
  /** Nothing went out although something was due for minutes. */
  readonly isStuck: boolean;
}

const stuckAfterMs = 5 * 60_000;

/** @param now business clock, epoch milliseconds. */
export async function outboxHealth(db: Sequelize, now: number): Promise<OutboxHealth> {
  const [row] = await select<{ waiting: number; sending: number; oldestDueAt: Date | null }>(
    db,
    `SELECT COUNT(CASE WHEN state = 'queued' THEN 1 END) AS waiting,
            COUNT(CASE WHEN state = 'sending' THEN 1 END) AS sending,
            MIN(next_try_at) AS oldestDueAt
     FROM messages WHERE state IN ('queued', 'sending') AND next_try_at <= :now`,
    { now: new Date(now) },
  );
  const oldestDueAt = row?.oldestDueAt?.getTime() ?? null;
  return {
    waiting: row?.waiting ?? 0,
    sending: row?.sending ?? 0,
    oldestDueAt,
    isStuck: oldestDueAt !== null && now - oldestDueAt > stuckAfterMs,
  };
}
