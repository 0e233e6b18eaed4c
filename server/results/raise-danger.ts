import type { Transaction } from 'sequelize';
import { isCritical, isPositive } from '../../shared/domain/critical';
import { raiseAlert } from '../alerts/raise-alert';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { select } from '../database/connection';
import type { SpecimenRow } from '../specimens/specimen-rows';
import { findingsOf, type ResultRow } from './current-results';

const dayMs = 86_400_000;

/** Everything critical is told by a person: a call task at once, and for a positive the reminder to report. */
export async function raiseDanger(
  context: Context,
  transaction: Transaction,
  row: SpecimenRow,
  entry: Pick<ResultRow, 'test' | 'value'>,
): Promise<void> {
  const findings = findingsOf([entry]);
  if (!isCritical(findings)) return;
  const now = context.clock.now();
  const [child] = await select<{ household_id: number }>(
    context.db,
    'SELECT household_id FROM children WHERE id = :id',
    { id: row.child_id },
    transaction,
  );
  const subject = `${row.id}:${entry.test}:${entry.value}`;
  const call = {
    householdId: child?.household_id ?? null,
    childId: row.child_id,
    seriesId: row.series_id,
    isForClinician: true,
    urgentAt: now,
    now,
  };
  const positive = isPositive(findings);
  await raiseCall(context.db, transaction, {
    ...call,
    reason: positive ? 'positive-result' : 'critical-result',
    openKey: `result:${subject}`,
    detail: `Specimen ${row.number}: ${entry.test} ${entry.value}`,
  });
  await raiseAlert(context, transaction, {
    kind: 'critical-result',
    siteId: row.site_id,
    cause: `${subject}:${now}`,
    usefulUntil: now + dayMs,
  });
  if (positive)
    await raiseCall(context.db, transaction, {
      ...call,
      reason: 'report-to-health-department',
      openKey: `report:${row.series_id}`,
      detail: 'Report to the health department under local law.',
    });
}
