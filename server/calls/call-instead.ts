import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { select } from '../database/connection';
import { raiseCall } from './calls';

/** A message that reached nobody, as the outbox gives it up. */
export interface UnreachedBy {
  readonly id: number;
  readonly callReason: string;
  readonly householdId: number | null;
  readonly familyMemberId: number | null;
  readonly morningOn: string | null;
}

/** A message that reached nobody becomes a call, in the transaction that gives it up. */
export const callInstead =
  ({ db, clock }: Context) =>
  async (transaction: Transaction, message: UnreachedBy): Promise<void> => {
    const now = clock.now();
    const { householdId, familyMemberId, morningOn, callReason } = message;
    const [morning] = await select<{ id: number; child_id: number }>(
      db,
      `SELECT morning.id, morning.child_id FROM mornings morning
       JOIN children child ON child.id = morning.child_id
       WHERE child.household_id = :householdId AND morning.planned_on = :morningOn
       ORDER BY morning.state = 'planned' DESC, morning.arrival_at LIMIT 1`,
      { householdId, morningOn },
      transaction,
    );
    await raiseCall(db, transaction, {
      reason: callReason,
      openKey: `${callReason}:${familyMemberId ?? `message-${message.id}`}:${morningOn ?? ''}`,
      householdId,
      familyMemberId,
      childId: morning?.child_id ?? null,
      morningId: morning?.id ?? null,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  };
