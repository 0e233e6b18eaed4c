import { placesOfMorning } from './places-of-morning';
import { proposeRuns, type SeriesChild, type SeriesRequest } from './series-dates';
import { instantOf, type Weekday } from './zone';

const zone = 'America/Chicago';
const weekdays: readonly Weekday[] = [1, 2, 3, 4, 5];
const toddler: SeriesChild = {
  id: 11,
  bornOn: '2024-02-02',
  leastMinutes: 360,
  longestMinutes: 780,
};
const infant: SeriesChild = {
  id: 12,
  bornOn: '2026-03-03',
  leastMinutes: 240,
  longestMinutes: 480,
};
/** Monday 7 December 2026 is a fortnight after `now`. */
const base: SeriesRequest = {
  zone,
  from: '2026-12-07',
  weeks: 1,
  count: 3,
  clinicDays: ([1, 2, 3, 4, 5, 6, 7] as const).map((weekday) => ({
    weekday,
    from: '06:00',
    until: '09:00',
  })),
  closures: [],
  laboratory: { receivingWeekdays: weekdays, cutOffTimes: {} },
  places: placesOfMorning({
    rooms: [
      { id: 1, closureMinutes: 60 },
      { id: 2, closureMinutes: 60 },
    ],
    staffPairs: 1,
    arrivalsFrom: '06:00',
    arrivalsUntil: '09:00',
    minutesPerChild: 30,
    limit: 5,
  }),
  booked: [],
  children: [toddler],
  usualWaitMinutes: 30,
  leadDays: 2,
  now: instantOf({ on: '2026-11-23', time: '10:00', zone }),
};

const starts = (request: SeriesRequest): string[] =>
  proposeRuns(request).runs.map(({ days }) => days[0]?.on ?? '');
const refusals = (request: SeriesRequest): Record<string, string[]> =>
  Object.fromEntries(
    proposeRuns(request).days.map(({ on, refused }) => [on, refused.map(({ code }) => code)]),
  );

describe('runs of consecutive mornings', () => {
  // Clinical facts 7, row 56, and 3.5.
  it('with a Monday to Friday laboratory start on Monday, Tuesday or Wednesday only', () => {
    expect(starts(base)).toEqual(['2026-12-07', '2026-12-08', '2026-12-09']);
    expect(starts({ ...base, weeks: 52 }).length).toBe(156);
  });

  it('are given with their days, places and the days until they start', () => {
    const [first] = proposeRuns(base).runs;
    expect(first?.startsInDays).toBe(14);
    expect(first?.days).toEqual(
      ['2026-12-07', '2026-12-08', '2026-12-09'].map((on) => ({
        on,
        neighbouring: true,
        places: [{ childId: 11, arrivalTime: '06:00', roomId: 1 }],
      })),
    );
  });

  it('say for each other day why', () => {
    expect(refusals(base)).toEqual({
      '2026-12-07': [],
      '2026-12-08': [],
      '2026-12-09': [],
      '2026-12-10': ['run-would-break'],
      '2026-12-11': ['run-would-break'],
      '2026-12-12': ['laboratory-does-not-receive'],
      '2026-12-13': ['laboratory-does-not-receive'],
    });
    const thursday = proposeRuns(base).days[3];
    expect(thursday).toMatchObject({ isPossible: true, canStart: false, placesLeft: 5 });
    expect(thursday?.refused[0]?.params).toEqual({
      on: '2026-12-12',
      because: 'laboratory-does-not-receive',
    });
  });

  it.each([
    [1, 5],
    [2, 4],
    [4, 2],
    [5, 1],
  ])('of %i mornings start on %i days of a week', (count, days) => {
    expect(starts({ ...base, count })).toHaveLength(days);
  });

  it('keep clear of a holiday of the clinic or the laboratory', () => {
    const closures = [{ on: '2026-12-09', reason: 'Staff day' }];
    expect(starts({ ...base, closures })).toEqual([]);
    expect(refusals({ ...base, closures })['2026-12-09']).toEqual(['closed']);
    const laboratory = { ...base.laboratory, closures };
    expect(refusals({ ...base, laboratory })['2026-12-09']).toEqual(['laboratory-closed']);
  });

  it('name every reason of a day', () => {
    const asked: SeriesRequest = {
      ...base,
      clinicDays: base.clinicDays.slice(0, 5),
      closures: [{ on: '2026-12-12', reason: 'Boiler' }],
    };
    expect(refusals(asked)['2026-12-12']).toEqual([
      'not-a-clinic-day',
      'closed',
      'laboratory-does-not-receive',
    ]);
  });

  it('keep the lead time and never lie in the past', () => {
    const now = instantOf({ on: '2026-12-08', time: '23:30', zone });
    expect(refusals({ ...base, now })).toMatchObject({
      '2026-12-07': ['past'],
      '2026-12-08': ['too-soon'],
      '2026-12-09': ['too-soon'],
      '2026-12-10': ['run-would-break'],
    });
    // 23:30 in Chicago is the next day in UTC; the clinic's day counts.
    expect(starts({ ...base, now, leadDays: 1 })).toEqual(['2026-12-09']);
  });

  it('reach the laboratory before its last receipt', () => {
    const cutOffTimes = { 1: '08:00', 2: '08:00', 3: '08:00', 4: '06:45', 5: '08:00' };
    const laboratory = { ...base.laboratory, cutOffTimes, minutesToLaboratory: 20 };
    const { days } = proposeRuns({ ...base, laboratory });
    // 6:00, 6:30: received by 6:50 and 7:20; 7:30 would be received at 8:20.
    expect(days[0]?.placesLeft).toBe(2);
    expect(days[3]?.refused.map(({ code }) => code)).toEqual(['laboratory-cut-off']);
  });

  it('use only places within the arrivals of the weekday', () => {
    const clinicDays = base.clinicDays.map((day) => ({ ...day, until: '07:00' }));
    expect(proposeRuns({ ...base, clinicDays }).days[0]?.placesLeft).toBe(2);
  });

  it('refuse a full morning with its numbers', () => {
    const booked = base.places.map(({ arrivalTime }) => ({ on: '2026-12-08', arrivalTime }));
    const day = proposeRuns({ ...base, booked }).days[1];
    expect(day?.refused).toEqual([{ code: 'no-places-left', params: { needed: 1, left: 0 } }]);
    expect(starts({ ...base, booked })).toEqual(['2026-12-09']);
  });

  it('refuse mornings that pass the longest fast, usual wait included', () => {
    // Supper at 18:00: 13 hours are over at 7:00, so that only 6:00 and 6:30 keep them.
    const child = { ...toddler, usualLastMealTime: '18:00' };
    const late = base.places.filter(({ arrivalTime }) => arrivalTime > '06:30');
    expect(starts({ ...base, children: [child] })).toHaveLength(3);
    expect(refusals({ ...base, children: [child], places: late })['2026-12-07']).toEqual([
      'fast-too-long',
    ]);
    // A night feed at 2:00 keeps it; one after the stop falls away and the stop counts.
    for (const usualLastMealTime of ['02:00', '05:00', '20:30']) {
      const fed = { ...toddler, usualLastMealTime };
      expect(starts({ ...base, children: [fed], places: late })).toHaveLength(3);
    }
    const waits = { ...base, usualWaitMinutes: 421 };
    expect(refusals(waits)['2026-12-07']).toEqual(['fast-too-long']);
  });

  it('count elapsed hours on the night a clock changes', () => {
    // The night in November 2026 has an hour more: supper at 18:00 is 13.5 h before 6:30.
    const child = { ...toddler, usualLastMealTime: '18:00' };
    const asked: SeriesRequest = {
      ...base,
      from: '2026-10-31',
      count: 1,
      now: instantOf({ on: '2026-10-01', time: '10:00', zone }),
      laboratory: { receivingWeekdays: [6, 7], cutOffTimes: {} },
      children: [child],
      places: [{ arrivalTime: '06:30', roomId: 1 }],
    };
    expect(refusals(asked)).toMatchObject({
      '2026-10-31': [],
      '2026-11-01': ['fast-too-long'],
    });
  });
});

describe('brothers and sisters', () => {
  const placesOn = (request: SeriesRequest): string[] =>
    (proposeRuns(request).runs[0]?.days[0]?.places ?? []).map(
      ({ childId, arrivalTime }) => `${childId} ${arrivalTime}`,
    );
  const both = { ...base, children: [toddler, infant] };

  it('come one after the other, the youngest first', () => {
    expect(placesOn(both)).toEqual(['12 06:00', '11 06:30']);
  });

  it('stay neighbours around a booked place', () => {
    const booked = ['2026-12-07', '2026-12-08', '2026-12-09'].map((on) => ({
      on,
      arrivalTime: '06:30',
    }));
    expect(placesOn({ ...both, booked })).toEqual(['12 07:30', '11 08:00']);
  });

  describe('with no neighbouring places left', () => {
    const booked = ['06:30', '08:00'].map((arrivalTime) => ({ on: '2026-12-07', arrivalTime }));

    it('do not come, and the places that are left are named', () => {
      expect(proposeRuns({ ...both, booked }).days[0]?.refused).toEqual([
        { code: 'siblings-apart', params: { left: 3 } },
      ]);
    });

    it('are parted only when they may be, and it is said', () => {
      const asked = { ...both, booked, siblingsMayPart: true };
      const [run] = proposeRuns(asked).runs;
      expect(run?.days.map(({ neighbouring }) => neighbouring)).toEqual([false, true, true]);
      expect(placesOn(asked)).toEqual(['12 06:00', '11 07:30']);
    });
  });

  it('need as many places as they are', () => {
    const booked = ['06:00', '06:30', '07:30', '08:00'].map((arrivalTime) => ({
      on: '2026-12-07',
      arrivalTime,
    }));
    expect(proposeRuns({ ...both, booked }).days[0]?.refused).toEqual([
      { code: 'no-places-left', params: { needed: 2, left: 1 } },
    ]);
  });
});

describe('every reason of a day', () => {
  it('lead times of family, ride and report, each with its days, and the full morning beside them', () => {
    const booked = base.places.map(({ arrivalTime }) => ({ on: '2026-12-08', arrivalTime }));
    const now = instantOf({ on: '2026-12-07', time: '10:00', zone });
    const asked = { ...base, now, booked, rideLeadDays: 3, reportingLeadDays: 4 };
    expect(proposeRuns(asked).days[1]?.refused).toEqual([
      { code: 'too-soon', params: { leadDays: 2 } },
      { code: 'ride-lead-time', params: { leadDays: 3 } },
      { code: 'reporting-lead-time', params: { leadDays: 4 } },
      { code: 'no-places-left', params: { needed: 1, left: 0 } },
    ]);
    expect(proposeRuns(asked).days[3]?.refused.map(({ code }) => code)).toEqual([
      'reporting-lead-time',
    ]);
  });

  it('a public holiday by its own name', () => {
    const closures = [{ on: '2026-12-25', reason: 'Christmas Day', kind: 'holiday' as const }];
    expect(proposeRuns({ ...base, from: '2026-12-21', closures }).days[4]?.refused).toEqual([
      { code: 'public-holiday', params: { reason: 'Christmas Day' } },
    ]);
  });

  it('each child whose fast would be too long, with its minutes', () => {
    const places = [
      { arrivalTime: '08:00', roomId: 1 },
      { arrivalTime: '08:30', roomId: 2 },
    ];
    const children = [
      { ...toddler, usualLastMealTime: '18:00' },
      { ...infant, usualLastMealTime: '22:30' },
    ];
    // 18:00 to 8:00 and 22:30 to 8:00, each with half an hour of waiting.
    expect(proposeRuns({ ...base, places, children }).days[0]?.refused).toEqual([
      { code: 'fast-too-long', params: { childId: 12, minutes: 600, longestMinutes: 480 } },
      { code: 'fast-too-long', params: { childId: 11, minutes: 870, longestMinutes: 780 } },
    ]);
  });

  it('places that are left only after the last receipt of the laboratory', () => {
    const laboratory = { ...base.laboratory, cutOffTimes: { 1: '07:30' } };
    const booked = ['06:00', '06:30'].map((arrivalTime) => ({ on: '2026-12-07', arrivalTime }));
    expect(proposeRuns({ ...base, laboratory, booked }).days[0]?.refused).toEqual([
      { code: 'no-places-left', params: { needed: 1, left: 0 } },
      { code: 'laboratory-cut-off', params: { cutOff: '07:30' } },
    ]);
  });
});

describe('turnover', () => {
  const turnover = {
    rooms: [
      { id: 1, closureMinutes: 60 },
      { id: 2, closureMinutes: 60 },
    ],
    staffPairs: 1,
    minutesPerChild: 30,
    limit: 5,
  };
  const left = (arrivalTime: string, roomId: number, more = {}): number =>
    proposeRuns({
      ...base,
      turnover: { ...turnover, ...more },
      booked: [{ on: '2026-12-07', arrivalTime, roomId }],
    }).days[0]?.placesLeft ?? -1;

  it('of a booking beside the places of today keeps its room and its pair', () => {
    // At 6:15 in room 1: its room is closed until 7:45, and the only pair is busy until 6:45.
    expect(left('06:15', 1)).toBe(2);
    // A second pair frees 6:30 in room 2, which nobody uses.
    expect(left('06:15', 1, { staffPairs: 2 })).toBe(3);
    // Clean sooner, room 1 is free again at 7:30.
    expect(left('06:15', 1, { rooms: [{ id: 1, closureMinutes: 23 }] })).toBe(3);
  });

  it('is said as a reason where it leaves too few', () => {
    const places = base.places.slice(0, 2);
    const booked = [{ on: '2026-12-07', arrivalTime: '06:15', roomId: 2 }];
    expect(proposeRuns({ ...base, places, booked, turnover }).days[0]?.refused).toEqual([
      { code: 'no-places-left', params: { needed: 1, left: 0 } },
      { code: 'turnover', params: { places: 2 } },
    ]);
  });

  it('never lets more children come than the clinic takes in a morning', () => {
    expect(left('05:00', 1, { limit: 3 })).toBe(2);
    expect(left('05:00', 1, { limit: 1 })).toBe(0);
  });
});

describe('a child that grows older meanwhile', () => {
  it('has the hours of its age on each day', () => {
    const from = '2026-12-09';
    const child = { ...infant, longestMinutes: 240, laterLimits: [{ ...infant, from }] };
    expect(refusals({ ...base, count: 1, children: [child] })).toMatchObject({
      '2026-12-08': ['fast-too-long'],
      '2026-12-09': [],
    });
  });

  it('counts from a clock time where the protocol has one and it lies before the hours', () => {
    // Nothing from 21:00 until 6:30 is 9.5 hours, from 1:00 the six hours of the protocol count.
    const until = (nothingFrom: string) => ({ ...toddler, longestMinutes: 540, nothingFrom });
    expect(starts({ ...base, children: [until('21:00')] })).toEqual([]);
    expect(starts({ ...base, children: [until('01:00')] })).toHaveLength(3);
  });

  it('keeps its longest fast by the last of its night feeds', () => {
    const child = { ...infant, usualLastMealTime: '19:00' };
    expect(starts({ ...base, children: [child] })).toEqual([]);
    // The feed at 5:00 falls away: the one at the stop stands for it.
    for (const nightFeedTimes of [['23:30'], ['22:00', '01:30'], ['05:00', '22:00']])
      expect(starts({ ...base, children: [{ ...child, nightFeedTimes }] })).toHaveLength(3);
  });
});

describe('any search', () => {
  it('gives each refused day a reason and each run consecutive mornings', () => {
    for (const count of [1, 2, 3, 4, 5]) {
      const proposal = proposeRuns({
        ...base,
        count,
        weeks: 8,
        children: [toddler, infant],
        closures: [{ on: '2026-12-25', reason: 'Holiday' }],
        booked: ['06:00', '07:30', '09:00'].map((arrivalTime) => ({
          on: '2026-12-16',
          arrivalTime,
        })),
      });
      expect(proposal.days).toHaveLength(56);
      for (const day of proposal.days) {
        expect(day.refused.length > 0).toBe(!day.canStart);
        expect(day.canStart && !day.isPossible).toBe(false);
      }
      for (const { days } of proposal.runs) {
        expect(days).toHaveLength(count);
        days.slice(1).forEach((day, index) => {
          const before = Date.parse(days[index]?.on ?? '');
          expect(Date.parse(day.on) - before).toBe(86_400_000);
        });
      }
    }
  });

  it.each([0, 6, 2.5])('refuses %p mornings', (count) => {
    expect(() => proposeRuns({ ...base, count })).toThrow('1 to 5');
  });

  it('refuses a start day that does not exist, no weeks and no children', () => {
    expect(() => proposeRuns({ ...base, from: '2027-02-29' })).toThrow('Not a calendar day');
    expect(() => proposeRuns({ ...base, weeks: 0 })).toThrow('at least a week');
    expect(() => proposeRuns({ ...base, children: [] })).toThrow('at least one child');
  });
});
