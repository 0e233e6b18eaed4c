import type { Sequelize, Transaction } from 'sequelize';
import type { Instant } from '../../shared/domain/day';
import type { StandardPlan } from '../../shared/domain/fasting-plan';
import {
  askedMoment,
  questionsFor,
  sayBackStanding,
  type SayBackQuestion,
  type SayBackStanding,
} from '../../shared/domain/say-it-back';
import { select } from '../database/connection';
import { standardPlanOf, type HouseholdNight } from '../fasting/household-night';
import type { MorningPlan } from '../series/morning-plans';

export interface TaughtChild {
  readonly morning: MorningPlan;
  readonly plan: StandardPlan;
}

/** What the household is asked about one night, and how it stands. */
export interface SayBackNight {
  readonly night: HouseholdNight;
  /** With times of their own; the youngest first. Never empty. */
  readonly children: readonly [TaughtChild, ...TaughtChild[]];
  readonly asked: readonly SayBackQuestion[];
  /** The moment of the question about water or comfort. */
  readonly momentAt: Instant | null;
  readonly standing: SayBackStanding;
}

interface SaidRow {
  series_id: number;
  question: SayBackQuestion;
  is_right: 0 | 1;
}

/** Null where nothing can be asked: no child of this night has times that are signed. */
export async function sayBackNightOf(
  db: Sequelize,
  night: HouseholdNight,
  transaction?: Transaction,
): Promise<SayBackNight | null> {
  const [first, ...more] = night.children.flatMap((morning): TaughtChild[] => {
    const plan = standardPlanOf(morning);
    return plan === null || morning.state !== 'planned' ? [] : [{ morning, plan }];
  });
  if (!first) return null;
  const children = [first, ...more] as const;
  const momentAt = askedMoment(
    Math.max(...children.map(({ plan }) => plan.nothingAt)),
    night.firstArrivalAt,
  );
  const { isInfant } = first.plan;
  const asked = questionsFor({ isInfant, feeding: first.morning.feeding }).filter(
    (question) => momentAt !== null || (question !== 'water' && question !== 'comfort'),
  );
  const rows = await select<SaidRow>(
    db,
    `SELECT series_id, question, is_right FROM say_backs
     WHERE series_id IN (:seriesIds) AND question IN (:asked) ORDER BY id`,
    { seriesIds: children.map(({ morning }) => morning.seriesId), asked },
    transaction,
  );
  const tries = asked.flatMap((question) => triesOf(question, aboutOf(question, children), rows));
  return { night, children, asked, momentAt, standing: sayBackStanding(asked, tries) };
}

/** The last feed and comfort are the youngest child's; water and mistakes are everybody's. */
export const aboutOf = (
  question: SayBackQuestion,
  children: readonly [TaughtChild, ...TaughtChild[]],
): readonly TaughtChild[] =>
  question === 'last' || question === 'comfort' ? [children[0]] : children;

/** A brother or sister who came later has not been talked about yet: the child with the fewest answers counts. */
function triesOf(
  question: SayBackQuestion,
  about: readonly TaughtChild[],
  rows: readonly SaidRow[],
): { question: SayBackQuestion; isRight: boolean }[] {
  const own = about.map(({ morning }) =>
    rows
      .filter((row) => row.question === question && row.series_id === morning.seriesId)
      .map((row) => ({ question, isRight: row.is_right === 1 })),
  );
  return own.reduce((fewest, tries) => (tries.length < fewest.length ? tries : fewest));
}
