import type { Sequelize, Transaction } from 'sequelize';
import { raiseAlert } from '../alerts/raise-alert';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { closeCalls, raiseCall } from './calls';

interface HouseholdDay {
  household_id: number;
  site_id: number;
  child_id: number;
  morning_id: number;
  planned_on: string;
  arrival_at: Date;
  escort_id: number | null;
  unanswered: number;
}

export const notAnsweredKey = (householdId: number, on: string): string =>
  `not-answered:${householdId}:${on}`;

/**
 * Families whom somebody has to call because the morning is near and no answer has come, one task a family and day;
 * tasks of families that have answered or arrived meanwhile are taken off again. Runs every minute.
 * @returns how many tasks are new.
 */
export async function raiseUnansweredCalls(context: Context): Promise<number> {
  const { db, clock } = context;
  const now = clock.now();
  const days = await select<HouseholdDay>(
    db,
    `SELECT child.household_id, MIN(morning.site_id) AS site_id, MIN(child.id) AS child_id, MIN(morning.id) AS morning_id, morning.planned_on,
       MIN(morning.arrival_at) AS arrival_at,
       MIN(COALESCE(morning.escort_family_member_id, morning.night_carer_family_member_id)) AS escort_id,
       SUM(NOT EXISTS (SELECT 1 FROM fasting_checks
         WHERE fasting_checks.morning_id = morning.id AND fasting_checks.answer <> 'late')) AS unanswered
     FROM mornings morning
     JOIN children child ON child.id = morning.child_id
     JOIN sites site ON site.id = morning.site_id
     WHERE morning.state = 'planned' AND morning.arrival_at > :now
       AND morning.arrival_at <= DATE_ADD(:now, INTERVAL site.call_list_minutes_before MINUTE)
     GROUP BY child.household_id, morning.planned_on`,
    { now: new Date(now) },
  );
  const waiting = days.filter((day) => Number(day.unanswered) > 0);
  const keyOf = (day: HouseholdDay): string => notAnsweredKey(day.household_id, day.planned_on);
  const waitingKeys = new Set(waiting.map(keyOf));
  const open = await select<{ open_key: string }>(
    db,
    "SELECT open_key FROM call_tasks WHERE reason = 'not-answered' AND open_key IS NOT NULL",
  );
  const openKeys = new Set(open.map((task) => task.open_key));
  const needless = [...openKeys].filter((key) => !waitingKeys.has(key));
  const spoken = await spokenWith(db, now);
  const toRaise = waiting.filter(
    (day) => !openKeys.has(keyOf(day)) && !spoken.has(`${day.household_id}`),
  );
  if (toRaise.length === 0 && needless.length === 0) return 0;
  return inTransaction(db, async (transaction) => {
    await closeCalls(db, transaction, needless, { now });
    let raised = 0;
    for (const day of toRaise) {
      const isNew = await raiseCall(db, transaction, {
        reason: 'not-answered',
        openKey: keyOf(day),
        householdId: day.household_id,
        childId: day.child_id,
        morningId: day.morning_id,
        familyMemberId: day.escort_id,
        isForClinician: false,
        urgentAt: now,
        now,
      });
      if (isNew) raised += 1;
    }
    await alertOnce(context, transaction, toRaise);
    return raised;
  });
}

/** One alert a site and morning, however many families are silent by and by: the call list shows who. */
async function alertOnce(
  context: Context,
  transaction: Transaction,
  silent: readonly HouseholdDay[],
): Promise<void> {
  const bySite = new Map<string, HouseholdDay[]>();
  for (const day of silent) {
    const key = `${day.site_id}:${day.planned_on}`;
    bySite.set(key, [...(bySite.get(key) ?? []), day]);
  }
  for (const days of bySite.values())
    for (const { site_id: siteId, planned_on: on } of days.slice(0, 1))
      await raiseAlert(context, transaction, {
        kind: 'not-answered',
        siteId,
        cause: on,
        count: days.length,
        usefulUntil:
          Math.max(...days.map((day) => day.arrival_at.getTime())) + usefulAfterArrivalMs,
      });
}

/** A family that has not come by then is called as one that stayed away. */
const usefulAfterArrivalMs = 2 * 3_600_000;
const oneMorningMs = 12 * 3_600_000;

/** Families with whom a person has spoken this morning; what they said may stand nowhere but in the call's note. */
async function spokenWith(db: Sequelize, now: number): Promise<Set<string>> {
  const rows = await select<{ household_id: number }>(
    db,
    `SELECT household_id FROM call_tasks
     WHERE reason = 'not-answered' AND done_by_staff_id IS NOT NULL AND done_at > :since
       AND outcome IN ('reached', 'told', 'not-needed')`,
    { since: new Date(now - oneMorningMs) },
  );
  return new Set(rows.map((row) => `${row.household_id}`));
}
