import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { select } from '../database/connection';
import { planHouseholdMessages } from './plan-messages';

/** Plans every night to come of a household again: after its adults, numbers, languages or consents have changed. */
export async function planComingNights(
  context: Context,
  transaction: Transaction,
  householdId: number,
): Promise<void> {
  const { db, clock } = context;
  const days = await select<{ on: string }>(
    db,
    `SELECT DISTINCT morning.planned_on AS \`on\` FROM mornings morning
     JOIN children child ON child.id = morning.child_id
     WHERE child.household_id = :householdId AND morning.arrival_at > :now ORDER BY morning.planned_on`,
    { householdId, now: new Date(clock.now()) },
    transaction,
  );
  for (const { on } of days) await planHouseholdMessages(context, transaction, { householdId, on });
}
