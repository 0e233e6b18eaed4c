import { QueryTypes, type Transaction } from 'sequelize';
import { parseReply, type Reply } from '../../shared/domain/reply';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { announce } from '../live/announce';
import type { IncomingText, ReplyOutcome } from './incoming-text';
import { answerByChoice } from './reply-choice';
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
    if (reply.kind === 'opt-in' && (await mayOptIn(context, transaction, text)))
      return optIn(context, transaction, text, sender);
    if (!sender) return unknownNumber(context, transaction, text);
    if (reply.kind === 'help') {
      await sendAnswer(context, transaction, { text, sender, key: 'message.help' });
      return 'help';
    }
    if (reply.kind === 'digit') {
      const { digit, words = null } = reply;
      if (words !== null || (text.pictures ?? 0) > 0)
        await tellPerson(context, transaction, text, sender);
      return answerByDigit(context, transaction, { text, sender, digit });
    }
    if (reply.kind === 'choice') {
      const outcome = await answerByChoice(context, transaction, {
        text,
        sender,
        choice: reply.choice,
      });
      if (outcome) return outcome;
    }
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
        understoodAs: understood(reply),
        receivedAt: new Date(receivedAt),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  return touched === 1;
}

function understood(reply: Reply): string {
  if (reply.kind === 'digit') return `digit-${reply.digit}`;
  return reply.kind === 'choice' ? `choice-${reply.choice}` : reply.kind;
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
  await tellPerson(context, transaction, text, sender);
  const isAsked = sender.plans.some(
    ({ state, arrivalAt }) => state === 'planned' && arrivalAt > text.receivedAt,
  );
  const key = isAsked ? 'message.unclear-morning' : 'message.unclear';
  await sendAnswer(context, transaction, { text, sender, key });
  return 'unclear';
}

/** What no machine reads: a person sees the words, and hears of pictures, which are not kept. */
async function tellPerson(
  { db }: Context,
  transaction: Transaction,
  { body, pictures = 0, receivedAt }: IncomingText,
  { recipient, plans }: ReplySender,
): Promise<void> {
  await raiseCall(db, transaction, {
    reason: pictures > 0 ? 'text-picture' : 'text-unclear',
    openKey: `text-unclear:${recipient.familyMemberId}`,
    householdId: recipient.householdId,
    childId: plans[0]?.childId ?? null,
    morningId: plans[0]?.morningId ?? null,
    familyMemberId: recipient.familyMemberId,
    detail: body,
    isForClinician: false,
    urgentAt: receivedAt,
    now: receivedAt,
  });
}

/** "Yes" is a word that people also answer with; it switches texts on only where they are off. */
async function mayOptIn(
  { db }: Context,
  transaction: Transaction,
  { from, body }: IncomingText,
): Promise<boolean> {
  if (!/yes/i.test(body)) return true;
  const rows = await select(
    db,
    `SELECT id FROM opt_outs WHERE channel = 'sms' AND address = :from AND ended_at IS NULL`,
    { from },
    transaction,
  );
  return rows.length > 0;
}
