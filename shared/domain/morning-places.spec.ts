import { limitsOn, morningPlaces, type SeriesChild } from './morning-places';
import type { Place } from './places-of-morning';

const on = '2026-12-09';
const child = (id: number, more: Partial<SeriesChild> = {}): SeriesChild => ({
  id,
  bornOn: '2024-02-02',
  leastMinutes: 360,
  longestMinutes: 780,
  ...more,
});
const place = (arrivalTime: string, roomId = 1): Place => ({ arrivalTime, roomId });
const found = (children: SeriesChild[], places: Place[], more = {}) =>
  morningPlaces({
    zone: 'America/Chicago',
    on,
    places,
    isTaken: () => false,
    children,
    usualWaitMinutes: 30,
    ...more,
  });

it('twins come by their number, places by time and room, in whatever order they are given', () => {
  const places = [place('07:30'), place('06:00', 2), place('06:30', 2), place('06:00', 1)];
  expect(found([child(5), child(4)], places)).toEqual({
    ok: true,
    neighbouring: true,
    places: [
      { childId: 4, arrivalTime: '06:00', roomId: 1 },
      { childId: 5, arrivalTime: '06:00', roomId: 2 },
    ],
  });
});

describe('the fast before a place', () => {
  /** With a longest fast that nothing keeps, the answer says how long it would be. */
  const minutesAt6 = (more: Partial<SeriesChild>): unknown => {
    const answer = found([child(1, { longestMinutes: 100, ...more })], [place('06:00')]);
    return answer.ok || answer.because !== 'fast-too-long' ? answer : answer.fasts;
  };
  // Arrival 6:00, least 6 h: the stop is at 0:00; collection after half an hour.
  it.each<[string, Partial<SeriesChild>, number]>([
    ['from the stop where no usual time is known', {}, 390],
    ['from supper', { usualLastMealTime: '20:00' }, 630],
    [
      'from the last feed before the stop',
      { usualLastMealTime: '20:00', nightFeedTimes: ['23:00'] },
      450,
    ],
    [
      'from the stop, where a later feed falls away',
      { usualLastMealTime: '20:00', nightFeedTimes: ['02:00'] },
      390,
    ],
    ['from a feed at the stop', { nightFeedTimes: ['00:00'] }, 390],
    [
      'from a day before, where the usual time is that of the arrival',
      { usualLastMealTime: '06:00' },
      1470,
    ],
    ['from the clock time of the protocol, where it is earlier', { nothingFrom: '23:00' }, 450],
    ['from the hours, where they are earlier', { nothingFrom: '01:00' }, 390],
    ['from the hours, where there is no clock time', { nothingFrom: null }, 390],
  ])('counts %s', (_, more, minutes) => {
    expect(minutesAt6(more)).toEqual([{ childId: 1, minutes, longestMinutes: 100 }]);
  });

  it('is kept to the minute', () => {
    expect(found([child(1, { longestMinutes: 390 })], [place('06:00')]).ok).toBe(true);
    expect(found([child(1, { longestMinutes: 389 })], [place('06:00')]).ok).toBe(false);
  });

  it('goes by the limits of the day', () => {
    const growing = child(1, {
      laterLimits: [
        { from: '2026-12-08', leastMinutes: 300, longestMinutes: 500 },
        { from: '2026-12-10', leastMinutes: 360, longestMinutes: 600 },
      ],
    });
    expect(limitsOn(growing, '2026-12-07').longestMinutes).toBe(780);
    expect(limitsOn(growing, '2026-12-08').longestMinutes).toBe(500);
    expect(limitsOn(growing, on).longestMinutes).toBe(500);
    expect(limitsOn(growing, '2026-12-10').longestMinutes).toBe(600);
  });

  it('is told at the earliest free place, and as none where no place is free', () => {
    const hungry = child(1, { longestMinutes: 100 });
    const isTaken = ({ arrivalTime }: Place): boolean => arrivalTime === '06:00';
    const places = [place('06:00'), place('07:00')];
    const supper = { ...hungry, usualLastMealTime: '20:00' };
    expect(found([supper], places, { isTaken })).toMatchObject({ fasts: [{ minutes: 690 }] });
    expect(found([hungry], places, { isTaken: () => true })).toEqual({
      ok: false,
      because: 'fast-too-long',
      fasts: [{ childId: 1, minutes: 0, longestMinutes: 100 }],
    });
  });
});
