import { criticalReasons, isCritical, isPositive, type SpecimenFindings } from './critical';

const none: SpecimenFindings = { smear: null, amplification: null, culture: null };

describe('positive and critical', () => {
  // The product page, "Positive and critical".
  it.each<[string, Partial<SpecimenFindings>, boolean, boolean]>([
    ['nothing yet', {}, false, false],
    ['amplification detected', { amplification: 'detected' }, true, true],
    ['culture identified', { culture: 'mtb-complex' }, true, true],
    ['smear positive', { smear: 'positive' }, false, true],
    ['amplification trace', { amplification: 'trace' }, false, true],
    ['culture growing', { culture: 'growing' }, false, true],
    ['another kind', { culture: 'not-tuberculous' }, false, false],
    ['amplification invalid', { amplification: 'invalid' }, false, false],
    ['culture contaminated', { culture: 'contaminated' }, false, false],
    [
      'all negative',
      { smear: 'negative', amplification: 'not-detected', culture: 'negative-final' },
      false,
      false,
    ],
    ['no growth yet', { culture: 'no-growth-yet' }, false, false],
  ])('%s', (_, findings, positive, critical) => {
    expect(isPositive({ ...none, ...findings })).toBe(positive);
    expect(isCritical({ ...none, ...findings })).toBe(critical);
  });

  it('names every reason, the weightiest first', () => {
    expect(
      criticalReasons({ smear: 'positive', amplification: 'detected', culture: 'growing' }),
    ).toEqual(['amplification-detected', 'smear-positive', 'culture-growing']);
  });
});
