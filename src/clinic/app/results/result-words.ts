import type { TestKind } from '../../../../shared/contracts/specimens';

interface Choice {
  readonly value: string;
  readonly says: string;
}

export const testWords: readonly { readonly test: TestKind; readonly says: string }[] = [
  { test: 'smear', says: $localize`:@@clinic.results.smear:Smear` },
  { test: 'amplification', says: $localize`:@@clinic.results.amplification:Amplification` },
  { test: 'culture', says: $localize`:@@clinic.results.culture:Culture` },
];

const answers: Record<TestKind, readonly Choice[]> = {
  smear: [
    {
      value: 'negative',
      says: $localize`:@@clinic.results.smear-negative:No acid-fast bacilli seen`,
    },
    { value: 'positive', says: $localize`:@@clinic.results.smear-positive:Acid-fast bacilli seen` },
  ],
  amplification: [
    { value: 'not-detected', says: $localize`:@@clinic.results.not-detected:Not detected` },
    {
      value: 'detected',
      says: $localize`:@@clinic.results.detected:M. tuberculosis complex detected`,
    },
    { value: 'trace', says: $localize`:@@clinic.results.trace:Trace` },
    { value: 'invalid', says: $localize`:@@clinic.results.invalid:Invalid` },
  ],
  culture: [
    { value: 'no-growth-yet', says: $localize`:@@clinic.results.no-growth-yet:No growth so far` },
    {
      value: 'negative-final',
      says: $localize`:@@clinic.results.negative-final:No growth, culture ended`,
    },
    {
      value: 'growing',
      says: $localize`:@@clinic.results.growing:Growing acid-fast bacilli, not identified yet`,
    },
    { value: 'contaminated', says: $localize`:@@clinic.results.contaminated:Contaminated` },
    { value: 'mtb-complex', says: $localize`:@@clinic.results.mtb:M. tuberculosis complex` },
    {
      value: 'not-tuberculous',
      says: $localize`:@@clinic.results.not-tuberculous:Not tuberculous mycobacteria`,
    },
  ],
};

export const answersOf = (test: TestKind): readonly Choice[] => answers[test];
