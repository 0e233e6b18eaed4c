import type { Transaction } from 'sequelize';
import { issueHouseholdLink } from '../auth/links';
import { closeCalls, raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { announce } from '../live/announce';
import { enqueue } from '../outbox/enqueue';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { canSpeak, loadWording, type Wording } from '../wording/render';
import { dedupeKeyOf, type DraftMessage } from './draft-message';
import { linkExpiresAt, messagesFor, nightTimes, type NightFor } from './night-messages';
import { isQuiet } from './quiet-hours';
import { chosenFor, recipientsOf, type Recipient } from './recipients';

export interface HouseholdDay {
  readonly householdId: number;
  /** The day of the mornings. */
  readonly on: string;
}

type Plans = readonly [MorningPlan, ...MorningPlan[]];

interface Told {
  readonly night: NightFor;
  readonly drafts: readonly DraftMessage[];
}

/**
 * Brings what waits in the outbox for a household's night and morning in line with the plan as it is now: evening text,
 * reminder, morning question. Queues what is new, takes back what no longer holds, leaves alone what has gone out with
 * the same content. Call it in every transaction that changes mornings, adults, consents or answers; doing so again
 * changes nothing. Whoever no message may reach is put on the call list.
 */
export async function planHouseholdMessages(
  context: Context,
  transaction: Transaction,
  day: HouseholdDay,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const plans = (await morningPlansOf(db, day, transaction))
    .filter(({ state, arrivalAt }) => state === 'planned' && arrivalAt > now)
    .sort((one, other) => other.bornOn.localeCompare(one.bornOn) || one.childId - other.childId);
  const [first, ...others] = plans;
  const answers = await newestAnswers(context, transaction, plans);
  const comesNot = plans.every(({ morningId }) => isAbsence(answers.get(morningId)));
  if (!first || comesNot) {
    await syncQueue(context, transaction, day, []);
    return;
  }
  await planNight(context, transaction, day, [first, ...others], answers.size === plans.length);
}

async function planNight(
  context: Context,
  transaction: Transaction,
  day: HouseholdDay,
  plans: Plans,
  isAnswered: boolean,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const household = await recipientsOf(db, { householdId: day.householdId }, transaction);
  const escorts = plans.map((plan) => plan.escortFamilyMemberId ?? plan.nightCarerFamilyMemberId);
  const hearEvening = chosenFor(
    plans.map((plan) => plan.nightCarerFamilyMemberId),
    household,
  );
  const hearMorning = chosenFor(escorts, household);
  const call = callsOf(context, transaction, day, plans, isAnswered);
  if (hearEvening.length === 0) await call.raise('nobody-to-message', null);
  else await call.close('nobody-to-message', null);
  if (plans.some(({ plan }) => plan.kind === 'individual'))
    await call.raise('individual-plan', null);
  const told: Told[] = [];
  for (const recipient of new Set([...hearEvening, ...hearMorning])) {
    if (recipient.readsHow === 'no') await call.raise('does-not-read', recipient);
    const wording = await signedWording(context, transaction, recipient);
    if (!wording) {
      await call.raise('language-not-signed', recipient);
      continue;
    }
    const url = await householdUrl(context, transaction, day, plans, recipient);
    const hearsEvening = hearEvening.includes(recipient);
    const hearsMorning = hearMorning.includes(recipient);
    const night = { recipient, wording, url, plans, hearsEvening, hearsMorning, isAnswered };
    const drafts = messagesFor(night);
    const keys = drafts.flatMap((draft) => Object.keys(draft.wordingVersions));
    if (!wording.isSignedOff(keys)) {
      await call.raise('language-not-signed', recipient);
      continue;
    }
    await call.close('language-not-signed', recipient);
    told.push({ night, drafts });
  }
  const queue = await queueOf(context, transaction, day);
  const wanted: DraftMessage[] = [];
  for (const { night, drafts } of told) {
    const fit = drafts.filter((draft) => isStillOpen(draft, night, now));
    wanted.push(...fit);
    const { familyMemberId } = night.recipient;
    const heard = [...fit, ...queue.filter((message) => message.state !== 'withdrawn')].some(
      (message) => message.kind === 'evening' && message.familyMemberId === familyMemberId,
    );
    if (night.hearsEvening && !heard) await call.raise('evening-too-late', night.recipient);
  }
  await syncQueue(context, transaction, day, wanted);
}

/** Whether a message can still go out: it is useful, and a late one does not fall into the quiet hours. */
function isStillOpen(draft: DraftMessage, { recipient, plans }: NightFor, now: number): boolean {
  if (draft.lastUsefulAt <= now) return false;
  if (draft.channel === 'mail' || draft.dueAt > now) return true;
  return !isQuiet(now, plans[0].zone, recipient.mayTextEarly);
}

/** Null when this person cannot be told anything in the language: no times, or no words. */
async function signedWording(
  { db }: Context,
  transaction: Transaction,
  { language }: Recipient,
): Promise<Wording | null> {
  if (!canSpeak(language)) return null;
  const wording = await loadWording(db, language, transaction);
  return wording.has('message.evening.text') ? wording : null;
}

async function householdUrl(
  { db, settings }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  plans: Plans,
  { familyMemberId }: Recipient,
): Promise<string> {
  const expiresAt = linkExpiresAt(nightTimes(plans));
  const link = { familyMemberId, householdId, morningOn: on, expiresAt };
  return (await issueHouseholdLink(db, transaction, settings, link)).url;
}

const isAbsence = (answer: string | undefined): boolean =>
  answer === 'not-coming' || answer === 'ill';

/** What was told last about each of these mornings. */
async function newestAnswers(
  { db }: Context,
  transaction: Transaction,
  plans: readonly MorningPlan[],
): Promise<Map<number, string>> {
  if (plans.length === 0) return new Map();
  const rows = await select<{ morning_id: number; answer: string }>(
    db,
    'SELECT morning_id, answer FROM fasting_checks WHERE morning_id IN (:morningIds) ORDER BY received_at, id',
    { morningIds: plans.map((plan) => plan.morningId) },
    transaction,
  );
  return new Map(rows.map((row) => [row.morning_id, row.answer]));
}

interface Calls {
  raise(reason: string, recipient: Recipient | null): Promise<void>;
  close(reason: string, recipient: Recipient | null): Promise<void>;
}

function callsOf(
  { db, clock }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  plans: Plans,
  isAnswered: boolean,
): Calls {
  const now = clock.now();
  const keyOf = (reason: string, recipient: Recipient | null): string =>
    `${reason}:${householdId}:${on}${recipient ? `:${recipient.familyMemberId}` : ''}`;
  return {
    raise: async (reason, recipient) => {
      // A family that has answered for all its children has been reached.
      if (isAnswered) return;
      // Made once for a night; after it was done, planning again does not ask for it again.
      const [known] = await select<{ id: number }>(
        db,
        `SELECT id FROM call_tasks WHERE reason = :reason AND morning_id = :morningId
           AND family_member_id <=> :familyMemberId LIMIT 1`,
        {
          reason,
          morningId: plans[0].morningId,
          familyMemberId: recipient?.familyMemberId ?? null,
        },
        transaction,
      );
      if (known) return;
      await raiseCall(db, transaction, {
        reason,
        openKey: keyOf(reason, recipient),
        householdId,
        childId: plans[0].childId,
        morningId: plans[0].morningId,
        familyMemberId: recipient?.familyMemberId ?? null,
        isForClinician: reason === 'individual-plan',
        urgentAt: Math.max(now, nightTimes(plans).eveningAt),
        now,
      });
    },
    close: async (reason, recipient) => {
      await closeCalls(db, transaction, [keyOf(reason, recipient)], { now });
    },
  };
}

interface QueuedMessage {
  readonly key: string;
  readonly kind: string;
  readonly familyMemberId: number | null;
  readonly state: string;
  readonly lastUsefulAt: Date;
}

const nightKinds: readonly DraftMessage['kind'][] = ['evening', 'reminder', 'morning'];

async function queueOf(
  { db }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
): Promise<QueuedMessage[]> {
  return select<QueuedMessage>(
    db,
    `SELECT dedupe_key AS \`key\`, kind, family_member_id AS familyMemberId, state,
       last_useful_at AS lastUsefulAt FROM messages
     WHERE household_id = :householdId AND morning_on = :on AND kind IN (:nightKinds)`,
    { householdId, on, nightKinds },
    transaction,
  );
}

async function syncQueue(
  context: Context,
  transaction: Transaction,
  day: HouseholdDay,
  wanted: readonly DraftMessage[],
): Promise<void> {
  const { db, clock } = context;
  const { householdId, on } = day;
  const now = clock.now();
  const byKey = new Map(wanted.map((draft) => [dedupeKeyOf(householdId, on, draft), draft]));
  const queue = await queueOf(context, transaction, day);
  // What waits past its time while the night goes on never arrived: the sender gives it up aloud.
  const isForSender = ({ lastUsefulAt }: QueuedMessage): boolean =>
    wanted.length > 0 && lastUsefulAt.getTime() <= now;
  const superseded = queue
    .filter((message) => message.state === 'queued' && !byKey.has(message.key))
    .filter((message) => !isForSender(message))
    .map(({ key }) => key);
  let changed = await setState(context, transaction, superseded, 'queued', 'withdrawn');
  // A plan that went back to what it was: its message was taken back before and is wanted again.
  const again = queue
    .filter(({ key, state }) => state === 'withdrawn' && byKey.has(key))
    .map(({ key }) => key);
  changed += await setState(context, transaction, again, 'withdrawn', 'queued');
  for (const [dedupeKey, draft] of byKey) {
    const isNew = await enqueue(db, transaction, {
      ...draft,
      dedupeKey,
      householdId,
      morningOn: on,
      createdAt: now,
    });
    if (isNew) changed += 1;
  }
  if (changed > 0) await announce(db, transaction, 'messages');
}

async function setState(
  { db }: Context,
  transaction: Transaction,
  dedupeKeys: readonly string[],
  from: 'queued' | 'withdrawn',
  to: 'queued' | 'withdrawn',
): Promise<number> {
  if (dedupeKeys.length === 0) return 0;
  return change(
    db,
    'UPDATE messages SET state = :to WHERE dedupe_key IN (:dedupeKeys) AND state = :from',
    { dedupeKeys, from, to },
    transaction,
  );
}
