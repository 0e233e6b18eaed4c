import {
  effectiveVersion,
  individualPlanOf,
  individualPlanProblems,
  morningProblems,
  ownPlanOfMorning,
  type IndividualPlanBody,
} from './individual-plan';
import { dayOf, instantOf, localTimeOf } from './zone';

const zone = 'America/Chicago';
const local = (instant: number): string => `${dayOf(instant, zone)} ${localTimeOf(instant, zone)}`;
const body: IndividualPlanBody = {
  stops: [
    { item: 'breast-milk', leastHours: 3, nothingFrom: null },
    { item: 'tube-feed', leastHours: null, nothingFrom: '02:30' },
    { item: 'water', leastHours: 3, nothingFrom: '02:45' },
  ],
  longestHours: 5,
  lastFeedTime: null,
  phrases: [{ key: 'glucose-low-feed-and-call', glucoseMgDl: 70 }],
  medicines: [{ name: 'Levetiracetam', way: 'usual-time-with-sip', time: '06:00', sipMl: 5 }],
};
const morning = (day: string, time: string) => ({
  arrivalAt: instantOf({ on: day, time, zone }),
  zone,
  ageMonths: 2,
  feeding: 'breast' as const,
  travelMinutes: 20,
  readyMinutes: 20,
  usualWaitMinutes: 15,
  eatAgainAfterMinutes: 10,
  protocolVersion: 3,
});
const on = (day: string, more: Partial<IndividualPlanBody> = {}, time = '06:00') =>
  individualPlanOf({ ...body, ...more }, 4, morning(day, time));

describe('the times of a plan that a clinician composed', () => {
  it('go as any other: hours, clock times, the earlier of both', () => {
    const plan = on('2026-12-09');
    expect(plan).toMatchObject({ kind: 'standard', basis: 'individual', longestMinutes: 300 });
    expect(
      plan.stops.map(({ item, stopAt, leastMinutes, clock }) => [
        item,
        local(stopAt),
        leastMinutes,
        clock,
      ]),
    ).toEqual([
      ['breast-milk', '2026-12-09 03:00', 180, null],
      ['water', '2026-12-09 02:45', 180, '02:45'],
      // A clock time alone asks for what lies between it and the booked arrival.
      ['tube-feed', '2026-12-09 02:30', 210, '02:30'],
    ]);
    expect(plan.explanation).toMatchObject({
      rule: 'fasting-plan.individual',
      inputs: { individualVersion: 4, protocolVersion: 3, longestMinutes: 300 },
    });
  });

  it.each([
    // 8 March 2026: the clock jumps from 2:00 to 3:00; 2:30 never comes and is read before the jump.
    ['2026-03-08', '2026-03-08 02:00', '2026-03-08 01:30'],
    // 1 November 2026: 3 h before 6:00 are 3:00 again, after the hour that comes twice.
    ['2026-11-01', '2026-11-01 03:00', '2026-11-01 02:30'],
  ])('on the night the clock changes, %s', (day, _, tube) => {
    const plan = on(day);
    const stop = (item: string) => plan.stops.find((one) => one.item === item);
    const feed = stop('breast-milk');
    expect(plan.arriveAt - (feed?.stopAt ?? 0)).toBe(3 * 3_600_000);
    expect(local(stop('tube-feed')?.stopAt ?? 0)).toBe(tube);
  });

  it('begin the last feed when the clinician says so, else 40 minutes before', () => {
    expect(local(on('2026-12-09').lastFeedAt ?? 0)).toBe('2026-12-09 02:20');
    expect(local(on('2026-12-09', { lastFeedTime: '02:00' }).lastFeedAt ?? 0)).toBe(
      '2026-12-09 02:00',
    );
    expect(local(on('2026-12-09', { lastFeedTime: '23:30' }).stopReminderAt)).toBe(
      '2026-12-08 23:30',
    );
  });
});

it('a plan without a single thing has no times', () => {
  expect(() => on('2026-12-09', { stops: [] })).toThrow('at least one item');
});

describe('what must be mended before signing', () => {
  it.each<[string, Partial<IndividualPlanBody>, string[]]>([
    ['nothing', {}, []],
    ['no thing at all', { stops: [] }, ['stops']],
    [
      'neither hours nor a clock time',
      { stops: [{ item: 'formula', leastHours: null, nothingFrom: null }] },
      ['stops.0.leastHours'],
    ],
    ['a thing named twice', { stops: [body.stops[0]!, body.stops[0]!] }, ['stops.1.item']],
    ['the longest fast not above the least', { longestHours: 3 }, ['longestHours', 'longestHours']],
    [
      'a low sugar without its number',
      { phrases: [{ key: 'glucose-low-feed-and-call', glucoseMgDl: null }] },
      ['phrases.0.glucoseMgDl'],
    ],
    [
      'a medicine with a sip without time and water',
      { medicines: [{ name: 'A', way: 'usual-time-with-sip', time: null, sipMl: null }] },
      ['medicines.0.time', 'medicines.0.sipMl'],
    ],
    [
      'a medicine after the test needs neither',
      { medicines: [{ name: 'A', way: 'after-the-test', time: null, sipMl: null }] },
      [],
    ],
  ])('%s', (_, more, paths) => {
    expect(individualPlanProblems({ ...body, ...more }).map(({ path }) => path)).toEqual(paths);
  });

  it('a wait that passes the longest fast shows on the morning', () => {
    expect(morningProblems(on('2026-12-09'))).toEqual([]);
    // The feed ends 3:00, collection is at 6:15: 3 h 15 min.
    expect(morningProblems(on('2026-12-09', { longestHours: 3.2 }))).toHaveLength(1);
    expect(morningProblems(on('2026-12-09', { longestHours: 3.25 }))).toEqual([]);
  });

  it.each([
    ['the booked arrival fits', '06:00', 'standard'],
    // The tube feed ends at 2:30 by the clock, whatever the arrival; 5 hours end at 7:30.
    ['the last minute that fits', '07:15', 'standard'],
    ['later the fast would pass its ceiling: a clinician composes again', '07:30', 'individual'],
  ])('%s', (_, time, kind) => {
    const own = { ...body, stops: body.stops.slice(1) };
    const plan = ownPlanOfMorning(own, 4, morning('2026-12-09', time));
    expect(plan.kind).toBe(kind);
    if (plan.kind === 'individual')
      expect(plan).toMatchObject({
        reasons: ['fast-too-long'],
        explanation: { rule: 'fasting-plan.individual-plan-missing' },
      });
  });
});

describe('which version counts', () => {
  const version = (number: number, more: Record<string, unknown> = {}) => ({
    version: number,
    seriesId: null as number | null,
    from: null as string | null,
    until: null as string | null,
    isEnded: false,
    ...more,
  });
  it.each([
    ['the newest', [version(1), version(2)], 2],
    ['none when the newest was ended', [version(1), version(2, { isEnded: true })], null],
    ['the newest after an ended one', [version(1, { isEnded: true }), version(2)], 2],
    ['one for this series', [version(1, { seriesId: 7 })], 1],
    ['not one for another series', [version(1, { seriesId: 8 })], null],
    [
      'one whose days hold the morning',
      [version(1, { from: '2026-12-09', until: '2026-12-09' })],
      1,
    ],
    ['not one that begins later', [version(1, { from: '2026-12-10' })], null],
    ['not one that is over', [version(1, { until: '2026-12-08' })], null],
    ['none', [], null],
  ])('%s', (_, versions, expected) => {
    const chosen = effectiveVersion(versions, { seriesId: 7, on: '2026-12-09' });
    expect(chosen?.version ?? null).toBe(expected);
  });
});
