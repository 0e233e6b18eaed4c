import type { Sequelize, Transaction } from 'sequelize';
import type { UsualNightAnswer } from '../../shared/contracts/series';
import { addDays, ageOn, compareDays, type Day, type LocalTime } from '../../shared/domain/day';
import { bandFor } from '../../shared/domain/fasting-protocol';
import type { FastingLimits } from '../../shared/domain/morning-places';
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
import { closedDays } from '../sites/closed-days';
import { localTimeOfColumn, roomsOf, siteOf, type Site, type SiteRoom } from '../sites/sites';

/** A series has at most five mornings: the last run looked at reaches so many days past the weeks. */
const longestRunDays = 7;

/** A child whose mornings are looked for. */
export interface SearchedChild {
  readonly childId: number;
  readonly fullName: string;
  readonly callMe: string;
  readonly bornOn: Day;
  /** As the family told it when the mornings were planned; null when nobody asked. */
  readonly usualLastMealTime: LocalTime | null;
  readonly nightFeedTimes: readonly LocalTime[];
  /** A report under local law is due and was not made. */
  readonly isReportOwed: boolean;
}

/** Everything about the clinic that decides on which days and at which places children can come. */
export interface Search {
  readonly site: Site;
  readonly rooms: readonly SiteRoom[];
  readonly protocol: StoredProtocol;
  readonly profile: StoredProfile;
  /** Between two mornings of one series, by the clinic. */
  readonly longestGapDays: number;
  readonly request: SeriesRequest;
}

export interface SearchWanted {
  readonly siteId: number;
  readonly children: readonly SearchedChild[];
  readonly from: Day;
  readonly weeks: number;
  readonly count: number;
  readonly now: number;
  readonly needsRide?: boolean;
  readonly siblingsMayPart?: boolean;
  /** Their places count as free: they are about to move. */
  readonly withoutSeriesIds?: readonly number[];
  /** In which holidays are named. */
  readonly language?: string;
}

/**
 * What runs are searched in, from the clinic as it stands. What is booked and closed is read for these weeks alone, so
 * that a search costs the same however many series there were before.
 * @throws Problem 409 'no-signed-protocol', 'no-signed-profile', 'age-not-in-protocol'
 */
export async function searchFor(
  db: Sequelize,
  wanted: SearchWanted,
  transaction?: Transaction,
): Promise<Search> {
  const { siteId, children, from, weeks, count, now } = wanted;
  const until = addDays(from, weeks * 7 + longestRunDays);
  // Until the end of a transaction that plans, nobody closes a day of the site.
  if (transaction)
    await select(
      db,
      'SELECT id FROM sites WHERE id = :siteId LOCK IN SHARE MODE',
      { siteId },
      transaction,
    );
  const site = await siteOf(db, siteId, transaction);
  const rooms = await roomsOf(db, siteId, transaction);
  const closures = await closedDays(db, siteId, from, until, transaction, wanted.language);
  const protocol = await currentProtocol(db, siteId, from, transaction);
  const profile = await currentProfile(db, siteId, from, transaction);
  const booked = await bookedPlaces(db, wanted, until, transaction);
  const { staffPairs, minutesPerChild, placesPerMorning: limit } = site;
  const places = placesOfMorning({
    rooms,
    staffPairs,
    arrivalsFrom: site.arrivals.from,
    arrivalsUntil: site.arrivals.until,
    minutesPerChild,
    limit,
  });
  const request: SeriesRequest = {
    zone: site.zone,
    from,
    weeks,
    count,
    clinicDays: site.clinicWeekdays.map((weekday) => ({ weekday, ...site.arrivals })),
    closures,
    laboratory: {
      receivingWeekdays: profile.receivingWeekdays,
      cutOffTimes: profile.cutOffTimes,
      minutesToLaboratory: profile.minutesToLaboratory,
    },
    places,
    booked,
    turnover: { rooms, staffPairs, minutesPerChild, limit },
    children: children.map((child) => seriesChild(child, from, until, protocol)),
    siblingsMayPart: wanted.siblingsMayPart ?? false,
    usualWaitMinutes: site.usualWaitMinutes,
    leadDays: site.leadDays,
    rideLeadDays: wanted.needsRide ? site.rideLeadDays : 0,
    reportingLeadDays: children.some(({ isReportOwed }) => isReportOwed)
      ? site.reportingLeadDays
      : 0,
    now,
  };
  return { site, rooms, protocol, profile, longestGapDays: site.longestGapDays, request };
}

/** A child's usual night and its limits by the protocol, with those of each later age until the last day looked at. */
export function seriesChild(
  child: Pick<
    SearchedChild,
    'childId' | 'fullName' | 'bornOn' | 'usualLastMealTime' | 'nightFeedTimes'
  >,
  from: Day,
  until: Day,
  protocol: StoredProtocol,
): SeriesChild {
  const laterLimits: (FastingLimits & { from: Day })[] = [];
  let limits = limitsFor(child, from, protocol);
  const first = limits;
  for (let on = addDays(from, 1); compareDays(on, until) <= 0; on = addDays(on, 1)) {
    const next = limitsFor(child, on, protocol);
    if (next.key === limits.key) continue;
    laterLimits.push({ ...next, from: on });
    limits = next;
  }
  return {
    ...first,
    id: child.childId,
    bornOn: child.bornOn,
    laterLimits,
    nightFeedTimes: child.nightFeedTimes,
    ...(child.usualLastMealTime === null ? {} : { usualLastMealTime: child.usualLastMealTime }),
  };
}

function limitsFor(
  { fullName, bornOn }: Pick<SearchedChild, 'fullName' | 'bornOn'>,
  on: Day,
  protocol: StoredProtocol,
): FastingLimits & { readonly key: number } {
  const months = compareDays(bornOn, on) <= 0 ? ageOn(bornOn, on).months : 0;
  const youngest = protocol.bands.find((band) => !band.individualPlan);
  const own = bandFor(protocol, months);
  if (!own || !youngest)
    throw new Problem(
      409,
      'age-not-in-protocol',
      `The fasting protocol has no hours for ${fullName}'s age. A clinician decides.`,
    );
  // A child without hours of its own gets an individual plan; until it is there, the strictest hours hold its place.
  const band = own.leastHours ? own : youngest;
  return {
    key: protocol.bands.indexOf(band),
    leastMinutes: Math.max(...Object.values(band.leastHours ?? {}), 0) * 60,
    longestMinutes: (band.longestHours ?? 0) * 60,
    nothingFrom: band.nothingFrom,
  };
}

async function bookedPlaces(
  db: Sequelize,
  { siteId, from, withoutSeriesIds = [] }: SearchWanted,
  until: Day,
  transaction?: Transaction,
): Promise<BookedPlace[]> {
  const rows = await select<{ on: Day; arrivalTime: string; roomId: number }>(
    db,
    `SELECT planned_on AS \`on\`, arrival_time AS arrivalTime, room_id AS roomId FROM mornings
     WHERE site_id = :siteId AND place_key IS NOT NULL AND planned_on BETWEEN :from AND :until
       ${withoutSeriesIds.length > 0 ? 'AND series_id NOT IN (:withoutSeriesIds)' : ''}`,
    { siteId, from, until, withoutSeriesIds },
    transaction,
  );
  return rows.map((row) => ({ ...row, arrivalTime: localTimeOfColumn(row.arrivalTime) }));
}

/** The children as the family has just told their nights; the others as their records say. */
export function withNights<Child extends SearchedChild>(
  children: readonly Child[],
  nights: readonly UsualNightAnswer[],
): Child[] {
  return children.map((child) => {
    const told = nights.find(({ childId }) => childId === child.childId);
    return told
      ? { ...child, usualLastMealTime: told.lastMealTime, nightFeedTimes: told.nightFeedTimes }
      : child;
  });
}
