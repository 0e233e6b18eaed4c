import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { closeCalls } from './calls';

/** Calls to tell or ask about one night: needless when the family has answered, has come, or the morning is over. */
const ofOneNight = [
  'nobody-to-message',
  'does-not-read',
  'evening-too-late',
  'not-understood',
  'not-said-back',
  'evening-text-failed',
  'morning-text-failed',
  'message-failed',
];
/** Calls about a letter that waits: needless when it was opened. */
const ofLetters = [
  'letter-unread',
  'letter-unread-outreach',
  'letter-unread-clinician',
  'letter-notice-failed',
  'letter-by-person',
];

/**
 * Takes tasks off the list whose reason is gone in the data, so that nobody calls a family for nothing. Runs with the
 * search for unanswered families.
 * @returns how many were open.
 */
export async function closeNeedlessCalls({ db, clock }: Context): Promise<number> {
  const now = clock.now();
  const rows = await select<{ open_key: string }>(
    db,
    `SELECT task.open_key FROM call_tasks task JOIN mornings morning ON morning.id = task.morning_id
     WHERE task.done_at IS NULL AND task.open_key IS NOT NULL AND task.claimed_by_staff_id IS NULL
       AND task.reason IN (:ofOneNight)
       AND (morning.state <> 'planned' OR morning.arrival_at <= :now
         OR NOT EXISTS (SELECT 1 FROM mornings other JOIN children child ON child.id = other.child_id
           WHERE child.household_id = task.household_id AND other.planned_on = morning.planned_on
             AND other.state = 'planned' AND NOT EXISTS (SELECT 1 FROM fasting_checks told
               WHERE told.morning_id = other.id AND told.answer <> 'late')))
     UNION
     SELECT task.open_key FROM call_tasks task
     WHERE task.done_at IS NULL AND task.open_key IS NOT NULL AND task.claimed_by_staff_id IS NULL
       AND task.reason = 'opted-out' AND NOT EXISTS (
         SELECT 1 FROM family_members member JOIN opt_outs ON opt_outs.channel = 'sms'
           AND opt_outs.address = member.phone AND opt_outs.ended_at IS NULL
         WHERE member.id = task.family_member_id)
     UNION
     SELECT task.open_key FROM call_tasks task
     WHERE task.done_at IS NULL AND task.open_key IS NOT NULL AND task.claimed_by_staff_id IS NULL
       AND task.reason IN (:ofLetters)
       AND EXISTS (SELECT 1 FROM letter_recipients recipient
         JOIN letters letter ON letter.id = recipient.letter_id
         WHERE recipient.family_member_id = task.family_member_id AND letter.child_id = task.child_id
           AND letter.state = 'released')
       AND NOT EXISTS (SELECT 1 FROM letter_recipients recipient
         JOIN letters letter ON letter.id = recipient.letter_id
         WHERE recipient.family_member_id = task.family_member_id AND letter.child_id = task.child_id
           AND letter.state = 'released' AND recipient.first_opened_at IS NULL)
     LIMIT 200`,
    { ofOneNight, ofLetters, now: new Date(now) },
  );
  if (rows.length === 0) return 0;
  return inTransaction(db, (transaction) =>
    closeCalls(
      db,
      transaction,
      rows.map((row) => row.open_key),
      { now },
    ),
  );
}
