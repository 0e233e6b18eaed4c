import { fastingPlan, type FastingPlanRequest, type StandardPlan } from './fasting-plan';
import { startingProtocol, type FastingBand } from './fasting-protocol';
import { lastBefore, stopGroups, stopsOf } from './fasting-stops';
import { dayOf, instantOf, localTimeOf } from './zone';

const zone = 'America/Chicago';
const local = (instant: number): string => `${dayOf(instant, zone)} ${localTimeOf(instant, zone)}`;

const hours = (more: Partial<NonNullable<FastingBand['leastHours']>> = {}) => ({
  ...startingProtocol.bands[1]!.leastHours!,
  ...more,
});
const planOf = (
  on: string,
  time: string,
  band: Partial<FastingBand>,
  more: Partial<FastingPlanRequest> = {},
): StandardPlan => {
  const bands = [
    { ...startingProtocol.bands[1]!, fromMonths: 0, toMonths: null, longestHours: 16, ...band },
  ];
  const plan = fastingPlan({
    arrivalAt: instantOf({ on, time, zone }),
    zone,
    bornOn: '2026-04-01',
    feeding: 'breast',
    protocol: { ...startingProtocol, bands },
    cautions: [],
    travelMinutes: 25,
    readyMinutes: 35,
    ...more,
  });
  if (plan.kind !== 'standard') throw new Error(`individual: ${plan.reason}`);
  return plan;
};

describe('a clock time as the rule', () => {
  it.each([
    // Curry International TB Center, step 1: nothing after midnight, all ages (clinical facts 7, row 3).
    ['from midnight', '2026-12-09', '07:00', '00:00', 4, '2026-12-09 00:00'],
    ['from 23:00 of the evening before', '2026-12-09', '07:00', '23:00', 6, '2026-12-08 23:00'],
    // The earlier of both counts: MedlinePlus 8 to 10 h (row 4) against midnight.
    ['8 h are earlier than midnight', '2026-12-09', '07:00', '00:00', 8, '2026-12-08 23:00'],
    [
      'a clock time after the arrival is last night’s',
      '2026-12-09',
      '07:00',
      '07:30',
      4,
      '2026-12-08 07:30',
    ],
    // 8 March 2026: Chicago jumps from 2:00 to 3:00; 2:30 is read before the jump.
    ['2:30 that never comes', '2026-03-08', '07:00', '02:30', 3, '2026-03-08 01:30'],
    // 1 November 2026: 1:30 comes twice, and the first counts.
    ['1:30 that comes twice', '2026-11-01', '07:00', '01:30', 3, '2026-11-01 01:30'],
  ])('%s', (_, on, time, nothingFrom, least, expected) => {
    const all = Object.fromEntries(Object.keys(hours()).map((item) => [item, least]));
    const plan = planOf(
      on,
      time,
      { leastHours: hours(all), nothingFrom, longestHours: 24 },
      { bornOn: '2025-09-09' },
    );
    expect(local(plan.stopAt)).toBe(expected);
    expect(plan.leastMinutes).toBe(least * 60);
  });

  it('of the twice-occurring hour is the first of the two', () => {
    const arrivalAt = instantOf({ on: '2026-11-01', time: '07:00', zone });
    expect(lastBefore(arrivalAt, '01:30', zone)).toBe(Date.parse('2026-11-01T06:30:00Z'));
  });

  it('is named in the explanation only where it made the stop', () => {
    const clockOf = (least: number) =>
      planOf('2026-12-09', '07:00', {
        leastHours: hours({ 'solid-food': least }),
        nothingFrom: '00:00',
      }).explanation.inputs['clock'];
    expect(clockOf(6)).toBe('00:00');
    expect(clockOf(8)).toBeNull();
  });
});

describe('things with different hours', () => {
  // ESAIC 2021/22 for anaesthesia (clinical facts 7, row 10): clear 1 h, breast milk 3 h, formula 4 h;
  // solids 6 h. Only as a worked case: these hours are not meant for this procedure.
  const mixed = {
    leastHours: hours({
      'solid-food': 6,
      'cows-milk': 4,
      formula: 4,
      'breast-milk': 3,
      water: 1,
      other: 1,
    }),
  };

  it('stop one after the other', () => {
    const plan = planOf('2026-12-09', '07:00', mixed);
    expect(
      stopGroups(plan.stops).map(({ stopAt, items }) => [
        localTimeOf(stopAt, zone),
        items.join(' '),
      ]),
    ).toEqual([
      ['01:00', 'solid-food'],
      ['03:00', 'cows-milk formula'],
      ['04:00', 'breast-milk'],
      ['06:00', 'water other'],
    ]);
    expect(local(plan.stopAt)).toBe('2026-12-09 01:00');
    expect(local(plan.nothingAt)).toBe('2026-12-09 06:00');
    expect(plan.allSame).toBe(false);
  });

  it.each([
    ['breast', '04:00', '03:20'],
    ['formula', '03:00', '02:20'],
    ['breast-and-formula', '03:00', '02:20'],
    ['family-food', '01:00', '00:20'],
  ] as const)('a baby fed with %s has its last feed by %s', (feeding, stop, begins) => {
    const plan = planOf('2026-12-09', '07:00', mixed, { feeding });
    expect(localTimeOf(plan.mealStopAt, zone)).toBe(stop);
    expect(localTimeOf(plan.lastFeedAt ?? 0, zone)).toBe(begins);
    expect(plan.latestIntakeAt).toBe(plan.mealStopAt);
  });
});

describe('the usual night', () => {
  it.each([
    // Stop at 3:00: the feed at 2:00 stays, those at 3:00 and 5:00 fall away.
    [
      '2026-12-09',
      ['05:00', '02:00', '03:00'],
      ['02:00 stays', '03:00 falls away', '05:00 falls away'],
    ],
    ['2026-12-09', ['23:30'], ['23:30 stays']],
    // The night of 8 March is an hour shorter: 4 h before 7:00 are 3:00, but 8 h before are 22:00.
    ['2026-03-08', ['02:00', '04:00'], ['01:00 stays', '04:00 falls away']],
    ['2026-12-09', [], []],
  ])('on %s, feeds at %j', (on, nightFeedTimes, expected) => {
    const plan = planOf(
      on,
      '07:00',
      {},
      {
        bornOn: '2025-09-09',
        usual: { lastMealTime: null, nightFeedTimes },
      },
    );
    expect(
      plan.nightFeeds.map(
        ({ at, fallsAway }) => `${localTimeOf(at, zone)} ${fallsAway ? 'falls away' : 'stays'}`,
      ),
    ).toEqual(expected);
  });

  it('moves a supper that the longest fast would not bear', () => {
    // Longest 8 h, likely collection 7:30: nothing before 23:30 can be the last meal.
    const lastMeal = (lastMealTime: string) =>
      planOf(
        '2026-12-09',
        '07:00',
        { longestHours: 8 },
        { usual: { lastMealTime, nightFeedTimes: [] } },
      ).lastMealAt ?? 0;
    expect(local(lastMeal('19:00'))).toBe('2026-12-08 23:30');
    expect(local(lastMeal('23:45'))).toBe('2026-12-08 23:45');
    expect(planOf('2026-12-09', '07:00', {}).lastMealAt).toBeNull();
  });
});

describe('the stops of any rules', () => {
  const arrivalAt = instantOf({ on: '2026-12-09', time: '07:00', zone });
  const rule = (leastMinutes: number | null, nothingFrom: string | null) => ({
    leastMinutes,
    nothingFrom,
  });

  it('come from the hours, from the clock, or from the earlier of both', () => {
    const rules = {
      'solid-food': rule(360, null),
      formula: rule(360, '01:00'),
      water: rule(360, '00:59'),
      other: rule(null, '02:30'),
    };
    expect(
      stopsOf(rules, arrivalAt, zone).map(({ item, stopAt, leastMinutes, clock }) => [
        item,
        local(stopAt),
        leastMinutes,
        clock,
      ]),
    ).toEqual([
      ['solid-food', '2026-12-09 01:00', 360, null],
      // In the same minute the hours are named.
      ['formula', '2026-12-09 01:00', 360, null],
      ['water', '2026-12-09 00:59', 360, '00:59'],
      ['other', '2026-12-09 02:30', 270, '02:30'],
    ]);
  });

  it('are refused without a thing, and without hours and clock', () => {
    expect(() => stopsOf({}, arrivalAt, zone)).toThrow('A plan needs hours for at least one item.');
    expect(() => stopsOf({ water: rule(null, null) }, arrivalAt, zone)).toThrow(
      'A stop needs hours or a clock time.',
    );
  });

  it('a clock time that is the arrival’s own is the day before', () => {
    expect(local(lastBefore(arrivalAt, '07:00', zone))).toBe('2026-12-08 07:00');
    expect(local(lastBefore(arrivalAt, '06:59', zone))).toBe('2026-12-09 06:59');
  });

  it('are told together where they end together, the earliest first', () => {
    const stops = stopsOf(
      { 'solid-food': rule(240, null), water: rule(360, null), other: rule(240, null) },
      arrivalAt,
      zone,
    );
    expect(stopGroups(stops)).toEqual([
      { stopAt: arrivalAt - 360 * 60_000, items: ['water'] },
      { stopAt: arrivalAt - 240 * 60_000, items: ['solid-food', 'other'] },
    ]);
  });
});
