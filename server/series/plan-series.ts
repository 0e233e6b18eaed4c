import type { Transaction } from 'sequelize';
import type { PlanSeries, PlanSeriesAnswer, UsualNightAnswer } from '../../shared/contracts/series';
import { addDays, compareDays } from '../../shared/domain/day';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid, Problem, type FieldError } from '../http/problem';
import { announce } from '../live/announce';
import { sendCalendarEntries } from '../messages/calendar-entries';
import { planHouseholdMessages } from '../messages/plan-messages';
import type { Site } from '../sites/sites';
import { clinicWords } from '../wording/clinic-words';
import { refuseDays } from './check-days';
import { familyWillHear } from './family-will-hear';
import { createMorning, placeTaken, type MorningPlace } from './morning-rows';
import { proposalFor } from './proposals';
import { searchFor, withNights } from './search';
import { Series } from './series-model';
import { plannableOrders, type PlannableOrder } from './series-orders';

/**
 * Plans the mornings of one child, or of brothers and sisters together: all of them or none. Messages and calendar
 * entries are queued in the same transaction.
 * @throws Problem 409 'already-planned', 'not-ready'; 'place-taken', 'day-refused' with the next `proposal`; 422 with
 *   fields
 */
export async function planSeries(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  request: PlanSeries,
): Promise<PlanSeriesAnswer> {
  const { db, clock } = context;
  const now = clock.now();
  const words = clinicWords(staff.language);
  const days = [...request.days].sort((left, right) => compareDays(left.on, right.on));
  try {
    return await inTransaction(db, async (transaction) => {
      const plannable = await plannableOrders(db, staff, request.orderIds, transaction);
      const orders = withNights(plannable, request.nights);
      const [first] = orders;
      const [firstDay] = days;
      if (!first || !firstDay)
        throw invalid([{ path: 'days', message: 'Choose at least one morning.' }]);
      refuseWrongDays(request, days, orders);
      await refuseWrongEscorts(context, request, orders, transaction);
      const search = await searchFor(
        db,
        {
          siteId: first.siteId,
          children: orders,
          from: firstDay.on,
          weeks: 1,
          count: days.length,
          now,
          needsRide: request.needsRide,
          language: staff.language,
        },
        transaction,
      );
      refuseDays(words, search, request.days, orders);
      await keepNights(context, transaction, request.nights, orders);

      const series: PlanSeriesAnswer['series'] = [];
      const morningIds: number[] = [];
      for (const order of orders) {
        const made = await createSeries(context, transaction, {
          order,
          site: search.site,
          fastingProtocolId: search.protocol.id,
          laboratoryProfileId: search.profile.id,
          staffId: staff.id,
          needsRide: request.needsRide,
          mornings: days.flatMap((day) =>
            day.places
              .filter((place) => place.childId === order.childId)
              .map((place) => ({
                on: day.on,
                arrivalTime: place.arrivalTime,
                roomId: place.roomId,
                escortFamilyMemberId:
                  request.escorts.find((escort) => escort.on === day.on)?.familyMemberId ?? null,
              })),
          ),
        });
        series.push({ id: made.seriesId, childId: order.childId });
        morningIds.push(...made.morningIds);
      }
      for (const { on } of days)
        await planHouseholdMessages(context, transaction, { householdId: first.householdId, on });
      await sendCalendarEntries(context, transaction, morningIds, 'REQUEST');
      await record(db, transaction, actor, {
        action: 'changed',
        matter: 'series-planned',
        childIds: orders.map((order) => order.childId),
        detail: { series: series.map(({ id }) => id), days: days.map(({ on }) => on) },
        at: now,
      });
      await announce(db, transaction, 'mornings');
      for (const order of orders) await announce(db, transaction, 'children', order.childId);
      return {
        series,
        familyWillHear: await familyWillHear(db, transaction, words, first.householdId, now),
      };
    });
  } catch (error) {
    throw await withNextOffers(context, staff, request, placeTaken(error) ?? error);
  }
}

/** Who came second gets the places that are left together with the answer. */
async function withNextOffers(
  context: Context,
  staff: StaffMember,
  request: PlanSeries,
  error: unknown,
): Promise<unknown> {
  if (!(error instanceof Problem) || !['place-taken', 'day-refused'].includes(error.code))
    return error;
  const [from = ''] = request.days.map(({ on }) => on).sort();
  const orders = await plannableOrders(context.db, staff, request.orderIds);
  const proposal = await proposalFor(context, staff, orders, {
    from,
    morningsPlanned: request.days.length,
    weeks: 4,
    nights: request.nights,
    needsRide: request.needsRide,
    siblingsMayPart: false,
  });
  return new Problem(error.status, error.code, error.title, { ...error.more, proposal });
}

/** What the family told about the child's nights stays with the child. */
async function keepNights(
  { db }: Context,
  transaction: Transaction,
  nights: readonly UsualNightAnswer[],
  orders: readonly PlannableOrder[],
): Promise<void> {
  for (const { childId, lastMealTime, nightFeedTimes } of nights) {
    if (!orders.some((order) => order.childId === childId)) continue;
    await change(
      db,
      'UPDATE children SET usual_last_meal_time = :lastMealTime, night_feed_times = :feeds WHERE id = :childId',
      { childId, lastMealTime, feeds: JSON.stringify(nightFeedTimes) },
      transaction,
    );
  }
}

export interface NewSeries {
  readonly order: Pick<PlannableOrder, 'orderId' | 'childId'>;
  readonly site: Pick<Site, 'id' | 'zone'>;
  readonly fastingProtocolId: number;
  readonly laboratoryProfileId: number;
  readonly staffId: number;
  readonly needsRide?: boolean;
  /** In order of days; the first is number 1. */
  readonly mornings: readonly (MorningPlace & { readonly escortFamilyMemberId: number | null })[];
}

/** Writes the rows of a series that was found to fit. */
export async function createSeries(
  context: Context,
  transaction: Transaction,
  { order, site, mornings, ...ids }: NewSeries,
): Promise<{ readonly seriesId: number; readonly morningIds: number[] }> {
  const series = await Series.create(
    {
      childId: order.childId,
      orderId: order.orderId,
      siteId: site.id,
      fastingProtocolId: ids.fastingProtocolId,
      laboratoryProfileId: ids.laboratoryProfileId,
      morningsPlanned: mornings.length,
      needsRide: ids.needsRide ?? false,
      createdByStaffId: ids.staffId,
      createdAt: new Date(context.clock.now()),
    },
    { transaction },
  );
  const morningIds: number[] = [];
  for (const [index, { escortFamilyMemberId, ...place }] of mornings.entries())
    morningIds.push(
      await createMorning(context, transaction, site, {
        seriesId: series.id,
        childId: order.childId,
        number: index + 1,
        place,
        escortFamilyMemberId,
      }),
    );
  return { seriesId: series.id, morningIds };
}

function refuseWrongDays(
  { days: asked }: PlanSeries,
  days: PlanSeries['days'],
  orders: readonly PlannableOrder[],
): void {
  const errors: FieldError[] = [];
  days.forEach((day, index) => {
    const before = days[index - 1];
    if (before && addDays(before.on, 1) !== day.on)
      errors.push({
        path: `days.${asked.indexOf(day)}.on`,
        message: 'The mornings of a series follow each other day by day.',
      });
    const childIds = day.places.map(({ childId }) => childId);
    const isEachOnce =
      childIds.length === orders.length &&
      orders.every(({ childId }) => childIds.includes(childId));
    if (!isEachOnce)
      errors.push({
        path: `days.${asked.indexOf(day)}.places`,
        message: 'Each child needs exactly one place on each morning.',
      });
  });
  const other = orders.find(({ morningsPlanned }) => morningsPlanned !== days.length);
  if (other)
    errors.push({
      path: 'days',
      message: `The order for ${other.fullName} asks for ${other.morningsPlanned} mornings.`,
    });
  if (errors.length > 0) throw invalid(errors);
}

async function refuseWrongEscorts(
  { db }: Context,
  { escorts, days }: PlanSeries,
  orders: readonly PlannableOrder[],
  transaction: Transaction,
): Promise<void> {
  const adults = await select<{ id: number; children: number }>(
    db,
    `SELECT family_member_id AS id, COUNT(*) AS children FROM child_family_members
     WHERE child_id IN (:childIds) GROUP BY family_member_id`,
    { childIds: orders.map(({ childId }) => childId) },
    transaction,
  );
  const errors = escorts.flatMap((escort, index): FieldError[] => {
    const isAdult = adults.some(
      (adult) => adult.id === escort.familyMemberId && adult.children === orders.length,
    );
    return [
      ...(isAdult
        ? []
        : [
            {
              path: `escorts.${index}.familyMemberId`,
              message: 'Choose an adult who belongs to every child of this morning.',
            },
          ]),
      ...(days.some(({ on }) => on === escort.on)
        ? []
        : [{ path: `escorts.${index}.on`, message: 'No morning is planned on this day.' }]),
    ];
  });
  if (errors.length > 0) throw invalid(errors);
}
