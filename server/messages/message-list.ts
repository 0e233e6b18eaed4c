import type { MessageList } from '../../shared/contracts/messages';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach, withinReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { outboxHealth } from '../outbox/health';
import { clinicWords } from '../wording/clinic-words';
import { healthSays, shownBody, stateSays } from './message-says';

interface MessageRow {
  id: number;
  kind: string;
  channel: 'sms' | 'mail';
  household_id: number;
  member_name: string | null;
  address: string;
  language: string;
  subject: string | null;
  body: string;
  state: MessageList['messages'][number]['state'];
  failure_says: string | null;
  due_at: Date;
  sent_at: Date | null;
  delivered_at: Date | null;
  attempts: number;
  segments: number | null;
}

const mostShown = 200;

/**
 * The messages to the families within reach, the latest due first; of one child's household when asked.
 * @throws Problem 404 when the child is out of reach.
 */
export async function listMessages(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  { childId }: { readonly childId: number | null },
): Promise<MessageList> {
  const { db, clock } = context;
  const now = clock.now();
  const words = clinicWords(staff.language);
  const child = childId === null ? null : await childInReach(db, staff, childId);
  const reach = withinReach(staff);
  const rows = await select<MessageRow>(
    db,
    `SELECT message.*, member.full_name AS member_name FROM messages message
     JOIN households ON households.id = message.household_id
     LEFT JOIN family_members member ON member.id = message.family_member_id
     WHERE ${reach.sql} ${child ? 'AND message.household_id = :householdId' : ''}
     ORDER BY message.due_at DESC, message.id DESC LIMIT ${mostShown}`,
    { ...reach.replacements, householdId: child?.householdId },
  );
  const health = await outboxHealth(db, now);
  const { waiting, oldestDueAt, isStuck } = health;
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'messages',
    childIds: await childrenOf(context, [...new Set(rows.map((row) => row.household_id))]),
    at: now,
  });
  return {
    messages: rows.map((row) => ({
      id: row.id,
      kind: row.kind,
      channel: row.channel,
      to: row.member_name ?? row.address,
      address: row.address,
      language: row.language,
      subject: row.subject,
      body: shownBody(row.kind, row.body),
      state: row.state,
      stateSays: stateSays(words, {
        state: row.state,
        attempts: row.attempts,
        failureSays: row.failure_says,
        isDue: row.due_at.getTime() <= now,
      }),
      dueAt: row.due_at.toISOString(),
      sentAt: row.sent_at?.toISOString() ?? null,
      deliveredAt: row.delivered_at?.toISOString() ?? null,
      attempts: row.attempts,
      segments: row.segments,
    })),
    health: {
      waiting,
      oldestDueAt: oldestDueAt === null ? null : new Date(oldestDueAt).toISOString(),
      isStuck,
      says: healthSays(words, { waiting, oldestDueAt, isStuck, now }),
    },
  };
}

async function childrenOf({ db }: Context, householdIds: readonly number[]): Promise<number[]> {
  if (householdIds.length === 0) return [];
  const rows = await select<{ id: number }>(
    db,
    'SELECT id FROM children WHERE household_id IN (:householdIds)',
    { householdIds },
  );
  return rows.map((row) => row.id);
}
