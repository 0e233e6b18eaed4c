import type { Transaction } from 'sequelize';
import type {
  FastingAnswer,
  MorningOutcome,
  OutcomeKind,
} from '../../shared/contracts/family-morning';
import type { Day, Instant } from '../../shared/domain/day';
import { record, type Actor } from '../access-record/record';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { invalid, notFound } from '../http/problem';
import { announce } from '../live/announce';
import type { StoredProfile } from '../protocols/protocols';
import { planHouseholdMessages } from '../messages/plan-messages';
import type { MorningPlan } from '../series/morning-plans';
import { checkChild, type ToldAnswer } from './check-child';
import { keepCallsInStep } from './family-calls';
import { familyWords, type FamilyWords } from './family-words';
import { dueAt, type HouseholdNight } from './household-night';
import { standingOutcome } from './morning-outcome';
import { lockedNight, refuseTooEarly, refuseTooLate } from './open-night';
import {
  householdOutcome,
  questionWords,
  toldUsSays,
  type CheckedChild,
  type HouseholdOutcome,
} from './outcome-words';
import { checkAll, profilesOf, standingAnswers } from './standing-answers';
import { countedInstant, keepToldRow, toldRows, type ToldRow } from './told-rows';

export interface FastingCheckSubmission {
  readonly source: 'web' | 'text' | 'call';
  readonly householdId: number;
  /** Null when staff record what a family said on the telephone. */
  readonly familyMemberId: number | null;
  /** The language in which the question was read or heard. */
  readonly language: string;
  /** The same key and morning are kept once; a repeat is answered like the first. */
  readonly submissionKey: string;
  readonly on: Day;
  readonly answers: readonly {
    readonly morningId: number;
    readonly answer: FastingAnswer;
    readonly lastIntakeAt?: Instant | null;
  }[];
  readonly deviceAt: Instant | null;
  /** The exact words, where they were not a choice on the page: the text "1", a sentence on the telephone. */
  readonly heard?: string;
}

export interface FastingCheckTold {
  readonly outcome: MorningOutcome;
  readonly kind: OutcomeKind;
  /** When the household's first child is due. */
  readonly arrivalAt: Instant;
  readonly waitUntil: Instant | null;
  readonly weCallBy: Instant | null;
  readonly night: HouseholdNight;
}

/**
 * Keeps what a family says about the night, word for word, and tells what to do now. Nothing is cancelled by it.
 * Accepted until the arrival.
 * @throws Problem 404 for a morning that is not this family's, 409 'too-early' or 'too-late', 422 for a time that
 * cannot be, or when a child is left out.
 */
export function recordFastingCheck(
  context: Context,
  actor: Actor,
  submission: FastingCheckSubmission,
): Promise<FastingCheckTold> {
  return inTransaction(context.db, (transaction) =>
    recordFastingCheckIn(context, transaction, actor, submission),
  );
}

/** The same inside the caller's transaction, for an answer that comes with its own record (a text). */
export async function recordFastingCheckIn(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  submission: FastingCheckSubmission,
): Promise<FastingCheckTold> {
  const { db } = context;
  const now = context.clock.now();
  const night = await lockedNight(db, transaction, submission, submission.on, now);
  const words = await familyWords(context, submission.language, night.site, transaction);
  const plans = plansOfAnswers(night, submission);
  const before = await toldRows(
    db,
    night.children.map(({ morningId }) => morningId),
    transaction,
  );
  const isKnown = (morningId: number): boolean =>
    before.some(
      (row) => row.submission_key === submission.submissionKey && row.morning_id === morningId,
    );
  const fresh = submission.answers.filter(({ morningId }) => !isKnown(morningId));
  if (fresh.length === 0) return told(night, before, words, null);
  refuseTooEarly(night, words, now);
  refuseTooLate(night, words, now);

  const toldAt = countedInstant(submission.deviceAt, now, night.questionOpensAt);
  const profiles = await profilesOf(context, transaction, night);
  const standing = standingAnswers(night, before, submission, toldAt);
  const checked = checkAll(night, standing, submission, profiles, now);
  const household = householdOutcome(night, checked, words);
  for (const answer of fresh) {
    const plan = plans.get(answer.morningId);
    if (!plan) throw notFound('This morning');
    await keepAnswer(
      context,
      transaction,
      { submission, plan, words, profiles, household, toldAt, now },
      answer,
    );
  }
  const after = await toldRows(
    db,
    night.children.map(({ morningId }) => morningId),
    transaction,
  );
  const isNewest = after.at(-1)?.submission_key === submission.submissionKey;
  if (isNewest) await raiseCalls(context, transaction, submission, checked, household, now);
  await record(db, transaction, actor, {
    action: 'changed',
    matter: 'fasting-check',
    childIds: [...plans.values()].map(({ childId }) => childId),
    detail: { on: night.on, source: submission.source, outcome: household.kind },
    at: now,
  });
  for (const { morningId } of fresh) await announce(db, transaction, 'mornings', morningId);
  // Whoever has answered is not asked again.
  await planHouseholdMessages(context, transaction, {
    householdId: submission.householdId,
    on: night.on,
  });
  return told(night, after, words, isNewest ? household : null);
}

function told(
  night: HouseholdNight,
  rows: readonly ToldRow[],
  words: FamilyWords,
  household: HouseholdOutcome | null,
): FastingCheckTold {
  const outcome = standingOutcome(night, rows, words);
  if (!outcome) throw notFound('This answer');
  return {
    outcome,
    kind: outcome.kind,
    arrivalAt: Math.min(...night.children.map(dueAt)),
    waitUntil: household?.waitUntil ?? null,
    weCallBy: household?.weCallBy ?? null,
    night,
  };
}

/** @throws Problem 404 for somebody else's morning, 422 when one is named twice. */
function plansOfAnswers(
  night: HouseholdNight,
  { answers }: FastingCheckSubmission,
): Map<number, MorningPlan> {
  const plans = new Map<number, MorningPlan>();
  for (const [index, { morningId }] of answers.entries()) {
    const plan = night.children.find((child) => child.morningId === morningId);
    if (!plan) throw notFound('This morning');
    if (plans.has(morningId))
      throw invalid([
        { path: `answers.${index}.morningId`, message: 'This child is answered twice.' },
      ]);
    plans.set(morningId, plan);
  }
  return plans;
}

interface Keeping {
  readonly submission: FastingCheckSubmission;
  readonly plan: MorningPlan;
  readonly words: FamilyWords;
  readonly profiles: ReadonlyMap<number, StoredProfile>;
  readonly household: HouseholdOutcome;
  readonly toldAt: Instant;
  readonly now: Instant;
}

async function keepAnswer(
  context: Context,
  transaction: Transaction,
  keeping: Keeping,
  given: FastingCheckSubmission['answers'][number],
): Promise<void> {
  const { submission, plan, words, profiles, household, toldAt, now } = keeping;
  const answer: ToldAnswer = { answer: given.answer, lastIntakeAt: given.lastIntakeAt ?? null };
  const profile = profiles.get(plan.laboratoryProfileId);
  const check = profile ? checkChild(plan, answer, profile, now) : null;
  const { asks, choices } = questionWords(plan, words);
  const chosen = choices.find((choice) => choice.answer === given.answer);
  const toldUs = toldUsSays(plan, answer, words);
  await keepToldRow(context.db, transaction, {
    morningId: plan.morningId,
    familyMemberId: submission.familyMemberId,
    source: submission.source,
    submissionKey: submission.submissionKey,
    answer: given.answer,
    lastIntakeAt: answer.lastIntakeAt,
    verdict: check?.ok ? check.verdict : null,
    outcome: check?.ok ? check.outcome : household.kind,
    explanation: check?.ok ? check.explanation : null,
    said: {
      toldAt: new Date(toldAt).toISOString(),
      question: { key: 'question.asks', says: asks },
      answer: {
        key: `question.choice.${given.answer}`,
        says: submission.heard ?? chosen?.says ?? toldUs,
      },
      toldUs,
      outcome: {
        kind: household.kind,
        heading: household.heading,
        lines: household.lines,
      },
      wording: words.used(),
    },
    language: submission.language,
    deviceAt: submission.deviceAt,
    receivedAt: now,
  });
}

async function raiseCalls(
  context: Context,
  transaction: Transaction,
  submission: FastingCheckSubmission,
  checked: readonly CheckedChild[],
  household: HouseholdOutcome,
  now: Instant,
): Promise<void> {
  const doubtful = checked.find(({ check }) => check.outcome === household.kind) ?? checked[0];
  if (!doubtful) return;
  await keepCallsInStep(context.db, transaction, {
    householdId: submission.householdId,
    on: submission.on,
    kind: household.kind,
    isNotSure: doubtful.told.answer === 'unsure',
    childId: doubtful.plan.childId,
    morningId: doubtful.plan.morningId,
    familyMemberId: submission.familyMemberId,
    detail: household.heading,
    weCallBy: household.weCallBy,
    now,
  });
}
