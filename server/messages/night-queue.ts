import type { Transaction } from 'sequelize';
import type { MessageKind } from '../../shared/domain/message-plan';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { announce } from '../live/announce';
import { enqueue } from '../outbox/enqueue';
import { dedupeKeyOf, factsInKey, factsOf, type DraftMessage } from './draft-message';

export interface HouseholdDay {
  readonly householdId: number;
  /** The day of the mornings. */
  readonly on: string;
}

export interface QueuedMessage {
  readonly key: string;
  readonly kind: string;
  readonly channel: string;
  readonly familyMemberId: number | null;
  readonly state: string;
  readonly lastUsefulAt: Date;
}

export interface WantedMessage extends DraftMessage {
  readonly dedupeKey: string;
  /** The person has heard exactly this last: nothing new is queued for it. */
  readonly isTold: boolean;
}

/** What planning a night anew queues and takes back. */
export const nightKinds: readonly MessageKind[] = [
  'ahead',
  'evening',
  'reminder',
  'morning',
  'nudge',
];

/** What this household's night has in the outbox, in the order in which it came there. */
export async function queueOf(
  { db }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
): Promise<QueuedMessage[]> {
  return select<QueuedMessage>(
    db,
    `SELECT dedupe_key AS \`key\`, kind, channel, family_member_id AS familyMemberId, state,
       last_useful_at AS lastUsefulAt FROM messages
     WHERE household_id = :householdId AND morning_on = :on AND kind IN (:nightKinds) ORDER BY id`,
    { householdId, on, nightKinds },
    transaction,
  );
}

const isOut = ({ state }: QueuedMessage): boolean => state !== 'queued' && state !== 'withdrawn';

/**
 * A draft with its key in the light of what has gone out. Who heard other facts before is told the new ones as news, also
 * where the plan goes back to what it was at first.
 */
export function wantedOf(
  day: HouseholdDay,
  draft: DraftMessage,
  queue: readonly QueuedMessage[],
): WantedMessage {
  // A reminder of another time is another reminder; of the rest each person gets one a night.
  const heard = queue.filter(
    (row) =>
      isOut(row) &&
      row.kind === draft.kind &&
      row.kind !== 'reminder' &&
      row.channel === draft.channel &&
      row.familyMemberId === draft.familyMemberId,
  );
  const last = heard.at(-1);
  const isTold = last !== undefined && factsInKey(last.key) === factsOf(draft);
  if (isTold) return { ...draft, dedupeKey: last.key, isTold };
  const body = heard.length > 0 ? (draft.bodyOfNews ?? draft.body) : draft.body;
  const told = { ...draft, body };
  return {
    ...told,
    dedupeKey: dedupeKeyOf(day.householdId, day.on, told, heard.length),
    isTold,
  };
}

/** Queues what is wanted and new, takes back what waits and is not wanted, leaves what has gone out. */
export async function syncQueue(
  context: Context,
  transaction: Transaction,
  day: HouseholdDay,
  wanted: readonly WantedMessage[],
): Promise<void> {
  const { db, clock } = context;
  const { householdId, on } = day;
  const now = clock.now();
  const byKey = new Map(wanted.map((message) => [message.dedupeKey, message]));
  const queue = await queueOf(context, transaction, day);
  // What waits past its time while the night goes on never arrived: the sender gives it up aloud.
  const isForSender = ({ lastUsefulAt }: QueuedMessage): boolean =>
    wanted.length > 0 && lastUsefulAt.getTime() <= now;
  const superseded = queue
    .filter((message) => message.state === 'queued' && !byKey.has(message.key))
    .filter((message) => !isForSender(message))
    .map(({ key }) => key);
  let changed = await setState(context, transaction, superseded, 'queued', 'withdrawn');
  // A plan that went back to what it was: its message was taken back before and is wanted again.
  const again = queue
    .filter(({ key, state }) => state === 'withdrawn' && byKey.has(key))
    .map(({ key }) => key);
  changed += await setState(context, transaction, again, 'withdrawn', 'queued');
  for (const { isTold, bodyOfNews: _, facts: __, ...message } of wanted) {
    if (isTold) continue;
    const more = { householdId, morningOn: on, createdAt: now };
    if (await enqueue(db, transaction, { ...message, ...more })) changed += 1;
  }
  if (changed > 0) await announce(db, transaction, 'messages');
}

async function setState(
  { db }: Context,
  transaction: Transaction,
  dedupeKeys: readonly string[],
  from: 'queued' | 'withdrawn',
  to: 'queued' | 'withdrawn',
): Promise<number> {
  if (dedupeKeys.length === 0) return 0;
  return change(
    db,
    'UPDATE messages SET state = :to WHERE dedupe_key IN (:dedupeKeys) AND state = :from',
    { dedupeKeys, from, to },
    transaction,
  );
}
