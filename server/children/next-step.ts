import type { Sequelize } from 'sequelize';
import { addDays, type Day } from '../../shared/domain/day';
import { select } from '../database/connection';
import { localTimeOfColumn } from '../sites/sites';
import type { ClinicWords } from '../wording/clinic-words';

export interface LatestOrder {
  readonly childId: number;
  readonly isSigned: boolean;
  readonly hasConsent: boolean;
  readonly seriesState: 'planned' | 'collecting' | 'awaiting-results' | 'closed' | null;
  readonly next: {
    readonly number: number;
    readonly ofPlanned: number;
    readonly on: Day;
    readonly arrivalTime: string;
  } | null;
}

/** What stands next for a child, in words; names no result, so that every role may read it. */
export function nextStep(words: ClinicWords, order: LatestOrder | undefined, today: Day): string {
  const say = (key: string): string => words.text(`clinic.step.${key}`);
  if (!order) return say('no-order');
  if (order.seriesState === null) {
    if (!order.isSigned) return say('signature');
    return say(order.hasConsent ? 'to-plan' : 'consent');
  }
  if (order.next) {
    const { number, ofPlanned, on, arrivalTime } = order.next;
    const when = on === today ? 'today' : on === addDays(today, 1) ? 'tomorrow' : 'on-day';
    return words.text(`clinic.step.${when}`, {
      number,
      of: ofPlanned,
      day: words.day(on),
      time: arrivalTime,
    });
  }
  return say(order.seriesState === 'closed' ? 'closed' : 'laboratory');
}

interface OrderRow {
  child_id: number;
  is_signed: 0 | 1;
  has_consent: 0 | 1;
  series_state: LatestOrder['seriesState'];
  number: number | null;
  mornings_planned: number;
  planned_on: Day;
  arrival_time: string;
}

/** The latest order of each child and its next planned morning from today on. */
export async function latestOrders(
  db: Sequelize,
  childIds: readonly number[],
  today: Day,
): Promise<Map<number, LatestOrder>> {
  if (childIds.length === 0) return new Map();
  const rows = await select<OrderRow>(
    db,
    `SELECT orders.child_id, orders.signed_at IS NOT NULL AS is_signed,
       EXISTS (SELECT 1 FROM procedure_consents consent WHERE consent.order_id = orders.id) AS has_consent,
       series.state AS series_state, orders.mornings_planned,
       mornings.number, mornings.planned_on, mornings.arrival_time
     FROM orders
     LEFT JOIN series ON series.order_id = orders.id
     LEFT JOIN mornings ON mornings.id = (
       SELECT upcoming.id FROM mornings upcoming
       WHERE upcoming.series_id = series.id AND upcoming.planned_on >= :today
         AND upcoming.state IN ('planned', 'here', 'collecting')
       ORDER BY upcoming.planned_on LIMIT 1)
     WHERE orders.id IN (SELECT MAX(id) FROM orders WHERE child_id IN (:childIds) GROUP BY child_id)`,
    { childIds, today },
  );
  return new Map(
    rows.map((row) => [
      row.child_id,
      {
        childId: row.child_id,
        isSigned: row.is_signed === 1,
        hasConsent: row.has_consent === 1,
        seriesState: row.series_state,
        next:
          row.number === null
            ? null
            : {
                number: row.number,
                ofPlanned: row.mornings_planned,
                on: row.planned_on,
                arrivalTime: localTimeOfColumn(row.arrival_time),
              },
      },
    ]),
  );
}
