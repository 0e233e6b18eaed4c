import { chosenFor } from '../../shared/domain/message-plan';
import { afterQuietHours, isQuiet } from '../../shared/domain/quiet-hours';
import { millisecondsPerMinute, type Instant } from '../../shared/domain/zone';
import type { HowTold } from '../../shared/contracts/closing';
import type { Recipient } from '../messages/recipients';
import type { MorningPlan } from '../series/morning-plans';

/** Why a text to this person cannot go, or does not suffice. */
export type WhyCall =
  'nobody' | 'no-texts' | 'no-early-texts' | 'does-not-read' | 'language-not-signed';

export interface Hearing {
  readonly recipient: Recipient;
  /** Null: somebody calls. */
  readonly textAt: Instant | null;
  readonly whyCall: WhyCall | null;
}

export interface FamilyHears {
  readonly how: HowTold;
  readonly textAt: Instant | null;
  readonly hearings: readonly Hearing[];
  readonly whyCall: WhyCall | null;
}

/**
 * How a family hears that its mornings of a day do not take place. A text goes at once, in the quiet hours only to who
 * agreed to early texts; one that can wait until they are over waits, as long as nobody fasts for nothing. Everybody
 * else is called: whoever gets no texts, does not read, or reads a language whose words are not signed.
 * @param canRead whether the text's words are signed off in a language
 */
export function whoHears(
  plans: readonly MorningPlan[],
  household: readonly Recipient[],
  now: Instant,
  canRead: (language: string) => boolean,
): FamilyHears {
  const named = plans.flatMap((plan) => [plan.escortFamilyMemberId, plan.nightCarerFamilyMemberId]);
  const zone = plans[0]?.zone ?? 'UTC';
  const mustKnowBy = Math.min(...plans.map(mustKnowAt));
  const hearings = chosenFor(named, household).map((recipient): Hearing => {
    const call = (whyCall: WhyCall): Hearing => ({ recipient, textAt: null, whyCall });
    if (!recipient.mayText || recipient.phone === null) return call('no-texts');
    if (recipient.readsHow === 'no') return call('does-not-read');
    if (!canRead(recipient.language)) return call('language-not-signed');
    if (!isQuiet(now, zone, recipient.mayTextEarly))
      return { recipient, textAt: now, whyCall: null };
    // Nobody is woken by a text that may wait; but nobody learns of it after the fast has begun.
    const later = afterQuietHours(now, zone);
    return later < mustKnowBy
      ? { recipient, textAt: later, whyCall: null }
      : call('no-early-texts');
  });
  const times = hearings.flatMap(({ textAt }) => textAt ?? []);
  const missing = hearings.find(({ whyCall }) => whyCall !== null);
  if (times.length === 0)
    return { how: 'call', textAt: null, hearings, whyCall: missing?.whyCall ?? 'nobody' };
  const textAt = Math.max(...times);
  if (missing) return { how: 'text-and-call', textAt, hearings, whyCall: missing.whyCall };
  return { how: 'text', textAt, hearings, whyCall: null };
}

/** When the child begins to fast, or where the plan tells no hours, when the family gets up. */
function mustKnowAt({ plan, arrivalAt, travelMinutes, readyMinutes }: MorningPlan): Instant {
  if ('stopAt' in plan && typeof plan.stopAt === 'number') return plan.stopAt;
  return arrivalAt - (travelMinutes + readyMinutes) * millisecondsPerMinute;
}

/** Whoever should have left home by now may be on the way: a text is read at the door of a closed clinic. */
export const mayBeOnTheWay = (plan: MorningPlan, now: Instant): boolean =>
  now >= (plan.expectedAt ?? plan.arrivalAt) - plan.travelMinutes * millisecondsPerMinute;
