import type { Instant } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { familyDay, familyTime } from '../../shared/languages/family-time';
import { shownPhone } from '../messages/shown-phone';
import type { MorningPlan } from '../series/morning-plans';
import type { WordingParams } from '../wording/render';
import type { LanguageProfile } from '../../shared/languages/profiles';
import { clinicClosed } from './closing-of-day';

export interface ClosedToday {
  readonly heading: string;
  /** What happens next, or who calls. */
  readonly subheading: string;
}

/**
 * What a family reads while the clinic is closed on the day of its morning; null on every other day, and while another
 * child of the family still comes.
 */
export function closedToday(
  mornings: readonly MorningPlan[],
  now: Instant,
  words: {
    readonly wording: { readonly profile: LanguageProfile };
    text(key: string, params?: WordingParams): string;
  },
): ClosedToday | null {
  const today = mornings.filter(({ on, zone }) => on === dayOf(now, zone));
  const isClosed = ({ state, lostReason }: MorningPlan): boolean =>
    state === 'lost' && (lostReason ?? '').startsWith(clinicClosed);
  const [first] = today;
  if (!first || !today.some(isClosed) || today.some(({ state }) => state !== 'lost')) return null;
  const phone = shownPhone(first.site.phone, first.site.country);
  const next = mornings
    .filter(({ state, arrivalAt }) => state === 'planned' && arrivalAt > now)
    .sort((left, right) => left.arrivalAt - right.arrivalAt)[0];
  const { profile } = words.wording;
  // Named, not "today": the phone keeps the page, and it may be read on another day.
  const { weekday: closedWeekday, date: closedDate } = familyDay(first.on, profile);
  const heading = words.text('closing.page.heading', { weekday: closedWeekday, date: closedDate });
  if (!next) return { heading, subheading: words.text('closing.page.none', { phone }) };
  const { weekday, date, time } = familyTime(next.arrivalAt, next.zone, profile);
  return { heading, subheading: words.text('closing.page.next', { weekday, date, time, phone }) };
}
