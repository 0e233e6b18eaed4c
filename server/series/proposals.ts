import type { z } from 'zod';
import type {
  PlanSeriesRequest,
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
import { refusalSays } from './refusal-says';
import { searchFor } from './search';
import { plannableOrders } from './series-orders';

/** All runs that fit the children, the clinic, the laboratory and the rooms; for every refused day, why. */
export async function proposeSeries(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  { orderIds, from, morningsPlanned }: z.output<typeof proposeSeriesRequest>,
): Promise<SeriesProposal> {
  const now = clock.now();
  const words = clinicWords(staff.language);
  const orders = await plannableOrders(db, staff, orderIds);
  const siteId = orders[0]?.siteId ?? staff.siteId;
  const site = await siteOf(db, siteId);
  const today = dayOf(now, site.zone);
  const start = compareDays(from, today) < 0 ? today : from;
  const search = await searchFor(db, { siteId, orders, from: start, count: morningsPlanned, now });
  const { days, runs } = proposeRuns(search.request);
  const callMe = new Map(orders.map((order) => [order.childId, order.callMe]));
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'series-proposal',
    childIds: orders.map((order) => order.childId),
    at: now,
  });
  return {
    children: [...orders]
      .sort((left, right) => compareDays(right.bornOn, left.bornOn))
      .map(({ orderId, childId, fullName, bornOn }) => ({
        orderId,
        childId,
        fullName,
        ageInWords: ageInWords(words, bornOn, start),
      })),
    days: days.map(({ on, placesLeft, refused }) => ({
      on,
      placesLeft,
      placesInAll: search.request.places.length,
      refused: refused.map((refusal) => ({
        code: refusal.code,
        says: refusalSays(words, refusal, callMe),
      })),
    })),
    runs: runs.map((run) => ({
      startsInDays: run.startsInDays,
      days: run.days.map(({ on, places }) => ({
        on,
        places: places.map(({ childId, arrivalTime, roomId }) => ({
          childId,
          arrivalTime,
          roomId,
        })),
      })),
    })),
    protocolSays: words.sentence(search.protocol.says),
    laboratorySays: words.sentence(search.profile.says),
  };
}

/** The fasting times of the first night of a run, a line a child. */
export async function previewSeries(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  { orderIds, days }: Pick<PlanSeriesRequest, 'orderIds' | 'days'>,
): Promise<PreviewSeriesAnswer> {
  const now = clock.now();
  const words = clinicWords(staff.language);
  const orders = await plannableOrders(db, staff, orderIds);
  const first = [...days].sort((left, right) => compareDays(left.on, right.on))[0];
  if (!first) throw invalid([{ path: 'days', message: 'Choose at least one morning.' }]);
  const siteId = orders[0]?.siteId ?? staff.siteId;
  const { site, protocol } = await searchFor(db, {
    siteId,
    orders,
    from: first.on,
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
          longestFast: words.text('clinic.preview.individual'),
          individualPlanNeeded: individualPlanSays(words, plan.reasons),
        };
      const toldStopAt = wallClockForFamily(plan.stopAt, site.zone);
      const longestAt = longestEndsAt(plan.stopAt, plan);
      return {
        ...line,
        nothingAfter: clockAndDay(toldStopAt),
        longestFast: words.text('clinic.preview.longest', {
          time: clockTime(longestAt),
          stop: clockTime(toldStopAt),
        }),
        individualPlanNeeded: null,
      };
    }),
  };
}

export const individualPlanSays = (
  words: ClinicWords,
  reasons: readonly IndividualReason[],
): string =>
  words.text('clinic.preview.needs-individual', {
    reasons: words.list(reasons.map((reason) => words.text(`clinic.individual.${reason}`))),
  });
