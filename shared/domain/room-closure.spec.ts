import { airChangesRange, clearedPercents, closureMinutesOf } from './room-closure';

describe('minutes until a room may be used again', () => {
  // CDC, Guidelines for Environmental Infection Control in Health-Care Facilities (2003), appendix B, table B.1:
  // air changes an hour, minutes for 99 %, minutes for 99.9 %. The row of 6 and the row of 12 are those of
  // isolation rooms, the others were written down from the same table from memory.
  it.each([
    [2, 138, 207],
    [4, 69, 104],
    [6, 46, 69],
    [8, 35, 52],
    [10, 28, 41],
    [12, 23, 35],
    [15, 18, 28],
    [20, 14, 21],
    [50, 6, 8],
  ])('at %s changes an hour: %s and %s', (airChangesPerHour, ninetyNine, threeNines) => {
    expect(closureMinutesOf({ airChangesPerHour, clearedPercent: 99 })).toBe(ninetyNine);
    expect(closureMinutesOf({ airChangesPerHour, clearedPercent: 99.9 })).toBe(threeNines);
  });

  it('never gets longer with more air, nor shorter with a stricter aim', () => {
    for (const clearedPercent of clearedPercents) {
      let before = Infinity;
      for (let changes = airChangesRange.from; changes <= airChangesRange.until; changes += 0.5) {
        const minutes = closureMinutesOf({ airChangesPerHour: changes, clearedPercent });
        expect(minutes).toBeLessThanOrEqual(before);
        before = minutes;
      }
    }
    for (let changes = 1; changes <= 60; changes += 1)
      expect(
        closureMinutesOf({ airChangesPerHour: changes, clearedPercent: 99.9 }),
      ).toBeGreaterThan(closureMinutesOf({ airChangesPerHour: changes, clearedPercent: 99 }));
  });

  it.each([0, -6, 0.9, 60.1, Number.NaN, Infinity])('refuses %s changes', (airChangesPerHour) => {
    expect(() => closureMinutesOf({ airChangesPerHour, clearedPercent: 99 })).toThrow(RangeError);
  });
});
