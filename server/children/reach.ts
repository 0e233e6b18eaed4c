import type { Sequelize, Transaction } from 'sequelize';
import { can, isRole } from '../../shared/access/rights';
import type { StaffMember } from '../auth/current-user';
import { select } from '../database/connection';
import { notFound } from '../http/problem';

export interface ReachCondition {
  /** Over the tables `children` and `households`. */
  readonly sql: string;
  readonly replacements: Readonly<Record<string, unknown>>;
}

/**
 * Whose records a staff member may open: those of the own site; an outreach nurse only those of families whose call she
 * has taken on.
 */
export function withinReach(staff: StaffMember): ReachCondition {
  const others = staff.roles.filter(isRole).filter((role) => role !== 'outreach-nurse');
  const isOutreachOnly = !can(others, 'children.read');
  return {
    sql:
      'households.site_id = :reachSiteId' +
      (isOutreachOnly
        ? ` AND EXISTS (SELECT 1 FROM call_tasks WHERE call_tasks.household_id = households.id
              AND call_tasks.claimed_by_staff_id = :reachStaffId)`
        : ''),
    replacements: { reachSiteId: staff.siteId, reachStaffId: staff.id },
  };
}

/** Of these children, those whose records the staff member may open. */
export async function childIdsInReach(
  db: Sequelize,
  staff: StaffMember,
  childIds: readonly number[],
): Promise<ReadonlySet<number>> {
  if (childIds.length === 0) return new Set();
  const reach = withinReach(staff);
  const rows = await select<{ id: number }>(
    db,
    `SELECT children.id FROM children JOIN households ON households.id = children.household_id
     WHERE children.id IN (:childIds) AND ${reach.sql}`,
    { ...reach.replacements, childIds },
  );
  return new Set(rows.map(({ id }) => id));
}

export interface ReachedChild {
  readonly id: number;
  readonly householdId: number;
  readonly siteId: number;
}

/** @throws Problem 404, the same for a child that does not exist and for one out of reach. */
export async function childInReach(
  db: Sequelize,
  staff: StaffMember,
  childId: number,
  transaction?: Transaction,
): Promise<ReachedChild> {
  const reach = withinReach(staff);
  const [child] = await select<ReachedChild>(
    db,
    `SELECT children.id, children.household_id AS householdId, households.site_id AS siteId
     FROM children JOIN households ON households.id = children.household_id
     WHERE children.id = :childId AND ${reach.sql}`,
    { ...reach.replacements, childId },
    transaction,
  );
  if (!child) throw notFound('This child');
  return child;
}
