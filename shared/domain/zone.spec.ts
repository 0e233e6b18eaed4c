import {
  addDays,
  compareDays,
  ageOn,
  clockChangeBetween,
  dayOf,
  daysBetween,
  instantOf,
  isDay,
  localTimeOf,
  minutesOfTime,
  localPartsOf,
  readings,
  timeOfMinutes,
  validateDay,
  validateTime,
  validateZone,
  InvalidDay,
  InvalidTime,
  InvalidZone,
  weekdayOf,
} from './zone';

const chicago = 'America/Chicago';
const at = (iso: string): number => Date.parse(iso);
const iso = (instant: number): string => new Date(instant).toISOString();

describe('a wall-clock time in a zone', () => {
  // Communication facts 8.6, T1 to T4; London and Kolkata by the IANA rules.
  it.each([
    ['T1, the day before', '2026-03-07', '06:30', chicago, '2026-03-07T12:30:00.000Z'],
    ['T1, the day of the change', '2026-03-08', '06:30', chicago, '2026-03-08T11:30:00.000Z'],
    ['T3, a time that never occurs', '2026-03-08', '02:30', chicago, '2026-03-08T08:30:00.000Z'],
    ['T4, a time that occurs twice', '2026-11-01', '01:30', chicago, '2026-11-01T07:30:00.000Z'],
    ['a leap day', '2028-02-29', '06:00', chicago, '2028-02-29T12:00:00.000Z'],
    ['half an hour off', '2027-04-13', '06:00', 'Asia/Kolkata', '2027-04-13T00:30:00.000Z'],
    ['across the date line', '2027-04-13', '06:00', 'Pacific/Apia', '2027-04-12T17:00:00.000Z'],
  ])('%s', (_, on, time, zone, expected) => {
    expect(iso(instantOf({ on, time, zone }))).toBe(expected);
  });

  it('reads an ordinary time once', () => {
    const once = readings({ on: '2026-11-01', time: '06:00', zone: chicago });
    expect(once.kind).toBe('once');
    expect(once.earlier).toBe(once.later);
  });

  it('reads 1:30 on the night in November in both ways', () => {
    expect(readings({ on: '2026-11-01', time: '01:30', zone: chicago })).toEqual({
      kind: 'twice',
      earlier: at('2026-11-01T06:30:00Z'),
      later: at('2026-11-01T07:30:00Z'),
    });
    const clock = { on: '2026-11-01', time: '01:30', zone: chicago };
    expect(iso(instantOf(clock, 'earlier'))).toBe('2026-11-01T06:30:00.000Z');
  });

  it('reads 2:30 on the night in March with the offsets before and after', () => {
    expect(readings({ on: '2026-03-08', time: '02:30', zone: chicago })).toEqual({
      kind: 'never',
      earlier: at('2026-03-08T07:30:00Z'),
      later: at('2026-03-08T08:30:00Z'),
    });
  });

  it.each(['02:00', '02:59'])('%s never occurs in March', (time) => {
    expect(readings({ on: '2026-03-08', time, zone: chicago }).kind).toBe('never');
  });

  it.each([
    ['00:59', 'once'],
    ['01:00', 'twice'],
    ['01:59', 'twice'],
    ['02:00', 'once'],
  ])('%s in November occurs %s', (time, kind) => {
    expect(readings({ on: '2026-11-01', time, zone: chicago }).kind).toBe(kind);
  });

  it('comes back to the same day and time', () => {
    const instant = instantOf({ on: '2026-12-09', time: '07:00', zone: chicago });
    expect(dayOf(instant, chicago)).toBe('2026-12-09');
    expect(localTimeOf(instant, chicago)).toBe('07:00');
    expect(
      localTimeOf(instantOf({ on: '2026-12-09', time: '00:00', zone: chicago }), chicago),
    ).toBe('00:00');
  });

  it('refuses a zone, a day and a time that do not exist', () => {
    expect(() => instantOf({ on: '2026-03-08', time: '06:00', zone: 'America/Nowhere' })).toThrow(
      'Not a time zone',
    );
    expect(() => instantOf({ on: '2027-02-29', time: '06:00', zone: chicago })).toThrow(
      'Not a calendar day',
    );
    expect(() => instantOf({ on: '2027-02-28', time: '24:00', zone: chicago })).toThrow(
      'Not a time of day',
    );
  });

  it('finds the change of the clock during a night', () => {
    const night = (on: string): [number, number] => [
      instantOf({ on: addDays(on, -1), time: '18:00', zone: chicago }),
      instantOf({ on, time: '09:00', zone: chicago }),
    ];
    expect(clockChangeBetween(...night('2026-03-08'), chicago)).toEqual({
      at: at('2026-03-08T08:00:00Z'),
      shiftMinutes: 60,
    });
    expect(clockChangeBetween(...night('2026-11-01'), chicago)).toEqual({
      at: at('2026-11-01T07:00:00Z'),
      shiftMinutes: -60,
    });
    expect(clockChangeBetween(...night('2026-12-09'), chicago)).toBeNull();
  });
});

describe('the parts of an instant', () => {
  it('are those of the wall clock', () => {
    expect(localPartsOf(at('2026-12-09T05:07:00Z'), chicago)).toEqual({
      on: '2026-12-08',
      time: '23:07',
      year: 2026,
      month: 12,
      day: 8,
      weekday: 2,
      hour: 23,
      minute: 7,
    });
  });

  it('are refused for what is no instant and no zone', () => {
    expect(() => localPartsOf(Number.NaN, chicago)).toThrow(RangeError);
    expect(() => localPartsOf(0, 'Nowhere')).toThrow(InvalidZone);
    expect(validateZone(chicago)).toBe(chicago);
    expect(() => validateZone('')).toThrow(InvalidZone);
  });

  it('a change of the clock is looked for forwards', () => {
    expect(clockChangeBetween(0, 0, chicago)).toBeNull();
    expect(() => clockChangeBetween(1, 0, chicago)).toThrow('The end comes before the beginning.');
  });
});

describe('calendar days', () => {
  it.each(['2027-12-31x', 'x2027-12-31', '12027-12-31', '2027-12-311'])('%j is not', (day) => {
    expect(isDay(day)).toBe(false);
    expect(() => validateDay(day)).toThrow(InvalidDay);
  });

  it.each(['x06:45', '06:45x', '24:00', '06:60'])('%j is no time', (time) => {
    expect(() => validateTime(time)).toThrow(InvalidTime);
  });

  it.each([-1, 1440, 1.5, Number.NaN])('%p is no minute of a day', (minutes) => {
    expect(() => timeOfMinutes(minutes)).toThrow(InvalidTime);
  });

  it('are minutes from 00:00 to 23:59', () => {
    expect(timeOfMinutes(0)).toBe('00:00');
    expect(timeOfMinutes(1439)).toBe('23:59');
    expect(isDay('2027-12-31')).toBe(true);
  });

  it('compare like numbers, the earlier first', () => {
    expect(['2027-01-01', '2026-12-31', '2026-02-28'].sort(compareDays)).toEqual([
      '2026-02-28',
      '2026-12-31',
      '2027-01-01',
    ]);
  });

  it.each(['2028-02-29', '2000-02-29', '2027-12-31'])('%s is a day', (day) => {
    expect(validateDay(day)).toBe(day);
  });

  it.each(['2027-02-29', '1900-02-29', '2027-04-31', '2027-13-01', '2027-1-1', 'tomorrow', ''])(
    '%p is not',
    (day) => {
      expect(isDay(day)).toBe(false);
      expect(() => validateDay(day)).toThrow('Not a calendar day');
    },
  );

  it('adds days by the calendar, over a change of the clock and a leap day', () => {
    expect(addDays('2026-03-07', 2)).toBe('2026-03-09');
    expect(addDays('2028-02-28', 1)).toBe('2028-02-29');
    expect(addDays('2027-01-01', -1)).toBe('2026-12-31');
    expect(daysBetween('2026-10-31', '2026-11-02')).toBe(2);
  });

  it('knows the weekday', () => {
    expect(weekdayOf('2026-12-07')).toBe(1);
    expect(weekdayOf('2026-12-13')).toBe(7);
  });

  it('counts minutes of the day there and back', () => {
    expect(minutesOfTime('06:45')).toBe(405);
    expect(timeOfMinutes(405)).toBe('06:45');
    expect(() => timeOfMinutes(1440)).toThrow('Not a time of day');
    expect(() => validateTime('6:45')).toThrow('Not a time of day');
  });
});

describe('age on a day', () => {
  it.each([
    ['2026-06-09', '2026-12-08', 0, 5],
    ['2026-06-09', '2026-12-09', 0, 6],
    ['2025-12-09', '2026-12-08', 0, 11],
    ['2025-12-09', '2026-12-09', 1, 12],
    // Born on a leap day: a year older on 1 March of a common year.
    ['2024-02-29', '2025-02-28', 0, 11],
    ['2024-02-29', '2025-03-01', 1, 12],
    ['2024-02-29', '2028-02-29', 4, 48],
    ['2026-08-31', '2026-11-30', 0, 2],
    ['2026-08-31', '2026-12-01', 0, 3],
    ['2026-12-09', '2026-12-09', 0, 0],
  ])('born %s, on %s', (bornOn, on, years, months) => {
    expect(ageOn(bornOn, on)).toEqual({ years, months });
  });

  it('refuses a day before birth', () => {
    expect(() => ageOn('2026-12-10', '2026-12-09')).toThrow('Not a calendar day');
  });
});
