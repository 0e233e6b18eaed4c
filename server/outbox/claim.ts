import type { Sequelize, Transaction } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';
import type { ClaimedMessage } from './claimed-message';
import { exceedsCareLimit } from './care-limit';
import { hasArrivedSql } from './delivery-reports';
import { giveUpOn, type GiveUp } from './give-up';

export interface Claim {
  /** This sender, unlike any other. */
  readonly claimedBy: string;
  /** Business clock, epoch milliseconds. */
  readonly now: number;
  /** End of the claim by the real clock: moving the business clock must not free what is in flight. */
  readonly claimedUntil: number;
  readonly atMost: number;
}

const columns = `id, kind, channel, household_id AS householdId, family_member_id AS familyMemberId,
  staff_id AS staffId, address, subject, body, calendar, calendar_method AS calendarMethod, call_reason AS callReason,
  morning_on AS morningOn, due_at AS dueAt, last_useful_at AS lastUsefulAt, created_at AS createdAt, attempts,
  is_without_consent AS isWithoutConsent`;

/** The one text that may still go to a number that opted out: saying so, within five minutes (FCC, 47 CFR 64.1200). */
const optOutConfirmation = 'opt-out-confirmation';
const confirmationWithinMs = 5 * 60_000;

/**
 * Takes due messages for one sender. In the same short transaction it gives up those that are of no use any more and
 * those to numbers that opted out; the attempt is counted before it is made.
 * Raw SQL, because the library drops SKIP LOCKED for this database without a word.
 */
export async function claimMessages(
  db: Sequelize,
  claim: Claim,
  giveUp: GiveUp,
): Promise<{ readonly claimed: readonly ClaimedMessage[]; readonly givenUp: number }> {
  return inTransaction(db, async (transaction) => {
    const due = await select<ClaimedMessage>(
      db,
      `SELECT ${columns} FROM messages m WHERE state = 'queued' AND next_try_at <= :now AND NOT (${hasArrivedSql})
       ORDER BY next_try_at, id LIMIT :atMost FOR UPDATE SKIP LOCKED`,
      { now: new Date(claim.now), atMost: claim.atMost },
      transaction,
    );
    if (due.length === 0) return { claimed: [], givenUp: 0 };
    const optedOut = await optOutsOf(db, transaction, due);
    const useful: ClaimedMessage[] = [];
    for (const message of due) {
      const since = message.channel === 'sms' ? optedOut.get(message.address) : undefined;
      if (since !== undefined && !mayConfirm(message, since))
        await giveUpOn(db, transaction, giveUp, message, {
          code: 'opted-out',
          says: 'This number wants no texts.',
          at: claim.now,
        });
      else if (claim.now > message.lastUsefulAt.getTime())
        await giveUpOn(db, transaction, giveUp, message, {
          code: 'too-late',
          says: 'Its time had passed before it could be sent.',
          at: claim.now,
        });
      else if (await exceedsCareLimit(db, transaction, message, useful, claim.now))
        await giveUpOn(db, transaction, giveUp, message, {
          code: 'care-limit',
          says: 'No consent is on file, and this number has had its texts of the day or the week.',
          at: claim.now,
        });
      else useful.push(message);
    }
    const givenUp = due.length - useful.length;
    if (useful.length === 0) return { claimed: [], givenUp };
    await change(
      db,
      `UPDATE messages SET state = 'sending', attempts = attempts + 1, claimed_by = :claimedBy, claimed_until = :until
       WHERE id IN (:ids)`,
      {
        claimedBy: claim.claimedBy,
        until: new Date(claim.claimedUntil),
        ids: useful.map((message) => message.id),
      },
      transaction,
    );
    return {
      claimed: useful.map((message) => ({ ...message, attempts: message.attempts + 1 })),
      givenUp,
    };
  });
}

/** Takes what another sender left in the middle: its claim has run out and nobody knows how the attempt ended. */
export async function claimAbandoned(
  db: Sequelize,
  claim: Omit<Claim, 'now'> & { readonly realNow: number },
): Promise<ClaimedMessage[]> {
  return inTransaction(db, async (transaction) => {
    const abandoned = await select<ClaimedMessage>(
      db,
      `SELECT ${columns} FROM messages WHERE state = 'sending' AND claimed_until <= :realNow
       ORDER BY id LIMIT :atMost FOR UPDATE SKIP LOCKED`,
      { realNow: new Date(claim.realNow), atMost: claim.atMost },
      transaction,
    );
    if (abandoned.length === 0) return [];
    await change(
      db,
      'UPDATE messages SET claimed_by = :claimedBy, claimed_until = :until WHERE id IN (:ids)',
      {
        claimedBy: claim.claimedBy,
        until: new Date(claim.claimedUntil),
        ids: abandoned.map((message) => message.id),
      },
      transaction,
    );
    return abandoned;
  });
}

async function optOutsOf(
  db: Sequelize,
  transaction: Transaction,
  messages: readonly ClaimedMessage[],
): Promise<Map<string, number>> {
  const numbers = messages.filter(({ channel }) => channel === 'sms').map(({ address }) => address);
  if (numbers.length === 0) return new Map();
  const rows = await select<{ address: string; sinceAt: Date }>(
    db,
    `SELECT address, MAX(since_at) AS sinceAt FROM opt_outs
     WHERE channel = 'sms' AND address IN (:numbers) AND ended_at IS NULL GROUP BY address`,
    { numbers },
    transaction,
  );
  return new Map(rows.map(({ address, sinceAt }) => [address, sinceAt.getTime()]));
}

const mayConfirm = ({ kind, createdAt }: ClaimedMessage, since: number): boolean =>
  kind === optOutConfirmation && createdAt.getTime() - since <= confirmationWithinMs;
