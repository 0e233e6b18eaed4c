import type { Transaction } from 'sequelize';
import type { SendInvitationAnswer } from '../../shared/contracts/children';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { issueInvitation } from '../auth/links';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { notFound } from '../http/problem';
import { announce } from '../live/announce';
import { recipientsOf } from './recipients';
import { tellMember } from './tell-member';

/** A second press on the button within this time is the same invitation. */
const sameInvitationMs = 2 * 60_000;
/** As long as the link in it can be opened. */
const usefulForMs = 48 * 3_600_000;

/** Invites an adult of a child within this staff member's reach. @throws Problem 404. */
export async function inviteFamilyMember(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  familyMemberId: number,
): Promise<SendInvitationAnswer> {
  const [childId] = await childrenOf(context, familyMemberId);
  if (childId === undefined) throw notFound('This family member');
  await childInReach(context.db, staff, childId).catch(() => {
    throw notFound('This family member');
  });
  return sendInvitation(context, actor, familyMemberId);
}

/** Sends a one-use link by text and e-mail, as this person has agreed to; where nothing may be sent, somebody calls. */
export async function sendInvitation(
  context: Context,
  actor: Actor,
  familyMemberId: number,
): Promise<SendInvitationAnswer> {
  const { db, clock, settings } = context;
  const now = clock.now();
  return inTransaction(db, async (transaction) => {
    // Locked, so that two presses at once are one after the other.
    await select(
      db,
      'SELECT id FROM family_members WHERE id = :familyMemberId FOR UPDATE',
      { familyMemberId },
      transaction,
    );
    const [recipient] = await recipientsOf(db, { familyMemberIds: [familyMemberId] }, transaction);
    if (!recipient) throw notFound('This family member');
    const recent = await select<{ channel: 'sms' | 'mail' }>(
      db,
      `SELECT channel FROM messages WHERE kind = 'invitation' AND family_member_id = :familyMemberId
         AND created_at > :since AND state <> 'withdrawn' ORDER BY id`,
      { familyMemberId, since: new Date(now - sameInvitationMs) },
      transaction,
    );
    if (recent.length > 0)
      return { channels: [...new Set(recent.map(({ channel }) => channel))], callReason: null };
    const childIds = await childrenOf(context, familyMemberId, transaction);
    const { householdId } = recipient;
    const { url } = await issueInvitation(db, transaction, settings, {
      familyMemberId,
      householdId,
    });
    const answer = await tellMember(context, transaction, recipient, {
      kind: 'invitation',
      prefix: 'message.invitation',
      params: { url },
      dedupe: `invitation:${now}`,
      callReason: 'invitation-failed',
      childId: childIds[0] ?? null,
      usefulForMs,
    });
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'invitation',
      childIds,
      detail: { familyMemberId, ...answer },
      at: now,
    });
    await announce(db, transaction, 'children', childIds[0] ?? null);
    return answer;
  });
}

async function childrenOf(
  { db }: Context,
  familyMemberId: number,
  transaction?: Transaction,
): Promise<number[]> {
  const rows = await select<{ child_id: number }>(
    db,
    `SELECT child_id FROM child_family_members WHERE family_member_id = :familyMemberId ORDER BY child_id`,
    { familyMemberId },
    transaction,
  );
  return rows.map((row) => row.child_id);
}
