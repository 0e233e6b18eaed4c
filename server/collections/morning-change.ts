import type { Sequelize, Transaction } from 'sequelize';
import type { MorningChanged } from '../../shared/contracts/this-morning';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { change, inTransaction } from '../database/connection';
import { changedMeanwhile, notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { siteOf } from '../sites/sites';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { sheetOf } from './this-morning';

export interface ChangeStep {
  readonly plan: MorningPlan;
  readonly now: number;
  readonly transaction: Transaction;
  readonly words: ClinicWords;
}

/** What a step did; 'repeated' when the same request came a second time and there is nothing left to do. */
export interface StepDone {
  readonly warnings?: readonly string[];
  readonly detail?: Readonly<Record<string, unknown>>;
  readonly isRepeated?: boolean;
}

/**
 * One change of a morning on its own day: the step, the access record and the live change in one transaction; the
 * answer is the row as it stands afterwards.
 * @throws Problem 404 for a morning of another site, 409 'not-today' on any other day.
 */
export async function changeMorning(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  matter: string,
  step: (of: ChangeStep) => Promise<StepDone>,
): Promise<MorningChanged> {
  const now = context.clock.now();
  const words = clinicWords(staff.language);
  const { plan, warnings } = await inTransaction(context.db, async (transaction) => {
    const found = await lockedPlan(context.db, transaction, staff, morningId);
    if (found.on !== dayOf(now, found.zone))
      throw new Problem(409, 'not-today', 'This morning belongs to another day.');
    const done = await step({ plan: found, now, transaction, words });
    if (!done.isRepeated) {
      await record(context.db, transaction, actor, {
        action: 'changed',
        matter,
        childIds: [found.childId],
        detail: { morningId, ...done.detail },
        at: now,
      });
      await announce(context.db, transaction, 'mornings', morningId);
    }
    return { plan: found, warnings: [...(done.warnings ?? [])] };
  });
  const site = await siteOf(context.db, plan.siteId);
  const { rows } = await sheetOf(context, site, plan.on, now, words);
  const row = rows.find((candidate) => candidate.morningId === morningId);
  if (!row) throw notFound('This morning');
  return { row, warnings };
}

async function lockedPlan(
  db: Sequelize,
  transaction: Transaction,
  staff: StaffMember,
  morningId: number,
): Promise<MorningPlan> {
  // Two screens that act at once come one after the other; the second sees what the first did.
  await db.query('SELECT id FROM mornings WHERE id = :morningId FOR UPDATE', {
    replacements: { morningId },
    transaction,
  });
  const [plan] = await morningPlansOf(db, { morningIds: [morningId] }, transaction);
  if (!plan || plan.siteId !== staff.siteId) throw notFound('This morning');
  await childInReach(db, staff, plan.childId, transaction).catch(() => {
    throw notFound('This morning');
  });
  return plan;
}

/**
 * Changes the morning's own columns from the version that the screen showed.
 * @throws Problem 409 'changed-meanwhile'
 */
export async function updateMorning(
  db: Sequelize,
  { plan, transaction }: ChangeStep,
  version: number,
  columns: Readonly<Record<string, unknown>>,
): Promise<void> {
  const assignments = Object.keys(columns).map((column) => `${column} = :${column}`);
  const touched = await change(
    db,
    `UPDATE mornings SET ${[...assignments, 'version = version + 1'].join(', ')}
     WHERE id = :morningId AND version = :version`,
    { ...columns, morningId: plan.morningId, version },
    transaction,
  );
  if (touched === 0) throw changedMeanwhile();
}
