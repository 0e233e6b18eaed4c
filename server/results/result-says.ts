import type { TestKind } from '../../shared/contracts/specimens';

const says: Record<TestKind, Record<string, string>> = {
  smear: {
    negative: 'Smear: no acid-fast bacilli seen',
    positive: 'Smear: acid-fast bacilli seen',
  },
  amplification: {
    'not-detected': 'Amplification: not detected',
    detected: 'Amplification: M. tuberculosis complex detected',
    trace: 'Amplification: trace',
    invalid: 'Amplification: invalid, neither positive nor negative',
  },
  culture: {
    'no-growth-yet': 'Culture: no growth so far',
    'negative-final': 'Culture: no growth',
    growing: 'Culture: growing acid-fast bacilli, not identified yet',
    contaminated: 'Culture: contaminated, neither positive nor negative',
    'mtb-complex': 'Culture: M. tuberculosis complex',
    'not-tuberculous': 'Culture: not tuberculous mycobacteria',
  },
};

/** 'Culture: no growth, final' */
export const resultSays = (test: TestKind, value: string, finality: string): string =>
  `${says[test][value] ?? value}, ${finality}`;
