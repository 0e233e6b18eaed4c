import type { Transaction } from 'sequelize';
import { closeCalls, raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { forLetters } from './letter-waiting';
import { recipientsOf } from './recipients';
import { tellMember } from './tell-member';

const dayMs = 86_400_000;

/**
 * What happens while a released letter is not opened (practice rule 23): a text on the third day, a call on the
 * seventh, a visit or a letter by post on the fourteenth; after thirty days a clinician closes it with a reason.
 */
const steps = [
  { afterDays: 3, reason: null },
  { afterDays: 7, reason: 'letter-unread' },
  { afterDays: 14, reason: 'letter-unread-outreach' },
  { afterDays: 30, reason: 'letter-unread-clinician' },
] as const;
export const unreadReasons = ['letter-unread', 'letter-unread-outreach', 'letter-unread-clinician'];

interface UnreadRow {
  letter_id: number;
  series_id: number;
  child_id: number;
  household_id: number;
  family_member_id: number;
  released_at: Date;
}

/** One open task a letter, person and step. */
export const unreadKey = (reason: string, letterId: number, familyMemberId: number): string =>
  `${reason}:${letterId}:${familyMemberId}`;

/** The newest released letter of each series that somebody has neither opened nor been told by a person. */
function unreadLetters({ db, clock }: Context): Promise<UnreadRow[]> {
  const [first] = steps;
  return select<UnreadRow>(
    db,
    `SELECT letter.id AS letter_id, letter.series_id, letter.child_id, child.household_id,
       recipient.family_member_id, letter.released_at
     FROM letters letter
     JOIN letter_recipients recipient ON recipient.letter_id = letter.id
     JOIN children child ON child.id = letter.child_id
     WHERE letter.state = 'released' AND letter.released_at <= :since AND recipient.first_opened_at IS NULL
       AND NOT EXISTS (SELECT 1 FROM letters newer WHERE newer.series_id = letter.series_id
         AND newer.state = 'released' AND newer.id > letter.id)
       AND NOT EXISTS (SELECT 1 FROM call_tasks task WHERE task.family_member_id = recipient.family_member_id
         AND task.series_id = letter.series_id AND task.reason LIKE 'letter-%'
         AND task.outcome = 'told' AND task.done_at >= letter.released_at)
       AND NOT EXISTS (SELECT 1 FROM call_tasks task WHERE task.family_member_id = recipient.family_member_id
         AND task.series_id = letter.series_id AND task.reason = 'letter-unread-clinician'
         AND task.created_at >= letter.released_at)
     ORDER BY letter.id LIMIT 500`,
    { since: new Date(clock.now() - first.afterDays * dayMs) },
  );
}

/** Brings every unread letter to the step that its days ask for, each step once. Runs every few minutes. */
export async function followUnreadLetters(context: Context): Promise<void> {
  const now = context.clock.now();
  for (const row of await unreadLetters(context)) {
    const days = (now - row.released_at.getTime()) / dayMs;
    const step = steps.filter(({ afterDays }) => days >= afterDays).at(-1);
    if (!step) continue;
    await inTransaction(context.db, (transaction) =>
      step.reason === null
        ? remind(context, transaction, row)
        : callAbout(context, transaction, row, step.reason),
    );
  }
}

async function remind(
  context: Context,
  transaction: Transaction,
  { letter_id: letterId, family_member_id: familyMemberId, child_id: childId }: UnreadRow,
): Promise<void> {
  const { db, settings } = context;
  const dedupe = `letter-reminder:${letterId}`;
  const known = await select(
    db,
    `SELECT id FROM messages WHERE dedupe_key LIKE :pattern LIMIT 1`,
    { pattern: `${dedupe}:${familyMemberId}:%` },
    transaction,
  );
  if (known.length > 0) return;
  const [recipient] = await recipientsOf(db, { familyMemberIds: [familyMemberId] }, transaction);
  // Who cannot be written to has had a person's call when the letter was released.
  if (!recipient?.mayTextLetters && !recipient?.mayMailLetters) return;
  await tellMember(context, transaction, forLetters(recipient), {
    kind: 'letter-reminder',
    prefix: 'message.letter-reminder',
    params: { url: `${settings.origin}/${recipient.language}/letters` },
    dedupe,
    callReason: 'letter-notice-failed',
    childId,
    usefulForMs: 3 * dayMs,
  });
}

async function callAbout(
  { db, clock }: Context,
  transaction: Transaction,
  row: UnreadRow,
  reason: string,
): Promise<void> {
  const now = clock.now();
  const { letter_id: letterId, family_member_id: familyMemberId } = row;
  const known = await select(
    db,
    `SELECT id FROM call_tasks WHERE reason = :reason AND series_id = :seriesId
       AND family_member_id = :familyMemberId AND created_at >= :releasedAt LIMIT 1`,
    { reason, seriesId: row.series_id, familyMemberId, releasedAt: row.released_at },
    transaction,
  );
  if (known.length > 0) return;
  const earlier = unreadReasons.filter((one) => one !== reason);
  const keys = earlier.map((one) => unreadKey(one, letterId, familyMemberId));
  await closeCalls(db, transaction, keys, { now });
  await raiseCall(db, transaction, {
    reason,
    openKey: unreadKey(reason, letterId, familyMemberId),
    householdId: row.household_id,
    childId: row.child_id,
    seriesId: row.series_id,
    familyMemberId,
    isForClinician: reason === 'letter-unread-clinician',
    urgentAt: now,
    now,
  });
}
