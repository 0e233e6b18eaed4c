import { QueryTypes, type Transaction } from 'sequelize';
import { parseReply, type Reply } from '../../shared/domain/reply';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { announce } from '../live/announce';
import type { IncomingText, ReplyOutcome } from './incoming-text';
import { answerByDigit } from './reply-digit';
import { optIn, optOut } from './reply-opt';
import { senderOf, type ReplySender } from './reply-sender';
import { sendAnswer } from './send-answer';

const longestBody = 1600;

/**
 * Takes a text of a family: 1, 2 or 3 answers the morning question for all children of the household, the legal words
 * work at once, and everything else goes to a person. Thanks and confirmations go out through the outbox.
 */
export async function takeReply(context: Context, text: IncomingText): Promise<ReplyOutcome> {
  const { db } = context;
  return inTransaction(db, async (transaction) => {
    const reply = parseReply(text.body);
    const sender = await senderOf(db, text.from, text.receivedAt, transaction);
    if (!(await noteReply(context, transaction, text, reply, sender))) return 'repeat';
    await announce(db, transaction, 'messages');
    if (reply.kind === 'opt-out') return optOut(context, transaction, text, sender);
    if (reply.kind === 'opt-in') return optIn(context, transaction, text, sender);
    if (!sender) return unknownNumber(context, transaction, text);
    if (reply.kind === 'help') {
      await sendAnswer(context, transaction, { text, sender, key: 'message.help' });
      return 'help';
    }
    if (reply.kind === 'digit')
      return answerByDigit(context, transaction, { text, sender, digit: reply.digit });
    return unclear(context, transaction, text, sender);
  });
}

/** @returns false when this text was taken before. */
async function noteReply(
  { db }: Context,
  transaction: Transaction,
  { providerId, from, body, receivedAt }: IncomingText,
  reply: Reply,
  sender: ReplySender | null,
): Promise<boolean> {
  const [, touched] = await db.query(
    `INSERT IGNORE INTO replies
       (provider_id, from_address, body, household_id, family_member_id, understood_as, received_at)
     VALUES (:providerId, :from, :body, :householdId, :familyMemberId, :understoodAs, :receivedAt)`,
    {
      replacements: {
        providerId,
        from,
        body: body.slice(0, longestBody),
        householdId: sender?.recipient.householdId ?? null,
        familyMemberId: sender?.recipient.familyMemberId ?? null,
        understoodAs: reply.kind === 'digit' ? `digit-${reply.digit}` : reply.kind,
        receivedAt: new Date(receivedAt),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  return touched === 1;
}

async function unknownNumber(
  { db }: Context,
  transaction: Transaction,
  { providerId, from, body, receivedAt }: IncomingText,
): Promise<ReplyOutcome> {
  // Nothing is written back: whoever holds this number has not agreed to be written to.
  await raiseCall(db, transaction, {
    reason: 'text-unknown-number',
    openKey: `text-unknown-number:${providerId}`,
    detail: `${from}: ${body}`,
    isForClinician: false,
    urgentAt: receivedAt,
    now: receivedAt,
  });
  return 'unknown-number';
}

async function unclear(
  context: Context,
  transaction: Transaction,
  text: IncomingText,
  sender: ReplySender,
): Promise<ReplyOutcome> {
  const { recipient, plans } = sender;
  await raiseCall(context.db, transaction, {
    reason: 'text-unclear',
    openKey: `text-unclear:${recipient.familyMemberId}`,
    householdId: recipient.householdId,
    childId: plans[0]?.childId ?? null,
    morningId: plans[0]?.morningId ?? null,
    familyMemberId: recipient.familyMemberId,
    detail: text.body,
    isForClinician: false,
    urgentAt: text.receivedAt,
    now: text.receivedAt,
  });
  const isAsked = plans.some(
    ({ state, arrivalAt }) => state === 'planned' && arrivalAt > text.receivedAt,
  );
  const key = isAsked ? 'message.unclear-morning' : 'message.unclear';
  await sendAnswer(context, transaction, { text, sender, key });
  return 'unclear';
}
