import type { Sequelize, Transaction } from 'sequelize';
import type { Day, Instant } from '../../shared/domain/day';
import { notFound, Problem } from '../http/problem';
import type { FamilyWords } from './family-words';
import { householdOf, type HouseholdNight, type HouseholdReader } from './household-night';

/**
 * The night that an answer is about, with its mornings locked: two phones of one family come one after the other.
 * @throws Problem 404 when this family has no morning on that day.
 */
export async function lockedNight(
  db: Sequelize,
  transaction: Transaction,
  reader: HouseholdReader,
  on: Day,
  now: Instant,
): Promise<HouseholdNight> {
  await db.query(
    `SELECT mornings.id FROM mornings JOIN children ON children.id = mornings.child_id
     WHERE children.household_id = :householdId AND mornings.planned_on = :on ORDER BY mornings.id FOR UPDATE`,
    { replacements: { householdId: reader.householdId, on }, transaction },
  );
  const { nights } = await householdOf(db, reader, now, transaction);
  const night = nights.find((candidate) => candidate.on === on);
  if (!night) throw notFound('This morning');
  return night;
}

export type QuestionState = 'open' | 'too-early' | 'closed';

export function questionState(night: HouseholdNight, now: Instant): QuestionState {
  const isOver = night.children.every(({ state }) => state !== 'planned');
  if (isOver || now >= night.questionClosesAt) return 'closed';
  return now < night.questionOpensAt ? 'too-early' : 'open';
}

/** The arrival ends what can be told by page or text; from then on a person is there to talk to. */
export function refuseTooLate(night: HouseholdNight, words: FamilyWords, now: Instant): void {
  if (questionState(night, now) !== 'closed') return;
  const { phone } = night.site;
  throw new Problem(409, 'too-late', words.text('question.state.closed', { phone }), {
    phone,
    closedAt: new Date(night.questionClosesAt).toISOString(),
  });
}

export function refuseTooEarly(night: HouseholdNight, words: FamilyWords, now: Instant): void {
  if (questionState(night, now) !== 'too-early') return;
  const { questionOpensAt } = night;
  throw new Problem(
    409,
    'too-early',
    words.text('question.state.too-early', {
      weekday: words.weekday(questionOpensAt),
      time: words.time(questionOpensAt),
    }),
    { opensAt: new Date(questionOpensAt).toISOString() },
  );
}
