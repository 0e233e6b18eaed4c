import type { Transaction } from 'sequelize';
import type { Day } from '../../shared/domain/day';
import { familyDay } from '../../shared/languages/family-time';
import { closeCalls, raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { announce } from '../live/announce';
import { siteParams } from '../messages/tell-member';
import { enqueue } from '../outbox/enqueue';
import type { Site } from '../sites/sites';
import { loadWording } from '../wording/render';
import { closingKind, textKeyOf, type FamilyOfDay } from './closing-of-day';

/** Read later, it still says what to do: the child may eat. */
const usefulForMs = 6 * 3_600_000;

/** Calls that only bring a family to its morning; a closed clinic makes them needless. */
const needlessCalls = [
  'nobody-to-message',
  'language-not-signed',
  'does-not-read',
  'evening-too-late',
  'evening-text-failed',
  'morning-text-failed',
  'individual-plan',
  'not-answered',
  'not-understood',
];

/** Takes back what waits to be sent about this morning, and the calls that were to bring the family to it. */
export async function withdrawWaiting(
  { db, clock }: Context,
  transaction: Transaction,
  { householdId, plans }: FamilyOfDay,
  on: Day,
): Promise<void> {
  const withdrawn = await change(
    db,
    `UPDATE messages SET state = 'withdrawn' WHERE household_id = :householdId AND morning_on = :on AND state = 'queued'`,
    { householdId, on },
    transaction,
  );
  if (withdrawn > 0) await announce(db, transaction, 'messages');
  const calls = await select<{ openKey: string }>(
    db,
    `SELECT open_key AS openKey FROM call_tasks
     WHERE morning_id IN (:morningIds) AND open_key IS NOT NULL AND reason IN (:needlessCalls)`,
    { morningIds: plans.map(({ morningId }) => morningId), needlessCalls },
    transaction,
  );
  await closeCalls(
    db,
    transaction,
    calls.map(({ openKey }) => openKey),
    { now: clock.now() },
  );
}

export interface TellFamily {
  readonly family: FamilyOfDay;
  readonly site: Site;
  readonly on: Day;
  readonly isToday: boolean;
}

/** One text for each person who must hear; one that does not arrive becomes a call. */
export async function textFamily(
  { db, clock }: Context,
  transaction: Transaction,
  { family, site, on, isToday }: TellFamily,
): Promise<void> {
  const now = clock.now();
  const { householdId, hears } = family;
  const lastMorning = Math.max(...family.plans.map(({ morningId }) => morningId));
  for (const { recipient, textAt } of hears.hearings) {
    const { phone, language, familyMemberId } = recipient;
    if (textAt === null || phone === null) continue;
    const wording = await loadWording(db, language, transaction);
    const key = textKeyOf(isToday);
    const { weekday, date } = familyDay(on, wording.profile);
    await enqueue(db, transaction, {
      // A day that was planned anew and closed again is told again.
      dedupeKey: `${closingKind}:${lastMorning}:${familyMemberId}`,
      kind: closingKind,
      channel: 'sms',
      householdId,
      familyMemberId,
      address: phone,
      language,
      wordingVersions: wording.versions([key]),
      body: wording.text(key, { ...siteParams(site), weekday, date }),
      callReason: callReasonOf(isToday),
      isWithoutConsent: recipient.isWithoutConsent,
      morningOn: on,
      dueAt: textAt,
      lastUsefulAt: textAt + usefulForMs,
      createdAt: now,
    });
    await announce(db, transaction, 'messages');
  }
}

const callReasonOf = (isToday: boolean): string => (isToday ? 'clinic-closed' : 'visit-cancelled');

/** Whoever no text reaches is called at once, on top of the list. */
export async function callFamily(
  { db, clock }: Context,
  transaction: Transaction,
  { family, on, isToday }: Omit<TellFamily, 'site'>,
): Promise<void> {
  const now = clock.now();
  const { householdId, plans, hears } = family;
  if (hears.whyCall === null) return;
  const whom = hears.hearings.find(({ whyCall }) => whyCall !== null)?.recipient;
  const reason = callReasonOf(isToday);
  await raiseCall(db, transaction, {
    reason,
    openKey: `${reason}:${householdId}:${on}`,
    householdId,
    childId: plans[0]?.childId ?? null,
    morningId: plans[0]?.morningId ?? null,
    familyMemberId: whom?.familyMemberId ?? null,
    isForClinician: false,
    urgentAt: now,
    now,
  });
}
