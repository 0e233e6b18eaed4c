import { QueryTypes, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { enterResultRequest, ResultList, Specimen } from '../../shared/contracts/specimens';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { changedMeanwhile, invalid, notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { clinicWords } from '../wording/clinic-words';
import {
  laboratorySays,
  specimenRows,
  toSpecimen,
  type SpecimenRow,
} from '../specimens/specimen-rows';
import {
  currentResultRows,
  needsSecondLook,
  resultsOfSpecimens,
  type ResultRow,
} from './current-results';
import { raiseDanger } from './raise-danger';
import { seriesSays } from './result-says';

export type EnteredResult = z.output<typeof enterResultRequest>;

/** All open series with specimens at the laboratory, the most dangerous first. */
export async function listResults(
  context: Context,
  actor: Actor,
  staff: StaffMember,
): Promise<ResultList> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  const rows = await specimenRows(context.db, { siteId: staff.siteId, isOpenOnly: true });
  const results = await resultsOfSpecimens(
    context.db,
    words,
    rows.map((row) => row.id),
  );
  const bySeries = new Map<number, SpecimenRow[]>();
  for (const row of rows)
    bySeries.set(row.series_id, [...(bySeries.get(row.series_id) ?? []), row]);
  const series = [...bySeries.values()].flatMap((group) => {
    const [first] = group;
    if (!first) return [];
    const specimens = group.map((row) => toSpecimen(words, row, results.get(row.id) ?? [], now));
    return {
      seriesId: first.series_id,
      childId: first.child_id,
      childName: first.full_name,
      bornOn: first.born_on,
      says: seriesSays(words, specimens),
      isCritical: specimens.some((one) => one.results?.some((result) => result.isCritical)),
      specimens,
    };
  });
  const danger = (one: (typeof series)[number]): number =>
    one.isCritical ? 0 : one.specimens.some((specimen) => specimen.isOverdue) ? 1 : 2;
  series.sort((a, b) => danger(a) - danger(b) || a.seriesId - b.seriesId);
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'results',
    childIds: series.map((one) => one.childId),
    at: now,
  });
  return { series, laboratorySays: await laboratorySays(context.db, staff.siteId, words) };
}

function checkEntry(
  row: SpecimenRow,
  entry: EnteredResult,
  current: ResultRow | undefined,
  now: number,
) {
  if (row.rejected_at)
    throw new Problem(409, 'rejected', 'The laboratory has rejected this specimen.');
  if (!row.received_at)
    throw new Problem(
      409,
      'not-received',
      'Record first when the laboratory received this specimen.',
    );
  if (entry.reportedOn < dayOf(row.collected_at.getTime(), row.zone))
    throw invalid([{ path: 'reportedOn', message: 'This is before the specimen was collected.' }]);
  if (entry.reportedOn > dayOf(now, row.zone))
    throw invalid([{ path: 'reportedOn', message: 'This is in the future.' }]);
  if (entry.test === 'culture') {
    const isRunning = entry.value === 'no-growth-yet' || entry.value === 'growing';
    if (isRunning && entry.finality === 'final')
      throw invalid([{ path: 'finality', message: 'A culture that still runs is preliminary.' }]);
    if (entry.value === 'negative-final' && entry.finality === 'preliminary')
      throw invalid([
        { path: 'finality', message: 'No growth before the final day is “no growth so far”.' },
      ]);
  }
  if (current?.finality === 'final' && entry.correctionReason === null)
    throw invalid([
      {
        path: 'correctionReason',
        message: 'This test has a final result. Say why it is corrected; the earlier one is kept.',
      },
    ]);
}

const isSame = (current: ResultRow | undefined, entry: EnteredResult): boolean =>
  current !== undefined &&
  current.value === entry.value &&
  current.finality === entry.finality &&
  current.reported_on === entry.reportedOn;

/**
 * Keeps a result from the laboratory's report; an earlier one of the same test stays as a version. A repeat of the same
 * entry changes nothing.
 * @throws Problem 404, 409 'rejected' | 'not-received' | 'changed-meanwhile', 422.
 */
export async function enterResult(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  specimenId: number,
  entry: EnteredResult,
): Promise<Specimen> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  return inTransaction(context.db, async (transaction) => {
    const [row] = await specimenRows(
      context.db,
      { siteId: staff.siteId, id: specimenId },
      transaction,
    );
    if (!row) throw notFound('This specimen');
    // The series first, as whoever signs or releases its letter: no result arrives under a signature.
    await select(
      context.db,
      'SELECT id FROM series WHERE id = :seriesId FOR UPDATE',
      { seriesId: row.series_id },
      transaction,
    );
    await select(
      context.db,
      'SELECT id FROM specimens WHERE id = :specimenId FOR UPDATE',
      { specimenId },
      transaction,
    );
    const current = (await currentResultRows(context.db, [specimenId], transaction)).find(
      (one) => one.test === entry.test,
    );
    if (!isSame(current, entry)) {
      checkEntry(row, entry, current, now);
      await writeResult(context, transaction, staff, row, entry, current);
      await raiseDanger(context, transaction, row, entry);
      await record(context.db, transaction, actor, {
        action: 'changed',
        matter: 'result',
        childIds: [row.child_id],
        detail: { specimenId, ...entry, replaces: current?.id ?? null },
        at: now,
      });
      await announce(context.db, transaction, 'results', row.series_id);
      await announce(context.db, transaction, 'calls');
    }
    const results = await resultsOfSpecimens(context.db, words, [specimenId], transaction);
    return toSpecimen(words, row, results.get(specimenId) ?? [], now);
  });
}

async function writeResult(
  context: Context,
  transaction: Transaction,
  staff: StaffMember,
  row: SpecimenRow,
  entry: EnteredResult,
  current: ResultRow | undefined,
): Promise<void> {
  if (current) {
    const touched = await change(
      context.db,
      'UPDATE results SET is_current = FALSE, current_key = NULL WHERE id = :id AND is_current = TRUE',
      { id: current.id },
      transaction,
    );
    if (touched === 0) throw changedMeanwhile();
  }
  await context.db.query(
    `INSERT INTO results (specimen_id, child_id, test, value, finality, reported_on, entered_at, entered_by_staff_id,
       replaces_result_id, correction_reason, current_key)
     VALUES (:specimenId, :childId, :test, :value, :finality, :reportedOn, :enteredAt, :staffId, :replaces,
       :correctionReason, :currentKey)`,
    {
      type: QueryTypes.INSERT,
      transaction,
      replacements: {
        specimenId: row.id,
        childId: row.child_id,
        test: entry.test,
        value: entry.value,
        finality: entry.finality,
        reportedOn: entry.reportedOn,
        enteredAt: new Date(context.clock.now()),
        staffId: staff.id,
        replaces: current?.id ?? null,
        correctionReason: entry.correctionReason,
        currentKey: `${row.id}:${entry.test}`,
      },
    },
  );
}

/**
 * The second look at a hand-entered final by another person.
 * @throws Problem 404, 409 'same-person' when the reader entered it, 'changed-meanwhile' when it is no longer current.
 */
export async function lookAgain(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  resultId: number,
): Promise<Specimen> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  return inTransaction(context.db, async (transaction) => {
    const [found] = await select<{ specimen_id: number }>(
      context.db,
      'SELECT specimen_id FROM results WHERE id = :resultId',
      { resultId },
      transaction,
    );
    const [row] = found
      ? await specimenRows(context.db, { siteId: staff.siteId, id: found.specimen_id }, transaction)
      : [];
    if (!row) throw notFound('This result');
    const current = (await currentResultRows(context.db, [row.id], transaction)).find(
      (one) => one.id === resultId,
    );
    if (!current) throw changedMeanwhile();
    if (current.entered_by_staff_id === staff.id)
      throw new Problem(
        409,
        'same-person',
        'You entered this result. The second look is by another person.',
      );
    if (needsSecondLook(current)) {
      await change(
        context.db,
        `UPDATE results SET second_look_by_staff_id = :staffId, second_look_at = :at
         WHERE id = :resultId AND second_look_at IS NULL`,
        { staffId: staff.id, at: new Date(now), resultId },
        transaction,
      );
      await record(context.db, transaction, actor, {
        action: 'changed',
        matter: 'second-look',
        childIds: [row.child_id],
        detail: { resultId },
        at: now,
      });
      await announce(context.db, transaction, 'results', row.series_id);
    }
    const results = await resultsOfSpecimens(context.db, words, [row.id], transaction);
    return toSpecimen(words, row, results.get(row.id) ?? [], now);
  });
}
