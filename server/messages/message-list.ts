import type { MessageItem, MessageList, MessagesQuery } from '../../shared/contracts/messages';
import { messageSegments } from '../../shared/domain/message-segments';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach, withinReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { outboxHealth } from '../outbox/health';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { healthSays, kindSays, shownBody, stateSays } from './message-says';

interface MessageRow {
  id: number;
  kind: string;
  channel: 'sms' | 'mail';
  household_id: number;
  family_member_id: number | null;
  child_id: number | null;
  member_name: string | null;
  address: string;
  language: string;
  subject: string | null;
  body: string;
  state: MessageItem['state'];
  failure_says: string | null;
  due_at: Date;
  last_useful_at: Date;
  sent_at: Date | null;
  delivered_at: Date | null;
  ended_at: Date | null;
  attempts: number;
  segments: number | null;
}

const mostShown = 200;
const states: Readonly<Record<MessagesQuery['show'], readonly string[]>> = {
  all: ['queued', 'sending', 'sent', 'delivered', 'failed', 'given-up', 'withdrawn'],
  waiting: ['queued', 'sending'],
  sent: ['sent', 'delivered'],
  failed: ['failed', 'given-up'],
};

/**
 * The messages to the families within reach, the latest due first; of one child's household, of some states, by one
 * channel when asked.
 * @throws Problem 404 when the child is out of reach.
 */
export async function listMessages(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  { childId, show, channel }: MessagesQuery,
): Promise<MessageList> {
  const { db, clock } = context;
  const now = clock.now();
  const child = childId === null ? null : await childInReach(db, staff, childId);
  const reach = withinReach(staff);
  const where = `FROM messages message
     JOIN households ON households.id = message.household_id
     LEFT JOIN family_members member ON member.id = message.family_member_id
     WHERE ${reach.sql} AND message.state IN (:states)
       ${child ? 'AND message.household_id = :householdId' : ''}
       ${channel === null ? '' : 'AND message.channel = :channel'}`;
  const replacements = {
    ...reach.replacements,
    householdId: child?.householdId,
    states: states[show],
    channel,
  };
  const rows = await select<MessageRow>(
    db,
    `SELECT message.*, member.full_name AS member_name,
       (SELECT MIN(id) FROM children WHERE children.household_id = message.household_id) AS child_id
     ${where} ORDER BY message.due_at DESC, message.id DESC LIMIT ${mostShown}`,
    replacements,
  );
  const [counted] = await select<{ total: number }>(
    db,
    `SELECT COUNT(*) AS total ${where}`,
    replacements,
  );
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'messages',
    childIds: await childrenOf(context, [...new Set(rows.map((row) => row.household_id))]),
    at: now,
  });
  const words = clinicWords(staff.language);
  return {
    messages: rows.map((row) => itemOf(words, row, now)),
    total: counted?.total ?? rows.length,
    health: await outboxState(context, staff),
  };
}

function itemOf(words: ClinicWords, row: MessageRow, now: number): MessageItem {
  const { state, attempts, channel } = row;
  const hasFailed = state === 'failed' || state === 'given-up';
  return {
    id: row.id,
    kind: row.kind,
    kindSays: kindSays(words, row.kind),
    childId: row.child_id,
    familyMemberId: row.family_member_id,
    channel,
    to: row.member_name ?? row.address,
    address: row.address,
    language: row.language,
    subject: row.subject,
    body: shownBody(row.kind, row.body),
    state,
    stateSays: stateSays(words, {
      state,
      attempts,
      failureSays: row.failure_says,
      isDue: row.due_at.getTime() <= now,
    }),
    dueAt: row.due_at.toISOString(),
    sentAt: row.sent_at?.toISOString() ?? null,
    deliveredAt: row.delivered_at?.toISOString() ?? null,
    failedAt: hasFailed ? (row.ended_at?.toISOString() ?? null) : null,
    attempts,
    // The provider's own count where it took the text already.
    segments: channel === 'sms' ? (row.segments ?? messageSegments(row.body).segments) : null,
    mayRetry: hasFailed && row.last_useful_at.getTime() > now,
  };
}

/** Whether anything is stuck, for the banner on every screen. Nothing of a family is in it. */
export async function outboxState(
  { db, clock }: Context,
  staff: StaffMember,
): Promise<MessageList['health']> {
  const now = clock.now();
  const { waiting, oldestDueAt, isStuck, failures } = await outboxHealth(db, now);
  const health = { waiting, oldestDueAt, isStuck, failures, now };
  return {
    waiting,
    oldestDueAt: oldestDueAt === null ? null : new Date(oldestDueAt).toISOString(),
    isStuck,
    failures,
    says: healthSays(clinicWords(staff.language), health),
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
