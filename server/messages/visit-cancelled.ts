import type { Transaction } from 'sequelize';
import { chosenFor } from '../../shared/domain/message-plan';
import { familyDay } from '../../shared/languages/family-time';
import type { Context } from '../context';
import { morningPlansOf } from '../series/morning-plans';
import { canSpeak } from '../wording/render';
import { profileOf } from '../../shared/languages/profiles';
import { isLanguageId } from '../../shared/languages/languages';
import { sendCalendarEntries } from './calendar-entries';
import { planHouseholdMessages } from './plan-messages';
import { recipientsOf } from './recipients';
import { tellMember } from './tell-member';

const usefulForMs = 12 * 3_600_000;
/** The family is up, or about to be: this does not wait for the end of the quiet hours. */
const urgentBeforeMs = 12 * 3_600_000;

/**
 * Tells the families of lost mornings that there is no visit that day: a text, the cancelled calendar entry, and the
 * night's other messages taken back. Call it after the rows were changed; where brothers or sisters still come that day
 * nothing is said but the new plan.
 */
export async function tellVisitCancelled(
  context: Context,
  transaction: Transaction,
  morningIds: readonly number[],
): Promise<void> {
  const { db, clock } = context;
  const lost = await morningPlansOf(db, { morningIds }, transaction);
  await sendCalendarEntries(context, transaction, morningIds, 'CANCEL');
  const days = new Map(lost.map((plan) => [`${plan.householdId}:${plan.on}`, plan]));
  for (const { householdId, on, childId, arrivalAt } of days.values()) {
    await planHouseholdMessages(context, transaction, { householdId, on });
    const sameDay = await morningPlansOf(db, { householdId, on }, transaction);
    if (sameDay.some(({ state }) => state !== 'lost')) continue;
    const lastLost = Math.max(...sameDay.map(({ morningId }) => morningId));
    const household = await recipientsOf(db, { householdId }, transaction);
    const named = lost.flatMap((plan) => [
      plan.escortFamilyMemberId,
      plan.nightCarerFamilyMemberId,
    ]);
    for (const recipient of chosenFor(named, household)) {
      const { language, mayText, mayMail, isGuardian } = recipient;
      // The calendar's e-mail says it already.
      const hasCalendarMail = mayMail && isGuardian;
      if (!mayText && hasCalendarMail) continue;
      const words =
        isLanguageId(language) && canSpeak(language) ? familyDay(on, profileOf(language)) : null;
      await tellMember(
        context,
        transaction,
        { ...recipient, mayMail: mayMail && !hasCalendarMail },
        {
          kind: 'visit-cancelled',
          prefix: 'message.visit-cancelled',
          params: { weekday: words?.weekday ?? '', date: words?.date ?? '' },
          // A day that was planned anew and lost again is told again.
          dedupe: `visit-cancelled:${householdId}:${on}:${lastLost}`,
          callReason: 'visit-cancelled-failed',
          personFirst: 'visit-cancelled',
          isUrgent: arrivalAt - clock.now() < urgentBeforeMs,
          childId,
          morningOn: on,
          usefulForMs,
          ...(arrivalAt > clock.now() && { lastUsefulAt: arrivalAt }),
        },
      );
    }
  }
}
