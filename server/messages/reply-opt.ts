import type { Transaction } from 'sequelize';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { planHouseholdMessages } from './plan-messages';
import type { IncomingText, ReplyOutcome } from './incoming-text';
import type { ReplySender } from './reply-sender';
import { recipientsOf } from './recipients';
import { sendAnswer } from './send-answer';
import { withdrawWaitingFor } from './withdraw-waiting';

/** A morning this near needs a person's call at once when its messages may not go any more. */
const nearMs = 48 * 3_600_000;

/** No text goes to this number any more, from this transaction on; what waited is taken back. */
export async function optOut(
  context: Context,
  transaction: Transaction,
  text: IncomingText,
  sender: ReplySender | null,
): Promise<ReplyOutcome> {
  const { db } = context;
  const { from, body, receivedAt } = text;
  const since = new Date(receivedAt);
  const [open] = await select<{ id: number }>(
    db,
    `SELECT id FROM opt_outs WHERE channel = 'sms' AND address = :from AND ended_at IS NULL`,
    { from },
    transaction,
  );
  if (!open)
    await db.query(
      `INSERT INTO opt_outs (channel, address, said, since_at) VALUES ('sms', :from, :said, :since)`,
      { replacements: { from, said: body.slice(0, 200), since }, transaction },
    );
  await withdrawWaitingFor(context, transaction, {
    channel: 'sms',
    address: from,
    familyMemberId: null,
    what: 'everything',
  });
  if (!sender) return 'opted-out';
  // One confirmation, which says nothing else (47 CFR 64.1200(a)(12)).
  if (!open)
    await sendAnswer(context, transaction, {
      text,
      sender,
      key: 'message.opt-out-confirmed',
      kind: 'opt-out-confirmation',
    });
  await planAgain(context, transaction, from, receivedAt);
  return 'opted-out';
}

export async function optIn(
  context: Context,
  transaction: Transaction,
  text: IncomingText,
  sender: ReplySender | null,
): Promise<ReplyOutcome> {
  const { db } = context;
  const { from, receivedAt } = text;
  await change(
    db,
    `UPDATE opt_outs SET ended_at = :at WHERE channel = 'sms' AND address = :from AND ended_at IS NULL`,
    { from, at: new Date(receivedAt) },
    transaction,
  );
  if (!sender) return 'opted-in';
  const { familyMemberId } = sender.recipient;
  const [recipient] = await recipientsOf(db, { familyMemberIds: [familyMemberId] }, transaction);
  await sendAnswer(context, transaction, {
    text,
    sender: { ...sender, recipient: recipient ?? sender.recipient },
    key: 'message.opt-in-confirmed',
  });
  await planAgain(context, transaction, from, receivedAt, false);
  return 'opted-in';
}

interface ComingDay {
  household_id: number;
  planned_on: string;
  family_member_id: number;
  child_id: number;
  morning_id: number;
  arrival_at: Date;
}

/** The number may be shared: every household with it is planned again. */
async function planAgain(
  context: Context,
  transaction: Transaction,
  phone: string,
  now: number,
  hasOptedOut = true,
): Promise<void> {
  const { db } = context;
  const days = await select<ComingDay>(
    db,
    `SELECT child.household_id, morning.planned_on, MIN(member.id) AS family_member_id,
       MIN(child.id) AS child_id, MIN(morning.id) AS morning_id, MIN(morning.arrival_at) AS arrival_at
     FROM family_members member
     JOIN children child ON child.household_id = member.household_id
     JOIN mornings morning ON morning.child_id = child.id
     WHERE member.phone = :phone AND morning.state = 'planned' AND morning.arrival_at > :now
     GROUP BY child.household_id, morning.planned_on ORDER BY arrival_at`,
    { phone, now: new Date(now) },
    transaction,
  );
  for (const day of days) {
    await planHouseholdMessages(context, transaction, {
      householdId: day.household_id,
      on: day.planned_on,
    });
    if (!hasOptedOut || day.arrival_at.getTime() > now + nearMs) continue;
    await raiseCall(db, transaction, {
      reason: 'opted-out',
      openKey: `opted-out:${day.household_id}`,
      householdId: day.household_id,
      childId: day.child_id,
      morningId: day.morning_id,
      familyMemberId: day.family_member_id,
      isForClinician: false,
      urgentAt: now,
      now,
    });
  }
}
