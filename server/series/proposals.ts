import type { z } from 'zod';
import type {
  planSeriesRequest,
  PreviewSeriesAnswer,
  proposeSeriesRequest,
  SeriesProposal,
} from '../../shared/contracts/series';
import { compareDays, type Instant } from '../../shared/domain/day';
import {
  fastingPlan,
  longestEndsAt,
  wallClockForFamily,
  type IndividualReason,
  type StandardPlan,
} from '../../shared/domain/fasting-plan';
import { proposeRuns } from '../../shared/domain/series-dates';
import { dayOf, instantOf, localPartsOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { invalid } from '../http/problem';
import { siteOf } from '../sites/sites';
import { ageInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { restsOnSays, searchedSays } from './proposal-says';
import { searchFor, withNights } from './search';
import { plannableOrders, type PlannableOrder } from './series-orders';

type Wanted = z.output<typeof proposeSeriesRequest>;

/** All runs that fit the children, the clinic, the laboratory and the rooms; for every refused day, why. */
export async function proposeSeries(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  wanted: Wanted,
): Promise<SeriesProposal> {
  const { db, clock } = context;
  const orders = await plannableOrders(db, staff, wanted.orderIds);
  const proposal = await proposalFor(context, staff, orders, wanted);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'series-proposal',
    childIds: orders.map((order) => order.childId),
    at: clock.now(),
  });
  return proposal;
}

/** The proposal without noting that somebody has seen it. */
export async function proposalFor(
  { db, clock }: Context,
  staff: StaffMember,
  orders: readonly PlannableOrder[],
  { from, morningsPlanned, weeks, nights, needsRide, siblingsMayPart }: Omit<Wanted, 'orderIds'>,
): Promise<SeriesProposal> {
  const now = clock.now();
  const words = clinicWords(staff.language);
  const siteId = orders[0]?.siteId ?? staff.siteId;
  const site = await siteOf(db, siteId);
  const today = dayOf(now, site.zone);
  const start = compareDays(from, today) < 0 ? today : from;
  const children = withNights(orders, nights);
  const search = await searchFor(db, {
    siteId,
    children,
    from: start,
    weeks,
    count: morningsPlanned,
    now,
    needsRide,
    siblingsMayPart,
    language: staff.language,
  });
  return {
    ...searchedSays(words, search, proposeRuns(search.request), children),
    ...restsOnSays(words, search),
    children: [...children]
      .sort((left, right) => compareDays(right.bornOn, left.bornOn))
      .map(({ orderId, childId, fullName, callMe, bornOn, ...night }) => ({
        orderId,
        childId,
        fullName,
        callMe,
        ageInWords: ageInWords(words, bornOn, start),
        usualNight: {
          lastMealTime: night.usualLastMealTime,
          nightFeedTimes: [...night.nightFeedTimes],
        },
      })),
  };
}

/** The fasting times of the first night of a run, a line a child. */
export async function previewSeries(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  {
    orderIds,
    days,
    nights,
  }: Pick<z.output<typeof planSeriesRequest>, 'orderIds' | 'days' | 'nights'>,
): Promise<PreviewSeriesAnswer> {
  const now = clock.now();
  const words = clinicWords(staff.language);
  const orders = withNights(await plannableOrders(db, staff, orderIds), nights);
  const first = [...days].sort((left, right) => compareDays(left.on, right.on))[0];
  if (!first) throw invalid([{ path: 'days', message: 'Choose at least one morning.' }]);
  const siteId = orders[0]?.siteId ?? staff.siteId;
  const { site, protocol } = await searchFor(db, {
    siteId,
    children: orders,
    from: first.on,
    weeks: 1,
    count: days.length,
    now,
  });
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'series-preview',
    childIds: orders.map((order) => order.childId),
    at: now,
  });
  const clockAndDay = (at: Instant): string => {
    const { time, weekday } = localPartsOf(at, site.zone);
    return words.text('clinic.preview.clock-and-day', { time, weekday: words.weekday(weekday) });
  };
  const clockTime = (at: Instant): string => words.clock(at, site.zone);
  return {
    firstNight: orders.map((order) => {
      const place = first.places.find(({ childId }) => childId === order.childId);
      if (!place)
        throw invalid([
          { path: 'days.0.places', message: `${order.callMe} has no place on this day.` },
        ]);
      const arrivalAt = instantOf({ on: first.on, time: place.arrivalTime, zone: site.zone });
      const plan = fastingPlan({
        arrivalAt,
        zone: site.zone,
        bornOn: order.bornOn,
        feeding: order.feeding,
        protocol,
        cautions: order.cautions,
        travelMinutes: order.travelMinutes,
        readyMinutes: order.readyMinutes,
        usualWaitMinutes: site.usualWaitMinutes,
        usual: { lastMealTime: order.usualLastMealTime, nightFeedTimes: order.nightFeedTimes },
      });
      const line = {
        childId: order.childId,
        fullName: order.fullName,
        arrive: words.text('clinic.preview.arrive', { time: place.arrivalTime, door: site.door }),
      };
      if (plan.kind === 'individual')
        return {
          ...line,
          nothingAfter: words.text('clinic.preview.individual'),
          fallsAway: null,
          longestFast: words.text('clinic.preview.individual'),
          individualPlanNeeded: individualPlanSays(words, plan.reasons),
        };
      const toldStopAt = wallClockForFamily(plan.stopAt, site.zone);
      const longestAt = longestEndsAt(plan.stopAt, plan);
      return {
        ...line,
        nothingAfter: clockAndDay(toldStopAt),
        fallsAway: fallsAwaySays(words, plan, clockTime),
        longestFast: words.text('clinic.preview.longest', {
          time: clockTime(longestAt),
          stop: clockTime(toldStopAt),
        }),
        individualPlanNeeded: null,
      };
    }),
  };
}

function fallsAwaySays(
  words: ClinicWords,
  { nightFeeds }: StandardPlan,
  clockTime: (at: Instant) => string,
): string | null {
  const gone = nightFeeds.filter(({ fallsAway }) => fallsAway).map(({ at }) => clockTime(at));
  if (gone.length === 0) return null;
  return words.text('clinic.preview.falls-away', { count: gone.length, times: words.list(gone) });
}

export const individualPlanSays = (
  words: ClinicWords,
  reasons: readonly IndividualReason[],
): string =>
  words.text('clinic.preview.needs-individual', {
    reasons: words.list(reasons.map((reason) => words.text(`clinic.individual.${reason}`))),
  });
