import type { Sequelize, Transaction } from 'sequelize';
import type { Caution, Feeding, MorningState } from '../../shared/contracts/common';
import type { Day, Instant, LocalTime } from '../../shared/domain/day';
import { fastingPlan, type FastingPlan } from '../../shared/domain/fasting-plan';
import { effectiveVersion, ownPlanOfMorning } from '../../shared/domain/individual-plan';
import type { UsualNight } from '../../shared/domain/usual-night';
import { ageOn } from '../../shared/domain/day';
import { select } from '../database/connection';
import { storedPlansOf, type StoredPlan } from '../individual-plans/stored-plans';
import { usualNightsOf } from '../individual-plans/usual-nights';
import { idInForce, protocolsByIds, type StoredProtocol } from '../protocols/protocols';
import { localTimeOfColumn, sitesOf, type Site } from '../sites/sites';

/** One planned collection with everything that its times depend on. */
export interface MorningPlan {
  readonly morningId: number;
  readonly version: number;
  readonly seriesId: number;
  readonly orderId: number;
  readonly childId: number;
  readonly householdId: number;
  readonly siteId: number;
  readonly site: Site;
  readonly zone: string;
  readonly fullName: string;
  readonly callMe: string;
  /** How texts call the child; never the name. */
  readonly familyLabel: string;
  readonly bornOn: Day;
  readonly feeding: Feeding;
  readonly cautions: readonly Caution[];
  /** This morning's number in its series, from 1. */
  readonly number: number;
  readonly ofPlanned: number;
  readonly on: Day;
  readonly arrivalTime: LocalTime;
  readonly arrivalAt: Instant;
  readonly expectedAt: Instant | null;
  readonly arrivedAt: Instant | null;
  readonly fedAt: Instant | null;
  readonly leftAt: Instant | null;
  readonly roomId: number;
  readonly roomName: string;
  readonly state: MorningState;
  readonly lostReason: string | null;
  readonly escortFamilyMemberId: number | null;
  readonly nightCarerFamilyMemberId: number | null;
  readonly travelMinutes: number;
  readonly readyMinutes: number;
  readonly calendarUid: string;
  readonly calendarSequence: number;
  /** The laboratory profile in force on that day. */
  readonly laboratoryProfileId: number;
  readonly protocol: StoredProtocol;
  /** The clinician's plan for this child that holds on this morning; null where there is none that fits it. */
  readonly individualPlan: StoredPlan | null;
  readonly plan: FastingPlan;
}

export type MorningsWanted =
  | { readonly morningIds: readonly number[] }
  | { readonly seriesIds: readonly number[] }
  | { readonly householdId: number; readonly on?: Day }
  | { readonly siteId: number; readonly on: Day };

interface MorningRow {
  morning_id: number;
  version: number;
  series_id: number;
  order_id: number;
  child_id: number;
  household_id: number;
  site_id: number;
  full_name: string;
  call_me: string;
  family_label: string;
  born_on: Day;
  feeding: Feeding;
  cautions: Caution[];
  number: number;
  mornings_planned: number;
  planned_on: Day;
  arrival_time: string;
  arrival_at: Date;
  expected_at: Date | null;
  arrived_at: Date | null;
  fed_at: Date | null;
  left_at: Date | null;
  room_id: number;
  room_name: string;
  state: MorningState;
  lost_reason: string | null;
  escort_family_member_id: number | null;
  night_carer_family_member_id: number | null;
  travel_minutes: number;
  ready_minutes: number;
  calendar_uid: string;
  calendar_sequence: number;
  fasting_protocol_id: number;
  laboratory_profile_id: number;
}

const onItsDay = { siteId: 'mornings.site_id', on: 'mornings.planned_on' };
const protocolId = idInForce('fasting_protocols', {
  ...onItsDay,
  otherwise: 'series.fasting_protocol_id',
});
const profileId = idInForce('laboratory_profiles', {
  ...onItsDay,
  otherwise: 'series.laboratory_profile_id',
});

/**
 * The mornings in order of arrival, lost ones included, each with its fasting plan. This is the one place where rows
 * become fasting plans, so that every screen, text and letter shows the same times.
 */
export async function morningPlansOf(
  db: Sequelize,
  wanted: MorningsWanted,
  transaction?: Transaction,
): Promise<MorningPlan[]> {
  if ('morningIds' in wanted && wanted.morningIds.length === 0) return [];
  if ('seriesIds' in wanted && wanted.seriesIds.length === 0) return [];
  const rows = await select<MorningRow>(
    db,
    `SELECT mornings.id AS morning_id, mornings.*, series.order_id, series.mornings_planned,
       ${protocolId} AS fasting_protocol_id, ${profileId} AS laboratory_profile_id,
       children.household_id, children.full_name, children.call_me, children.family_label, children.born_on,
       children.feeding, children.cautions, households.travel_minutes, households.ready_minutes,
       rooms.name AS room_name
     FROM mornings
     JOIN series ON series.id = mornings.series_id
     JOIN children ON children.id = mornings.child_id
     JOIN households ON households.id = children.household_id
     JOIN rooms ON rooms.id = mornings.room_id
     WHERE ${whereOf(wanted)}
     ORDER BY mornings.arrival_at, mornings.id`,
    { ...wanted },
    transaction,
  );
  const sites = await sitesOf(db, [...new Set(rows.map((row) => row.site_id))], transaction);
  const protocols = await protocolsByIds(
    db,
    rows.map((row) => row.fasting_protocol_id),
    transaction,
  );
  const childIds = rows.map((row) => row.child_id);
  const ownPlans = await storedPlansOf(db, childIds, transaction);
  const usualNights = await usualNightsOf(db, childIds, transaction);
  const siteById = new Map(sites.map((site) => [site.id, site]));
  const protocolById = new Map(protocols.map((protocol) => [protocol.id, protocol]));
  return rows.flatMap((row) => {
    const site = siteById.get(row.site_id);
    const protocol = protocolById.get(row.fasting_protocol_id);
    if (!site || !protocol) return [];
    const ofChild = ownPlans.filter((plan) => plan.childId === row.child_id);
    const morning = { seriesId: row.series_id, on: row.planned_on };
    const individualPlan = effectiveVersion(ofChild, morning);
    const usual = usualNights.get(row.child_id);
    return [planFrom(row, { site, protocol, individualPlan, usual })];
  });
}

function whereOf(wanted: MorningsWanted): string {
  if ('morningIds' in wanted) return 'mornings.id IN (:morningIds)';
  if ('seriesIds' in wanted) return 'mornings.series_id IN (:seriesIds)';
  if ('siteId' in wanted) return 'mornings.site_id = :siteId AND mornings.planned_on = :on';
  return wanted.on === undefined
    ? 'children.household_id = :householdId'
    : 'children.household_id = :householdId AND mornings.planned_on = :on';
}

interface PlanSources {
  readonly site: Site;
  readonly protocol: StoredProtocol;
  readonly individualPlan: StoredPlan | null;
  readonly usual: UsualNight | undefined;
}

function planFrom(row: MorningRow, sources: PlanSources): MorningPlan {
  const { site, protocol, individualPlan } = sources;
  const arrivalAt = row.arrival_at.getTime();
  const plan = fastingPlanOf(row, sources, arrivalAt);
  return {
    morningId: row.morning_id,
    version: row.version,
    seriesId: row.series_id,
    orderId: row.order_id,
    childId: row.child_id,
    householdId: row.household_id,
    siteId: row.site_id,
    site,
    zone: site.zone,
    fullName: row.full_name,
    callMe: row.call_me,
    familyLabel: row.family_label,
    bornOn: row.born_on,
    feeding: row.feeding,
    cautions: row.cautions,
    number: row.number,
    ofPlanned: row.mornings_planned,
    on: row.planned_on,
    arrivalTime: localTimeOfColumn(row.arrival_time),
    arrivalAt,
    expectedAt: row.expected_at?.getTime() ?? null,
    arrivedAt: row.arrived_at?.getTime() ?? null,
    fedAt: row.fed_at?.getTime() ?? null,
    leftAt: row.left_at?.getTime() ?? null,
    roomId: row.room_id,
    roomName: row.room_name,
    state: row.state,
    lostReason: row.lost_reason,
    escortFamilyMemberId: row.escort_family_member_id,
    nightCarerFamilyMemberId: row.night_carer_family_member_id,
    travelMinutes: row.travel_minutes,
    readyMinutes: row.ready_minutes,
    calendarUid: row.calendar_uid,
    calendarSequence: row.calendar_sequence,
    laboratoryProfileId: row.laboratory_profile_id,
    protocol,
    individualPlan: plan.kind === 'standard' ? individualPlan : null,
    plan,
  };
}

/** The clinician's plan for the child comes before the clinic's protocol. */
function fastingPlanOf(
  row: MorningRow,
  { site, protocol, individualPlan, usual }: PlanSources,
  arrivalAt: Instant,
): FastingPlan {
  const common = {
    arrivalAt,
    zone: site.zone,
    feeding: row.feeding,
    travelMinutes: row.travel_minutes,
    readyMinutes: row.ready_minutes,
    usualWaitMinutes: site.usualWaitMinutes,
    usual,
  };
  if (individualPlan)
    return ownPlanOfMorning(individualPlan.body, individualPlan.version, {
      ...common,
      ageMonths: ageOn(row.born_on, row.planned_on).months,
      eatAgainAfterMinutes: protocol.eatAgainAfterMinutes,
      protocolVersion: protocol.version,
    });
  return fastingPlan({ ...common, bornOn: row.born_on, protocol, cautions: row.cautions });
}
