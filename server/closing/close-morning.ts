import type { Transaction } from 'sequelize';
import type { Closing, CloseMorningRequest } from '../../shared/contracts/closing';
import type { Day, Instant } from '../../shared/domain/day';
import { instantOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { announce } from '../live/announce';
import { sendCalendarEntries } from '../messages/calendar-entries';
import { planComingNights } from '../messages/plan-coming-nights';
import { settleSeries } from '../series/lose-morning';
import type { MorningPlan } from '../series/morning-plans';
import { renumber } from '../series/renumber';
import { renewVisitsChanged } from '../series/tell-visits-changed';
import { siteOf, type Site } from '../sites/sites';
import { clinicWords } from '../wording/clinic-words';
import { clinicClosed, closingOfDay, type FamilyOfDay } from './closing-of-day';
import { reasonSays, refusePast, showClosing } from './show-closing';
import { callFamily, textFamily, withdrawWaiting } from './tell-families';

/** By then somebody should have begun to look for new mornings. */
const planAnewTime = '10:00';

/**
 * The clinic does not open on a day: every planned morning of it is lost through no fault of the family, what waits to be
 * sent about it is taken back, and each family hears by text or by telephone. Nothing is changed about families who are
 * on the way, here or done; a person speaks with them. All of it happens, or none; a repeat closes what is left and tells
 * nobody twice. It cannot be undone: families have heard it.
 * @throws Problem 422 for a day that is past.
 */
export async function closeMorning(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  on: Day,
  request: CloseMorningRequest,
): Promise<Closing> {
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    const now = clock.now();
    // Whoever plans a morning at the same moment waits, or is seen: nobody is planned onto a closed day.
    await select(
      db,
      'SELECT id FROM sites WHERE id = :siteId FOR UPDATE',
      { siteId: staff.siteId },
      transaction,
    );
    const site = await siteOf(db, staff.siteId, transaction);
    const isToday = refusePast(on, site, now);
    await keepClosing(context, transaction, { site, on, request, staff, now });
    await holdMornings(context, transaction, site.id, on);
    const day = { siteId: site.id, on, isToday, now };
    const { open, apart } = await closingOfDay(db, day, transaction);
    const reason = reasonSays(clinicWords('en'), request);
    await loseAll(context, transaction, actor, open, reason);
    for (const family of open) {
      await renewVisitsChanged(context, transaction, family.householdId, `closed-${on}`);
      await withdrawWaiting(context, transaction, family, on);
      await planComingNights(context, transaction, family.householdId);
      await textFamily(context, transaction, { family, site, on, isToday });
      await callFamily(context, transaction, { family, on, isToday });
      await planAnew(context, transaction, family, site);
    }
    await sendCalendarEntries(context, transaction, idsOf(open), 'CANCEL');
    await callOnTheWay(context, transaction, apart, on);
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'morning-closed',
      childIds: [...open.flatMap(({ plans }) => plans), ...apart].map(({ childId }) => childId),
      detail: { on, reason, lost: idsOf(open), apart: apart.map(({ morningId }) => morningId) },
      at: now,
    });
    await announce(db, transaction, 'mornings');
    await announce(db, transaction, 'calls');
  });
  return showClosing(context, actor, staff, on);
}

const idsOf = (families: readonly FamilyOfDay[]): number[] =>
  families.flatMap(({ plans }) => plans.map(({ morningId }) => morningId));

/** Keeps why and by whom, once for a day, and lets nobody plan for it; who closes at the same time waits here. */
async function keepClosing(
  { db }: Context,
  transaction: Transaction,
  closing: {
    readonly site: Site;
    readonly on: Day;
    readonly request: CloseMorningRequest;
    readonly staff: StaffMember;
    readonly now: Instant;
  },
): Promise<void> {
  const { site, on, request, staff, now } = closing;
  const replacements = {
    siteId: site.id,
    on,
    reason: request.reason,
    says: request.says,
    closureSays: reasonSays(clinicWords('en'), request).slice(0, 120),
    now: new Date(now),
    staffId: staff.id,
  };
  await db.query(
    `INSERT IGNORE INTO closed_mornings (site_id, closed_on, reason, says, closed_at, closed_by_staff_id)
     VALUES (:siteId, :on, :reason, :says, :now, :staffId)`,
    { replacements, transaction },
  );
  await db.query(
    'SELECT id FROM closed_mornings WHERE site_id = :siteId AND closed_on = :on FOR UPDATE',
    { replacements, transaction },
  );
  await db.query(
    'INSERT IGNORE INTO closures (site_id, closed_on, reason) VALUES (:siteId, :on, :closureSays)',
    { replacements, transaction },
  );
}

/** An answer or an arrival that comes at the same moment waits, or is seen. */
async function holdMornings(
  { db }: Context,
  transaction: Transaction,
  siteId: number,
  on: Day,
): Promise<void> {
  await select(
    db,
    'SELECT id FROM mornings WHERE site_id = :siteId AND planned_on = :on ORDER BY id FOR UPDATE',
    { siteId, on },
    transaction,
  );
}

async function loseAll(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  open: readonly FamilyOfDay[],
  reason: string,
): Promise<void> {
  const { db, clock } = context;
  for (const { morningId, childId, seriesId } of open.flatMap(({ plans }) => plans)) {
    await change(
      db,
      `UPDATE mornings SET state = 'lost', place_key = NULL, lost_reason = :lostReason,
         calendar_sequence = calendar_sequence + 1, version = version + 1
       WHERE id = :morningId`,
      { morningId, lostReason: `${clinicClosed}: ${reason}`.slice(0, 200) },
      transaction,
    );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'morning-lost',
      childIds: [childId],
      detail: { morningId, reason: clinicClosed },
      at: clock.now(),
    });
    await renumber(context, transaction, seriesId);
    await settleSeries(context, transaction, seriesId);
    await announce(db, transaction, 'mornings', morningId);
  }
}

/** The series go on: somebody offers each family new mornings. */
async function planAnew(
  { db, clock }: Context,
  transaction: Transaction,
  { householdId, plans }: FamilyOfDay,
  site: Site,
): Promise<void> {
  const now = clock.now();
  const on = plans[0]?.on ?? '';
  for (const { seriesId, childId, morningId } of plans) {
    await announce(db, transaction, 'children', childId);
    await raiseCall(db, transaction, {
      reason: 'plan-anew',
      openKey: `plan-anew:${seriesId}`,
      householdId,
      childId,
      morningId,
      seriesId,
      isForClinician: false,
      urgentAt: Math.max(now, instantOf({ on, time: planAnewTime, zone: site.zone })),
      now,
    });
  }
}

async function callOnTheWay(
  { db, clock }: Context,
  transaction: Transaction,
  apart: readonly MorningPlan[],
  on: Day,
): Promise<void> {
  const now = clock.now();
  for (const plan of apart.filter(({ state }) => state === 'planned')) {
    await raiseCall(db, transaction, {
      reason: 'clinic-closed-on-the-way',
      openKey: `clinic-closed-on-the-way:${plan.householdId}:${on}`,
      householdId: plan.householdId,
      childId: plan.childId,
      morningId: plan.morningId,
      familyMemberId: plan.escortFamilyMemberId,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  }
}
