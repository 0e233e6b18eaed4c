import type { Sequelize, Transaction } from 'sequelize';
import type { Instant } from '../../shared/domain/day';
import { addDays, instantOf } from '../../shared/domain/zone';
import type { SayBackQuestion } from '../../shared/domain/say-it-back';
import { closeCalls, raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { wordsFrom } from '../fasting/family-words';
import { householdOf, type HouseholdNight } from '../fasting/household-night';
import { canSpeak, loadWording } from '../wording/render';
import { sayBackNightOf, type SayBackNight } from './say-back-night';
import { isSetSigned } from './say-back-words';

type Reason = 'not-understood' | 'not-said-back';

const keyOf = (reason: Reason, householdId: number, on: string): string =>
  `${reason}:${householdId}:${on}`;

/** For the person who calls: where to begin. */
const details: Readonly<Record<SayBackQuestion, string>> = {
  water: 'It was about water in the night.',
  comfort: 'It was about a baby who wakes up hungry.',
  last: 'It was about when to stop.',
  mistake: 'It was about what to do after a mistake.',
};

/** The evening before, when the family hears of its night: by then somebody should have talked with it. */
const eveningOf = ({ on, site, zone }: HouseholdNight): Instant =>
  instantOf({ on: addDays(on, -1), time: site.eveningTextTime, zone });

/** Whoever has answered is not called for silence; what was missed twice is gone through by telephone. */
export async function callIfNotUnderstood(
  db: Sequelize,
  transaction: Transaction,
  { night, children: [first], standing }: SayBackNight,
  familyMemberId: number,
  now: Instant,
): Promise<void> {
  const { householdId } = first.morning;
  if (standing.pending.length === 0)
    await closeCalls(db, transaction, [keyOf('not-said-back', householdId, night.on)], { now });
  const missed = standing.notUnderstood.at(-1);
  if (!missed) return;
  await raiseCall(db, transaction, {
    reason: 'not-understood',
    openKey: keyOf('not-understood', householdId, night.on),
    householdId,
    childId: first.morning.childId,
    morningId: first.morning.morningId,
    familyMemberId,
    detail: details[missed],
    isForClinician: false,
    urgentAt: Math.max(now, eveningOf(night)),
    now,
  });
}

interface SilentRow {
  household_id: number;
  on: string;
  morning_id: number;
  family_member_id: number;
  language: string;
}

/** How long before the arrival families are looked at: the evening before lies in it everywhere. */
const reachHours = 24;

/**
 * Families who by the evening have not said the plan back, one task a household and night. Left out are those whom a
 * person has told the plan by telephone or is about to, and those who could not be asked in their language: they are
 * called for that. Runs every minute.
 * @returns how many tasks are new.
 */
export async function raiseNotSaidBackCalls({ db, clock }: Context): Promise<number> {
  const now = clock.now();
  const rows = await select<SilentRow>(
    db,
    `SELECT child.household_id, morning.planned_on AS \`on\`, MIN(morning.id) AS morning_id,
       MIN(member.id) AS family_member_id, MIN(member.reads_language) AS language
     FROM mornings morning
     JOIN children child ON child.id = morning.child_id
     JOIN child_family_members tie ON tie.child_id = child.id AND tie.standing = 'guardian'
     JOIN family_members member ON member.id = tie.family_member_id
     WHERE morning.state = 'planned' AND morning.arrival_at > :now
       AND morning.arrival_at <= DATE_ADD(:now, INTERVAL ${reachHours} HOUR)
       AND NOT EXISTS (SELECT 1 FROM mornings earlier WHERE earlier.series_id = morning.series_id
         AND earlier.state = 'collected')
       AND NOT EXISTS (SELECT 1 FROM call_tasks task WHERE task.household_id = child.household_id
         AND (task.open_key IS NOT NULL AND task.reason IN (:planReasons)
           OR task.done_by_staff_id IS NOT NULL AND task.outcome IN ('reached', 'told')
             AND task.reason IN (:planReasons) AND task.created_at >= DATE_SUB(:now, INTERVAL 14 DAY)
           OR task.reason IN ('not-said-back', 'not-understood') AND task.morning_id = morning.id))
     GROUP BY child.household_id, morning.planned_on
     LIMIT 200`,
    { now: new Date(now), planReasons },
  );
  let raised = 0;
  for (const row of rows) if (await raiseForSilent(db, row, now)) raised += 1;
  return raised;
}

/** Calls in which the family hears the whole plan. */
const planReasons = [
  'invitation-failed',
  'evening-text-failed',
  'nobody-to-message',
  'language-not-signed',
  'does-not-read',
  'evening-too-late',
  'opted-out',
  'not-said-back',
  'not-understood',
];

function raiseForSilent(db: Sequelize, row: SilentRow, now: Instant): Promise<boolean> {
  return inTransaction(db, async (transaction) => {
    if (!canSpeak(row.language)) return false;
    const reader = { householdId: row.household_id, familyMemberId: null };
    const { nights } = await householdOf(db, reader, now, transaction);
    const night = nights.find(({ on }) => on === row.on);
    if (!night || now < eveningOf(night)) return false;
    const sayBack = await sayBackNightOf(db, night, transaction);
    if (!sayBack || sayBack.standing.pending.length === 0) return false;
    const wording = await loadWording(db, row.language, transaction);
    if (!isSetSigned(sayBack, wordsFrom(wording, night.zone))) return false;
    return raiseCall(db, transaction, {
      reason: 'not-said-back',
      openKey: keyOf('not-said-back', row.household_id, row.on),
      householdId: row.household_id,
      childId: sayBack.children[0].morning.childId,
      morningId: row.morning_id,
      familyMemberId: row.family_member_id,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  });
}
