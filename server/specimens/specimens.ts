import type { Transaction } from 'sequelize';
import type {
  SpecimenChanged,
  SpecimenList,
  specimenStepRequest,
} from '../../shared/contracts/specimens';
import { can, type Role } from '../../shared/access/rights';
import type { z } from 'zod';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { changedMeanwhile, invalid, notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { resultsOfSpecimens } from '../results/current-results';
import { minutesInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { laboratorySays, specimenRows, toSpecimen, type SpecimenRow } from './specimen-rows';

export type SpecimenStep = z.output<typeof specimenStepRequest>;

export const mayReadResults = (staff: StaffMember): boolean =>
  can(staff.roles as readonly Role[], 'results.read');

/** Specimens of open series with their clocks; results only for those who may read them. */
export async function listSpecimens(
  context: Context,
  actor: Actor,
  staff: StaffMember,
): Promise<SpecimenList> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  const rows = await specimenRows(context.db, { siteId: staff.siteId, isOpenOnly: true });
  const results = mayReadResults(staff)
    ? await resultsOfSpecimens(
        context.db,
        words,
        rows.map((row) => row.id),
      )
    : null;
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'specimens',
    childIds: rows.map((row) => row.child_id),
    at: now,
  });
  return {
    specimens: rows.map((row) =>
      toSpecimen(words, row, results === null ? null : (results.get(row.id) ?? []), now),
    ),
    laboratorySays: await laboratorySays(context.db, staff.siteId, words),
  };
}

const soon = 2 * 60_000;

/** Refuses what cannot be: times before the collection or in the future, steps out of order. */
function checkStep(row: SpecimenRow, step: SpecimenStep, now: number): void {
  if ('at' in step) {
    const at = Date.parse(step.at);
    if (at < row.collected_at.getTime())
      throw invalid([{ path: 'at', message: 'This is before the specimen was collected.' }]);
    if (at > now + soon) throw invalid([{ path: 'at', message: 'This is in the future.' }]);
  }
  if (row.rejected_at)
    throw new Problem(409, 'rejected', 'The laboratory has rejected this specimen.');
  if (step.step === 'labelled' && row.label !== null && row.label !== step.label)
    throw new Problem(
      409,
      'already-labelled',
      'This specimen has its label. A label that was lost is not replaced: collect again.',
    );
  if (step.step === 'handed-over' && row.label === null)
    throw new Problem(409, 'not-labelled', 'Scan the label first. No specimen leaves without it.');
  if (step.step === 'received' && row.label === null)
    throw new Problem(409, 'not-labelled', 'Scan the label first. The laboratory cannot know it.');
}

const columns: Record<SpecimenStep['step'], string> = {
  neutralised: 'neutralised_at = :at, neutralised_with = :with',
  labelled: 'label = :label',
  'handed-over': 'handed_over_at = :at',
  received: 'received_at = :at, laboratory_number = :laboratoryNumber',
  rejected: 'rejected_at = :at, reject_reason = :reason',
};

const fields: Record<SpecimenStep['step'], keyof SpecimenRow> = {
  neutralised: 'neutralised_at',
  labelled: 'label',
  'handed-over': 'handed_over_at',
  received: 'received_at',
  rejected: 'rejected_at',
};

/** A repeat of a step that is already recorded with the same facts changes nothing. */
function isRepeat(row: SpecimenRow, step: SpecimenStep): boolean {
  const recorded = row[fields[step.step]];
  if (recorded === null) return false;
  if (step.step === 'labelled') return recorded === step.label;
  return recorded instanceof Date && recorded.getTime() === Date.parse(step.at);
}

async function writeStep(
  context: Context,
  transaction: Transaction,
  row: SpecimenRow,
  step: SpecimenStep,
): Promise<void> {
  const touched = await change(
    context.db,
    `UPDATE specimens SET ${columns[step.step]}, version = version + 1 WHERE id = :id AND version = :version`,
    { ...step, id: row.id, at: 'at' in step ? new Date(step.at) : null },
    transaction,
  );
  if (touched === 0) throw changedMeanwhile();
}

/**
 * Records a step of a specimen's way: neutralised, labelled, handed over, received, rejected.
 * @throws Problem 404, 409 'changed-meanwhile' | 'label-taken' | 'not-labelled' | 'already-labelled' | 'rejected', 422.
 */
export async function stepSpecimen(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
  step: SpecimenStep,
): Promise<SpecimenChanged> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  return inTransaction(context.db, async (transaction) => {
    const where = { siteId: staff.siteId, id };
    const [row] = await specimenRows(context.db, where, transaction);
    if (!row) throw notFound('This specimen');
    if (!isRepeat(row, step)) {
      checkStep(row, step, now);
      if (step.step === 'labelled') {
        const taken = await select(
          context.db,
          'SELECT id FROM specimens WHERE label = :label AND id <> :id',
          { label: step.label, id },
          transaction,
        );
        if (taken.length > 0)
          throw new Problem(
            409,
            'label-taken',
            'This label belongs to another specimen. Look again.',
            {
              errors: [{ path: 'label', message: 'This label belongs to another specimen.' }],
            },
          );
      }
      await writeStep(context, transaction, row, step);
      await record(context.db, transaction, actor, {
        action: 'changed',
        matter: 'specimen',
        childIds: [row.child_id],
        detail: { ...step },
        at: now,
      });
      await announce(context.db, transaction, 'specimens', id);
      await announce(context.db, transaction, 'mornings', row.morning_id);
    }
    const [after] = await specimenRows(context.db, where, transaction);
    if (!after) throw notFound('This specimen');
    const results = mayReadResults(staff)
      ? ((await resultsOfSpecimens(context.db, words, [id], transaction)).get(id) ?? [])
      : null;
    return { specimen: toSpecimen(words, after, results, now), warnings: warningsOf(words, after) };
  });
}

/** Gentle warnings against the laboratory's profile; nothing is blocked by them. */
function warningsOf(words: ClinicWords, row: SpecimenRow): string[] {
  const { profile } = row;
  const collected = row.collected_at.getTime();
  const minutes = (at: Date): number => Math.round((at.getTime() - collected) / 60_000);
  const warnings: string[] = [];
  const warn = (key: string, taken: number, most: number): void => {
    warnings.push(
      words.text(`clinic.warning.${key}`, {
        minutes: minutesInWords(words, taken),
        limit: String(most),
        laboratory: profile.name,
      }),
    );
  };
  const limit = profile.neutraliseWithinMinutes;
  if (row.neutralised_at && limit !== null && minutes(row.neutralised_at) > limit)
    warn('neutralised-late', minutes(row.neutralised_at), limit);
  if (row.received_at && minutes(row.received_at) > profile.receiptWithinMinutes)
    warn('received-late', minutes(row.received_at), profile.receiptWithinMinutes);
  return warnings;
}
