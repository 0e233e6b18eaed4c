import type { Sequelize } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';
import { announce } from '../live/announce';
import { providerCode } from '../channels/sms/provider-codes';
import { mostAttempts, pauseAfter } from './back-off';
import { giveUpOn, type GiveUp, type GivenUpMessage } from './give-up';
import { queueAgain } from './settle';

export interface DeliveryReport {
  readonly providerId: string;
  readonly status: string;
  readonly errorCode: string | null;
  /** Business clock, epoch milliseconds. */
  readonly receivedAt: number;
}

/**
 * Keeps a report of the provider, once for each text and status: reports come late, twice and out of order.
 * The sender applies them, so that a report can also arrive before the text is settled.
 */
export async function keepDeliveryReport(db: Sequelize, report: DeliveryReport): Promise<void> {
  await change(
    db,
    `INSERT IGNORE INTO delivery_reports (provider_id, status, error_code, received_at)
     VALUES (:providerId, :status, :errorCode, :receivedAt)`,
    { ...report, receivedAt: new Date(report.receivedAt) },
  );
}

interface Reported extends Omit<GivenUpMessage, 'callReason' | 'failure'> {
  readonly callReason: string | null;
  readonly state: 'queued' | 'sent' | 'failed' | 'given-up';
  readonly attempts: number;
  readonly isDelivered: number;
  readonly deliveredAt: Date | null;
  readonly errorCode: string | null;
  readonly lastUsefulAt: Date;
}

const reportsComeWithinMs = 3 * 86_400_000;

/** Every id under which the provider took a message: attempts that it reported lost may still arrive. */
const reportsOf = (columns: string, statuses: string): string =>
  `SELECT ${columns} FROM message_attempts a JOIN delivery_reports r ON r.provider_id = a.provider_id
   WHERE a.message_id = m.id AND r.status IN (${statuses})`;
const arrived = "'delivered', 'read'";
const lost = "'undelivered', 'failed'";

/** SQL: whether a message `m` that waits for another attempt has arrived after all, applied or not. */
export const hasArrivedSql = `m.provider_id IS NOT NULL AND EXISTS (${reportsOf('1', arrived)})`;

/**
 * Moves texts on by the reports that came: to 'delivered', or to 'failed' with a call; states only move forward, and
 * 'delivered' wins over everything, also while another attempt waits: a late report must not make a double. A handset
 * out of reach gets another attempt while that is useful.
 * @returns how many texts moved.
 */
export async function applyDeliveryReports(
  db: Sequelize,
  now: number,
  giveUp: GiveUp,
): Promise<number> {
  const since = new Date(now - reportsComeWithinMs);
  const ids = await select<{ id: number }>(
    db,
    `SELECT m.id FROM messages m
     WHERE m.state IN ('queued', 'sent', 'failed', 'given-up') AND m.next_try_at >= :since AND m.channel = 'sms'
       AND m.provider_id IS NOT NULL
       AND (EXISTS (${reportsOf('1', arrived)})
         OR m.state = 'sent' AND EXISTS (SELECT 1 FROM delivery_reports r
           WHERE r.provider_id = m.provider_id AND r.status IN (${lost})))
     ORDER BY m.id LIMIT 200`,
    { since },
  );
  for (const { id } of ids) await applyTo(db, id, now, giveUp);
  return ids.length;
}

async function applyTo(db: Sequelize, id: number, now: number, giveUp: GiveUp): Promise<void> {
  await inTransaction(db, async (transaction) => {
    const [message] = await select<Reported>(
      db,
      `SELECT m.id, m.state, m.kind, m.channel, m.household_id AS householdId, m.family_member_id AS familyMemberId,
         m.staff_id AS staffId, m.morning_on AS morningOn, m.call_reason AS callReason, m.attempts,
         m.last_useful_at AS lastUsefulAt,
         EXISTS (${reportsOf('1', arrived)}) AS isDelivered,
         (${reportsOf('MIN(r.received_at)', arrived)}) AS deliveredAt,
         (SELECT r.error_code FROM delivery_reports r
          WHERE r.provider_id = m.provider_id AND r.status IN (${lost}) LIMIT 1) AS errorCode
       FROM messages m WHERE m.id = :id AND m.state IN ('queued', 'sent', 'failed', 'given-up')
       FOR UPDATE SKIP LOCKED`,
      { id },
      transaction,
    );
    if (!message) return;
    if (message.isDelivered === 1) {
      await change(
        db,
        `UPDATE messages SET state = 'delivered', delivered_at = :deliveredAt, failure_code = NULL, failure_says = NULL,
           ended_at = :deliveredAt WHERE id = :id`,
        { id, deliveredAt: message.deliveredAt },
        transaction,
      );
      await announce(db, transaction, 'messages', id);
      return;
    }
    if (message.state !== 'sent') return;
    const code = message.errorCode ?? 'undelivered';
    const nextTryAt = now + pauseAfter(message.attempts + 1, Math.random());
    const known = providerCode(code);
    const canTryAgain =
      known?.kind === 'later' &&
      message.attempts < mostAttempts &&
      nextTryAt <= message.lastUsefulAt.getTime();
    const says = known?.says ?? 'The text service reports that this text did not arrive.';
    if (canTryAgain) await queueAgain(db, transaction, message, { code, says, nextTryAt });
    else await giveUpOn(db, transaction, giveUp, message, { code, says, at: now }, 'failed');
  });
}
