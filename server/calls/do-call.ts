import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { CallList, callDoneRequest } from '../../shared/contracts/calls';
import { can, isRole } from '../../shared/access/rights';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid, notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { listCalls } from './call-list';
import { callPeople, callRowToChange, personOf, type CallRow } from './call-rows';
import { isAboutResults, onlyClinicianTells } from './call-says';
import { raiseCall } from './calls';

type Outcome = z.output<typeof callDoneRequest>;

const minuteMs = 60_000;
/** Three tries at different hours reach more families than three tries at once. */
const nextTryMinutes = 60;
/** Shortly before a morning there is no time for different hours. */
const nextTryBeforeMorningMinutes = 10;
const morningIsNearMs = 12 * 60 * minuteMs;

/** Says that somebody is making the call, so that no family is called twice. */
export async function claimCall(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  callId: number,
): Promise<CallList> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const row = await openRow(context, staff, callId, transaction);
    if (row.claimed_by_staff_id !== null && row.claimed_by_staff_id !== staff.id)
      throw new Problem(409, 'claimed-by-another', `${row.claimed_by ?? 'Somebody'} is calling.`);
    await change(
      db,
      'UPDATE call_tasks SET claimed_by_staff_id = :staffId, claimed_at = :now WHERE id = :callId',
      { staffId: staff.id, now: new Date(now), callId },
      transaction,
    );
    await noted(context, actor, transaction, row, { claimed: true });
  });
  return listCalls(context, actor, staff);
}

/**
 * Writes down how a call went. A family that was not reached stays on the list for a later try; each try is kept.
 * The same outcome by the same person a second time answers like the first.
 */
export async function endCall(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  callId: number,
  outcome: Outcome,
): Promise<CallList> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const row = await callRowToChange(db, staff, callId, transaction);
    if (!row) throw notFound('This call');
    if (row.done_at !== null) {
      if (row.outcome === outcome.outcome && row.done_by_staff_id === staff.id) return;
      throw new Problem(409, 'already-done', `${row.done_by ?? 'Somebody'} has made this call.`);
    }
    await checkOutcome(context, staff, row, outcome, transaction);
    await change(
      db,
      `UPDATE call_tasks SET open_key = NULL, done_at = :now, done_by_staff_id = :staffId, outcome = :outcome,
         note = :note, interpreter = :interpreter WHERE id = :callId`,
      { ...outcome, now: new Date(now), staffId: staff.id, callId },
      transaction,
    );
    if (outcome.outcome === 'not-reached' || outcome.outcome === 'wrong-number')
      await raiseNextTry(context, row, outcome, transaction);
    await noted(context, actor, transaction, row, { outcome: outcome.outcome });
  });
  return listCalls(context, actor, staff);
}

async function openRow(
  context: Context,
  staff: StaffMember,
  callId: number,
  transaction: Transaction,
): Promise<CallRow> {
  const row = await callRowToChange(context.db, staff, callId, transaction);
  if (!row) throw notFound('This call');
  if (row.done_at !== null)
    throw new Problem(409, 'already-done', `${row.done_by ?? 'Somebody'} has made this call.`);
  return row;
}

const isClinician = (staff: StaffMember): boolean =>
  staff.roles.some((role) => role === 'clinician' || role === 'lead-clinician');

/** Only a clinician tells or closes what is positive; an interpreter is named wherever one is needed. */
async function checkOutcome(
  context: Context,
  staff: StaffMember,
  row: CallRow,
  { outcome, interpreter }: Outcome,
  transaction: Transaction,
): Promise<void> {
  if (isAboutResults(row.reason) && !can(staff.roles.filter(isRole), 'results.read'))
    throw new Problem(403, 'not-allowed', 'A call about results is for those who see results.');
  const isTry = outcome === 'not-reached' || outcome === 'wrong-number';
  if (onlyClinicianTells(row.reason) && !isTry) {
    if (!isClinician(staff))
      throw new Problem(403, 'clinician-only', 'A clinician tells the family about this result.');
    if (outcome === 'reached')
      throw invalid([
        {
          path: 'outcome',
          message: 'Say whether the family was told. Reaching somebody is not enough here.',
        },
      ]);
  }
  if (outcome !== 'told' || interpreter !== null || row.household_id === null) return;
  const people = await callPeople(context.db, [row.household_id], transaction);
  if (personOf(row, people)?.needs_interpreter === 1)
    throw invalid([
      {
        path: 'interpreter',
        message:
          'Give the name or number of the interpreter. A child of the family cannot interpret.',
      },
    ]);
}

async function raiseNextTry(
  context: Context,
  row: CallRow,
  { outcome }: Outcome,
  transaction: Transaction,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const arrivalAt = await arrivalOf(context, row, transaction);
  // After the arrival nobody waits for an answer about that night any more.
  if (arrivalAt !== null && arrivalAt <= now) return;
  const isNear = arrivalAt !== null && arrivalAt - now < morningIsNearMs;
  const minutes = isNear ? nextTryBeforeMorningMinutes : nextTryMinutes;
  await raiseCall(db, transaction, {
    reason: row.reason,
    openKey: row.open_key ?? `${row.reason}:again:${row.id}`,
    householdId: row.household_id,
    childId: row.child_id,
    morningId: row.morning_id,
    seriesId: row.series_id,
    familyMemberId: outcome === 'wrong-number' ? null : row.family_member_id,
    detail: row.detail,
    isForClinician: row.is_for_clinician === 1,
    urgentAt: outcome === 'wrong-number' ? now : now + minutes * minuteMs,
    now,
  });
}

async function arrivalOf(
  { db }: Context,
  { morning_id }: CallRow,
  transaction: Transaction,
): Promise<number | null> {
  if (morning_id === null) return null;
  const [morning] = await select<{ arrival_at: Date }>(
    db,
    'SELECT arrival_at FROM mornings WHERE id = :morningId',
    { morningId: morning_id },
    transaction,
  );
  return morning?.arrival_at.getTime() ?? null;
}

async function noted(
  { db, clock }: Context,
  actor: Actor,
  transaction: Transaction,
  row: CallRow,
  detail: Record<string, unknown>,
): Promise<void> {
  await record(db, transaction, actor, {
    action: 'changed',
    matter: 'call',
    childIds: row.child_id === null ? [] : [row.child_id],
    detail: { callId: row.id, reason: row.reason, ...detail },
    at: clock.now(),
  });
  await announce(db, transaction, 'calls');
}
