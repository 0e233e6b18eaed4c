import type { Sequelize } from 'sequelize';
import type { MorningState } from '../../shared/contracts/common';
import type { Day } from '../../shared/domain/day';
import type { Explanation } from '../../shared/domain/explanation';
import type { Item } from '../../shared/domain/fasting-protocol';
import { select } from '../database/connection';
import { toldAtOf, type Said } from '../fasting/told-rows';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';

export interface SaidRow {
  readonly morning_id: number;
  readonly source: 'web' | 'text' | 'call';
  readonly answer: 'nothing' | 'sip' | 'feed' | 'unsure' | 'not-coming' | 'ill' | 'late';
  readonly last_intake_at: Date | null;
  readonly verdict: 'long-enough' | 'not-long-enough' | 'cannot-tell' | null;
  readonly outcome: string;
  /** How the answer was weighed; answers of before it was kept have none. */
  readonly explanation: Explanation | null;
  readonly said: Said;
  readonly language: string;
  readonly device_at: Date | null;
  readonly received_at: Date;
}

export interface DoorCheckRow {
  readonly id: number;
  readonly morning_id: number;
  readonly last_food_at: Date | null;
  readonly food_item: Item | null;
  readonly last_drink_at: Date | null;
  readonly drink_item: 'water' | 'other' | null;
  readonly medicine: string | null;
  readonly woke_at: Date | null;
  readonly is_well: 0 | 1;
  readonly blood_glucose_mg_dl: number | null;
  readonly brought_by: string;
  readonly verdict: 'long-enough' | 'not-long-enough' | 'cannot-tell';
  readonly go_on_reason: string | null;
  readonly checked_by_staff_id: number;
  readonly checked_by: string;
  readonly checked_at: Date;
}

export interface CollectionRow {
  readonly morning_id: number;
  readonly room_id: number;
  readonly begun_at: Date;
  readonly begun_by: string;
  readonly ended_at: Date | null;
  readonly outcome: 'collected' | 'not-collected' | null;
  readonly not_collected_reason: string | null;
}

export interface SpecimenRow {
  readonly id: number;
  readonly morning_id: number;
  readonly version: number;
  readonly number: number;
  readonly label: string | null;
  readonly volume_ml: string;
  readonly collected_at: Date;
  readonly neutralised_at: Date | null;
  readonly handed_over_at: Date | null;
  readonly received_at: Date | null;
}

export interface AdultRow {
  readonly child_id: number;
  readonly id: number;
  readonly full_name: string;
  readonly phone: string | null;
  readonly speaks_language: string;
  readonly needs_interpreter: 0 | 1;
  readonly standing: 'guardian' | 'helper';
  readonly relationship: string;
  readonly may_consent: 0 | 1;
}

export interface SisterMorning {
  readonly id: number;
  readonly series_id: number;
  readonly number: number;
  readonly state: MorningState;
}

/** Everything a morning's sheet shows of one child, read from the tables. */
export interface MorningFacts {
  readonly plan: MorningPlan;
  /** Oldest first, by when it was told. */
  readonly said: readonly SaidRow[];
  /** The newest. */
  readonly doorCheck: DoorCheckRow | null;
  readonly collection: CollectionRow | null;
  readonly specimen: SpecimenRow | null;
  readonly adults: readonly AdultRow[];
  readonly seriesMornings: readonly SisterMorning[];
  /** Who gave the consent to the procedure; null when none is on file. */
  readonly consentBy: string | null;
}

const grouped = <Row, Key>(rows: readonly Row[], keyOf: (row: Row) => Key): Map<Key, Row[]> => {
  const groups = new Map<Key, Row[]>();
  for (const row of rows) {
    const key = keyOf(row);
    const group = groups.get(key);
    if (group) group.push(row);
    else groups.set(key, [row]);
  }
  return groups;
};

/** The sheet of a day: a fixed number of queries, however many children come. */
export async function morningFactsOf(
  db: Sequelize,
  siteId: number,
  on: Day,
): Promise<MorningFacts[]> {
  const plans = await morningPlansOf(db, { siteId, on });
  if (plans.length === 0) return [];
  const ids = plans.map((plan) => plan.morningId);
  const [said, doorChecks, collections, specimens, adults, mornings, consents] = await Promise.all([
    saidOf(db, ids),
    select<DoorCheckRow>(
      db,
      `SELECT door_checks.*, staff.full_name AS checked_by FROM door_checks
       JOIN staff ON staff.id = door_checks.checked_by_staff_id
       WHERE morning_id IN (:ids) ORDER BY checked_at, door_checks.id`,
      { ids },
    ),
    select<CollectionRow>(
      db,
      `SELECT morning_id, room_id, begun_at, staff.full_name AS begun_by, ended_at, outcome, not_collected_reason
       FROM collections JOIN staff ON staff.id = begun_by_staff_id WHERE morning_id IN (:ids)`,
      { ids },
    ),
    select<SpecimenRow>(
      db,
      `SELECT id, morning_id, version, number, label, volume_ml, collected_at, neutralised_at, handed_over_at, received_at
       FROM specimens WHERE morning_id IN (:ids)`,
      { ids },
    ),
    select<AdultRow>(
      db,
      `SELECT child_id, family_members.id, full_name, phone, speaks_language, needs_interpreter, standing,
         relationship, may_consent
       FROM child_family_members JOIN family_members ON family_members.id = family_member_id
       WHERE child_id IN (:childIds) ORDER BY standing, family_members.id`,
      { childIds: plans.map((plan) => plan.childId) },
    ),
    select<SisterMorning>(
      db,
      'SELECT id, series_id, number, state FROM mornings WHERE series_id IN (:seriesIds) ORDER BY number',
      { seriesIds: plans.map((plan) => plan.seriesId) },
    ),
    select<{ order_id: number; full_name: string }>(
      db,
      `SELECT order_id, full_name FROM procedure_consents
       JOIN family_members ON family_members.id = family_member_id WHERE order_id IN (:orderIds)`,
      { orderIds: plans.map((plan) => plan.orderId) },
    ),
  ]);
  const saidBy = grouped(said, (row) => row.morning_id);
  const checksBy = grouped(doorChecks, (row) => row.morning_id);
  const adultsBy = grouped(adults, (row) => row.child_id);
  const morningsBy = grouped(mornings, (row) => row.series_id);
  return plans.map((plan) => ({
    plan,
    said: saidBy.get(plan.morningId) ?? [],
    doorCheck: checksBy.get(plan.morningId)?.at(-1) ?? null,
    collection: collections.find((row) => row.morning_id === plan.morningId) ?? null,
    specimen: specimens.find((row) => row.morning_id === plan.morningId) ?? null,
    adults: adultsBy.get(plan.childId) ?? [],
    seriesMornings: morningsBy.get(plan.seriesId) ?? [],
    consentBy: consents.find((row) => row.order_id === plan.orderId)?.full_name ?? null,
  }));
}

async function saidOf(db: Sequelize, ids: readonly number[]): Promise<SaidRow[]> {
  const rows = await select<SaidRow>(
    db,
    `SELECT morning_id, source, answer, last_intake_at, verdict, outcome, explanation, said, language, device_at, received_at
     FROM fasting_checks WHERE morning_id IN (:ids) ORDER BY id`,
    { ids },
  );
  return rows.sort((left, right) => toldAtOf(left) - toldAtOf(right));
}
