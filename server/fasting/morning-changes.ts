import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { morningChangeRequest, MorningOutcome } from '../../shared/contracts/family-morning';
import type { Day, Instant } from '../../shared/domain/day';
import { instantOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { Context } from '../context';
import { change, inTransaction } from '../database/connection';
import { notFound } from '../http/problem';
import { announce } from '../live/announce';
import { planHouseholdMessages } from '../messages/plan-messages';
import type { MorningPlan } from '../series/morning-plans';
import { keepCallsInStep } from './family-calls';
import { sayingOf, type ChangeSaying } from './change-words';
import { familyWords, type FamilyWords } from './family-words';
import type { HouseholdNight } from './household-night';
import { standingOutcome } from './morning-outcome';
import { lockedNight, refuseTooLate } from './open-night';
import { countedInstant, keepToldRow, toldRows, type ToldKind } from './told-rows';

type ChangeRequest = z.output<typeof morningChangeRequest>;
type Without<Key extends PropertyKey, Union> = Union extends unknown ? Omit<Union, Key> : never;

/** "Late", "ill" or "not coming", from the page, a text or the telephone. */
export type MorningChangeSubmission = Without<'deviceAt', ChangeRequest> & {
  readonly source: 'web' | 'text' | 'call';
  readonly householdId: number;
  readonly familyMemberId: number | null;
  readonly language: string;
  readonly deviceAt: Instant | null;
  readonly heard?: string;
};

const minute = 60_000;

/**
 * Keeps a change of the morning for every child of the household and tells what to do: food first when a child is ill
 * or does not come. The morning itself stays until a clinician decides.
 * @throws Problem 404, 409 'too-late', 422 'newArrivalAt'
 */
export function recordMorningChange(
  context: Context,
  actor: Actor,
  submission: MorningChangeSubmission,
): Promise<MorningOutcome> {
  return inTransaction(context.db, (transaction) =>
    recordMorningChangeIn(context, transaction, actor, submission),
  );
}

export async function recordMorningChangeIn(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  submission: MorningChangeSubmission,
): Promise<MorningOutcome> {
  const { db } = context;
  const now = context.clock.now();
  const night = await lockedNight(db, transaction, submission, submission.on, now);
  const words = await familyWords(context, submission.language, night.site, transaction);
  const ids = night.children.map(({ morningId }) => morningId);
  const before = await toldRows(db, ids, transaction);
  if (!before.some((row) => row.submission_key === submission.submissionKey)) {
    refuseTooLate(night, words, now);
    const saying = sayingOf(submission, night, before, words, now);
    const toldAt = countedInstant(submission.deviceAt, now, earliestPossible(night.on, night.zone));
    if (submission.kind === 'late')
      await noteNewArrival(context, transaction, night, Date.parse(submission.newArrivalAt));
    for (const plan of night.children)
      await keepToldRow(db, transaction, rowOf(submission, plan, saying, words, toldAt, now));
    await keepCallsInStep(db, transaction, {
      householdId: submission.householdId,
      on: submission.on,
      kind: saying.kind,
      isNotSure: false,
      childId: night.children[0]?.childId ?? 0,
      morningId: night.children[0]?.morningId ?? 0,
      familyMemberId: submission.familyMemberId,
      detail: saying.heading,
      weCallBy: saying.weCallBy,
      now,
    });
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'morning-change',
      childIds: night.children.map(({ childId }) => childId),
      detail: { on: night.on, kind: submission.kind, source: submission.source },
      at: now,
    });
    for (const id of ids) await announce(db, transaction, 'mornings', id);
    // Whoever does not come is not asked again.
    await planHouseholdMessages(context, transaction, {
      householdId: submission.householdId,
      on: submission.on,
    });
  }
  const after = await lockedNight(db, transaction, submission, submission.on, now);
  const outcome = standingOutcome(after, await toldRows(db, ids, transaction), words);
  if (!outcome) throw notFound('This answer');
  return outcome;
}

/** A family can say from the day before on that it will not come. */
const earliestPossible = (on: Day, zone: string): Instant =>
  instantOf({ on, time: '00:00', zone }) - 24 * 60 * minute;

async function noteNewArrival(
  context: Context,
  transaction: Transaction,
  night: HouseholdNight,
  newArrivalAt: Instant,
): Promise<void> {
  const lateMs = newArrivalAt - night.firstArrivalAt;
  for (const plan of night.children.filter(({ state }) => state === 'planned'))
    await change(
      context.db,
      'UPDATE mornings SET expected_at = :expectedAt, version = version + 1 WHERE id = :morningId',
      { expectedAt: new Date(plan.arrivalAt + lateMs), morningId: plan.morningId },
      transaction,
    );
}

const kinds: Readonly<Record<MorningChangeSubmission['kind'], ToldKind>> = {
  late: 'late',
  ill: 'ill',
  'not-coming': 'not-coming',
};

function rowOf(
  submission: MorningChangeSubmission,
  plan: MorningPlan,
  saying: ChangeSaying,
  words: FamilyWords,
  toldAt: Instant,
  now: Instant,
) {
  const { source, familyMemberId, submissionKey, language, deviceAt } = submission;
  return {
    morningId: plan.morningId,
    familyMemberId,
    source,
    submissionKey,
    answer: kinds[submission.kind],
    lastIntakeAt: null,
    verdict: null,
    outcome: saying.kind,
    said: {
      toldAt: new Date(toldAt).toISOString(),
      question: { key: saying.questionKey, says: words.text(saying.questionKey) },
      answer: { key: saying.answerKey, says: submission.heard ?? saying.answer },
      toldUs: saying.toldUs(plan),
      outcome: { kind: saying.kind, heading: saying.heading, lines: saying.lines },
      wording: words.used(),
    },
    language,
    deviceAt,
    receivedAt: now,
  };
}
