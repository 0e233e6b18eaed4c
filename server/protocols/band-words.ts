import type { FastingBand } from '../../shared/domain/fasting-protocol';
import type { ClinicWords } from '../wording/clinic-words';

const yearsOrMonths = (words: ClinicWords, months: number): string =>
  months >= 12 && months % 12 === 0
    ? words.text('clinic.age.years', { count: months / 12 })
    : words.text('clinic.age.months', { count: months });

/** "under 3 months", "3 to 5 months", "1 year", "2 to 4 years", "5 years and over". */
export function ageOfBand(
  words: ClinicWords,
  { fromMonths, toMonths }: Pick<FastingBand, 'fromMonths' | 'toMonths'>,
): string {
  if (toMonths === null)
    return words.text('clinic.band.and-over', { age: yearsOrMonths(words, fromMonths) });
  const next = toMonths + 1;
  if (fromMonths === 0) return words.text('clinic.band.under', { age: yearsOrMonths(words, next) });
  if (fromMonths % 12 !== 0 || next % 12 !== 0 || toMonths < 12)
    return words.text('clinic.band.months', { from: fromMonths, to: toMonths });
  const years = { from: fromMonths / 12, to: next / 12 - 1 };
  return years.from === years.to
    ? yearsOrMonths(words, fromMonths)
    : words.text('clinic.band.years', years);
}
