import type { Transaction } from 'sequelize';
import type { PlannedCall } from '../../shared/domain/message-plan';
import { addDays } from '../../shared/domain/zone';
import { isQuiet } from '../../shared/domain/quiet-hours';
import { issueHouseholdLink } from '../auth/links';
import { closeCalls, raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { select } from '../database/connection';
import { arePhrasesSigned } from '../individual-plans/plan-lines';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { canSpeak, loadWording, type Wording } from '../wording/render';
import { tellDisagreement, toldAnswers, type ToldAnswers } from './answers-differ';
import {
  drafted,
  linkExpiresAt,
  nightTimes,
  planOfNight,
  type NightFor,
  type NightPlans,
} from './night-messages';
import {
  queueOf,
  syncQueue,
  wantedOf,
  type HouseholdDay,
  type QueuedMessage,
  type WantedMessage,
} from './night-queue';
import { recipientsOf, type Recipient } from './recipients';

/**
 * Brings what waits in the outbox for a household's day in line with the plan as it is now: the word some days ahead,
 * evening text, reminder, morning question, nudge. Queues what is new, takes back what no longer holds, leaves alone
 * what has gone out with the same content. Call it in every transaction that changes mornings, adults, consents or
 * answers; doing so again changes nothing. Whoever no message may reach is put on the call list.
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
  const answers = await toldAnswers(context, transaction, plans);
  await tellDisagreement(context, transaction, day, plans, answers);
  const comesNot = plans.every(({ morningId }) => isAbsence(answers.get(morningId)));
  if (!first || comesNot) {
    await syncQueue(context, transaction, day, []);
    return;
  }
  await planNight(context, transaction, day, [first, ...others], answers);
}

const isAbsence = (told: { readonly answer: string } | undefined): boolean =>
  told?.answer === 'not-coming' || told?.answer === 'ill';

async function planNight(
  context: Context,
  transaction: Transaction,
  day: HouseholdDay,
  plans: NightPlans,
  answers: ToldAnswers,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const household = await recipientsOf(db, { householdId: day.householdId }, transaction);
  // Running late answers nothing about the night.
  const isAnswered = plans.every(({ morningId }) => answers.has(morningId));
  const followsMorning = await hasMorningBefore(context, transaction, day, plans[0]);
  const night = planOfNight(plans, household, { isAnswered, followsMorning });
  const call = callsOf(context, transaction, day, plans, isAnswered);
  await raisePlanned(call, night.calls, household, plans);
  const queue = await queueOf(context, transaction, day);
  const wanted: WantedMessage[] = [];
  for (const recipient of new Set([...night.hearEvening, ...night.hearMorning])) {
    const planned = night.messages.filter(
      ({ familyMemberId }) => familyMemberId === recipient.familyMemberId,
    );
    const wording = await signedWording(context, transaction, recipient);
    if (!wording) {
      await call.raise('language-not-signed', recipient);
      continue;
    }
    if (hasUnsignedPhrases(plans, wording)) await call.raise('individual-plan', null);
    const url = await householdUrl(context, transaction, day, plans, recipient);
    const nightFor = { recipient, wording, url, plans, moments: night.moments };
    const drafts = planned.map((message) => drafted(message, nightFor));
    const keys = drafts.flatMap((draft) => Object.keys(draft.wordingVersions));
    if (!wording.isSignedOff(keys)) {
      await call.raise('language-not-signed', recipient);
      continue;
    }
    await call.close('language-not-signed', recipient);
    const own = drafts.map((draft) => wantedOf(day, draft, queue));
    const fit = own.filter((message) => isStillOpen(message, nightFor, queue, now));
    wanted.push(...fit);
    const hearsEvening = night.hearEvening.includes(recipient);
    if (hearsEvening && !hearsOfNight(own, fit, queue))
      await call.raise('evening-too-late', recipient);
  }
  await syncQueue(context, transaction, day, wanted);
}

/** Whether the evening's facts have reached this person, are on the way, or are a call already. */
const hearsOfNight = (
  own: readonly WantedMessage[],
  fit: readonly WantedMessage[],
  queue: readonly QueuedMessage[],
): boolean =>
  fit.some(({ kind }) => kind === 'evening') ||
  own.some(
    ({ kind, isTold, dedupeKey }) =>
      kind === 'evening' &&
      (isTold || queue.some(({ key, state }) => key === dedupeKey && state === 'queued')),
  );

/** Whether a message can still go out: it is useful, and a late one does not fall into the quiet hours. */
function isStillOpen(
  message: WantedMessage,
  { recipient, plans }: NightFor,
  queue: readonly QueuedMessage[],
  now: number,
): boolean {
  if (message.isTold) return true;
  if (message.lastUsefulAt <= now) return false;
  if (message.dueAt > now) return true;
  // Who is planned in less than these days hears from the invitation; a change of what was told ahead goes at once.
  const isExpected = queue.some(
    ({ kind, familyMemberId, channel }) =>
      kind === message.kind &&
      familyMemberId === message.familyMemberId &&
      channel === message.channel,
  );
  if (message.kind === 'ahead' && !isExpected) return false;
  return message.channel === 'mail' || !isQuiet(now, plans[0].zone, recipient.mayTextEarly);
}

/** What a clinician composed for one child and nobody has signed in this language, a person tells. */
const hasUnsignedPhrases = (plans: NightPlans, wording: Wording): boolean =>
  plans.some(
    ({ individualPlan }) => individualPlan && !arePhrasesSigned(individualPlan.body, wording),
  );

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
  plans: NightPlans,
  { familyMemberId }: Recipient,
): Promise<string> {
  const expiresAt = linkExpiresAt(nightTimes(plans));
  const link = { familyMemberId, householdId, morningOn: on, expiresAt };
  return (await issueHouseholdLink(db, transaction, settings, link)).url;
}

/** Whether the household comes in the days before as well: it has been told of the run by then. */
async function hasMorningBefore(
  { db }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  { site }: MorningPlan,
): Promise<boolean> {
  const rows = await select(
    db,
    `SELECT morning.id FROM mornings morning JOIN children child ON child.id = morning.child_id
     WHERE child.household_id = :householdId AND morning.state <> 'lost'
       AND morning.planned_on >= :from AND morning.planned_on < :on LIMIT 1`,
    { householdId, on, from: addDays(on, -site.aheadTextDays) },
    transaction,
  );
  return rows.length > 0;
}

interface Calls {
  raise(reason: string, recipient: Recipient | null, urgentAt?: number): Promise<void>;
  close(reason: string, recipient: Recipient | null): Promise<void>;
}

async function raisePlanned(
  call: Calls,
  planned: readonly PlannedCall[],
  household: readonly Recipient[],
  plans: NightPlans,
): Promise<void> {
  if (!planned.some(({ reason }) => reason === 'nobody-to-message'))
    await call.close('nobody-to-message', null);
  for (const { reason, familyMemberId, urgentAt } of planned) {
    const recipient = household.find((one) => one.familyMemberId === familyMemberId) ?? null;
    await call.raise(reason, recipient, urgentAt);
  }
  if (plans.some(({ plan }) => plan.kind === 'individual'))
    await call.raise('individual-plan', null);
  else await call.close('individual-plan', null);
}

function callsOf(
  { db, clock }: Context,
  transaction: Transaction,
  { householdId, on }: HouseholdDay,
  plans: NightPlans,
  isAnswered: boolean,
): Calls {
  const now = clock.now();
  const keyOf = (reason: string, recipient: Recipient | null): string =>
    `${reason}:${householdId}:${on}${recipient ? `:${recipient.familyMemberId}` : ''}`;
  return {
    raise: async (reason, recipient, urgentAt = nightTimes(plans).eveningAt) => {
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
        urgentAt: Math.max(now, urgentAt),
        now,
      });
    },
    close: async (reason, recipient) => {
      await closeCalls(db, transaction, [keyOf(reason, recipient)], { now });
    },
  };
}
