import { ageOn, daysBetween, type Day } from '../../shared/domain/day';
import type { ClinicWords } from './clinic-words';

/** Weeks under 3 months, months under 2 years, then years. */
export function ageInWords(words: ClinicWords, bornOn: Day, on: Day): string {
  const { months, years } = ageOn(bornOn, on);
  if (months < 3)
    return words.text('clinic.age.weeks', { count: Math.floor(daysBetween(bornOn, on) / 7) });
  return months < 24
    ? words.text('clinic.age.months', { count: months })
    : words.text('clinic.age.years', { count: years });
}

/** '1 minute', '29 minutes'. */
export const minutesInWords = (words: ClinicWords, minutes: number): string =>
  words.text('clinic.minutes', { count: minutes });

/** '4 hours', '5 hours 30 minutes', '45 minutes'. */
export function hoursInWords(words: ClinicWords, minutes: number): string {
  const rest = minutes % 60;
  if (minutes < 60) return minutesInWords(words, rest);
  const hours = words.text('clinic.hours', { count: Math.floor(minutes / 60) });
  return rest === 0
    ? hours
    : words.text('clinic.hours-and-minutes', { hours, minutes: minutesInWords(words, rest) });
}

/** '9 h 54 min' */
export function durationInWords(words: ClinicWords, minutes: number): string {
  const rest = minutes % 60;
  return minutes < 60
    ? words.text('clinic.duration-short', { minutes: rest })
    : words.text('clinic.duration', {
        hours: Math.floor(minutes / 60),
        minutes: String(rest).padStart(2, '0'),
      });
}
