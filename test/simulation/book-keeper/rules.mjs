// The rules as the pages of the product state them, written down a second time. Nothing here is taken
// from the product's code; where both differ, one of them is wrong.
import { hour, minute, monthsOld, wallClock } from './calendar.mjs';

/** Texts rest from 21:00 to 8:00 of the family's clock; a separate yes opens the hours before 8. */
export function isQuiet(instant, zone, agreesToEarly) {
  const { hour } = wallClock(instant, zone);
  return hour >= 21 || (hour < 8 && !agreesToEarly);
}

/** The starting protocol: least hours without anything by mouth, by months of age; null is a clinician's plan. */
export function leastHours(bornOn, on) {
  const months = monthsOld(bornOn, on);
  if (months < 3) return null;
  return months < 12 ? 4 : 6;
}

export const isInfant = (bornOn, on) => monthsOld(bornOn, on) < 12;

/** An infant's reminder leaves time for a feed. */
export const infantReminderBefore = 40 * minute;

/** Languages whose texts the furnished clinic has signed. */
const signed = new Set(['en', 'es', 'ar']);
export const isSigned = (language) => signed.has(language);

/** 47 CFR 64.1200(a)(10), what providers take as well, and the same in the languages of the clinic. */
const stopWords = new Set([
  ...['stop', 'stopall', 'quit', 'end', 'revoke', 'opt out', 'optout', 'cancel', 'unsubscribe'],
  ...['alto', 'parar', 'توقف'],
]);
const startWords = new Set(['start', 'unstop', 'yes']);
const bare = (body) =>
  body
    .trim()
    .toLowerCase()
    .replace(/[.!]+$/, '');
export const switchesOff = (body) => stopWords.has(bare(body));
export const switchesOn = (body) => startWords.has(bare(body));

/** 1, 2 or 3 in Latin or Arabic digits; null for anything else. */
export function digitOf(body) {
  const at = ['1', '2', '3', '١', '٢', '٣'].indexOf(bare(body));
  return at < 0 ? null : (at % 3) + 1;
}

/** What may go to a phone at any hour because its owner has just written or asked. */
export const answersToOwn = new Set(['reply', 'opt-out-confirmation', 'code']);

/** A morning that is called off is told at once; a quiet night may lie between. */
export const cancellationWithin = 12 * hour;

/** How long after the family's own text an answer still is one. */
export const answerWithin = 30 * minute;
export const confirmationWithin = 5 * minute;
