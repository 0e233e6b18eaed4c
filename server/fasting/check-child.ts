import type { FastingAnswer } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { fastingCheck, type FastingCheckResult } from '../../shared/domain/fasting-check';
import { laboratoryCutOffAt } from '../../shared/domain/laboratory-day';
import type { LaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { instantOf } from '../../shared/domain/zone';
import type { MorningPlan } from '../series/morning-plans';
import { dueAt } from './household-night';

const minute = 60_000;
/** A promised call leaves the clinic a quarter of an hour after its telephone opens. */
export const callBackMinutes = 15;
/** A family takes the later of two times, and telephones run ahead: a time that is just to come means now. */
const aheadMinutes = 31;

export interface ToldAnswer {
  readonly answer: FastingAnswer;
  readonly lastIntakeAt: Instant | null;
}

/** When somebody answers the site's telephone on that morning, and when it ends. */
export function dawnPhoneOf({ site, on, zone }: MorningPlan): {
  answersFrom: Instant;
  answersUntil: Instant;
} {
  return {
    answersFrom: instantOf({ on, time: site.dawnPhone.from, zone }),
    answersUntil: instantOf({ on, time: site.dawnPhone.until, zone }),
  };
}

/** The domain's check with everything that the site, the laboratory and a later arrival change about it. */
export function checkChild(
  plan: MorningPlan,
  { answer, lastIntakeAt }: ToldAnswer,
  profile: LaboratoryProfile,
  now: Instant,
): FastingCheckResult {
  const { site, on, zone } = plan;
  const arrivalAt = dueAt(plan);
  const dawnPhone = dawnPhoneOf(plan);
  const isJustAhead =
    lastIntakeAt !== null && lastIntakeAt > now && lastIntakeAt <= now + aheadMinutes * minute;
  const intakeAt = isJustAhead ? now : lastIntakeAt;
  return fastingCheck({
    answer: intakeAt === null ? { kind: answer } : { kind: answer, lastIntakeAt: intakeAt },
    plan: plan.plan,
    now,
    arrivalAt,
    likelyCollectionAt: arrivalAt + site.usualWaitMinutes * minute,
    dawnPhone,
    weCallBy: now < dawnPhone.answersFrom ? dawnPhone.answersFrom + callBackMinutes * minute : null,
    lastRoomStartAt:
      instantOf({ on, time: site.arrivals.until, zone }) + site.usualWaitMinutes * minute,
    laboratoryCutOffAt: laboratoryCutOffAt({ profile, on, zone }),
  });
}
