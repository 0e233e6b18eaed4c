import { afterQuietHours } from '../../shared/domain/quiet-hours';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { forLetters } from './letter-waiting';
import { recipientsOf, type Recipient } from './recipients';
import { siteOfHousehold } from './tell-member';
import { letterKinds } from './withdraw-waiting';

interface FailedRow {
  id: number;
  kind: string;
  channel: 'sms' | 'mail';
  state: string;
  address: string;
  household_id: number;
  family_member_id: number | null;
  morning_on: string | null;
  last_useful_at: Date;
}

/**
 * Queues a message again that has failed, with the same words. The call that was raised for it stays until it arrives.
 * @throws Problem 404 out of reach, 409 when it has not failed, is of no use any more, was replaced, or may not go there.
 */
export async function retryMessage(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  messageId: number,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const reach = withinReach(staff);
  await inTransaction(db, async (transaction) => {
    await select(
      db,
      'SELECT id FROM messages WHERE id = :messageId FOR UPDATE',
      { messageId },
      transaction,
    );
    const [row] = await select<FailedRow>(
      db,
      `SELECT message.* FROM messages message JOIN households ON households.id = message.household_id
       WHERE message.id = :messageId AND ${reach.sql}`,
      { ...reach.replacements, messageId },
      transaction,
    );
    if (!row) throw notFound('This message');
    // A second press finds it on its way.
    if (row.state === 'queued' || row.state === 'sending') return;
    if (row.state !== 'failed' && row.state !== 'given-up')
      throw new Problem(409, 'not-failed', 'This message has not failed.');
    if (row.last_useful_at.getTime() <= now)
      throw new Problem(409, 'too-late', 'Its time is over. Call the family.');
    const familyMemberIds = row.family_member_id === null ? [] : [row.family_member_id];
    const [recipient] = await recipientsOf(db, { familyMemberIds }, transaction);
    if (!recipient || !mayGoTo(recipient, row))
      throw new Problem(
        409,
        'may-not-be-written',
        'This person may not be written to there. Call the family.',
      );
    const newer = await select(
      db,
      `SELECT id FROM messages WHERE id > :messageId AND household_id = :householdId AND kind = :kind
         AND channel = :channel AND family_member_id = :familyMemberId AND morning_on <=> :morningOn
         AND state <> 'withdrawn' LIMIT 1`,
      {
        messageId,
        householdId: row.household_id,
        kind: row.kind,
        channel: row.channel,
        familyMemberId: row.family_member_id,
        morningOn: row.morning_on,
      },
      transaction,
    );
    if (newer.length > 0)
      throw new Problem(409, 'replaced', 'A newer message has taken its place.');
    const { zone } = await siteOfHousehold(context, row.household_id, transaction);
    const at = row.channel === 'sms' ? afterQuietHours(now, zone, recipient.mayTextEarly) : now;
    if (at > row.last_useful_at.getTime())
      throw new Problem(409, 'quiet-hours', 'It would come in the quiet hours. Call the family.');
    await change(
      db,
      `UPDATE messages SET state = 'queued', attempts = 0, next_try_at = :at, ended_at = NULL
       WHERE id = :messageId`,
      { messageId, at: new Date(at) },
      transaction,
    );
    const children = await select<{ id: number }>(
      db,
      'SELECT id FROM children WHERE household_id = :householdId',
      { householdId: row.household_id },
      transaction,
    );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'messages',
      childIds: children.map(({ id }) => id),
      detail: { messageId, kind: row.kind, retried: true },
      at: now,
    });
    await announce(db, transaction, 'messages', messageId);
  });
}

/** Still agreed to for what it is about, not opted out, and still this person's number. */
function mayGoTo(recipient: Recipient, { kind, channel, address }: FailedRow): boolean {
  const { mayText, mayMail } = letterKinds.includes(kind) ? forLetters(recipient) : recipient;
  return channel === 'sms'
    ? mayText && recipient.phone === address
    : mayMail && recipient.email === address;
}
