import type { Sequelize, Transaction } from 'sequelize';
import type { MorningState } from '../../shared/contracts/common';
import { compareDays, type Day, type LocalTime } from '../../shared/domain/day';
import type { SeriesMorning, SeriesToReplan } from '../../shared/domain/replan';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import { select } from '../database/connection';
import { invalid, notFound } from '../http/problem';
import { localTimeOfColumn } from '../sites/sites';
import type { SearchedChild } from './search';
import { searchedFacts } from './series-orders';

/** A morning as it stands, with what re-planning must know of it. */
export interface StandingRow extends SeriesMorning {
  readonly morningId: number;
  readonly arrivalTime: LocalTime;
  readonly roomId: number;
  readonly morningState: MorningState;
  readonly lostReason: string | null;
  /** The family has answered for this morning already; the answer belongs to that night alone. */
  readonly isAnswered: boolean;
  readonly escortFamilyMemberId: number | null;
  readonly nightCarerFamilyMemberId: number | null;
}

export interface ReplanSeries extends SearchedChild, SeriesToReplan<StandingRow> {
  readonly seriesId: number;
  readonly version: number;
  readonly state: 'planned' | 'collecting' | 'awaiting-results' | 'closed';
  readonly householdId: number;
  readonly siteId: number;
  readonly needsRide: boolean;
}

type SeriesRow = Omit<
  ReplanSeries,
  'mornings' | 'needsRide' | 'nightFeedTimes' | 'isReportOwed'
> & { needsRide: 0 | 1; nightFeedTimes: string[] | null; isReportOwed: 0 | 1 };

/**
 * Series of one household, the youngest child first.
 * @param transaction with one, series and mornings are held until its end
 * @throws Problem 404; 422 when they are of different households
 */
export async function seriesToReplan(
  db: Sequelize,
  staff: StaffMember,
  seriesIds: readonly number[],
  transaction?: Transaction,
): Promise<readonly [ReplanSeries, ...ReplanSeries[]]> {
  const wanted = [...new Set(seriesIds)];
  const reach = withinReach(staff);
  if (transaction)
    await select(
      db,
      'SELECT id FROM series WHERE id IN (:wanted) ORDER BY id FOR UPDATE',
      { wanted },
      transaction,
    );
  const rows = await select<SeriesRow>(
    db,
    `SELECT series.id AS seriesId, series.version, series.state, series.mornings_planned AS plannedCount,
       series.needs_ride AS needsRide, children.id AS childId, children.household_id AS householdId,
       households.site_id AS siteId, children.full_name AS fullName, children.call_me AS callMe,
       children.born_on AS bornOn, children.usual_last_meal_time AS usualLastMealTime,
       children.night_feed_times AS nightFeedTimes,
       orders.reporting_due_on IS NOT NULL AND orders.reported_at IS NULL AS isReportOwed
     FROM series
     JOIN orders ON orders.id = series.order_id
     JOIN children ON children.id = series.child_id
     JOIN households ON households.id = children.household_id
     WHERE series.id IN (:wanted) AND ${reach.sql}`,
    { ...reach.replacements, wanted },
    transaction,
  );
  if (rows.length < wanted.length) throw notFound('This series');
  if (new Set(rows.map(({ householdId }) => householdId)).size > 1)
    throw invalid([
      {
        path: 'seriesIds',
        message: 'Only brothers and sisters of one household are planned together.',
      },
    ]);
  if (new Set(rows.map(({ childId }) => childId)).size < rows.length)
    throw invalid([{ path: 'seriesIds', message: 'Choose one series for each child.' }]);
  const mornings = await standingMornings(db, wanted, transaction);
  const [first, ...others] = rows
    .sort((left, right) => compareDays(right.bornOn, left.bornOn) || left.childId - right.childId)
    .map((row) => ({
      ...row,
      ...searchedFacts(row),
      needsRide: row.needsRide === 1,
      mornings: mornings
        .filter(({ seriesId }) => seriesId === row.seriesId)
        .map(({ seriesId: _series, ...morning }) => morning),
    }));
  if (!first) throw notFound('This series');
  return [first, ...others];
}

async function standingMornings(
  db: Sequelize,
  seriesIds: readonly number[],
  transaction?: Transaction,
): Promise<(StandingRow & { readonly seriesId: number })[]> {
  const rows = await select<{
    morningId: number;
    seriesId: number;
    number: number;
    on: Day;
    arrivalTime: string;
    roomId: number;
    morningState: MorningState;
    lostReason: string | null;
    isAnswered: 0 | 1;
    escortFamilyMemberId: number | null;
    nightCarerFamilyMemberId: number | null;
  }>(
    db,
    `SELECT mornings.id AS morningId, mornings.series_id AS seriesId, mornings.number, mornings.planned_on AS \`on\`,
       mornings.arrival_time AS arrivalTime, mornings.room_id AS roomId, mornings.state AS morningState,
       mornings.lost_reason AS lostReason,
       EXISTS (SELECT 1 FROM fasting_checks checks WHERE checks.morning_id = mornings.id) AS isAnswered,
       mornings.escort_family_member_id AS escortFamilyMemberId,
       mornings.night_carer_family_member_id AS nightCarerFamilyMemberId
     FROM mornings WHERE mornings.series_id IN (:seriesIds)
     ORDER BY mornings.planned_on, mornings.number, mornings.id ${transaction ? 'FOR UPDATE' : ''}`,
    { seriesIds },
    transaction,
  );
  return rows.map((row) => ({
    ...row,
    isAnswered: row.isAnswered === 1,
    arrivalTime: localTimeOfColumn(row.arrivalTime),
    state: stateFor(row.morningState),
  }));
}

/** A child that is here or being collected is about to have a specimen: its number stands. */
export function stateFor(state: MorningState): SeriesMorning['state'] {
  if (state === 'planned') return 'planned';
  return state === 'lost' || state === 'not-collected' ? 'lost' : 'collected';
}
