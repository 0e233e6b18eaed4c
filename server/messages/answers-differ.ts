import type { Transaction } from 'sequelize';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { select } from '../database/connection';
import type { MorningPlan } from '../series/morning-plans';
import type { HouseholdDay } from './night-queue';

export interface ToldAnswer {
  readonly answer: string;
  readonly source: 'web' | 'text' | 'call';
  /** The answer before it, where it came another way and says something else. */
  readonly unlike: { readonly id: number; readonly answer: string } | null;
}

/** What was told last about each morning, by its id; "we run late" is no answer about the night. */
export type ToldAnswers = ReadonlyMap<number, ToldAnswer>;

interface AnswerRow {
  id: number;
  morning_id: number;
  answer: string;
  source: ToldAnswer['source'];
}

export async function toldAnswers(
  { db }: Context,
  transaction: Transaction,
  plans: readonly MorningPlan[],
): Promise<ToldAnswers> {
  if (plans.length === 0) return new Map();
  const rows = await select<AnswerRow>(
    db,
    `SELECT id, morning_id, answer, source FROM fasting_checks
     WHERE morning_id IN (:morningIds) AND answer <> 'late' ORDER BY received_at, id`,
    { morningIds: plans.map((plan) => plan.morningId) },
    transaction,
  );
  const told = new Map<number, ToldAnswer>();
  const before = new Map<number, AnswerRow>();
  for (const row of rows) {
    const last = before.get(row.morning_id);
    const isUnlike = last && last.source !== row.source && last.answer !== row.answer;
    told.set(row.morning_id, {
      answer: row.answer,
      source: row.source,
      unlike: isUnlike ? { id: row.id, answer: last.answer } : null,
    });
    before.set(row.morning_id, row);
  }
  return told;
}

/**
 * A family that says one thing by text and another on the page: the later one counts, both are kept, and a person asks.
 * Each pair is told to the staff once.
 */
export async function tellDisagreement(
  { db, clock }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  plans: readonly MorningPlan[],
  answers: ToldAnswers,
): Promise<void> {
  const plan = plans.find(({ morningId }) => answers.get(morningId)?.unlike);
  const unlike = plan && answers.get(plan.morningId)?.unlike;
  if (!plan || !unlike) return;
  const openKey = `answers-differ:${householdId}:${on}:${unlike.id}`;
  const known = await select(
    db,
    `SELECT id FROM call_tasks WHERE reason = 'answers-differ' AND morning_id = :morningId
       AND (open_key = :openKey OR done_at >= (SELECT received_at FROM fasting_checks WHERE id = :answerId)) LIMIT 1`,
    { morningId: plan.morningId, openKey, answerId: unlike.id },
    transaction,
  );
  if (known.length > 0) return;
  await raiseCall(db, transaction, {
    reason: 'answers-differ',
    openKey,
    householdId,
    childId: plan.childId,
    morningId: plan.morningId,
    familyMemberId: plan.escortFamilyMemberId ?? plan.nightCarerFamilyMemberId,
    isForClinician: false,
    urgentAt: clock.now(),
    now: clock.now(),
  });
}
