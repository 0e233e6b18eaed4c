import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import { change } from '../database/connection';
import { announce } from '../live/announce';

/** Something that a person has to do by telephone. */
export interface NewCall {
  /** Kebab-case; `call.says.<reason>` and `call.script.<reason>` of the wording belong to it. */
  readonly reason: string;
  /** Reason and subject, for example 'not-answered:12:2027-04-14'. One task is open for each key. */
  readonly openKey: string;
  readonly householdId?: number | null;
  readonly childId?: number | null;
  readonly morningId?: number | null;
  readonly seriesId?: number | null;
  readonly familyMemberId?: number | null;
  /** What the person who calls should know; never shown where results are hidden. */
  readonly detail?: string | null;
  readonly isForClinician: boolean;
  /** When somebody should have called, epoch milliseconds of the business clock. */
  readonly urgentAt: number;
  readonly now: number;
}

const longestDetail = 500;

/**
 * Puts a task on the call list, in the transaction of its cause. While a task with this key is open it only becomes
 * more urgent and takes the newer detail.
 * @returns whether the task is new.
 */
export async function raiseCall(
  db: Sequelize,
  transaction: Transaction,
  call: NewCall,
): Promise<boolean> {
  const [, touched] = await db.query(
    `INSERT INTO call_tasks (open_key, reason, household_id, child_id, morning_id, series_id, family_member_id, detail,
       is_for_clinician, urgent_at, created_at)
     VALUES (:openKey, :reason, :householdId, :childId, :morningId, :seriesId, :familyMemberId, :detail,
       :isForClinician, :urgentAt, :now)
     ON DUPLICATE KEY UPDATE urgent_at = LEAST(urgent_at, :urgentAt), detail = COALESCE(:detail, detail)`,
    {
      replacements: {
        openKey: call.openKey,
        reason: call.reason,
        householdId: call.householdId ?? null,
        childId: call.childId ?? null,
        morningId: call.morningId ?? null,
        seriesId: call.seriesId ?? null,
        familyMemberId: call.familyMemberId ?? null,
        detail: call.detail?.slice(0, longestDetail) ?? null,
        isForClinician: call.isForClinician,
        urgentAt: new Date(call.urgentAt),
        now: new Date(call.now),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  // One row for a new task; two or none for one that was open already.
  const isNew = touched === 1;
  if (isNew) await announce(db, transaction, 'calls');
  return isNew;
}

/**
 * Takes tasks from the list that have become needless, for example because the family has answered.
 * @returns how many were open.
 */
export async function closeCalls(
  db: Sequelize,
  transaction: Transaction,
  openKeys: readonly string[],
  { now, note = null }: { readonly now: number; readonly note?: string | null },
): Promise<number> {
  if (openKeys.length === 0) return 0;
  const closed = await change(
    db,
    `UPDATE call_tasks SET open_key = NULL, done_at = :now, outcome = 'not-needed', note = :note
     WHERE open_key IN (:openKeys) AND done_at IS NULL`,
    { openKeys, now: new Date(now), note },
    transaction,
  );
  if (closed > 0) await announce(db, transaction, 'calls');
  return closed;
}
