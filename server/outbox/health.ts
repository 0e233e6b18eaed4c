import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';

export interface OutboxHealth {
  /** Due and not sent yet. */
  readonly waiting: number;
  readonly sending: number;
  /** When the longest waiting message was due, epoch milliseconds. */
  readonly oldestDueAt: number | null;
  /** Nothing went out although something was due for minutes. */
  readonly isStuck: boolean;
  /** Given up, or reported as lost, in the last day. */
  readonly failures: number;
}

const stuckAfterMs = 5 * 60_000;
const dayMs = 86_400_000;

/**
 * Counts by the due time, not by the next try: a service that refuses everything is tried again and again and never looks
 * late otherwise. A text that the service took once and lost waits for the telephone, not for us.
 * @param now business clock, epoch milliseconds.
 */
export async function outboxHealth(db: Sequelize, now: number): Promise<OutboxHealth> {
  const [row] = await select<{ waiting: number; sending: number; oldestDueAt: Date | null }>(
    db,
    `SELECT COUNT(CASE WHEN state = 'queued' THEN 1 END) AS waiting,
            COUNT(CASE WHEN state = 'sending' THEN 1 END) AS sending,
            MIN(due_at) AS oldestDueAt
     FROM messages WHERE state IN ('queued', 'sending') AND due_at <= :now AND provider_id IS NULL`,
    { now: new Date(now) },
  );
  const [failed] = await select<{ failures: number }>(
    db,
    `SELECT COUNT(*) AS failures FROM messages
     WHERE ended_at > :since AND state IN ('failed', 'given-up') AND failure_code <> 'opted-out'`,
    { since: new Date(now - dayMs) },
  );
  const oldestDueAt = row?.oldestDueAt?.getTime() ?? null;
  return {
    waiting: row?.waiting ?? 0,
    sending: row?.sending ?? 0,
    oldestDueAt,
    isStuck: oldestDueAt !== null && now - oldestDueAt > stuckAfterMs,
    failures: failed?.failures ?? 0,
  };
}

export type Channel = 'sms' | 'mail';

export interface ChannelHealth {
  readonly channel: Channel;
  /** The message that has waited longest beyond its time; null when none is late. */
  readonly lateMessageId: number | null;
  /** In the last half hour several numbers or addresses were given up and nothing went out. */
  readonly isRefused: boolean;
}

const refusedWithinMs = 30 * 60_000;
const refusedAtLeast = 3;
/** These ended by what we or the family decided, not by the service. */
const ownCodes = ['opted-out', 'care-limit', 'too-late'];

/** Each way out by itself: when one of them stands still, staff is told by the other. @param now business clock. */
export async function channelHealth(
  db: Sequelize,
  now: number,
  transaction?: Transaction,
): Promise<Record<Channel, ChannelHealth>> {
  const late = await select<{ channel: Channel; id: number }>(
    db,
    `SELECT channel, MIN(id) AS id FROM messages
     WHERE state IN ('queued', 'sending') AND due_at < :lateSince AND provider_id IS NULL GROUP BY channel`,
    { lateSince: new Date(now - stuckAfterMs) },
    transaction,
  );
  const since = new Date(now - refusedWithinMs);
  const failed = await select<{ channel: Channel; addresses: number }>(
    db,
    `SELECT channel, COUNT(DISTINCT address) AS addresses FROM messages
     WHERE ended_at > :since AND state IN ('failed', 'given-up') AND failure_code NOT IN (:ownCodes)
     GROUP BY channel`,
    { since, ownCodes },
    transaction,
  );
  const went = failed.some(({ addresses }) => addresses >= refusedAtLeast)
    ? await select<{ channel: Channel }>(
        db,
        `SELECT DISTINCT channel FROM messages
         WHERE state IN ('sent', 'delivered') AND next_try_at > :since AND sent_at > :since`,
        { since },
        transaction,
      )
    : [];
  const of = (channel: Channel): ChannelHealth => ({
    channel,
    lateMessageId: late.find((row) => row.channel === channel)?.id ?? null,
    isRefused:
      (failed.find((row) => row.channel === channel)?.addresses ?? 0) >= refusedAtLeast &&
      !went.some((row) => row.channel === channel),
  });
  return { sms: of('sms'), mail: of('mail') };
}
