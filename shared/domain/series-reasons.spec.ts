import { morningOn, type SeriesRequest } from './series-dates';
import { instantOf, type Weekday } from './zone';

const zone = 'America/Chicago';
const monday = '2026-12-07';
const saturday = '2026-12-12';
const week: readonly Weekday[] = [1, 2, 3, 4, 5, 6, 7];
const base: SeriesRequest = {
  zone,
  from: monday,
  weeks: 1,
  count: 1,
  clinicDays: week.map((weekday) => ({ weekday, from: '06:00', until: '09:00' })),
  closures: [],
  laboratory: { receivingWeekdays: week, cutOffTimes: {} },
  places: ['06:00', '06:30', '07:30', '08:00', '09:00'].map((arrivalTime) => ({
    arrivalTime,
    roomId: 1,
  })),
  booked: [],
  children: [{ id: 1, bornOn: '2024-02-02', leastMinutes: 360, longestMinutes: 780 }],
  usualWaitMinutes: 30,
  leadDays: 0,
  now: instantOf({ on: monday, time: '10:00', zone }),
};
const refusedOn = (on: string, more: Partial<SeriesRequest>) => {
  const { placesLeft, refused, morning } = morningOn({ ...base, ...more }, on);
  return { placesLeft, refused, comes: morning !== null };
};
const because = (code: string, params = {}, placesLeft = 0) => ({
  placesLeft,
  refused: [{ code, params }],
  comes: false,
});
const workdays = week.slice(0, 5);
const reason = 'Ventilation';

describe('a day that is refused for one reason says this one alone, and counts no places', () => {
  it.each<[string, string, Partial<SeriesRequest>, ReturnType<typeof because>]>([
    [
      'no day of the clinic',
      saturday,
      { clinicDays: base.clinicDays.slice(0, 5) },
      because('not-a-clinic-day', { weekday: 6 }),
    ],
    [
      'no day of the laboratory',
      saturday,
      { laboratory: { ...base.laboratory, receivingWeekdays: workdays } },
      because('laboratory-does-not-receive', { weekday: 6 }),
    ],
    ['closed', saturday, { closures: [{ on: saturday, reason }] }, because('closed', { reason })],
    [
      'a holiday',
      saturday,
      { closures: [{ on: saturday, reason: 'Feast', kind: 'holiday' }] },
      because('public-holiday', { reason: 'Feast' }),
    ],
    [
      'the laboratory closed',
      saturday,
      { laboratory: { ...base.laboratory, closures: [{ on: saturday, reason }] } },
      because('laboratory-closed', { reason }),
    ],
    ['held by the child itself', saturday, { heldDays: [saturday] }, because('held-already')],
    ['over', '2026-12-06', {}, because('past')],
    [
      'every place too late for the laboratory',
      saturday,
      { laboratory: { ...base.laboratory, cutOffTimes: { 6: '06:29' } } },
      because('laboratory-cut-off', { cutOff: '06:29' }),
    ],
    [
      'no place within the hours of the day',
      saturday,
      { clinicDays: [{ weekday: 6, from: '06:01', until: '06:29' }] },
      because('no-places-left', { needed: 1, left: 0 }),
    ],
  ])('%s', (_, on, more, expected) => {
    expect(refusedOn(on, more)).toEqual(expected);
  });

  it('too soon, though places are left', () => {
    expect(refusedOn(monday, { leadDays: 1 })).toEqual(because('too-soon', { leadDays: 1 }, 5));
    expect(refusedOn(monday, {})).toEqual({ placesLeft: 5, refused: [], comes: true });
  });
});

describe('the places of a day', () => {
  it('are those within the hours of its own weekday', () => {
    const clinicDays: SeriesRequest['clinicDays'] = [
      { weekday: 1, from: '06:00', until: '07:00' },
      { weekday: 2, from: '08:00', until: '09:00' },
      { weekday: 3, from: '06:30', until: '08:00' },
    ];
    const placesLeft = ['2026-12-07', '2026-12-08', '2026-12-09'].map(
      (on) => refusedOn(on, { clinicDays }).placesLeft,
    );
    expect(placesLeft).toEqual([2, 2, 3]);
  });

  it('reach the laboratory to the minute', () => {
    const reaching = (cutOff: string) =>
      refusedOn(monday, {
        laboratory: { ...base.laboratory, cutOffTimes: { 1: cutOff }, minutesToLaboratory: 15 },
      }).placesLeft;
    // 6:00, half an hour of waiting and a quarter on the way.
    expect(reaching('06:45')).toBe(1);
    expect(reaching('06:44')).toBe(0);
    expect(reaching('07:15')).toBe(2);
  });
});
