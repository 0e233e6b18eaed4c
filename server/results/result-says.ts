import type { Specimen, TestKind } from '../../shared/contracts/specimens';
import type { ClinicWords } from '../wording/clinic-words';

/** 'Culture: no growth, final' */
export function resultSays(
  words: ClinicWords,
  test: TestKind,
  value: string,
  finality: string,
): string {
  const key = `clinic.result.${test}.${value}`;
  const result = words.has(key) ? words.text(key) : value;
  return words.text('clinic.result.with-finality', { result, finality });
}

/** The one thing about the results of a series that matters most now. */
export function seriesSays(words: ClinicWords, specimens: readonly Specimen[]): string {
  const results = specimens.flatMap((specimen) => specimen.results ?? []);
  if (results.some((result) => result.isCritical)) return words.text('clinic.results.person-first');
  if (results.some((result) => result.needsSecondLook))
    return words.text('clinic.results.second-look');
  if (specimens.some((specimen) => specimen.isOverdue)) return words.text('clinic.results.overdue');
  const open = specimens.filter(
    (specimen) =>
      !specimen.rejectedAt &&
      !specimen.results?.some((one) => one.test === 'culture' && one.finality === 'final'),
  ).length;
  return open === 0
    ? words.text('clinic.results.all-final')
    : words.text('clinic.results.expected', { count: open });
}
