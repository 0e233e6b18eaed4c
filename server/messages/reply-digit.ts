import type { Transaction } from 'sequelize';
import type { OutcomeKind } from '../../shared/contracts/family-morning';
import { familyTime } from '../../shared/languages/family-time';
import { isLanguageId } from '../../shared/languages/languages';
import { profileOf } from '../../shared/languages/profiles';
import type { Actor } from '../access-record/record';
import { issueHouseholdLink } from '../auth/links';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { householdOf, type HouseholdNight } from '../fasting/household-night';
import { recordMorningChangeIn } from '../fasting/morning-changes';
import { recordFastingCheckIn, type FastingCheckTold } from '../fasting/record-check';
import { Problem } from '../http/problem';
import { canSpeak, type WordingParams } from '../wording/render';
import { linkExpiresAt, nightTimes } from './night-messages';
import type { IncomingText, ReplyOutcome } from './incoming-text';
import { askWhichChild, choiceLines } from './which-child';
import type { ReplySender } from './reply-sender';
import { sendAnswer } from './send-answer';

export interface DigitReply {
  readonly text: IncomingText;
  readonly sender: ReplySender;
  readonly digit: 1 | 2 | 3;
}

/**
 * 1: all went by the plan, for every child of the household; 2: someone ate or drank, the time unknown until one
 * question back is answered; 3: not coming. What cannot be kept as an answer goes to a person.
 */
export async function answerByDigit(
  context: Context,
  transaction: Transaction,
  reply: DigitReply,
): Promise<ReplyOutcome> {
  const { text, sender, digit } = reply;
  const { householdId, familyMemberId, language } = sender.recipient;
  const [near] = sender.plans;
  const { nights } = await householdOf(
    context.db,
    { householdId, familyMemberId },
    text.receivedAt,
    transaction,
  );
  const night = nights.find(({ on }) => on === near?.on);
  if (!night || !canSpeak(language))
    return toPerson(context, transaction, reply, 'text-no-morning');
  const common = {
    source: 'text',
    householdId,
    familyMemberId,
    language,
    submissionKey: text.providerId,
    on: night.on,
    deviceAt: null,
    heard: text.body.trim(),
  } as const;
  try {
    if (digit === 3) {
      await recordMorningChangeIn(context, transaction, actorOf(sender), {
        ...common,
        kind: 'not-coming',
      });
      await sendAnswer(context, transaction, { text, sender, key: 'message.reply-thanks-3' });
      return 'not-coming';
    }
    const told = await recordFastingCheckIn(context, transaction, actorOf(sender), {
      ...common,
      answers: night.children
        .filter(({ state }) => state === 'planned')
        .map(({ morningId }) => ({
          morningId,
          answer: digit === 1 ? ('nothing' as const) : ('feed' as const),
          lastIntakeAt: null,
        })),
    });
    if (digit === 2 && (await asksWhich(context, transaction, reply, night, told)))
      return 'answered';
    await thank(context, transaction, reply, night, told);
    return 'answered';
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    if (error.code === 'too-early') return tooEarly(context, transaction, reply, night);
    const reason = error.code === 'too-late' ? 'text-too-late' : 'text-unclear';
    return toPerson(context, transaction, reply, reason);
  }
}

export const actorOf = ({ recipient }: ReplySender): Actor => ({
  side: 'family',
  id: recipient.familyMemberId,
  name: recipient.fullName,
  sessionHash: null,
  address: recipient.phone,
});

/** The plan as the family was told it, for the words of an answer. */
async function wordsOfNight(
  { db, settings }: Context,
  transaction: Transaction,
  { recipient, plans }: ReplySender,
  { on, site, zone, firstArrivalAt }: HouseholdNight,
): Promise<WordingParams> {
  const [first, ...others] = plans;
  if (!first || !isLanguageId(recipient.language)) return {};
  const arrival = familyTime(firstArrivalAt, zone, profileOf(recipient.language));
  const { url } = await issueHouseholdLink(db, transaction, settings, {
    familyMemberId: recipient.familyMemberId,
    householdId: recipient.householdId,
    morningOn: on,
    expiresAt: linkExpiresAt(nightTimes([first, ...others])),
  });
  return { url, weekday: arrival.weekday, date: arrival.date, time: arrival.time, door: site.door };
}

/** No family is told to go on without food for a child whose own plan nobody has composed. */
const withoutHours = (night: HouseholdNight): boolean =>
  night.children.some(({ plan }) => plan.kind === 'individual');
const ownPlanKinds: readonly OutcomeKind[] = ['come-nurse-decides', 'stay-we-call'];

const todoKeys: Readonly<Partial<Record<OutcomeKind, string>>> = {
  come: 'message.reply.come',
  'come-and-wait': 'message.reply.come-and-wait',
  'call-us': 'message.reply.call-us',
  'come-nurse-decides': 'message.reply.come-nurse-decides',
  'stay-we-call': 'message.reply.stay-we-call',
  'feed-now-and-call': 'message.reply.feed-now-and-call',
};

function todoKeyOf(kind: OutcomeKind, night: HouseholdNight): string {
  const key = todoKeys[kind] ?? 'message.reply.call-us';
  return withoutHours(night) && ownPlanKinds.includes(kind) ? `${key}-own-plan` : key;
}

/** With several children a 2 is asked back once: who was it? Until then all of them count as fed. */
async function asksWhich(
  context: Context,
  transaction: Transaction,
  reply: DigitReply,
  night: HouseholdNight,
  told: FastingCheckTold,
): Promise<boolean> {
  const { text, sender } = reply;
  const labels = await askWhichChild(context, transaction, { text, sender }, night);
  if (labels === null) return false;
  await sendAnswer(context, transaction, {
    text,
    sender,
    key: 'message.which-child.text',
    ...(await todoOf(context, transaction, sender, night, told)),
    lines: (noted) => choiceLines(noted, labels),
  });
  return true;
}

/** What this household does now, as the answer to a text tells it. */
export async function todoOf(
  context: Context,
  transaction: Transaction,
  sender: ReplySender,
  night: HouseholdNight,
  { kind, weCallBy }: FastingCheckTold,
): Promise<{ readonly todoKey: string; readonly params: WordingParams }> {
  const params = await wordsOfNight(context, transaction, sender, night);
  const { language } = sender.recipient;
  const callBy =
    weCallBy === null || !isLanguageId(language)
      ? {}
      : { weCallBy: familyTime(weCallBy, night.zone, profileOf(language)).time };
  const feedsAndWaits = kind === 'feed-now-and-call' && weCallBy !== null;
  const todoKey = feedsAndWaits ? 'message.reply.feed-now-we-call' : todoKeyOf(kind, night);
  return { todoKey, params: { ...params, ...callBy } };
}

async function thank(
  context: Context,
  transaction: Transaction,
  { text, sender, digit }: DigitReply,
  night: HouseholdNight,
  told: FastingCheckTold,
): Promise<void> {
  const more = await todoOf(context, transaction, sender, night, told);
  if (digit === 1 && told.kind === 'come') {
    const { params } = more;
    await sendAnswer(context, transaction, { text, sender, key: 'message.reply-thanks-1', params });
    return;
  }
  const key = digit === 2 ? 'message.reply-thanks-2' : 'message.reply-thanks';
  await sendAnswer(context, transaction, { text, sender, key, ...more });
}

/** Before the question opens a 1 says nothing about the night; a 2 is news for the nurse, a person reads it. */
async function tooEarly(
  context: Context,
  transaction: Transaction,
  reply: DigitReply,
  night: HouseholdNight,
): Promise<ReplyOutcome> {
  const { text, sender, digit } = reply;
  if (digit === 2) await raise(context, transaction, reply, 'said-feed');
  const params = await wordsOfNight(context, transaction, sender, night);
  await sendAnswer(context, transaction, { text, sender, key: 'message.reply-early', params });
  return 'too-early';
}

async function toPerson(
  context: Context,
  transaction: Transaction,
  reply: DigitReply,
  reason: 'text-no-morning' | 'text-too-late' | 'text-unclear',
): Promise<ReplyOutcome> {
  const { text, sender } = reply;
  await raise(context, transaction, reply, reason);
  await sendAnswer(context, transaction, { text, sender, key: 'message.unclear' });
  return reason === 'text-too-late'
    ? 'too-late'
    : reason === 'text-no-morning'
      ? 'no-morning'
      : 'unclear';
}

async function raise(
  { db }: Context,
  transaction: Transaction,
  { text, sender }: DigitReply,
  reason: string,
): Promise<void> {
  const { householdId, familyMemberId } = sender.recipient;
  const [near] = sender.plans;
  await raiseCall(db, transaction, {
    reason,
    openKey: `${reason}:${householdId}:${near?.on ?? 'none'}`,
    householdId,
    childId: near?.childId ?? null,
    morningId: near?.morningId ?? null,
    familyMemberId,
    detail: text.body,
    isForClinician: false,
    urgentAt: text.receivedAt,
    now: text.receivedAt,
  });
}
