import type { Sequelize, Transaction } from 'sequelize';
import type { Caution, Feeding } from '../../shared/contracts/common';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import { select } from '../database/connection';
import { invalid, notFound, Problem } from '../http/problem';
import { stillNeeded } from '../orders/order-answer';
import { localTimeOfColumn } from '../sites/sites';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import type { SearchedChild } from './search';

/** An order with what planning needs of its child. */
export interface PlannableOrder extends SearchedChild {
  readonly orderId: number;
  readonly householdId: number;
  readonly siteId: number;
  readonly feeding: Feeding;
  readonly cautions: readonly Caution[];
  readonly morningsPlanned: number;
  readonly travelMinutes: number;
  readonly readyMinutes: number;
}

type OrderRow = Omit<PlannableOrder, 'cautions' | 'isReportOwed' | 'nightFeedTimes'> & {
  cautions: Caution[];
  isReportOwed: 0 | 1;
  nightFeedTimes: string[] | null;
  isSigned: 0 | 1;
  hasConsent: 0 | 1;
  seriesId: number | null;
};

/**
 * The orders of brothers and sisters that can be planned now, in the order asked for.
 * @param transaction with one, the orders are held until its end, so that two submits of the same come one after the other
 * @throws Problem 404; 422 when they are of different households; 409 'already-planned' with `seriesIds`; 409 'not-ready'
 */
export async function plannableOrders(
  db: Sequelize,
  staff: StaffMember,
  orderIds: readonly number[],
  transaction?: Transaction,
): Promise<PlannableOrder[]> {
  const wanted = [...new Set(orderIds)];
  const reach = withinReach(staff);
  if (transaction)
    await select(
      db,
      'SELECT id FROM orders WHERE id IN (:wanted) ORDER BY id FOR UPDATE',
      { wanted },
      transaction,
    );
  const rows = await select<OrderRow>(
    db,
    `SELECT orders.id AS orderId, children.id AS childId, children.household_id AS householdId,
       households.site_id AS siteId, children.full_name AS fullName, children.call_me AS callMe,
       children.born_on AS bornOn, children.feeding, children.cautions,
       children.usual_last_meal_time AS usualLastMealTime, children.night_feed_times AS nightFeedTimes,
       orders.reporting_due_on IS NOT NULL AND orders.reported_at IS NULL AS isReportOwed,
       orders.mornings_planned AS morningsPlanned, households.travel_minutes AS travelMinutes,
       households.ready_minutes AS readyMinutes, orders.signed_at IS NOT NULL AS isSigned,
       EXISTS (SELECT 1 FROM procedure_consents consent WHERE consent.order_id = orders.id) AS hasConsent,
       series.id AS seriesId
     FROM orders
     JOIN children ON children.id = orders.child_id
     JOIN households ON households.id = children.household_id
     LEFT JOIN series ON series.order_id = orders.id
     WHERE orders.id IN (:wanted) AND ${reach.sql}`,
    { ...reach.replacements, wanted },
    transaction,
  );
  const byId = new Map(rows.map((row) => [row.orderId, row]));
  const orders = wanted.map((orderId) => {
    const order = byId.get(orderId);
    if (!order) throw notFound('This order');
    return order;
  });
  refuseUnready(clinicWords(staff.language), orders);
  return orders.map(
    ({ isSigned: _signed, hasConsent: _consent, seriesId: _series, ...order }): PlannableOrder => ({
      ...order,
      ...searchedFacts(order),
    }),
  );
}

/** Columns of a child and its order as a search wants them. */
export const searchedFacts = (row: {
  readonly usualLastMealTime: string | null;
  readonly nightFeedTimes: readonly string[] | null;
  readonly isReportOwed: 0 | 1;
}): Pick<SearchedChild, 'usualLastMealTime' | 'nightFeedTimes' | 'isReportOwed'> => ({
  usualLastMealTime: row.usualLastMealTime && localTimeOfColumn(row.usualLastMealTime),
  nightFeedTimes: row.nightFeedTimes ?? [],
  isReportOwed: row.isReportOwed === 1,
});

function refuseUnready(words: ClinicWords, orders: readonly OrderRow[]): void {
  const seriesIds = orders.flatMap(({ seriesId }) => (seriesId === null ? [] : [seriesId]));
  if (seriesIds.length > 0)
    throw new Problem(
      409,
      'already-planned',
      'The mornings of this order are planned already. Nothing was planned twice.',
      { seriesId: seriesIds[0], seriesIds },
    );
  const households = new Set(orders.map(({ householdId }) => householdId));
  if (households.size > 1)
    throw invalid([
      {
        path: 'orderIds',
        message: 'Only brothers and sisters of one household are planned together.',
      },
    ]);
  const children = new Set(orders.map(({ childId }) => childId));
  if (children.size < orders.length)
    throw invalid([{ path: 'orderIds', message: 'Choose one order for each child.' }]);
  const missing = orders.flatMap((order) =>
    stillNeeded(words, {
      isSigned: order.isSigned === 1,
      hasConsent: order.hasConsent === 1,
    }).map((sentence) => `${order.fullName}: ${sentence}`),
  );
  if (missing.length > 0)
    throw new Problem(409, 'not-ready', 'These mornings cannot be planned yet.', {
      detail: missing.join(' '),
      stillNeeded: missing,
    });
}
