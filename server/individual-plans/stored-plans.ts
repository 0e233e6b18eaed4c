import type { Sequelize, Transaction } from 'sequelize';
import type { Day } from '../../shared/domain/day';
import type { IndividualPlanBody } from '../../shared/domain/individual-plan';
import { select } from '../database/connection';

/** One signed version of a child's own plan. */
export interface StoredPlan {
  readonly id: number;
  readonly childId: number;
  readonly version: number;
  /** Null where days bound it. */
  readonly seriesId: number | null;
  readonly from: Day | null;
  readonly until: Day | null;
  readonly body: IndividualPlanBody;
  readonly signedBy: string;
  readonly signedAt: number;
  readonly isEnded: boolean;
  readonly endedAt: number | null;
  readonly endReason: string | null;
}

interface PlanRow {
  id: number;
  child_id: number;
  version: number;
  series_id: number | null;
  effective_from: Day | null;
  effective_until: Day | null;
  body: IndividualPlanBody;
  signed_by: string;
  signed_at: Date;
  ended_at: Date | null;
  end_reason: string | null;
}

/** Every version of these children, the newest first. */
export async function storedPlansOf(
  db: Sequelize,
  childIds: readonly number[],
  transaction?: Transaction,
): Promise<StoredPlan[]> {
  if (childIds.length === 0) return [];
  const rows = await select<PlanRow>(
    db,
    `SELECT individual_plans.*, staff.full_name AS signed_by FROM individual_plans
     JOIN staff ON staff.id = signed_by_staff_id
     WHERE child_id IN (:childIds) ORDER BY child_id, version DESC`,
    { childIds: [...new Set(childIds)] },
    transaction,
  );
  return rows.map((row) => ({
    id: row.id,
    childId: row.child_id,
    version: row.version,
    seriesId: row.series_id,
    from: row.effective_from,
    until: row.effective_until,
    body: row.body,
    signedBy: row.signed_by,
    signedAt: row.signed_at.getTime(),
    isEnded: row.ended_at !== null,
    endedAt: row.ended_at?.getTime() ?? null,
    endReason: row.end_reason,
  }));
}
