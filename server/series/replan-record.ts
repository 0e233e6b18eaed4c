import type { Sequelize, Transaction } from 'sequelize';
import type { SeriesMorning } from '../../shared/domain/replan';

export interface NewReplan {
  readonly seriesId: number;
  readonly kind: 'next-possible-morning' | 'new-run' | 'close-with-fewer' | 'move' | 'pause';
  readonly reason: string;
  readonly before: readonly SeriesMorning[];
  readonly after: readonly SeriesMorning[];
  readonly staffId: number;
  readonly now: number;
}

/** Keeps what was chosen about a series, by whom and why, with its mornings before and after. */
export async function insertReplan(
  db: Sequelize,
  transaction: Transaction,
  { seriesId, kind, reason, before, after, staffId, now }: NewReplan,
): Promise<void> {
  await db.query(
    `INSERT INTO replans (series_id, kind, reason, mornings_before, mornings_after, chosen_by_staff_id, chosen_at)
     VALUES (:seriesId, :kind, :reason, :before, :after, :staffId, :now)`,
    {
      replacements: {
        seriesId,
        kind,
        reason,
        before: JSON.stringify(before),
        after: JSON.stringify(after),
        staffId,
        now: new Date(now),
      },
      transaction,
    },
  );
}
