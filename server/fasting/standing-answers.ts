import type { Transaction } from 'sequelize';
import type { FastingAnswer } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import type { Context } from '../context';
import { invalid, type FieldError } from '../http/problem';
import { laboratoryProfileOf, type StoredProfile } from '../protocols/protocols';
import { checkChild, type ToldAnswer } from './check-child';
import type { HouseholdNight } from './household-night';
import { newestFood } from './morning-outcome';
import type { CheckedChild } from './outcome-words';
import { isAboutFood, toldAtOf, type ToldRow } from './told-rows';

export interface GivenAnswers {
  readonly answers: readonly {
    readonly morningId: number;
    readonly answer: FastingAnswer;
    readonly lastIntakeAt?: Instant | null;
  }[];
}

export async function profilesOf(
  context: Context,
  transaction: Transaction,
  night: HouseholdNight,
): Promise<Map<number, StoredProfile>> {
  const ids = [...new Set(night.children.map(({ laboratoryProfileId }) => laboratoryProfileId))];
  const profiles = new Map<number, StoredProfile>();
  for (const id of ids) profiles.set(id, await laboratoryProfileOf(context.db, id, transaction));
  return profiles;
}

/** The newest answer of each child, the new ones counted where they are the newest. */
export function standingAnswers(
  night: HouseholdNight,
  before: readonly ToldRow[],
  given: GivenAnswers,
  toldAt: Instant,
): Map<number, ToldAnswer> {
  const standing = new Map<number, ToldAnswer>();
  for (const { morningId } of night.children) {
    const fresh = given.answers.find((answer) => answer.morningId === morningId);
    const last = newestFood(before, morningId);
    if (fresh && !(last && toldAtOf(last) > toldAt))
      standing.set(morningId, { answer: fresh.answer, lastIntakeAt: fresh.lastIntakeAt ?? null });
    else if (last && isAboutFood(last.answer))
      standing.set(morningId, {
        answer: last.answer,
        lastIntakeAt: last.last_intake_at?.getTime() ?? null,
      });
  }
  return standing;
}

export function checkAll(
  night: HouseholdNight,
  standing: ReadonlyMap<number, ToldAnswer>,
  given: GivenAnswers,
  profiles: ReadonlyMap<number, StoredProfile>,
  now: Instant,
): CheckedChild[] {
  const faults: FieldError[] = [];
  const checked = night.children.flatMap((plan): CheckedChild[] => {
    const answer = standing.get(plan.morningId);
    const profile = profiles.get(plan.laboratoryProfileId);
    if (!answer || !profile) {
      if (plan.state === 'planned')
        faults.push({ path: 'answers', message: `Answer for ${plan.callMe} too.` });
      return [];
    }
    const check = checkChild(plan, answer, profile, now);
    if (check.ok) return [{ plan, told: answer, check }];
    const index = given.answers.findIndex(({ morningId }) => morningId === plan.morningId);
    faults.push({
      path: `answers.${Math.max(0, index)}.lastIntakeAt`,
      message:
        check.error === 'intake-in-the-future'
          ? 'This time has not come yet.'
          : 'This is more than a day ago.',
    });
    return [];
  });
  if (faults.length > 0) throw invalid(faults);
  return checked;
}
