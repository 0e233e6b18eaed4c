import type { Sequelize } from 'sequelize';
import { can, isRole, type Right } from '../../shared/access/rights';
import type { ChildRecord } from '../../shared/contracts/children';
import type { Caution, Feeding, MorningState } from '../../shared/contracts/common';
import { compareDays, type Day } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { notFound } from '../http/problem';
import { localTimeOfColumn, siteOf } from '../sites/sites';
import { familyMembersOf } from './family-members';
import { ageInWords } from '../wording/clinic-measures';
import { clinicWords } from '../wording/clinic-words';
import { happeningsOf } from './happenings';
import { childInReach } from './reach';

interface ChildRow {
  id: number;
  version: number;
  householdId: number;
  fullName: string;
  callMe: string;
  familyLabel: string;
  bornOn: Day;
  recordNumber: string | null;
  feeding: Feeding;
  cautions: Caution[];
  travelMinutes: number;
}

/** One child with everything that belongs to it, as far as the reader's roles reach. */
export async function readChild(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
): Promise<ChildRecord> {
  const reached = await childInReach(db, staff, childId);
  const site = await siteOf(db, reached.siteId);
  const today = dayOf(clock.now(), site.zone);
  const roles = staff.roles.filter(isRole);
  const may = (right: Right): boolean => can(roles, right);
  const [child] = await select<ChildRow>(
    db,
    `SELECT children.id, children.version, children.household_id AS householdId, children.full_name AS fullName,
       children.call_me AS callMe, children.family_label AS familyLabel, children.born_on AS bornOn,
       children.record_number AS recordNumber, children.feeding, children.cautions,
       households.travel_minutes AS travelMinutes
     FROM children JOIN households ON households.id = children.household_id WHERE children.id = :childId`,
    { childId },
  );
  if (!child) throw notFound('This child');
  const siblings = await select<{ id: number; fullName: string; bornOn: Day }>(
    db,
    `SELECT id, full_name AS fullName, born_on AS bornOn FROM children
     WHERE household_id = :householdId AND id <> :childId ORDER BY born_on DESC`,
    { childId, householdId: reached.householdId },
  );
  const [familyMembers, orders, series, happenings] = await Promise.all([
    may('contacts.read') ? familyMembersOf(db, childId) : [],
    may('orders.read') ? ordersOf(db, childId) : [],
    seriesOf(db, childId),
    happeningsOf(db, staff, reached),
  ]);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'child',
    childIds: [childId, ...siblings.map((sibling) => sibling.id)],
    at: clock.now(),
  });
  return {
    ...child,
    // In a rehearsal the clock can be moved before the birth; the record still opens.
    ageInWords: ageInWords(clinicWords(staff.language), child.bornOn, latest(child.bornOn, today)),
    siblings,
    familyMembers,
    orders,
    series,
    happenings,
  };
}

const latest = (left: Day, right: Day): Day => (compareDays(left, right) > 0 ? left : right);

async function ordersOf(db: Sequelize, childId: number): Promise<ChildRecord['orders']> {
  const rows = await select<{
    id: number;
    orderedBy: string;
    reason: string;
    morningsPlanned: number;
    signedAt: Date | null;
    signedBy: string | null;
    hasConsent: 0 | 1;
    reportingDueOn: Day | null;
    seriesId: number | null;
  }>(
    db,
    `SELECT orders.id, orders.ordered_by_name AS orderedBy, orders.reason, orders.mornings_planned AS morningsPlanned,
       orders.signed_at AS signedAt, staff.full_name AS signedBy,
       EXISTS (SELECT 1 FROM procedure_consents consent WHERE consent.order_id = orders.id) AS hasConsent,
       orders.reporting_due_on AS reportingDueOn, series.id AS seriesId
     FROM orders LEFT JOIN staff ON staff.id = orders.signed_by_staff_id
     LEFT JOIN series ON series.order_id = orders.id
     WHERE orders.child_id = :childId ORDER BY orders.id DESC`,
    { childId },
  );
  return rows.map((row) => ({
    ...row,
    signedAt: row.signedAt?.toISOString() ?? null,
    hasConsent: row.hasConsent === 1,
  }));
}

type SeriesState = ChildRecord['series'][number]['state'];

async function seriesOf(db: Sequelize, childId: number): Promise<ChildRecord['series']> {
  const rows = await select<{
    seriesId: number;
    seriesState: SeriesState;
    id: number;
    number: number;
    plannedOn: Day;
    arrivalTime: string;
    state: MorningState;
  }>(
    db,
    `SELECT series.id AS seriesId, series.state AS seriesState, mornings.id, mornings.number,
       mornings.planned_on AS plannedOn, mornings.arrival_time AS arrivalTime, mornings.state
     FROM series JOIN mornings ON mornings.series_id = series.id
     WHERE series.child_id = :childId ORDER BY series.id DESC, mornings.number`,
    { childId },
  );
  const bySeries = new Map<number, ChildRecord['series'][number]>();
  for (const { seriesId, seriesState, arrivalTime, ...morning } of rows) {
    const known = bySeries.get(seriesId) ?? { id: seriesId, state: seriesState, mornings: [] };
    known.mornings.push({ ...morning, arrivalTime: localTimeOfColumn(arrivalTime) });
    bySeries.set(seriesId, known);
  }
  return [...bySeries.values()];
}
