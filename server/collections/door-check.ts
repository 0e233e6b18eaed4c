import type { z } from 'zod';
import { can, isRole } from '../../shared/access/rights';
import type { doorCheckRequest, MorningChanged } from '../../shared/contracts/this-morning';
import type { Instant } from '../../shared/domain/day';
import { doorFast, type DoorFast } from '../../shared/domain/door-check';
import type { FastingPlan } from '../../shared/domain/fasting-plan';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { changedMeanwhile, invalid, Problem, type FieldError } from '../http/problem';
import type { DoorCheckRow } from './morning-facts';
import { changeMorning, updateMorning, type ChangeStep } from './morning-change';

export type DoorCheckInput = z.output<typeof doorCheckRequest>;

const minute = 60_000;
const oldestHours = 36;
const at = (text: string | null): Instant | null => (text === null ? null : Date.parse(text));

/** Whoever may sign orders decides about going on against the plan's hours (PRACTICE 1). */
export const isClinician = (staff: StaffMember): boolean =>
  can(staff.roles.filter(isRole), 'orders.sign');

/**
 * What the nurse hears at the door. This record, not the phone's answer, opens "begin"; differences to the answer
 * stay visible, because every check is a row of its own.
 * @throws Problem 403 'clinician-decides' when somebody else gives a reason to go on; 422 for impossible times.
 */
export function checkAtTheDoor(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  input: DoorCheckInput,
): Promise<MorningChanged> {
  return changeMorning(context, actor, staff, morningId, 'door-check', async (step) => {
    const { plan, now, transaction } = step;
    if (plan.arrivedAt === null)
      throw new Problem(409, 'not-here-yet', 'This child has not arrived yet.');
    if (await isSameAsLast(context, step, staff, input)) return { isRepeated: true };
    if (plan.state !== 'here')
      throw new Problem(409, 'morning-over', 'The collection has begun or is over.');
    if (input.goOnReason !== null && !isClinician(staff))
      throw new Problem(
        403,
        'clinician-decides',
        'A clinician decides to go on and gives the reason.',
        { errors: [{ path: 'goOnReason', message: 'A clinician gives this reason.' }] },
      );
    const faults = timeFaults(input, now);
    if (faults.length > 0) throw invalid(faults);
    const { verdict, explanation } = fastAtTheDoor(input, plan.plan, now);
    await updateMorning(context.db, step, input.version, {});
    await context.db.query(
      `INSERT INTO door_checks (morning_id, last_food_at, food_item, last_drink_at, drink_item, medicine, woke_at, is_well,
         blood_glucose_mg_dl, brought_by, verdict, explanation, go_on_reason, checked_by_staff_id, checked_at)
       VALUES (:morningId, :lastFoodAt, :foodItem, :lastDrinkAt, :drinkItem, :medicine, :wokeAt, :isWell,
         :bloodGlucoseMgDl, :broughtBy, :verdict, :explanation, :goOnReason, :staffId, :now)`,
      {
        replacements: {
          ...columnsOf(input),
          morningId,
          verdict,
          explanation: JSON.stringify(explanation),
          staffId: staff.id,
          now: new Date(now),
        },
        transaction,
      },
    );
    return {
      detail: { verdict },
      warnings: input.isWell ? [] : [step.words.text('clinic.warning.not-well')],
    };
  });
}

function columnsOf(input: DoorCheckInput) {
  const date = (text: string | null): Date | null => (text === null ? null : new Date(text));
  return {
    lastFoodAt: date(input.lastFoodAt),
    lastDrinkAt: date(input.lastDrinkAt),
    foodItem: input.lastFoodAt === null ? null : input.foodItem,
    drinkItem: input.lastDrinkAt === null ? null : input.drinkItem,
    wokeAt: date(input.wokeAt),
    bloodGlucoseMgDl: input.bloodGlucoseMgDl,
    medicine: input.medicine,
    isWell: input.isWell,
    broughtBy: input.broughtBy,
    goOnReason: input.goOnReason,
  };
}

function timeFaults(input: DoorCheckInput, now: Instant): FieldError[] {
  return (['lastFoodAt', 'lastDrinkAt', 'wokeAt'] as const).flatMap((path): FieldError[] => {
    const time = at(input[path]);
    if (time === null) return [];
    if (time > now + minute) return [{ path, message: 'This time has not come yet.' }];
    if (time < now - oldestHours * 60 * minute)
      return [{ path, message: `This is more than ${oldestHours} hours ago.` }];
    return [];
  });
}

/** Against the clock on the wall: what was too short at home can be long enough at the door. */
function fastAtTheDoor(input: DoorCheckInput, plan: FastingPlan, now: Instant): DoorFast {
  const { lastFoodAt, foodItem, lastDrinkAt, drinkItem, isNothingSincePlan } = input;
  return doorFast({
    food: lastFoodAt === null ? null : { at: Date.parse(lastFoodAt), item: foodItem },
    drink: lastDrinkAt === null ? null : { at: Date.parse(lastDrinkAt), item: drinkItem },
    isNothingSincePlan,
    plan,
    now,
  });
}

/** The same check sent twice by the same person from the same screen is one check. */
async function isSameAsLast(
  context: Context,
  { plan, transaction }: ChangeStep,
  staff: StaffMember,
  input: DoorCheckInput,
): Promise<boolean> {
  if (plan.version === input.version) return false;
  const [last] = await select<DoorCheckRow>(
    context.db,
    'SELECT * FROM door_checks WHERE morning_id = :morningId ORDER BY id DESC LIMIT 1',
    { morningId: plan.morningId },
    transaction,
  );
  const same = (column: Date | null, text: string | null): boolean =>
    (column?.getTime() ?? null) === at(text);
  const isSame =
    last !== undefined &&
    plan.version === input.version + 1 &&
    last.checked_by_staff_id === staff.id &&
    same(last.last_food_at, input.lastFoodAt) &&
    same(last.last_drink_at, input.lastDrinkAt) &&
    last.food_item === columnsOf(input).foodItem &&
    last.drink_item === columnsOf(input).drinkItem &&
    last.blood_glucose_mg_dl === input.bloodGlucoseMgDl &&
    same(last.woke_at, input.wokeAt) &&
    last.medicine === input.medicine &&
    (last.is_well === 1) === input.isWell &&
    last.brought_by === input.broughtBy &&
    last.go_on_reason === input.goOnReason;
  if (!isSame) throw changedMeanwhile();
  return true;
}
