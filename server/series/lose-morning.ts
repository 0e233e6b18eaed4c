import type { Transaction } from 'sequelize';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { tellVisitCancelled } from '../messages/visit-cancelled';
import { renumber } from './renumber';
import { renewVisitsChanged } from './tell-visits-changed';

interface MorningRow {
  readonly id: number;
  readonly seriesId: number;
  readonly childId: number;
  readonly state: string;
}

/**
 * A planned morning does not take place. Its place is free again, its messages are taken back and its calendar entry is
 * cancelled; specimens that were taken stay valid and keep their numbers, mornings to come are numbered anew. Losing it
 * twice changes nothing.
 * @throws Problem 409 'morning-over' when the collection has begun or is done
 */
export async function loseMorning(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  reason: string,
): Promise<void> {
  await inTransaction(context.db, (transaction) =>
    loseOneMorning(context, transaction, { actor, staff }, morningId, reason),
  );
}

/**
 * The same within a transaction.
 * @param check throws where this morning must not be lost that way
 * @returns whether it was planned until now
 */
export async function loseOneMorning(
  context: Context,
  transaction: Transaction,
  { actor, staff }: { readonly actor: Actor; readonly staff: StaffMember },
  morningId: number,
  reason: string,
  check: () => void = () => undefined,
): Promise<boolean> {
  const [morning] = await heldMornings(context, staff, 'mornings.id', morningId, transaction);
  if (!morning) throw notFound('This morning');
  check();
  if (morning.state === 'lost') return false;
  if (morning.state !== 'planned' && morning.state !== 'here')
    throw new Problem(409, 'morning-over', 'The collection of this morning has begun already.');
  await loseMornings(context, transaction, actor, [morning], reason);
  await renumber(context, transaction, morning.seriesId);
  await settleSeries(context, transaction, morning.seriesId);
  return true;
}

/** Closes a series with fewer mornings or for another reason; mornings to come are lost. */
export async function closeSeries(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  seriesId: number,
  reason: string,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const mornings = await heldMornings(context, staff, 'series.id', seriesId, transaction);
    const [first] = mornings;
    if (!first) throw notFound('This series');
    if (mornings.some(({ state }) => state === 'collecting'))
      throw new Problem(409, 'morning-over', 'A collection of this series is going on.');
    const closed = await change(
      db,
      `UPDATE series SET state = 'closed', closed_at = :now, close_reason = :reason, version = version + 1
       WHERE id = :seriesId AND state <> 'closed'`,
      { seriesId, reason, now: new Date(now) },
      transaction,
    );
    if (closed === 0) return;
    const toCome = mornings.filter(({ state }) => state === 'planned' || state === 'here');
    await loseMornings(context, transaction, actor, toCome, reason);
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'series-closed',
      childIds: [first.childId],
      detail: { seriesId, reason },
      at: now,
    });
    await announce(db, transaction, 'children', first.childId);
  });
}

async function loseMornings(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  mornings: readonly MorningRow[],
  reason: string,
): Promise<void> {
  const { db, clock } = context;
  for (const { id, childId } of mornings) {
    await change(
      db,
      `UPDATE mornings SET state = 'lost', place_key = NULL, lost_reason = :reason,
         calendar_sequence = calendar_sequence + 1, version = version + 1
       WHERE id = :id`,
      { id, reason: reason.slice(0, 200) },
      transaction,
    );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'morning-lost',
      childIds: [childId],
      detail: { morningId: id, reason },
      at: clock.now(),
    });
    await announce(db, transaction, 'mornings', id);
  }
  const ids = mornings.map(({ id }) => id);
  if (ids.length === 0) return;
  await tellVisitCancelled(context, transaction, ids);
  const households = await select<{ id: number }>(
    db,
    `SELECT DISTINCT children.household_id AS id FROM mornings JOIN children ON children.id = mornings.child_id
     WHERE mornings.id IN (:ids)`,
    { ids },
    transaction,
  );
  for (const { id } of households)
    await renewVisitsChanged(context, transaction, id, `lost-${ids.join('-')}`);
}

/** When no morning is to come any more, the series waits for the results of what was collected. */
export async function settleSeries(
  { db }: Context,
  transaction: Transaction,
  seriesId: number,
): Promise<void> {
  await change(
    db,
    `UPDATE series SET state = 'awaiting-results', version = version + 1
     WHERE id = :seriesId AND state = 'collecting'
       AND NOT EXISTS (SELECT 1 FROM mornings WHERE mornings.series_id = series.id
         AND mornings.state IN ('planned', 'here', 'collecting'))`,
    { seriesId },
    transaction,
  );
}

/** Every morning by the given column, whatever its state, held until the end of the transaction. */
function heldMornings(
  { db }: Context,
  staff: StaffMember,
  column: 'mornings.id' | 'series.id',
  id: number,
  transaction: Transaction,
): Promise<MorningRow[]> {
  const reach = withinReach(staff);
  return select<MorningRow>(
    db,
    `SELECT mornings.id, mornings.series_id AS seriesId, mornings.child_id AS childId, mornings.state
     FROM mornings
     JOIN series ON series.id = mornings.series_id
     JOIN children ON children.id = mornings.child_id
     JOIN households ON households.id = children.household_id
     WHERE ${column} = :id AND ${reach.sql}
     ORDER BY mornings.id FOR UPDATE`,
    { ...reach.replacements, id },
    transaction,
  );
}
