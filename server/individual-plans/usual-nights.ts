import type { Sequelize, Transaction } from 'sequelize';
import type { LocalTime } from '../../shared/domain/day';
import type { UsualNight } from '../../shared/domain/usual-night';
import { change, select } from '../database/connection';
import { localTimeOfColumn } from '../sites/sites';

/** What each family told about its usual nights; children who were not asked are left out. */
export async function usualNightsOf(
  db: Sequelize,
  childIds: readonly number[],
  transaction?: Transaction,
): Promise<Map<number, UsualNight>> {
  if (childIds.length === 0) return new Map();
  const rows = await select<{ id: number; meal: string | null; feeds: LocalTime[] | null }>(
    db,
    `SELECT id, usual_last_meal_time AS meal, night_feed_times AS feeds FROM children
     WHERE id IN (:childIds) AND (usual_last_meal_time IS NOT NULL OR night_feed_times IS NOT NULL)`,
    { childIds: [...new Set(childIds)] },
    transaction,
  );
  return new Map(
    rows.map(({ id, meal, feeds }) => [
      id,
      {
        lastMealTime: meal === null ? null : localTimeOfColumn(meal),
        nightFeedTimes: feeds ?? [],
      },
    ]),
  );
}

/** Keeps what was asked when planning. The caller has the right, the access record and the messages planned anew. */
export async function keepUsualNight(
  db: Sequelize,
  transaction: Transaction,
  childId: number,
  { lastMealTime, nightFeedTimes }: UsualNight,
): Promise<void> {
  await change(
    db,
    `UPDATE children SET usual_last_meal_time = :lastMealTime, night_feed_times = :feeds WHERE id = :childId`,
    { childId, lastMealTime, feeds: JSON.stringify([...new Set(nightFeedTimes)].sort()) },
    transaction,
  );
}
