import type { Sequelize, Transaction } from 'sequelize';
import type { Result, TestKind } from '../../shared/contracts/specimens';
import { isCritical, type SpecimenFindings } from '../../shared/domain/critical';
import { select } from '../database/connection';
import type { ClinicWords } from '../wording/clinic-words';
import { resultSays } from './result-says';

export interface ResultRow {
  readonly id: number;
  readonly specimen_id: number;
  readonly test: TestKind;
  readonly value: string;
  readonly finality: 'preliminary' | 'final';
  readonly reported_on: string;
  readonly entered_at: Date;
  readonly entered_by_staff_id: number;
  readonly entered_by: string;
  readonly second_look_by: string | null;
  readonly replaces_result_id: number | null;
  readonly correction_reason: string | null;
}

/** The current result of each test of these specimens; earlier versions stay in the table. */
export function currentResultRows(
  db: Sequelize,
  specimenIds: readonly number[],
  transaction?: Transaction,
): Promise<ResultRow[]> {
  if (specimenIds.length === 0) return Promise.resolve([]);
  return select<ResultRow>(
    db,
    `SELECT results.id, results.specimen_id, results.test, results.value, results.finality, results.reported_on,
       results.entered_at, results.entered_by_staff_id, entering.full_name AS entered_by,
       looking.full_name AS second_look_by, results.replaces_result_id, results.correction_reason
     FROM results
       JOIN staff AS entering ON entering.id = results.entered_by_staff_id
       LEFT JOIN staff AS looking ON looking.id = results.second_look_by_staff_id
     WHERE results.specimen_id IN (:specimenIds) AND results.is_current = TRUE
     ORDER BY results.specimen_id, FIELD(results.test, 'smear', 'amplification', 'culture')`,
    { specimenIds },
    transaction,
  );
}

/** Which results of a series count now. */
export async function currentResultIds(
  db: Sequelize,
  seriesId: number,
  transaction?: Transaction,
): Promise<number[]> {
  const rows = await select<{ id: number }>(
    db,
    `SELECT results.id FROM results JOIN specimens ON specimens.id = results.specimen_id
     WHERE specimens.series_id = :seriesId AND results.is_current = TRUE`,
    { seriesId },
    transaction,
  );
  return rows.map(({ id }) => id);
}

/** A second look is needed for finals entered by hand and for corrections (PRACTICE 22). */
export const needsSecondLook = (row: ResultRow): boolean =>
  row.second_look_by === null && (row.finality === 'final' || row.correction_reason !== null);

export function findingsOf(rows: readonly Pick<ResultRow, 'test' | 'value'>[]): SpecimenFindings {
  const value = (test: TestKind): string | null =>
    rows.find((row) => row.test === test)?.value ?? null;
  return {
    smear: value('smear') as SpecimenFindings['smear'],
    amplification: value('amplification') as SpecimenFindings['amplification'],
    culture: value('culture') as SpecimenFindings['culture'],
  };
}

export function toResult(words: ClinicWords, row: ResultRow): Result {
  return {
    id: row.id,
    test: row.test,
    value: row.value,
    says: resultSays(words, row.test, row.value, row.finality),
    finality: row.finality,
    reportedOn: row.reported_on,
    enteredAt: row.entered_at.toISOString(),
    enteredBy: row.entered_by,
    needsSecondLook: needsSecondLook(row),
    secondLookBy: row.second_look_by,
    isCritical: isCritical(findingsOf([row])),
  };
}

export async function resultsOfSpecimens(
  db: Sequelize,
  words: ClinicWords,
  specimenIds: readonly number[],
  transaction?: Transaction,
): Promise<Map<number, Result[]>> {
  const bySpecimen = new Map<number, Result[]>();
  for (const row of await currentResultRows(db, specimenIds, transaction))
    bySpecimen.set(row.specimen_id, [
      ...(bySpecimen.get(row.specimen_id) ?? []),
      toResult(words, row),
    ]);
  return bySpecimen;
}
