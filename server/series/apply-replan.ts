import type { Transaction } from 'sequelize';
import type { ReplanChange } from '../../shared/contracts/replan';
import { daysBetween, type Day } from '../../shared/domain/day';
import { dayOf, instantOf, type Instant } from '../../shared/domain/zone';
import type { Actor } from '../access-record/record';
import { record } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change } from '../database/connection';
import { Problem } from '../http/problem';
import { announce } from '../live/announce';
import { sendCalendarEntries } from '../messages/calendar-entries';
import { planHouseholdMessages } from '../messages/plan-messages';
import { clinicWords } from '../wording/clinic-words';
import { refuseDays } from './check-days';
import { insertReplan } from './replan-record';
import { refuseWrongChange } from './replan-check';
import { freePlaces, rewriteSeries, type RewrittenSeries } from './rewrite-series';
import { searchFor, type Search } from './search';
import { seriesToReplan, type ReplanSeries } from './series-to-replan';
import { tellVisitsChanged } from './tell-visits-changed';

export interface Replanned {
  readonly all: readonly RewrittenSeries[];
  readonly search: Search;
}

/**
 * Puts planned mornings onto the chosen days: moves what can move, gives up what is too many, makes what is new, and
 * numbers what is to come. What was collected is not touched. Messages and calendar entries follow in the transaction.
 * @throws Problem 404, 409 'series-closed', 'morning-over', 'place-taken', 'day-refused'; 422
 */
export async function applyReplan(
  context: Context,
  transaction: Transaction,
  { actor, staff }: { readonly actor: Actor; readonly staff: StaffMember },
  asked: ReplanChange,
  reason: string,
): Promise<Replanned> {
  const { db, clock } = context;
  const series = await seriesToReplan(db, staff, asked.seriesIds, transaction);
  if (series.some(({ state }) => state === 'closed'))
    throw new Problem(409, 'series-closed', 'This series is closed. Nothing was changed.');
  const isClosing = asked.kind === 'close-with-fewer';
  if (isClosing && series.some(isGoingOn))
    throw new Problem(409, 'morning-over', 'A collection of this series is going on.');
  refuseWrongChange(asked, series);
  const search = await searchOf(context, staff, series, asked, transaction);
  refuseDays(clinicWords(staff.language), search, asked.days, series);

  await freePlaces(context, transaction, series);
  const all: RewrittenSeries[] = [];
  for (const one of series)
    all.push(await rewriteSeries(context, transaction, one, { asked, search, reason }));
  if (isClosing) await closeAll(context, transaction, series, reason);
  else for (const one of series) await reopen(context, transaction, one);

  await tellFamily(context, transaction, all, search.site.zone);
  for (const { series: one, after } of all) {
    await insertReplan(db, transaction, {
      seriesId: one.seriesId,
      kind: asked.kind,
      reason,
      before: one.mornings.map(({ number, on, state }) => ({ number, on, state })),
      after: after.mornings.map(({ number, on, state }) => ({ number, on, state })),
      staffId: staff.id,
      now: clock.now(),
    });
    await record(db, transaction, actor, {
      action: 'changed',
      matter: isClosing ? 'series-closed' : 'series-replanned',
      childIds: [one.childId],
      detail: { seriesId: one.seriesId, kind: asked.kind, reason },
      at: clock.now(),
    });
    await announce(db, transaction, 'children', one.childId);
  }
  await announce(db, transaction, 'mornings');
  return { all, search };
}

const isGoingOn = ({ mornings }: ReplanSeries): boolean =>
  mornings.some(({ morningState }) => morningState === 'here' || morningState === 'collecting');

function searchOf(
  { db, clock }: Context,
  staff: StaffMember,
  series: readonly [ReplanSeries, ...ReplanSeries[]],
  { days }: ReplanChange,
  transaction: Transaction,
): Promise<Search> {
  const now = clock.now();
  const inOrder = days.map(({ on }) => on).sort();
  const from = inOrder[0] ?? dayOf(now, 'UTC');
  const span = daysBetween(from, inOrder.at(-1) ?? from);
  return searchFor(
    db,
    {
      siteId: series[0].siteId,
      children: series,
      from,
      weeks: Math.floor(span / 7) + 1,
      count: 1,
      now,
      needsRide: series.some(({ needsRide }) => needsRide),
      withoutSeriesIds: series.map(({ seriesId }) => seriesId),
      language: staff.language,
    },
    transaction,
  );
}

async function closeAll(
  { db, clock }: Context,
  transaction: Transaction,
  series: readonly ReplanSeries[],
  reason: string,
): Promise<void> {
  await change(
    db,
    `UPDATE series SET state = 'closed', closed_at = :now, close_reason = :reason, version = version + 1
     WHERE id IN (:ids)`,
    { ids: series.map(({ seriesId }) => seriesId), reason, now: new Date(clock.now()) },
    transaction,
  );
}

/** A series that waited for results alone has mornings to come again. */
async function reopen(
  { db }: Context,
  transaction: Transaction,
  { seriesId, mornings }: ReplanSeries,
): Promise<void> {
  const hasBegun = mornings.some(({ state }) => state === 'collected');
  await change(
    db,
    `UPDATE series SET version = version + 1,
       state = IF(state = 'awaiting-results', :open, state) WHERE id = :seriesId`,
    { seriesId, open: hasBegun ? 'collecting' : 'planned' },
    transaction,
  );
}

async function tellFamily(
  context: Context,
  transaction: Transaction,
  all: readonly RewrittenSeries[],
  zone: string,
): Promise<void> {
  const first = all[0]?.series;
  if (!first) return;
  const { householdId, childId } = first;
  const today = dayOf(context.clock.now(), zone);
  const invited = all.flatMap((one) => one.invitedIds);
  const lost = all.flatMap((one) => one.lostIds);
  await sendCalendarEntries(context, transaction, lost, 'CANCEL');
  for (const on of changedDays(all).filter((day) => day >= today))
    await planHouseholdMessages(context, transaction, { householdId, on });
  await sendCalendarEntries(context, transaction, invited, 'REQUEST');
  if (invited.length + lost.length > 0)
    await tellVisitsChanged(context, transaction, {
      householdId,
      childId,
      change: [...invited, ...lost].join('-'),
      leftAt: firstLeftAt(all, zone, context.clock.now()),
    });
}

/** The first arrival to come that was given up or lies elsewhere now. */
function firstLeftAt(all: readonly RewrittenSeries[], zone: string, now: Instant): Instant | null {
  const left = all.flatMap(({ after, invitedIds, lostIds }) =>
    after.mornings.flatMap(({ was }) =>
      was && (lostIds.includes(was.morningId) || invitedIds.includes(was.morningId))
        ? [instantOf({ on: was.on, time: was.arrivalTime, zone })]
        : [],
    ),
  );
  const toCome = left.filter((at) => at > now);
  return toCome.length > 0 ? Math.min(...toCome) : null;
}

/** Days that a morning came to or left, in order. */
const changedDays = (all: readonly RewrittenSeries[]): Day[] =>
  [
    ...new Set(
      all.flatMap(({ after }) =>
        after.mornings.flatMap(({ on, was }) => [on, ...(was ? [was.on] : [])]),
      ),
    ),
  ].sort();
