import { bandFor, startingProtocol } from './fasting-protocol';
import { validateProtocol } from './fasting-protocol-problems';

describe('the starting protocol', () => {
  // The table of the product page "Starting protocol".
  it.each([
    [0, null, null],
    [2, null, null],
    [3, 4, 6],
    [5, 4, 6],
    [6, 4, 8],
    [11, 4, 8],
    [12, 6, 12],
    [23, 6, 12],
    [24, 6, 13],
    [59, 6, 13],
    [60, 6, 14],
    [17 * 12, 6, 14],
  ])('at %i months: least %p, longest %p', (ageMonths, least, longest) => {
    const band = bandFor(startingProtocol, ageMonths);
    expect(band?.individualPlan).toBe(least === null);
    expect(band?.longestHours).toBe(longest);
    expect(new Set(Object.values(band?.leastHours ?? {}))).toEqual(
      new Set(least === null ? [] : [least]),
    );
  });

  it('holds, is unsigned and says that it is to be confirmed', () => {
    expect(validateProtocol(startingProtocol)).toEqual([]);
    expect(startingProtocol).toMatchObject({ isStartingValues: true, signedBy: null });
  });

  // Clinical facts 1.4 (H1): fasts monitored in hospital, by age.
  it('stays under the limits of monitored fasts', () => {
    for (const [ageMonths, limit] of [
      [5, 8],
      [7, 12],
      [11, 16],
      [23, 18],
      [83, 20],
      [84, 24],
    ] as const) {
      expect(bandFor(startingProtocol, ageMonths)?.longestHours).toBeLessThan(limit);
    }
  });
});

describe('the band of an age', () => {
  it('is none for an age that the protocol leaves out', () => {
    const [under3, , ...older] = startingProtocol.bands;
    const withGap = { ...startingProtocol, bands: under3 ? [under3, ...older] : [] };
    expect(bandFor(withGap, 2)).toBe(under3);
    expect(bandFor(withGap, 3)).toBeNull();
    expect(bandFor(withGap, 5)).toBeNull();
    expect(bandFor(withGap, 6)?.fromMonths).toBe(6);
  });
});
