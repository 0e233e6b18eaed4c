import type { Sequelize, Transaction } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';
import { announce } from '../live/announce';
import type { DeliveryFailure } from '../channels/delivery-failure';
import { mostAttempts, pauseAfter } from './back-off';
import type { ClaimedMessage } from './claimed-message';
import { giveUpOn, type GiveUp } from './give-up';

export interface Settling {
  readonly db: Sequelize;
  readonly giveUp: GiveUp;
  readonly claimedBy: string;
  /** Business clock, epoch milliseconds. */
  readonly now: number;
}

/**
 * Runs the work when this sender still holds the message; another one may have taken it over meanwhile.
 * @returns whether it did.
 */
async function whenStillOurs(
  { db, claimedBy }: Settling,
  message: ClaimedMessage,
  work: (transaction: Transaction) => Promise<void>,
): Promise<boolean> {
  return inTransaction(db, async (transaction) => {
    const rows = await select(
      db,
      `SELECT id FROM messages WHERE id = :id AND state = 'sending' AND claimed_by = :claimedBy FOR UPDATE`,
      { id: message.id, claimedBy },
      transaction,
    );
    if (rows.length === 0) return false;
    await work(transaction);
    return true;
  });
}

export function settleSent(
  settling: Settling,
  message: ClaimedMessage,
  sent: { readonly providerId: string; readonly segments: number | null },
): Promise<boolean> {
  const { db, now, claimedBy } = settling;
  // One statement finds out whether it is still ours and settles it: this runs for every message there is.
  return inTransaction(db, async (transaction) => {
    const settled = await change(
      db,
      `UPDATE messages SET state = 'sent', provider_id = :providerId, segments = :segments, sent_at = :now,
         claimed_by = NULL, claimed_until = NULL, failure_code = NULL, failure_says = NULL
       WHERE id = :id AND state = 'sending' AND claimed_by = :claimedBy`,
      { id: message.id, ...sent, claimedBy, now: new Date(now) },
      transaction,
    );
    if (settled === 0) return false;
    await change(
      db,
      `INSERT IGNORE INTO message_attempts (message_id, provider_id, taken_at)
       VALUES (:id, :providerId, :now)`,
      { id: message.id, providerId: sent.providerId, now: new Date(now) },
      transaction,
    );
    await announce(db, transaction, 'messages', message.id);
    return true;
  });
}

/** The number says at the provider that it wants no texts, which we had not heard: 21610. */
const optedOutAtProvider = '21610';

/** A refusal ends the message; anything else brings it back later, unless it was the last attempt. */
export function settleFailed(
  settling: Settling,
  message: ClaimedMessage,
  failure: DeliveryFailure,
): Promise<boolean> {
  const { db, giveUp, now } = settling;
  return whenStillOurs(settling, message, async (transaction) => {
    const says = { code: failure.code, says: failure.message };
    if (failure.code === optedOutAtProvider)
      await rememberOptOut(db, transaction, message.address, now);
    if (failure.kind === 'refused' || message.attempts >= mostAttempts)
      await giveUpOn(db, transaction, giveUp, message, { ...says, at: now });
    else
      await queueAgain(db, transaction, message, {
        ...says,
        nextTryAt: now + pauseAfter(message.attempts, Math.random()),
      });
  });
}

/** Back into the queue; the claim decides then whether it is still of use and still wanted. */
export async function queueAgain(
  db: Sequelize,
  transaction: Transaction,
  message: Pick<ClaimedMessage, 'id'>,
  {
    code,
    says,
    nextTryAt,
  }: { readonly code: string; readonly says: string; readonly nextTryAt: number },
): Promise<void> {
  await change(
    db,
    `UPDATE messages SET state = 'queued', next_try_at = :nextTryAt, failure_code = :code, failure_says = :says,
       claimed_by = NULL, claimed_until = NULL WHERE id = :id`,
    {
      id: message.id,
      nextTryAt: new Date(nextTryAt),
      code: code.slice(0, 40),
      says: says.slice(0, 300),
    },
    transaction,
  );
}

/** Nobody knows whether the attempt arrived: the claim is kept for a while, then the provider is asked. */
export function keepInDoubt(
  settling: Settling,
  message: ClaimedMessage,
  { failure, askAt }: { readonly failure: DeliveryFailure; readonly askAt: number },
): Promise<boolean> {
  const { db } = settling;
  return whenStillOurs(settling, message, async (transaction) => {
    await change(
      db,
      `UPDATE messages SET claimed_until = :askAt, failure_code = :code, failure_says = :says WHERE id = :id`,
      {
        id: message.id,
        askAt: new Date(askAt),
        code: failure.code.slice(0, 40),
        says: failure.message.slice(0, 300),
      },
      transaction,
    );
  });
}

export function settleGivenUp(
  settling: Settling,
  message: ClaimedMessage,
  failure: { readonly code: string; readonly says: string },
): Promise<boolean> {
  return whenStillOurs(settling, message, (transaction) =>
    giveUpOn(settling.db, transaction, settling.giveUp, message, { ...failure, at: settling.now }),
  );
}

export function settleQueuedAgain(settling: Settling, message: ClaimedMessage): Promise<boolean> {
  return whenStillOurs(settling, message, (transaction) =>
    queueAgain(settling.db, transaction, message, {
      code: 'sent-again',
      says: 'The attempt before was cut off and had not arrived.',
      nextTryAt: settling.now,
    }),
  );
}

async function rememberOptOut(
  db: Sequelize,
  transaction: Transaction,
  address: string,
  now: number,
): Promise<void> {
  await change(
    db,
    `INSERT INTO opt_outs (channel, address, said, since_at)
     SELECT 'sms', :address, 'reported by the text service', :now FROM DUAL
     WHERE NOT EXISTS (SELECT 1 FROM opt_outs
                       WHERE channel = 'sms' AND address = :address AND ended_at IS NULL)`,
    { address, now: new Date(now) },
    transaction,
  );
}
