import type { Sequelize, Transaction } from 'sequelize';
import type { SayBackAnswered } from '../../shared/contracts/say-it-back';
import type { Day, Instant } from '../../shared/domain/day';
import { isChoiceOf, isRightChoice, type SayBackQuestion } from '../../shared/domain/say-it-back';
import { record, type Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { familyWords, type FamilyWords } from '../fasting/family-words';
import { lockedNight, refuseTooLate } from '../fasting/open-night';
import { invalid, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { sayBackNightOf, aboutOf, type SayBackNight } from './say-back-night';
import { isSetSigned, questionWords, type QuestionWords } from './say-back-words';
import { pageOf } from './say-it-back';
import { callIfNotUnderstood } from './say-back-calls';

export interface SayBackSubmission {
  readonly submissionKey: string;
  readonly on: Day;
  readonly question: SayBackQuestion;
  readonly tries: number;
  readonly choice: string;
  readonly deviceAt: Instant;
}

/**
 * Keeps one answer word for word and explains it. An answer that came before, or a question that another phone of the
 * family has answered meanwhile, is explained and not counted again. What is missed after its explanation becomes a
 * call in the same transaction.
 * @throws Problem 404 for a morning that is not this visitor's, 409 'not-asked' where nothing is asked, 409 'too-late'
 * after the arrival, 422 for a choice that the question does not have.
 */
export function recordSayBack(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
  submission: SayBackSubmission,
): Promise<SayBackAnswered> {
  const { db } = context;
  return inTransaction(db, async (transaction) => {
    const now = context.clock.now();
    const night = await lockedNight(db, transaction, visitor, submission.on, now);
    const words = await familyWords(context, visitor.language, night.site, transaction);
    refuseTooLate(night, words, now);
    const before = await sayBackNightOf(db, night, transaction);
    if (!before?.asked.includes(submission.question) || !isSetSigned(before, words))
      throw new Problem(409, 'not-asked', words.text('say-back.none'));
    if (!isChoiceOf(submission.question, submission.choice))
      throw invalid([{ path: 'choice', message: 'The question has no such choice.' }]);
    const fresh = await familyWords(context, visitor.language, night.site, transaction);
    const told = questionWords(submission.question, before, fresh);
    const answered = answeredSays(submission, told, fresh);
    const isDue = before.standing.pending.some(
      ({ question, tries }) => question === submission.question && tries === submission.tries,
    );
    // The night's rows are locked: a repeat finds the first one counted.
    if (!isDue) return { ...answered, next: pageOf(before, words, now) };
    await keep(db, transaction, { submission, visitor, before, told, answered, words: fresh, now });
    const after = (await sayBackNightOf(db, night, transaction)) ?? before;
    await callIfNotUnderstood(db, transaction, after, visitor.familyMemberId, now);
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'say-it-back',
      childIds: aboutOf(submission.question, before.children).map(({ morning }) => morning.childId),
      detail: { on: night.on, question: submission.question, isRight: answered.isRight },
      at: now,
    });
    for (const { morning } of aboutOf(submission.question, before.children))
      await announce(db, transaction, 'children', morning.childId);
    return { ...answered, next: pageOf(after, words, now) };
  });
}

function answeredSays(
  { question, choice }: SayBackSubmission,
  told: QuestionWords,
  words: FamilyWords,
): Omit<SayBackAnswered, 'next'> {
  const isRight = isRightChoice(question, choice);
  const key = isRight ? 'right' : choice === 'unsure' ? 'unsure-thanks' : 'explain';
  const picture =
    told.choices.find((one) => isRightChoice(question, one.choice))?.picture ?? 'done';
  return { isRight, heading: words.text(`say-back.${key}`), says: told.explains, picture };
}

interface Keeping {
  readonly submission: SayBackSubmission;
  readonly visitor: FamilyVisitor;
  readonly before: SayBackNight;
  readonly told: QuestionWords;
  readonly answered: Omit<SayBackAnswered, 'next'>;
  readonly words: FamilyWords;
  readonly now: Instant;
}

async function keep(
  db: Sequelize,
  transaction: Transaction,
  { submission, visitor, before, told, answered, words, now }: Keeping,
): Promise<void> {
  const said = JSON.stringify({
    question: told.asks,
    answer: told.choices.find(({ choice }) => choice === submission.choice)?.says ?? '',
    heading: answered.heading,
    explained: answered.says,
    wording: words.used(),
  });
  for (const { morning } of aboutOf(submission.question, before.children))
    await db.query(
      `INSERT INTO say_backs (series_id, morning_id, family_member_id, submission_key, question, choice, is_right,
         said, language, device_at, received_at)
       VALUES (:seriesId, :morningId, :familyMemberId, :submissionKey, :question, :choice, :isRight,
         :said, :language, :deviceAt, :now)`,
      {
        replacements: {
          seriesId: morning.seriesId,
          morningId: morning.morningId,
          familyMemberId: visitor.familyMemberId,
          submissionKey: submission.submissionKey,
          question: submission.question,
          choice: submission.choice,
          isRight: answered.isRight,
          said,
          language: visitor.language,
          deviceAt: new Date(submission.deviceAt),
          now: new Date(now),
        },
        transaction,
      },
    );
}
