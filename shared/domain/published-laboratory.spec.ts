import { publishedLaboratoryValues, type ProfileField } from './published-laboratory';
import { demoLaboratoryProfile, resultStages } from './specimen-clocks';

const rangeOf = (field: ProfileField): [number, number] => {
  const numbers = publishedLaboratoryValues
    .filter((value) => value.field === field)
    .flatMap(({ from, to }) => [from, to])
    .filter((value) => value !== null);
  return [Math.min(...numbers), Math.max(...numbers)];
};

describe('published laboratory values', () => {
  // Clinical facts 2, 3.1 and 4.1.
  it.each<[ProfileField, number, number]>([
    ['neutraliseWithinMinutes', 30, 360],
    ['receiptWithinMinutes', 180, 240],
    ['minimumVolumeMl', 2, 10],
    ['maximumVolumeMl', 10, 15],
    ['smear', 1, 1],
    ['amplification', 1, 3],
    ['cultureNegativeFinal', 42, 60],
  ])('%s lies between %p and %p', (field, from, to) => {
    expect(rangeOf(field)).toEqual([from, to]);
  });

  it('stand beside every number of a profile', () => {
    for (const stage of resultStages) expect(rangeOf(stage)[0]).toBeGreaterThan(0);
  });

  it('hold the demo profile', () => {
    const { neutraliseWithinMinutes, minimumVolumeMl, maximumVolumeMl, resultDays } =
      demoLaboratoryProfile;
    const inside = (field: ProfileField, value: number | null): boolean => {
      const [from, to] = rangeOf(field);
      return value !== null && value >= from && value <= to;
    };
    expect(inside('neutraliseWithinMinutes', neutraliseWithinMinutes)).toBe(true);
    expect(inside('minimumVolumeMl', minimumVolumeMl)).toBe(true);
    expect(inside('maximumVolumeMl', maximumVolumeMl)).toBe(true);
    expect(inside('cultureIdentification', resultDays.cultureIdentification)).toBe(true);
    expect(inside('cultureNegativeFinal', resultDays.cultureNegativeFinal)).toBe(true);
  });
});
