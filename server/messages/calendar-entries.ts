import type { Transaction } from 'sequelize';
import { addDays, instantOf } from '../../shared/domain/zone';
import { isQuiet } from '../../shared/domain/quiet-hours';
import { familyTime } from '../../shared/languages/family-time';
import type { Context } from '../context';
import { calendarFile } from '../outbox/calendar-file';
import { enqueue } from '../outbox/enqueue';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { canSpeak, loadWording } from '../wording/render';
import { noting } from './draft-message';
import { recipientsOf, type Recipient } from './recipients';
import { siteParams } from './tell-member';

/** From the arrival to the way home, where a child's own plan gives no time. */
const usualVisitMs = 2 * 3_600_000;

/**
 * One e-mail with a calendar entry for each morning and each guardian who agreed to e-mail. The entry keeps its UID for
 * life; whoever moves or cancels a morning first raises `calendar_sequence` on its row. Where the words are not signed off
 * nothing is sent: the household's own messages have put the family on the call list already.
 */
export async function sendCalendarEntries(
  context: Context,
  transaction: Transaction,
  morningIds: readonly number[],
  method: 'REQUEST' | 'CANCEL',
): Promise<void> {
  const plans = await morningPlansOf(context.db, { morningIds }, transaction);
  for (const plan of plans) {
    const household = await recipientsOf(
      context.db,
      { householdId: plan.householdId },
      transaction,
    );
    const guardians = household.filter(({ isGuardian, mayMail }) => isGuardian && mayMail);
    for (const guardian of guardians) await sendEntry(context, transaction, plan, guardian, method);
  }
}

async function sendEntry(
  { db, clock, settings }: Context,
  transaction: Transaction,
  morning: MorningPlan,
  recipient: Recipient,
  method: 'REQUEST' | 'CANCEL',
): Promise<void> {
  const now = clock.now();
  const { email, language, familyMemberId, householdId } = recipient;
  if (email === null || morning.arrivalAt <= now || !canSpeak(language)) return;
  const noted = noting(await loadWording(db, language, transaction));
  const { site, arrivalAt, zone, plan } = morning;
  const prefix = method === 'REQUEST' ? 'message.calendar' : 'message.visit-cancelled';
  if (!noted.wording.has(`${prefix}.mail`)) return;
  const arrival = familyTime(arrivalAt, zone, noted.wording.profile);
  const params = {
    ...siteParams(site),
    url: `${settings.origin}/${language}/`,
    weekday: arrival.weekday,
    date: arrival.date,
    time: arrival.time,
  };
  const content = calendarFile({
    method,
    uid: morning.calendarUid,
    sequence: morning.calendarSequence,
    title: noted.text('calendar.title'),
    description: noted.text('calendar.description', params),
    location: `${site.door}, ${site.address}`,
    startAt: arrivalAt,
    endAt: plan.kind === 'standard' ? plan.eatAgainAt : arrivalAt + usualVisitMs,
    alarmAt: alarmAt(morning),
    language,
    organizer: { name: site.shortName, email: settings.mail.from },
    // The address stands for the person: a calendar that others see names nobody.
    attendee: { name: email, email },
    stampAt: now,
  });
  const subject = noted.text(`${prefix}.subject`, params);
  const body = noted.text(`${prefix}.mail`, params);
  if (!noted.wording.isSignedOff(noted.used())) return;
  await enqueue(db, transaction, {
    dedupeKey: `calendar:${morning.calendarUid}:${morning.calendarSequence}:${method}:${familyMemberId}`,
    kind: method === 'REQUEST' ? 'calendar' : 'visit-cancelled',
    channel: 'mail',
    householdId,
    familyMemberId,
    address: email,
    language,
    wordingVersions: noted.wording.versions(noted.used()),
    subject,
    body,
    calendar: { method, content },
    callReason: method === 'CANCEL' && !recipient.mayText ? 'visit-cancelled-failed' : null,
    morningOn: morning.on,
    dueAt: now,
    lastUsefulAt: arrivalAt,
    createdAt: now,
  });
}

/** The stop reminder, or the evening text's time where that would ring in the night. */
function alarmAt({ plan, on, site, zone }: MorningPlan): number {
  const eveningAt = instantOf({ on: addDays(on, -1), time: site.eveningTextTime, zone });
  if (plan.kind !== 'standard' || isQuiet(plan.stopReminderAt, zone, false)) return eveningAt;
  return plan.stopReminderAt;
}
