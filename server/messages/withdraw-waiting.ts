import type { Transaction } from 'sequelize';
import { callInstead, type UnreachedBy } from '../calls/call-instead';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { nightKinds } from './night-queue';

/** Whose messages wait no longer, and which: all of them, or those about letters. */
export interface NoMore {
  readonly channel: 'sms' | 'mail';
  /** The number or e-mail address. */
  readonly address: string;
  /** Null for everybody who shares the number. */
  readonly familyMemberId: number | null;
  readonly what: 'everything' | 'letters';
}

export const letterKinds: readonly string[] = ['letter-waits', 'letter-reminder'];

interface WaitingRow extends Omit<UnreachedBy, 'callReason'> {
  readonly kind: string;
  readonly callReason: string | null;
}

/**
 * Takes back what waits for a number that wants no more of it. What only this message would have told becomes a call;
 * the messages of a night do not, because planning the night anew finds another way or calls.
 */
export async function withdrawWaitingFor(
  context: Context,
  transaction: Transaction,
  { channel, address, familyMemberId, what }: NoMore,
): Promise<void> {
  const { db } = context;
  const rows = await select<WaitingRow>(
    db,
    `SELECT id, kind, call_reason AS callReason, household_id AS householdId, family_member_id AS familyMemberId,
       morning_on AS morningOn FROM messages
     WHERE address = :address AND channel = :channel AND state = 'queued'
       ${familyMemberId === null ? '' : 'AND family_member_id = :familyMemberId'}
       ${what === 'letters' ? 'AND kind IN (:letterKinds)' : ''} ORDER BY id FOR UPDATE`,
    { channel, address, familyMemberId, letterKinds },
    transaction,
  );
  if (rows.length === 0) return;
  await change(
    db,
    `UPDATE messages SET state = 'withdrawn' WHERE id IN (:ids)`,
    { ids: rows.map(({ id }) => id) },
    transaction,
  );
  const call = callInstead(context);
  for (const { kind, callReason, ...message } of rows)
    if (callReason !== null && !isOfNight(kind))
      await call(transaction, { ...message, callReason });
}

const isOfNight = (kind: string): boolean => (nightKinds as readonly string[]).includes(kind);
