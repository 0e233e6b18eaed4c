import type { Sequelize, Transaction } from 'sequelize';
import { can, isRole } from '../../shared/access/rights';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import { select } from '../database/connection';

export interface CallRow {
  id: number;
  open_key: string | null;
  reason: string;
  household_id: number | null;
  child_id: number | null;
  child_name: string | null;
  morning_id: number | null;
  series_id: number | null;
  family_member_id: number | null;
  detail: string | null;
  is_for_clinician: 0 | 1;
  urgent_at: Date;
  created_at: Date;
  claimed_by_staff_id: number | null;
  claimed_by: string | null;
  done_at: Date | null;
  done_by: string | null;
  done_by_staff_id: number | null;
  outcome: string | null;
  note: string | null;
  site_name: string | null;
}

export interface CallPerson {
  id: number;
  household_id: number;
  full_name: string;
  relationship: string;
  phone: string | null;
  speaks_language: string;
  needs_interpreter: 0 | 1;
}

const from = `
  FROM call_tasks task
  LEFT JOIN households ON households.id = task.household_id
  LEFT JOIN sites site ON site.id = households.site_id
  LEFT JOIN children child ON child.id = task.child_id
  LEFT JOIN staff claimant ON claimant.id = task.claimed_by_staff_id
  LEFT JOIN staff doer ON doer.id = task.done_by_staff_id`;
const columns = `task.*, child.full_name AS child_name, claimant.full_name AS claimed_by,
  doer.full_name AS done_by, site.short_name AS site_name`;

/**
 * Which tasks a staff member may see: those of the own site, and those of nobody's family (a text from an unknown
 * number). An outreach nurse sees the families she has taken on, and unread letters that nobody has taken yet.
 */
function reachOf(staff: StaffMember): { sql: string; replacements: Record<string, unknown> } {
  const reach = withinReach(staff);
  const isOutreachOnly = !can(
    staff.roles.filter(isRole).filter((role) => role !== 'outreach-nurse'),
    'calls.read',
  );
  const more = isOutreachOnly
    ? `(task.reason IN ('letter-unread', 'letter-unread-outreach') AND task.claimed_by_staff_id IS NULL
        AND households.site_id = :reachSiteId)`
    : 'task.household_id IS NULL';
  return { sql: `((${reach.sql}) OR ${more})`, replacements: { ...reach.replacements } };
}

/** Open tasks, the most urgent first. */
export async function openCallRows(db: Sequelize, staff: StaffMember): Promise<CallRow[]> {
  const reach = reachOf(staff);
  return select<CallRow>(
    db,
    `SELECT ${columns} ${from} WHERE task.done_at IS NULL AND ${reach.sql}
     ORDER BY task.urgent_at, task.id LIMIT 300`,
    reach.replacements,
  );
}

/** Tasks done since an instant, the latest first. */
export async function doneCallRows(
  db: Sequelize,
  staff: StaffMember,
  since: number,
): Promise<CallRow[]> {
  const reach = reachOf(staff);
  return select<CallRow>(
    db,
    `SELECT ${columns} ${from} WHERE task.done_at >= :since AND ${reach.sql}
     ORDER BY task.done_at DESC, task.id DESC LIMIT 100`,
    { ...reach.replacements, since: new Date(since) },
  );
}

/** One task within reach, locked for the change that follows; null when there is none. */
export async function callRowToChange(
  db: Sequelize,
  staff: StaffMember,
  callId: number,
  transaction: Transaction,
): Promise<CallRow | null> {
  const reach = reachOf(staff);
  // Locked alone: a join under FOR UPDATE would lock the family's rows as well.
  await select(
    db,
    'SELECT id FROM call_tasks WHERE id = :callId FOR UPDATE',
    { callId },
    transaction,
  );
  const [row] = await select<CallRow>(
    db,
    `SELECT ${columns} ${from} WHERE task.id = :callId AND ${reach.sql}`,
    { ...reach.replacements, callId },
    transaction,
  );
  return row ?? null;
}

/** The adults of these households, those to call first in front: guardians with a number. */
export async function callPeople(
  db: Sequelize,
  householdIds: readonly number[],
  transaction?: Transaction,
): Promise<CallPerson[]> {
  if (householdIds.length === 0) return [];
  return select<CallPerson>(
    db,
    `SELECT member.id, member.household_id, member.full_name, member.phone, member.speaks_language,
       member.needs_interpreter, MIN(tie.relationship) AS relationship
     FROM family_members member JOIN child_family_members tie ON tie.family_member_id = member.id
     WHERE member.household_id IN (:householdIds)
     GROUP BY member.id
     ORDER BY member.phone IS NULL, MIN(tie.standing), member.id`,
    { householdIds },
    transaction,
  );
}

/** Whom to call about a task: the person it names, else the first of the family. */
export function personOf(row: CallRow, people: readonly CallPerson[]): CallPerson | null {
  return (
    people.find((person) => person.id === row.family_member_id) ??
    people.find((person) => person.household_id === row.household_id) ??
    null
  );
}
