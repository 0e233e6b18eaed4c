import type { Sequelize, Transaction } from 'sequelize';
import type { Day, Instant } from '../../shared/domain/day';
import type { StandardPlan } from '../../shared/domain/fasting-plan';
import { select } from '../database/connection';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import type { Site } from '../sites/sites';

const minute = 60_000;
/** A morning stays on the page until two hours after the last arrival; its household link opens as long. */
const staysMinutes = 120;

/** One household's night: the children of one morning together, each with its own plan. */
export interface HouseholdNight {
  readonly on: Day;
  readonly site: Site;
  readonly zone: string;
  /** Youngest first; mornings that were lost are left out. */
  readonly children: readonly MorningPlan[];
  readonly firstArrivalAt: Instant;
  readonly lastArrivalAt: Instant;
  readonly questionOpensAt: Instant;
  /** Answers count until the last child is due. */
  readonly questionClosesAt: Instant;
  /** From here on a person calls whoever has not answered. */
  readonly callListAt: Instant;
}

export interface Household {
  readonly nights: readonly HouseholdNight[];
  /** The one the family reads about now; null when none is to come. */
  readonly next: HouseholdNight | null;
  readonly mornings: readonly MorningPlan[];
}

export const dueAt = (plan: MorningPlan): Instant => plan.expectedAt ?? plan.arrivalAt;

export const standardPlanOf = ({ plan }: MorningPlan): StandardPlan | null =>
  plan.kind === 'standard' ? plan : null;

export interface HouseholdReader {
  readonly householdId: number;
  /** Null reads for the whole household, as the clinic does. */
  readonly familyMemberId: number | null;
}

/** A guardian reads about every morning of the child, a helper about those given to the helper. */
export async function householdOf(
  db: Sequelize,
  reader: HouseholdReader,
  now: Instant,
  transaction?: Transaction,
): Promise<Household> {
  const all = await morningPlansOf(db, { householdId: reader.householdId }, transaction);
  const mornings = await morningsFor(db, reader, all, transaction);
  const days = [...new Set(mornings.map(({ on }) => on))].sort();
  const nights = days.flatMap((on) => nightOf(on, mornings) ?? []);
  const next = nights.find((night) => now < night.lastArrivalAt + staysMinutes * minute) ?? null;
  return { nights, next, mornings };
}

async function morningsFor(
  db: Sequelize,
  { familyMemberId }: HouseholdReader,
  all: readonly MorningPlan[],
  transaction?: Transaction,
): Promise<MorningPlan[]> {
  if (familyMemberId === null) return [...all];
  const ties = await select<{ child_id: number; standing: 'guardian' | 'helper' }>(
    db,
    'SELECT child_id, standing FROM child_family_members WHERE family_member_id = :familyMemberId',
    { familyMemberId },
    transaction,
  );
  const standings = new Map(ties.map(({ child_id, standing }) => [child_id, standing]));
  return all.filter((plan) => {
    const standing = standings.get(plan.childId);
    if (standing !== 'helper') return standing === 'guardian';
    const { escortFamilyMemberId, nightCarerFamilyMemberId } = plan;
    return [escortFamilyMemberId, nightCarerFamilyMemberId].includes(familyMemberId);
  });
}

function nightOf(on: Day, mornings: readonly MorningPlan[]): HouseholdNight | null {
  const children = mornings
    .filter((plan) => plan.on === on && plan.state !== 'lost')
    .sort((left, right) => right.bornOn.localeCompare(left.bornOn) || left.childId - right.childId);
  const [first] = children;
  if (!first) return null;
  const { site, zone } = first;
  const firstArrivalAt = Math.min(...children.map(({ arrivalAt }) => arrivalAt));
  const lastArrivalAt = Math.max(...children.map(dueAt));
  return {
    on,
    site,
    zone,
    children,
    firstArrivalAt,
    lastArrivalAt,
    questionOpensAt: firstArrivalAt - site.morningQuestionMinutesBefore * minute,
    questionClosesAt: lastArrivalAt,
    callListAt: firstArrivalAt - site.callListMinutesBefore * minute,
  };
}
