import type { Transaction } from 'sequelize';
import { chosenFor } from '../../shared/domain/message-plan';
import { dayOf, type Instant } from '../../shared/domain/zone';
import { isLanguageId } from '../../shared/languages/languages';
import { familyTime } from '../../shared/languages/family-time';
import { profileOf } from '../../shared/languages/profiles';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { recipientsOf } from '../messages/recipients';
import { tellMember } from '../messages/tell-member';
import { canSpeak } from '../wording/render';
import { morningPlansOf, type MorningPlan } from './morning-plans';

const kind = 'visits-changed';
const usefulForMs = 24 * 3_600_000;
/** Whoever is to come so soon, or was, is told before the quiet hours end: nobody fasts and comes for nothing. */
const urgentBeforeMs = 12 * 3_600_000;

/**
 * Tells the adults of a household on which days the children come now, after days were changed: every visit to come in
 * one text, so that nobody has to know what was said before; one that still waits is taken back. Calendar entries and
 * the evening texts follow by themselves.
 * @param change makes the text of this change one of its own
 * @param leftAt the first arrival to come that is no more; null where there is none
 */
export async function tellVisitsChanged(
  context: Context,
  transaction: Transaction,
  {
    householdId,
    childId,
    change: what,
    leftAt,
  }: {
    readonly householdId: number;
    readonly childId: number;
    readonly change: string;
    readonly leftAt: Instant | null;
  },
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const plans = await morningPlansOf(db, { householdId }, transaction);
  const toCome = plans.filter(({ state, arrivalAt }) => state === 'planned' && arrivalAt > now);
  const firstADay = [...new Map([...toCome].reverse().map((plan) => [plan.on, plan])).values()]
    .reverse()
    .sort((left, right) => left.arrivalAt - right.arrivalAt);
  const named = toCome.flatMap((plan) => [
    plan.escortFamilyMemberId,
    plan.nightCarerFamilyMemberId,
  ]);
  const soonestAt = Math.min(firstADay[0]?.arrivalAt ?? Infinity, leftAt ?? Infinity);
  const isUrgent = soonestAt - now < urgentBeforeMs;
  await withdrawWaiting(context, transaction, householdId);
  const household = await recipientsOf(db, { householdId }, transaction);
  for (const recipient of chosenFor(named, household)) {
    const { language } = recipient;
    const isKnown = isLanguageId(language) && canSpeak(language);
    await tellMember(context, transaction, recipient, {
      kind,
      prefix: firstADay.length > 0 ? 'message.visits-changed' : 'message.visits-over',
      params: {
        visits: isKnown ? firstADay.map((plan) => visitSays(plan, language)).join('\n') : '',
      },
      dedupe: `visits-changed:${householdId}:${now}:${what}`.slice(0, 120),
      callReason: 'visits-changed-failed',
      personFirst: 'visits-changed',
      isUrgent,
      ...(isUrgent && { lastUsefulAt: soonestAt }),
      childId,
      morningOn: firstADay[0]?.on ?? dayOf(now, plans[0]?.zone ?? 'UTC'),
      usefulForMs,
    });
  }
}

/**
 * A visit was given up otherwise, and the family is told of it. What still waits about an earlier change names that
 * visit: those that are left are told in its place.
 * @param what as `change` of `tellVisitsChanged`
 */
export async function renewVisitsChanged(
  context: Context,
  transaction: Transaction,
  householdId: number,
  what: string,
): Promise<void> {
  const { db, clock } = context;
  const waiting = await select(
    db,
    `SELECT id FROM messages WHERE household_id = :householdId AND kind = :kind AND state = 'queued' LIMIT 1`,
    { householdId, kind },
    transaction,
  );
  if (waiting.length === 0) return;
  const plans = await morningPlansOf(db, { householdId }, transaction);
  const next = plans.find(({ state, arrivalAt }) => state === 'planned' && arrivalAt > clock.now());
  if (!next) return withdrawWaiting(context, transaction, householdId);
  const { childId } = next;
  const changed = { householdId, childId, change: what, leftAt: null };
  await tellVisitsChanged(context, transaction, changed);
}

/** An earlier change that nobody has heard yet must not be read after this one. */
async function withdrawWaiting(
  { db }: Context,
  transaction: Transaction,
  householdId: number,
): Promise<void> {
  await change(
    db,
    `UPDATE messages SET state = 'withdrawn'
     WHERE household_id = :householdId AND kind = :kind AND state = 'queued'`,
    { householdId, kind },
    transaction,
  );
}

/** 'Friday, April 16, at 6:00 in the morning', as the language tells it. */
function visitSays({ arrivalAt, zone }: MorningPlan, language: string): string {
  if (!isLanguageId(language)) return '';
  return familyTime(arrivalAt, zone, profileOf(language)).text;
}
