import { placesOfMorning } from './places-of-morning';
import { proposeRuns, type BookedPlace, type SeriesRequest } from './series-dates';
import type * as zoneEdge from './zone';
import { addDays, instantOf, type Weekday } from './zone';

jest.mock('./zone', () => {
  const real = jest.requireActual<typeof zoneEdge>('./zone');
  return { ...real, instantOf: jest.fn(real.instantOf) };
});

/** What a search costs is counted, not timed: conversions of a clock time, and looks at what is booked. */
const zone = 'America/Chicago';
const places = placesOfMorning({
  rooms: [
    { id: 1, closureMinutes: 60 },
    { id: 2, closureMinutes: 60 },
  ],
  staffPairs: 1,
  arrivalsFrom: '06:00',
  arrivalsUntil: '09:00',
  minutesPerChild: 30,
  limit: 5,
});
const bookings = (count: number, looks: { n: number }): BookedPlace[] =>
  Array.from({ length: count }, (_, index) => ({
    get on() {
      looks.n += 1;
      return addDays('2026-11-23', index % 400);
    },
    arrivalTime: places[index % 5]?.arrivalTime ?? '06:00',
    roomId: places[index % 5]?.roomId ?? 1,
  }));
const child = {
  leastMinutes: 360,
  longestMinutes: 780,
  usualLastMealTime: '19:30',
  nightFeedTimes: ['23:30', '03:00'],
};
const asked: SeriesRequest = {
  zone,
  from: '2026-11-24',
  weeks: 12,
  count: 3,
  clinicDays: ([1, 2, 3, 4, 5] as Weekday[]).map((weekday) => ({
    weekday,
    from: '06:00',
    until: '09:00',
  })),
  closures: [],
  laboratory: { receivingWeekdays: [1, 2, 3, 4, 5], cutOffTimes: {} },
  places,
  booked: [],
  children: [
    { ...child, id: 1, bornOn: '2024-02-02' },
    { ...child, id: 2, bornOn: '2026-03-03', leastMinutes: 240, longestMinutes: 480 },
    { ...child, id: 3, bornOn: '2021-05-05' },
  ],
  usualWaitMinutes: 30,
  leadDays: 2,
  now: Date.parse('2026-11-23T16:00:00Z'),
};

describe('a proposal over 12 weeks for three siblings', () => {
  it('in a clinic with 2,000 booked mornings stays far below 2,000 conversions of a clock time', () => {
    const looks = { n: 0 };
    jest.mocked(instantOf).mockClear();
    const { days, runs } = proposeRuns({ ...asked, booked: bookings(2000, looks) });
    expect(days).toHaveLength(84);
    expect(runs.length).toBeGreaterThan(0);
    expect(jest.mocked(instantOf).mock.calls.length).toBeGreaterThan(0);
    expect(jest.mocked(instantOf).mock.calls.length).toBeLessThan(1500);
  });

  it('looks at each booking at most twice, however many days there are', () => {
    for (const weeks of [1, 12]) {
      const looks = { n: 0 };
      proposeRuns({ ...asked, weeks, booked: bookings(2000, looks) });
      expect(looks.n).toBeGreaterThanOrEqual(2000);
      expect(looks.n).toBeLessThanOrEqual(4000);
    }
  });
});
