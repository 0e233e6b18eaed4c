import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';
import { notFound } from '../http/problem';
import type { Day, LocalTime, Weekday } from '../../shared/domain/day';
import type { RoomAir } from '../../shared/domain/room-closure';
import type { Closure } from '../../shared/domain/series-dates';

/** A door of the organisation: its clock, hours, telephone and message times. */
export interface Site {
  readonly id: number;
  readonly name: string;
  /** What messages call it; names neither disease nor test. */
  readonly shortName: string;
  readonly zone: string;
  /** ISO 3166-1 alpha-2; numbers without a country code are read as numbers of this country. */
  readonly country: string;
  readonly region: string | null;
  readonly address: string;
  readonly door: string;
  readonly doorDirections: string;
  readonly phone: string;
  readonly emergencyNumber: string;
  /** Between these times somebody answers before the clinic opens. */
  readonly dawnPhone: { readonly from: LocalTime; readonly until: LocalTime };
  /** Languages that they speak. */
  readonly dawnLanguages: readonly string[];
  readonly clinicWeekdays: readonly Weekday[];
  /** First and last arrival, inclusive. */
  readonly arrivals: { readonly from: LocalTime; readonly until: LocalTime };
  readonly minutesPerChild: number;
  readonly placesPerMorning: number;
  readonly staffPairs: number;
  /** Days from today to the first morning at the least. */
  readonly leadDays: number;
  /** Days from booking to the first morning where the family needs a ride. */
  readonly rideLeadDays: number;
  /** Days from the order to the first morning where the suspicion must be reported first. */
  readonly reportingLeadDays: number;
  /** Longest gap between two mornings of one series. */
  readonly longestGapDays: number;
  /** From arrival to collection. */
  readonly usualWaitMinutes: number;
  readonly eveningTextTime: LocalTime;
  readonly morningQuestionMinutesBefore: number;
  readonly callListMinutesBefore: number;
  /** The first word about a visit: so many days before, at this time. */
  readonly aheadTextDays: number;
  readonly aheadTextTime: LocalTime;
  /** A second word to who has not answered, before the first arrival; 0 is none. */
  readonly nudgeMinutesBefore: number;
  /** Whether care texts may go to a number given without a recorded consent: one a day, three in a week. */
  readonly textsWithoutConsent: boolean;
  readonly version: number;
}

export interface SiteRoom {
  readonly id: number;
  readonly name: string;
  readonly closureMinutes: number;
}

/** A room as it is set up, also one that is not in use any more. */
export interface RoomSetUp extends SiteRoom {
  /** What the minutes were computed from; null where they were given. */
  readonly air: RoomAir | null;
  readonly isInUse: boolean;
  readonly version: number;
}

interface SiteRow {
  id: number;
  name: string;
  short_name: string;
  zone: string;
  country: string;
  region: string | null;
  address: string;
  door: string;
  door_directions: string;
  phone: string;
  emergency_number: string;
  dawn_answers_from_time: string;
  dawn_answers_until_time: string;
  clinic_weekdays: Weekday[];
  arrivals_from_time: string;
  arrivals_until_time: string;
  minutes_per_child: number;
  places_per_morning: number;
  staff_pairs: number;
  lead_days: number;
  ride_lead_days: number;
  reporting_lead_days: number;
  longest_gap_days: number;
  usual_wait_minutes: number;
  evening_text_time: string;
  morning_question_minutes_before: number;
  call_list_minutes_before: number;
  ahead_text_days: number;
  ahead_text_time: string;
  nudge_minutes_before: number;
  texts_without_consent: 0 | 1;
  dawn_languages: string[];
  version: number;
}

/** 'HH:mm' of a TIME column, which comes as 'HH:mm:ss'. */
export const localTimeOfColumn = (time: string): LocalTime => time.slice(0, 5);

/** @throws Problem 404 when there is no such site. */
export async function siteOf(
  db: Sequelize,
  siteId: number,
  transaction?: Transaction,
): Promise<Site> {
  const [site] = await sitesOf(db, [siteId], transaction);
  if (!site) throw notFound('This site');
  return site;
}

/** The sites with these ids, or all of them, in the order in which they were set up. */
export async function sitesOf(
  db: Sequelize,
  siteIds?: readonly number[],
  transaction?: Transaction,
): Promise<Site[]> {
  if (siteIds?.length === 0) return [];
  const rows = await select<SiteRow>(
    db,
    `SELECT * FROM sites ${siteIds ? 'WHERE id IN (:siteIds)' : ''} ORDER BY id`,
    { siteIds },
    transaction,
  );
  return rows.map(siteFrom);
}

/** The rooms in use. */
export async function roomsOf(
  db: Sequelize,
  siteId: number,
  transaction?: Transaction,
): Promise<SiteRoom[]> {
  const rooms = await allRoomsOf(db, siteId, transaction);
  return rooms
    .filter(({ isInUse }) => isInUse)
    .map(({ id, name, closureMinutes }) => ({ id, name, closureMinutes }));
}

export async function allRoomsOf(
  db: Sequelize,
  siteId: number,
  transaction?: Transaction,
): Promise<RoomSetUp[]> {
  const rows = await select<{
    id: number;
    name: string;
    closure_minutes: number;
    air_changes_per_hour: string | null;
    cleared_percent: string | null;
    is_in_use: 0 | 1;
    version: number;
  }>(db, 'SELECT * FROM rooms WHERE site_id = :siteId ORDER BY id', { siteId }, transaction);
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    closureMinutes: row.closure_minutes,
    air:
      row.air_changes_per_hour === null
        ? null
        : {
            airChangesPerHour: Number(row.air_changes_per_hour),
            clearedPercent: Number(row.cleared_percent) === 99 ? 99 : 99.9,
          },
    isInUse: row.is_in_use === 1,
    version: row.version,
  }));
}

/** The clinic's own closures from a day on; `closedDays` knows the holidays as well. */
export async function closuresOf(
  db: Sequelize,
  siteId: number,
  from: Day,
  transaction?: Transaction,
): Promise<Closure[]> {
  return select<Closure>(
    db,
    `SELECT closed_on AS \`on\`, reason FROM closures
     WHERE site_id = :siteId AND closed_on >= :from ORDER BY closed_on`,
    { siteId, from },
    transaction,
  );
}

function siteFrom(row: SiteRow): Site {
  return {
    id: row.id,
    name: row.name,
    shortName: row.short_name,
    zone: row.zone,
    country: row.country,
    region: row.region,
    address: row.address,
    door: row.door,
    doorDirections: row.door_directions,
    phone: row.phone,
    emergencyNumber: row.emergency_number,
    dawnPhone: {
      from: localTimeOfColumn(row.dawn_answers_from_time),
      until: localTimeOfColumn(row.dawn_answers_until_time),
    },
    dawnLanguages: row.dawn_languages,
    clinicWeekdays: row.clinic_weekdays,
    arrivals: {
      from: localTimeOfColumn(row.arrivals_from_time),
      until: localTimeOfColumn(row.arrivals_until_time),
    },
    minutesPerChild: row.minutes_per_child,
    placesPerMorning: row.places_per_morning,
    staffPairs: row.staff_pairs,
    leadDays: row.lead_days,
    rideLeadDays: row.ride_lead_days,
    reportingLeadDays: row.reporting_lead_days,
    longestGapDays: row.longest_gap_days,
    usualWaitMinutes: row.usual_wait_minutes,
    eveningTextTime: localTimeOfColumn(row.evening_text_time),
    morningQuestionMinutesBefore: row.morning_question_minutes_before,
    callListMinutesBefore: row.call_list_minutes_before,
    aheadTextDays: row.ahead_text_days,
    aheadTextTime: localTimeOfColumn(row.ahead_text_time),
    nudgeMinutesBefore: row.nudge_minutes_before,
    textsWithoutConsent: row.texts_without_consent === 1,
    version: row.version,
  };
}
