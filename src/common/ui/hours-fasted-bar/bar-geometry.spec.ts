import { minuteOn, rulerOf } from '../ruler/ruler-scale';
import { barGeometry, type BarFacts } from './bar-geometry';

const zone = 'America/Chicago';
const facts: BarFacts = {
  fromAt: '2027-04-06T05:40:00.000Z',
  isPlanOnly: false,
  isUnsure: false,
  leastAt: '2027-04-06T09:40:00.000Z',
  longestAt: '2027-04-06T11:40:00.000Z',
  likelyCollectionAt: '2027-04-06T11:26:00.000Z',
  collectedAt: null,
};
const now = Date.parse('2027-04-06T11:20:00.000Z');

describe('the ruler', () => {
  test('has 960 minutes from 20:00 to 12:00 and an hour every two', () => {
    const scale = rulerOf('2027-04-06', zone);
    expect(scale.minutes).toBe(960);
    expect(scale.hours.map(({ says }) => says)).toEqual(['22', '00', '02', '04', '06', '08', '10']);
    expect(scale.hours[0]).toEqual({ minute: 120, says: '22' });
  });

  // The clock goes forward on 14 March 2027 and back on 7 November 2027 in Chicago.
  test.each([
    ['2027-03-14', 900],
    ['2027-11-07', 1020],
  ])('is as long as the night that ends on %s', (on, minutes) => {
    expect(rulerOf(on, zone).minutes).toBe(minutes);
  });

  test('keeps what lies outside at its ends', () => {
    const scale = rulerOf('2027-04-06', zone);
    expect(minuteOn(scale, scale.startAt - 1)).toBe(0);
    expect(minuteOn(scale, scale.startAt + 2000 * 60_000)).toBe(960);
  });
});

describe('a bar', () => {
  const scale = rulerOf('2027-04-06', zone);

  test('stands in minutes from the evening before', () => {
    expect(barGeometry(facts, { scale, now })).toMatchObject({
      from: 280,
      least: 520,
      longest: 640,
      to: 626,
      hasStart: true,
      hasLeast: true,
      hasLongest: true,
      hasAhead: true,
      until: null,
    });
  });

  test('reaches at least to now', () => {
    const late = Date.parse('2027-04-06T11:35:00.000Z');
    const shape = barGeometry(facts, { scale, now: late });
    expect(shape.to).toBe(635);
    expect(shape.hasAhead).toBe(false);
  });

  test('after the collection carries the specimen to its stops', () => {
    const collectedAt = '2027-04-06T11:04:00.000Z';
    const shape = barGeometry(
      { ...facts, collectedAt },
      {
        scale,
        now,
        stops: [
          { at: '2027-04-06T11:34:00.000Z', isDue: true },
          { at: '2027-04-06T14:30:00.000Z', isDue: false },
        ],
      },
    );
    expect(shape).toMatchObject({ to: 604, until: 810, hasLongest: false, hasAhead: false });
    expect(shape.stops).toEqual([
      { minute: 634, isDue: true },
      { minute: 810, isDue: false },
    ]);
  });

  test('a fast that began before the ruler has no words at its start', () => {
    const early = { ...facts, fromAt: '2027-04-05T23:00:00.000Z' };
    expect(barGeometry(early, { scale, now })).toMatchObject({ from: 0, hasStart: false });
  });

  test('a longest fast behind the ruler has no tick, one near its end has its words before it', () => {
    const behind = { ...facts, longestAt: '2027-04-06T18:00:00.000Z' };
    expect(barGeometry(behind, { scale, now }).hasLongest).toBe(false);
    const near = { ...facts, longestAt: '2027-04-06T16:30:00.000Z' };
    expect(barGeometry(near, { scale, now }).isLongestAtEnd).toBe(true);
  });
});
