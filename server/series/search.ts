import type { Sequelize, Transaction } from 'sequelize';
import { addDays, ageOn, compareDays, type Day } from '../../shared/domain/day';
import { bandFor } from '../../shared/domain/fasting-protocol';
import { placesOfMorning } from '../../shared/domain/places-of-morning';
import type { BookedPlace, SeriesChild, SeriesRequest } from '../../shared/domain/series-dates';
import { select } from '../database/connection';
import { Problem } from '../http/problem';
import {
  currentProfile,
  currentProtocol,
  type StoredProfile,
  type StoredProtocol,
} from '../protocols/protocols';
import {
  closuresOf,
  localTimeOfColumn,
  roomsOf,
  siteOf,
  type Site,
  type SiteRoom,
} from '../sites/sites';
import type { PlannableOrder } from './series-orders';

/** How far ahead runs are looked for. */
export const weeksAhead = 4;

/** Everything about the clinic that decides on which days and at which places children can come. */
export interface Search {
  readonly site: Site;
  readonly rooms: readonly SiteRoom[];
  readonly protocol: StoredProtocol;
  readonly profile: StoredProfile;
  readonly request: SeriesRequest;
}

/**
 * What runs are searched in, from the clinic as it stands.
 * @throws Problem 409 'no-signed-protocol', 'no-signed-profile', 'age-not-in-protocol'
 */
export async function searchFor(
  db: Sequelize,
  search: {
    readonly siteId: number;
    readonly orders: readonly PlannableOrder[];
    readonly from: Day;
    readonly count: number;
    readonly now: number;
  },
  transaction?: Transaction,
): Promise<Search> {
  const { siteId, orders, from, count, now } = search;
  const site = await siteOf(db, siteId, transaction);
  const rooms = await roomsOf(db, siteId, transaction);
  const closures = await closuresOf(db, siteId, from, transaction);
  const protocol = await currentProtocol(db, siteId, from, transaction);
  const profile = await currentProfile(db, siteId, from, transaction);
  const booked = await bookedPlaces(db, siteId, from, transaction);
  const places = placesOfMorning({
    rooms,
    staffPairs: site.staffPairs,
    arrivalsFrom: site.arrivals.from,
    arrivalsUntil: site.arrivals.until,
    minutesPerChild: site.minutesPerChild,
    limit: site.placesPerMorning,
  });
  const request: SeriesRequest = {
    zone: site.zone,
    from,
    weeks: weeksAhead,
    count,
    clinicDays: site.clinicWeekdays.map((weekday) => ({ weekday, ...site.arrivals })),
    closures,
    laboratory: {
      receivingWeekdays: profile.receivingWeekdays,
      cutOffTimes: profile.cutOffTimes,
    },
    places,
    booked,
    children: orders.map((order) => seriesChild(order, from, protocol)),
    usualWaitMinutes: site.usualWaitMinutes,
    leadDays: site.leadDays,
    now,
  };
  return { site, rooms, protocol, profile, request };
}

/** A child's limits by the protocol at its age on that day. */
export function seriesChild(
  { childId, fullName, bornOn }: Pick<PlannableOrder, 'childId' | 'fullName' | 'bornOn'>,
  on: Day,
  protocol: StoredProtocol,
): SeriesChild {
  const months = compareDays(bornOn, on) <= 0 ? ageOn(bornOn, on).months : 0;
  const youngest = protocol.bands.find((band) => !band.individualPlan);
  const band = bandFor(protocol, months);
  if (!band || !youngest)
    throw new Problem(
      409,
      'age-not-in-protocol',
      `The fasting protocol has no hours for ${fullName}'s age. A clinician decides.`,
    );
  // A child without hours of its own gets an individual plan; until it is there, the strictest hours hold its place.
  const { leastHours, longestHours } = band.leastHours ? band : youngest;
  return {
    id: childId,
    bornOn,
    leastMinutes: Math.max(...Object.values(leastHours ?? {}), 0) * 60,
    longestMinutes: (longestHours ?? 0) * 60,
  };
}

async function bookedPlaces(
  db: Sequelize,
  siteId: number,
  from: Day,
  transaction?: Transaction,
): Promise<BookedPlace[]> {
  const rows = await select<{ on: Day; arrivalTime: string; roomId: number }>(
    db,
    `SELECT planned_on AS \`on\`, arrival_time AS arrivalTime, room_id AS roomId FROM mornings
     WHERE site_id = :siteId AND place_key IS NOT NULL AND planned_on BETWEEN :from AND :until`,
    { siteId, from, until: addDays(from, weeksAhead * 7 + 7) },
    transaction,
  );
  return rows.map((row) => ({ ...row, arrivalTime: localTimeOfColumn(row.arrivalTime) }));
}
