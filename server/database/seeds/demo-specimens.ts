import type { Transaction } from 'sequelize';
import { addDays, type Day } from '../../../shared/domain/day';
import { instantOf } from '../../../shared/domain/zone';
import type { Context } from '../../context';
import { change } from '../connection';
import { demoZone, type DemoClinic } from './demo-clinic';
import { insertRow } from './insert-row';

const minute = 60_000;

export interface PastMorning {
  readonly morningId: number;
  readonly seriesId: number;
  readonly childId: number;
  readonly roomId: number;
  readonly number: number;
  readonly arrivalAt: number;
  readonly broughtBy: string;
  readonly label: string;
}

/** A morning that went well: door check, collected, neutralised in time, received by the laboratory. @returns the specimen's id. */
export async function collectMorning(
  { db }: Context,
  transaction: Transaction,
  clinic: DemoClinic,
  morning: PastMorning,
): Promise<number> {
  const nurseId = clinic.staffIds.get('kofi') ?? 0;
  const after = (minutes: number): Date => new Date(morning.arrivalAt + minutes * minute);
  const { morningId } = morning;
  await insertRow(db, transaction, 'door_checks', {
    morning_id: morningId,
    last_food_at: after(-10 * 60),
    last_drink_at: after(-9 * 60),
    medicine: null,
    woke_at: after(-75),
    is_well: true,
    brought_by: morning.broughtBy,
    verdict: 'long-enough',
    go_on_reason: null,
    checked_by_staff_id: nurseId,
    checked_at: after(6),
  });
  await insertRow(db, transaction, 'collections', {
    morning_id: morningId,
    room_id: morning.roomId,
    begun_at: after(22),
    begun_by_staff_id: nurseId,
    ended_at: after(36),
    outcome: 'collected',
    tube_size_fr: 8,
    position_check: 'acid on paper',
    rinse_fluid: null,
    rinse_ml: null,
    tries: 1,
    tolerance: 'cried, calm after two minutes',
  });
  const specimenId = await insertRow(db, transaction, 'specimens', {
    series_id: morning.seriesId,
    morning_id: morningId,
    child_id: morning.childId,
    number: morning.number,
    label: morning.label,
    volume_ml: 5 + morning.number * 0.5,
    collected_at: after(34),
    neutralised_at: after(46),
    neutralised_with: 'sodium carbonate',
    handed_over_at: after(95),
    received_at: after(140),
    laboratory_number: `L${morning.label.slice(3).replace('-', '')}`,
  });
  await change(
    db,
    `UPDATE mornings SET state = 'collected', arrived_at = :arrivedAt, fed_at = :fedAt, left_at = :leftAt
     WHERE id = :morningId`,
    { morningId, arrivedAt: after(-3), fedAt: after(55), leftAt: after(80) },
    transaction,
  );
  return specimenId;
}

export interface ResultsSeed {
  readonly specimenId: number;
  readonly childId: number;
  readonly receivedOn: Day;
  /** Everything reported and looked at twice; otherwise the culture is still running. */
  readonly isFinal: boolean;
}

/** What the laboratory has answered: nothing found; the cultures running, or final after 42 days. */
export async function giveResults(
  { db }: Context,
  transaction: Transaction,
  clinic: DemoClinic,
  { specimenId, childId, receivedOn, isFinal }: ResultsSeed,
): Promise<void> {
  const culture = isFinal
    ? { test: 'culture', value: 'negative-final', finality: 'final', afterDays: 42 }
    : { test: 'culture', value: 'no-growth-yet', finality: 'preliminary', afterDays: 7 };
  const answers = [
    { test: 'smear', value: 'negative', finality: 'final', afterDays: 1 },
    { test: 'amplification', value: 'not-detected', finality: 'final', afterDays: 2 },
    culture,
  ];
  for (const { test, value, finality, afterDays } of answers) {
    const reportedOn = addDays(receivedOn, afterDays);
    const enteredAt = instantOf({ on: reportedOn, time: '14:10', zone: demoZone });
    await insertRow(db, transaction, 'results', {
      specimen_id: specimenId,
      child_id: childId,
      test,
      value,
      finality,
      reported_on: reportedOn,
      entered_at: new Date(enteredAt),
      entered_by_staff_id: clinic.staffIds.get('rosa'),
      second_look_by_staff_id: finality === 'final' ? clinic.staffIds.get('okafor') : null,
      second_look_at: finality === 'final' ? new Date(enteredAt + 90 * minute) : null,
      is_current: true,
      current_key: `${specimenId}:${test}`,
    });
  }
}
