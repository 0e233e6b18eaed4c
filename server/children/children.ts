import { UniqueConstraintError, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { addChildRequest, changeChildRequest } from '../../shared/contracts/children';
import { ageOn, compareDays, type Day } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, invalid, notFound, Problem, type FieldError } from '../http/problem';
import { announce } from '../live/announce';
import { planHouseholdMessages } from '../messages/plan-messages';
import { siteOf, type Site } from '../sites/sites';
import { Child, Household } from './child-model';
import { checkedFamilyMember } from './contact-details';
import { linkFamilyMember } from './family-members';
import { childInReach } from './reach';

export type AddChild = z.output<typeof addChildRequest>;
export type ChangeChild = z.output<typeof changeChildRequest>;

const adultFromYears = 18;

/**
 * Adds a child with the adults around it.
 * @returns the id; a repeat with the same key answers with the id of the first
 * @throws Problem 409 'child-known' with `childId` when the child is there already
 */
export async function addChild(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  request: AddChild,
): Promise<number> {
  const { db, clock } = context;
  const now = clock.now();
  const site = await siteOf(db, staff.siteId);
  const checked = request.familyMembers.map((member, index) =>
    checkedFamilyMember(member, site.country, `familyMembers.${index}`),
  );
  const errors = [
    ...birthErrors(request.bornOn, dayOf(now, site.zone)),
    ...checked.flatMap((member) => member.errors),
  ];
  if (errors.length > 0) throw invalid(errors);

  const submission = { matter: 'child', key: request.submissionKey, at: now };
  const { id } = await addOnce(db, submission, async (transaction) => {
    await refuseKnown(request, site, transaction);
    const householdId = request.householdId
      ? await householdOfSite(context, site, request.householdId, transaction)
      : (
          await Household.create(
            { siteId: site.id, travelMinutes: request.travelMinutes, createdAt: new Date(now) },
            { transaction },
          )
        ).id;
    const child = await Child.create(
      {
        householdId,
        fullName: request.fullName,
        callMe: request.callMe,
        familyLabel: request.familyLabel,
        bornOn: request.bornOn,
        recordNumber: request.recordNumber,
        feeding: request.feeding,
        cautions: request.cautions,
        createdAt: new Date(now),
      },
      { transaction },
    ).catch(asKnown);
    for (const { member } of checked)
      await linkFamilyMember(transaction, {
        childId: child.id,
        householdId,
        staffId: staff.id,
        member,
        now,
      });
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'child-added',
      childIds: [child.id],
      at: now,
    });
    await announce(db, transaction, 'children', child.id);
    return child.id;
  });
  return id;
}

/** Changes what was written about a child; the times and texts of the mornings to come follow. */
export async function changeChild(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
  { version, ...changes }: ChangeChild,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const reached = await childInReach(db, staff, childId, transaction);
    const site = await siteOf(db, reached.siteId, transaction);
    const today = dayOf(now, site.zone);
    const days = await morningDays(context, childId, transaction);
    const errors = birthErrors(changes.bornOn, today);
    if (days.some((day) => compareDays(day, changes.bornOn) < 0))
      errors.push({ path: 'bornOn', message: 'A morning of this child lies before this day.' });
    if (errors.length > 0) throw invalid(errors);

    const before = await Child.findByPk(childId, { transaction });
    const [touched] = await Child.update(
      { ...changes, version: version + 1 },
      { where: { id: childId, version }, transaction },
    ).catch(asKnown);
    if (touched === 0) throw changedMeanwhile();
    for (const on of new Set(days.filter((day) => compareDays(day, today) >= 0)))
      await planHouseholdMessages(context, transaction, { householdId: reached.householdId, on });
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'child',
      childIds: [childId],
      detail: { before: before?.toJSON() },
      at: now,
    });
    await announce(db, transaction, 'children', childId);
    await announce(db, transaction, 'mornings');
  });
}

function birthErrors(bornOn: Day, today: Day): FieldError[] {
  if (compareDays(bornOn, today) > 0)
    return [{ path: 'bornOn', message: 'This birth date lies in the future.' }];
  if (ageOn(bornOn, today).years >= adultFromYears)
    return [
      { path: 'bornOn', message: `A child is under ${adultFromYears} years. Check the year.` },
    ];
  return [];
}

async function refuseKnown(request: AddChild, site: Site, transaction: Transaction): Promise<void> {
  const known = await Child.alreadyKnown(request, transaction);
  if (!known) return;
  const household = await Household.findByPk(known.householdId, { transaction });
  throw childKnown(household?.siteId === site.id ? known.id : null);
}

/** The id stays out where the record belongs to another site. */
const childKnown = (childId: number | null): Problem =>
  new Problem(
    409,
    'child-known',
    'This child has a record already: the same name and birth date, or the same record number.',
    childId === null ? {} : { childId },
  );

/** Somebody gave the same record number in the meantime. */
function asKnown(error: unknown): never {
  if (error instanceof UniqueConstraintError && 'children_record_number' in error.fields)
    throw childKnown(null);
  throw error;
}

async function householdOfSite(
  { db }: Context,
  site: Site,
  householdId: number,
  transaction: Transaction,
): Promise<number> {
  const [household] = await select<{ id: number }>(
    db,
    'SELECT id FROM households WHERE id = :householdId AND site_id = :siteId FOR UPDATE',
    { householdId, siteId: site.id },
    transaction,
  );
  if (!household) throw notFound('This household');
  return household.id;
}

async function morningDays(
  { db }: Context,
  childId: number,
  transaction: Transaction,
): Promise<Day[]> {
  const rows = await select<{ planned_on: Day }>(
    db,
    "SELECT planned_on FROM mornings WHERE child_id = :childId AND state <> 'lost'",
    { childId },
    transaction,
  );
  return rows.map((row) => row.planned_on);
}
