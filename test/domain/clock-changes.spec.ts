import { fastingPlan } from '../../shared/domain/fasting-plan';
import { startingProtocol } from '../../shared/domain/fasting-protocol';
import {
  clockChangeBetween,
  instantOf,
  localPartsOf,
  timeOfMinutes,
  type ClockChange,
} from '../../shared/domain/zone';
import { differences, readingsDiffer, transitionsOf } from './support/second-clock';
import { clinicZones, zonesBrazil } from './support/zones';

const minute = 60_000;
const week = 7 * 24 * 60 * minute;
const from2020 = Date.UTC(2020, 0);
const until2036 = Date.UTC(2036, 0);

/** The changes that the domain finds, week by week. */
function changesOf(zone: string): ClockChange[] {
  const found: ClockChange[] = [];
  for (let from = from2020; from < until2036; from += week) {
    const change = clockChangeBetween(from, Math.min(from + week, until2036), zone);
    if (change) found.push(change);
  }
  return found;
}

const found = new Map(clinicZones.map((zone) => [zone, changesOf(zone)]));
const years = Array.from({ length: 16 }, (_, index) => 2020 + index);

/** The n-th Sunday of a month, or the last one for -1. */
function sunday(year: number, month: number, nth: 1 | 2 | -1): string {
  const days = Array.from({ length: new Date(Date.UTC(year, month, 0)).getUTCDate() }, (_, index) =>
    Date.UTC(year, month - 1, index + 1),
  ).filter((day) => new Date(day).getUTCDay() === 0);
  return new Date(days.at(nth > 0 ? nth - 1 : nth) ?? 0).toISOString().slice(0, 10);
}

describe('every night on which a clock changes at a clinic, 2020 to 2035', () => {
  const nights = [...found].flatMap(([zone, changes]) => changes.map(({ at }) => ({ zone, at })));

  it('is found, to the minute, as by the second implementation', () => {
    for (const [zone, changes] of found)
      expect([zone, changes]).toEqual([zone, transitionsOf(zone, 2020, 2035)]);
    expect(nights.length).toBeGreaterThan(500);
  });

  it('reads six times around the change as the second implementation does', () => {
    const times = 6;
    const differing = differences(nights.length * times, (index) => {
      const night = nights[Math.floor(index / times)];
      if (!night) throw new RangeError('There are more questions than nights.');
      const { on, hour } = localPartsOf(night.at - minute, night.zone);
      const clock = (Math.max(hour - 1, 0) * 60 + 15 + (index % times) * 30) % 1440;
      return readingsDiffer(on, timeOfMinutes(clock), night.zone).sides;
    });
    expect(differing).toEqual([]);
  });

  it('has stops that are elapsed hours before the arrival', () => {
    for (const { zone, at } of nights) {
      const { on } = localPartsOf(at, zone);
      const arrivalAt = instantOf({ on, time: '07:00', zone });
      const plan = fastingPlan({
        arrivalAt,
        zone,
        bornOn: '2018-05-05',
        feeding: 'family-food',
        protocol: { ...startingProtocol, bands: startingProtocol.bands.slice(-4) },
        cautions: [],
        travelMinutes: 30,
        readyMinutes: 30,
      });
      if (plan.kind !== 'standard') throw new Error(plan.reason);
      expect(arrivalAt - plan.stopAt).toBe(plan.leastMinutes * minute);
    }
  });
});

/**
 * The rules as the laws put them. Recalled from memory, not read again for this table:
 * 15 U.S.C. 260a as changed by the Energy Policy Act of 2005 (United States; Ontario and Nova
 * Scotia keep the same nights); Summer Time Act 1972 with the Summer Time Order 2002 (United
 * Kingdom, 1:00 of universal time); Standard Time Act 1987 of New South Wales and its like in
 * Victoria, Tasmania and South Australia (2:00 of standard time).
 */
describe('the nights are those of the law', () => {
  const wallClockBefore = (zone: string, { at }: ClockChange): string => {
    const { on, time } = localPartsOf(at - minute, zone);
    return `${on} ${time}`;
  };
  const northAmerica = years.flatMap((year) => [
    `${sunday(year, 3, 2)} 01:59`,
    `${sunday(year, 11, 1)} 01:59`,
  ]);
  const southEast = years.flatMap((year) => [
    `${sunday(year, 4, 1)} 02:59`,
    `${sunday(year, 10, 1)} 01:59`,
  ]);

  it.each([
    ...[
      'America/New_York',
      'America/Detroit',
      'America/Indiana/Indianapolis',
      'America/Chicago',
      'America/Denver',
      'America/Boise',
      'America/Los_Angeles',
      'America/Anchorage',
      'America/Adak',
      'America/Toronto',
      'America/Halifax',
      'America/St_Johns',
    ].map((zone) => [zone, northAmerica] as const),
    [
      'Europe/London',
      years.flatMap((year) => [`${sunday(year, 3, -1)} 00:59`, `${sunday(year, 10, -1)} 01:59`]),
    ] as const,
    ...['Australia/Sydney', 'Australia/Melbourne', 'Australia/Hobart', 'Australia/Adelaide'].map(
      (zone) => [zone, southEast] as const,
    ),
    [
      'Australia/Lord_Howe',
      years.flatMap((year) => [`${sunday(year, 4, 1)} 01:59`, `${sunday(year, 10, 1)} 01:59`]),
    ] as const,
  ])('%s', (zone, expected) => {
    const changes = found.get(zone) ?? [];
    expect(changes.map((change) => wallClockBefore(zone, change))).toEqual(expected);
    const hour = zone === 'Australia/Lord_Howe' ? 30 : 60;
    expect([...new Set(changes.map(({ shiftMinutes }) => Math.abs(shiftMinutes)))]).toEqual([hour]);
  });

  // Brazil ended summer time by Decree 9,772 of 2019 (from memory); the others keep one clock.
  it.each([
    ...zonesBrazil,
    'Africa/Johannesburg',
    'Asia/Kolkata',
    'America/Phoenix',
    'Pacific/Honolulu',
    'America/Puerto_Rico',
    'America/Regina',
    'Australia/Brisbane',
    'Australia/Darwin',
    'Australia/Perth',
    'Australia/Eucla',
  ])('%s never changes its clock', (zone) => {
    expect(changesOf(zone)).toEqual([]);
  });
});

/**
 * Dates as governments announced them, from memory: gov.uk "When do the clocks change?"; NSW
 * Government "Daylight saving"; the U.S. Naval Observatory's table; Egypt's Law 24 of 2023; the
 * decrees of Chile (2022: a week later because of the plebiscite); Morocco's clock at +1 except in
 * Ramadan; New Zealand's Time Act with the Chatham Islands 45 minutes ahead; Samoa's end of summer
 * time in 2021; Newfoundland's return to 2:00 in 2011.
 */
describe('published changes of single nights', () => {
  it.each([
    // Zone, the instant, minutes, the wall clock that then shows.
    ['America/Chicago', '2026-03-08T08:00Z', 60, '2026-03-08 03:00'],
    ['America/Chicago', '2026-11-01T07:00Z', -60, '2026-11-01 01:00'],
    ['America/New_York', '2025-03-09T07:00Z', 60, '2025-03-09 03:00'],
    ['America/New_York', '2024-11-03T06:00Z', -60, '2024-11-03 01:00'],
    ['America/St_Johns', '2026-03-08T05:30Z', 60, '2026-03-08 03:00'],
    ['America/St_Johns', '2025-11-02T04:30Z', -60, '2025-11-02 01:00'],
    ['Europe/London', '2025-03-30T01:00Z', 60, '2025-03-30 02:00'],
    ['Europe/London', '2026-10-25T01:00Z', -60, '2026-10-25 01:00'],
    ['Australia/Sydney', '2026-04-04T16:00Z', -60, '2026-04-05 02:00'],
    ['Australia/Sydney', '2025-10-04T16:00Z', 60, '2025-10-05 03:00'],
    ['Australia/Adelaide', '2025-10-04T16:30Z', 60, '2025-10-05 03:00'],
    ['Australia/Lord_Howe', '2026-04-04T15:00Z', -30, '2026-04-05 01:30'],
    ['Australia/Lord_Howe', '2025-10-04T15:30Z', 30, '2025-10-05 02:30'],
    ['Pacific/Chatham', '2026-04-04T14:00Z', -60, '2026-04-05 02:45'],
    ['Pacific/Chatham', '2025-09-27T14:00Z', 60, '2025-09-28 03:45'],
    ['Africa/Cairo', '2023-04-27T22:00Z', 60, '2023-04-28 01:00'],
    ['Africa/Cairo', '2023-10-26T21:00Z', -60, '2023-10-26 23:00'],
    ['Africa/Casablanca', '2024-03-10T02:00Z', -60, '2024-03-10 02:00'],
    ['Africa/Casablanca', '2024-04-14T02:00Z', 60, '2024-04-14 03:00'],
    ['America/Santiago', '2022-09-11T04:00Z', 60, '2022-09-11 01:00'],
    ['America/Santiago', '2025-04-06T03:00Z', -60, '2025-04-05 23:00'],
    ['Pacific/Apia', '2021-04-03T14:00Z', -60, '2021-04-04 03:00'],
  ])('%s at %s', (zone, iso, shiftMinutes, shows) => {
    const at = Date.parse(iso);
    expect(clockChangeBetween(at - week, at + week, zone)).toEqual({ at, shiftMinutes });
    const { on, time } = localPartsOf(at, zone);
    expect(`${on} ${time}`).toBe(shows);
  });

  it.each([
    // Five hours and three quarters since 1986; no summer time since.
    ['Asia/Kathmandu', '2030-07-01', '06:00', '2030-07-01T00:15:00.000Z'],
    ['Asia/Kathmandu', '2030-01-01', '06:00', '2030-01-01T00:15:00.000Z'],
    // Thirteen hours the whole year since 2021.
    ['Pacific/Apia', '2030-01-01', '06:00', '2029-12-31T17:00:00.000Z'],
    ['Pacific/Apia', '2030-07-01', '06:00', '2030-06-30T17:00:00.000Z'],
    ['Pacific/Chatham', '2030-07-01', '06:00', '2030-06-30T17:15:00.000Z'],
  ])('%s on %s at %s', (zone, on, time, expected) => {
    expect(new Date(instantOf({ on, time, zone })).toISOString()).toBe(expected);
  });
});
