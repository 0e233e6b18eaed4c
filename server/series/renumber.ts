import type { Transaction } from 'sequelize';
import type { MorningState } from '../../shared/contracts/common';
import type { Day } from '../../shared/domain/day';
import { numberMornings } from '../../shared/domain/replan';
import type { Context } from '../context';
import { select } from '../database/connection';
import { giveNumber, stepAside } from './morning-rows';
import { stateFor } from './series-to-replan';

/** Numbers the mornings to come of a series in order of days; what has a specimen keeps its number. */
export async function renumber(
  context: Context,
  transaction: Transaction,
  seriesId: number,
): Promise<void> {
  const rows = await select<{
    morningId: number;
    number: number;
    on: Day;
    morningState: MorningState;
  }>(
    context.db,
    `SELECT id AS morningId, number, planned_on AS \`on\`, state AS morningState FROM mornings
     WHERE series_id = :seriesId`,
    { seriesId },
    transaction,
  );
  const before = new Map(rows.map(({ morningId, number }) => [morningId, number]));
  const changed = numberMornings(
    rows.map((row) => ({ ...row, state: stateFor(row.morningState) })),
  ).filter(({ morningId, number }) => before.get(morningId) !== number);
  const ids = changed.map(({ morningId }) => morningId);
  await stepAside(context, transaction, ids, { isPlaceToo: false });
  for (const { morningId, number } of changed)
    await giveNumber(context, transaction, morningId, number);
}
