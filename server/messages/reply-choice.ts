import type { Transaction } from 'sequelize';
import type { Context } from '../context';
import { householdOf } from '../fasting/household-night';
import { recordFastingCheckIn } from '../fasting/record-check';
import { Problem } from '../http/problem';
import type { IncomingText, ReplyOutcome } from './incoming-text';
import { actorOf, todoOf } from './reply-digit';
import type { ReplySender } from './reply-sender';
import { sendAnswer } from './send-answer';
import { chosenMornings, noteChoice } from './which-child';

export interface ChoiceReply {
  readonly text: IncomingText;
  readonly sender: ReplySender;
  /** The digit of the list that was sent. */
  readonly choice: number;
}

/**
 * The answer to "which child": the chosen one ate or drank, the others did not.
 * @returns null when nothing was asked or it cannot be taken any more: a person reads it.
 */
export async function answerByChoice(
  context: Context,
  transaction: Transaction,
  { text, sender, choice }: ChoiceReply,
): Promise<ReplyOutcome | null> {
  const [near] = sender.plans;
  if (!near) return null;
  const picked = await chosenMornings(context, transaction, sender, near.on, choice);
  if (!picked) return null;
  const { householdId, familyMemberId, language } = sender.recipient;
  const reader = { householdId, familyMemberId };
  const { nights } = await householdOf(context.db, reader, text.receivedAt, transaction);
  const night = nights.find(({ on }) => on === near.on);
  const planned = night?.children.filter(({ state }) => state === 'planned') ?? [];
  // A child that was planned or lost since: the digits of the list no longer fit.
  if (!night || planned.map(({ morningId }) => morningId).join() !== picked.all.join()) return null;
  try {
    const told = await recordFastingCheckIn(context, transaction, actorOf(sender), {
      ...{ source: 'text', householdId, familyMemberId, language, on: night.on },
      submissionKey: text.providerId,
      deviceAt: null,
      heard: text.body.trim(),
      answers: planned.map(({ morningId }) => ({
        morningId,
        answer: picked.chosen.includes(morningId) ? ('feed' as const) : ('nothing' as const),
        lastIntakeAt: null,
      })),
    });
    await noteChoice(context, transaction, sender, night.on, text.receivedAt);
    const more = await todoOf(context, transaction, sender, night, told);
    const key = 'message.reply-thanks-2';
    await sendAnswer(context, transaction, { text, sender, key, ...more });
    return 'answered';
  } catch (error) {
    if (error instanceof Problem) return null;
    throw error;
  }
}
