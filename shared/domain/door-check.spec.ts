import { doorFast, type DoorFast, type DoorFastRequest } from './door-check';
import { fastingPlan, type FastingPlan, type StandardPlan } from './fasting-plan';
import { startingProtocol } from './fasting-protocol';
import { instantOf, localTimeOf } from './zone';

const zone = 'America/Chicago';
const day = '2026-12-09';
const at = (time: string, on = day): number => instantOf({ on, time, zone });
const planOf = (bornOn: string, on = day): FastingPlan =>
  fastingPlan({
    arrivalAt: at('07:00', on),
    zone,
    bornOn,
    feeding: 'family-food',
    protocol: startingProtocol,
    cautions: [],
    travelMinutes: 30,
    readyMinutes: 30,
  });
const standard = planOf('2023-05-05');
if (standard.kind !== 'standard') throw new Error('individual');
/** Least 6 h, stop at 1:00, longest 13 h (to 14:00 from the stop); water only 4 h, stop at 3:00. */
const toddler: StandardPlan = {
  ...standard,
  nothingAt: at('03:00'),
  stops: standard.stops.map((stop) =>
    stop.item === 'water' ? { ...stop, leastMinutes: 240, stopAt: at('03:00') } : stop,
  ),
};
/** Least 4 h, stop at 3:00, longest 8 h (11:00). */
const infant = planOf('2026-04-01');

const door = (more: Partial<DoorFastRequest>): DoorFast =>
  doorFast({
    food: null,
    drink: null,
    isNothingSincePlan: false,
    plan: toddler,
    now: at('07:10'),
    ...more,
  });
const food = (time: string, item: 'solid-food' | 'formula' | null = 'solid-food', on = day) => ({
  food: { at: at(time, on), item },
});
const water = (time: string) => ({ drink: { at: at(time), item: 'water' as const } });
const shown = (fast: DoorFast) => ({
  verdict: fast.verdict,
  ready: fast.readyAt === null ? null : localTimeOf(fast.readyAt, zone),
  hungryFrom: fast.hungryFromAt === null ? null : localTimeOf(fast.hungryFromAt, zone),
  ceiling: fast.ceiling,
});

describe('what the door hears', () => {
  it.each<[string, Partial<DoorFastRequest>, unknown[]]>([
    [
      'nothing since the plan',
      { isNothingSincePlan: true },
      ['long-enough', '07:00', '01:00', 'ok'],
    ],
    ['food at 1:10, ready now', food('01:10'), ['long-enough', '07:10', '01:10', 'ok']],
    ['food at 1:11', food('01:11'), ['not-long-enough', '07:11', '01:11', 'ok']],
    [
      'milk of no known kind counts as the strictest',
      food('01:11', null),
      ['not-long-enough', '07:11', '01:11', 'ok'],
    ],
    // A sip of water starts the least hours of water again, not the longest fast (practice 1 and 13).
    ['water at 3:10', water('03:10'), ['long-enough', '07:10', '01:00', 'ok']],
    ['water at 3:11', water('03:11'), ['not-long-enough', '07:11', '01:00', 'ok']],
    [
      'supper at 18:00, water at 3:00',
      { ...food('18:00', 'solid-food', '2026-12-08'), ...water('03:00') },
      ['long-enough', '07:00', '18:00', 'feed'],
    ],
    [
      'supper at 18:30, water at 3:00',
      { ...food('18:30', 'solid-food', '2026-12-08'), ...water('03:00') },
      ['long-enough', '07:00', '18:30', 'collect-or-feed'],
    ],
    [
      'supper at 18:41: half an hour and a minute left',
      food('18:41', 'solid-food', '2026-12-08'),
      ['long-enough', '00:41', '18:41', 'ok'],
    ],
    [
      'supper at 18:10: the ceiling to the minute',
      food('18:10', 'solid-food', '2026-12-08'),
      ['long-enough', '00:10', '18:10', 'feed'],
    ],
    // Some other drink, or one that nobody can name, waits as long as food and stills no hunger.
    [
      'juice at 2:00',
      { drink: { at: at('02:00'), item: 'other' } },
      ['not-long-enough', '08:00', '01:00', 'ok'],
    ],
    [
      'some drink at 2:00',
      { drink: { at: at('02:00'), item: null } },
      ['not-long-enough', '08:00', '01:00', 'ok'],
    ],
    [
      'water at 23:00 alone: the meal was before it',
      { drink: { at: at('23:00', '2026-12-08'), item: 'water' } },
      ['long-enough', '03:00', '23:00', 'ok'],
    ],
    ['not known', {}, ['cannot-tell', null, null, 'ok']],
    [
      'not known, an infant near 11:00',
      { plan: infant, now: at('10:40') },
      ['cannot-tell', null, null, 'collect-or-feed'],
    ],
    [
      '"nothing" beside food at 4:00',
      { isNothingSincePlan: true, ...food('04:00') },
      ['cannot-tell', null, '04:00', 'ok'],
    ],
    [
      '"nothing" beside food at 0:30',
      { isNothingSincePlan: true, ...food('00:30') },
      ['long-enough', '06:30', '00:30', 'ok'],
    ],
    [
      'a child without a plan',
      { plan: planOf('2026-11-01'), ...food('04:00') },
      ['cannot-tell', null, '04:00', 'ok'],
    ],
  ])('%s', (_, more, [verdict, ready, hungryFrom, ceiling]) => {
    expect(shown(door(more))).toEqual({ verdict, ready, hungryFrom, ceiling });
  });

  it.each([
    // 8 March 2026 jumps from 2:00 to 3:00: from 1:00 to 7:10 it is 5 h 10 min, not 6 h 10 min.
    ['2026-03-08', 'not-long-enough'],
    // 1 November 2026 goes back at 2:00: the hour more is counted.
    ['2026-11-01', 'long-enough'],
  ])('food at 1:00 on the night the clock changes, %s', (on, verdict) => {
    const plan = planOf('2023-05-05', on);
    const taken = {
      at: instantOf({ on, time: '01:00', zone }, 'earlier'),
      item: 'solid-food' as const,
    };
    expect(door({ plan, food: taken, now: at('07:10', on) }).verdict).toBe(verdict);
  });

  it('says what went in and which rule decided', () => {
    expect(door(water('03:11')).explanation).toEqual({
      rule: 'door-check.not-long-enough',
      inputs: {
        foodAt: null,
        foodItem: null,
        drinkAt: at('03:11'),
        drinkItem: 'water',
        stopAt: at('01:00'),
        leastMinutes: 360,
        longestMinutes: 780,
        now: at('07:10'),
        readyAt: at('07:11'),
        hungryFromAt: at('01:00'),
        longestEndsAt: at('14:00'),
      },
    });
    expect(door({}).explanation.rule).toBe('door-check.time-not-known');
    expect(door({ isNothingSincePlan: true, ...food('04:00') }).explanation.rule).toBe(
      'door-check.contradictory',
    );
  });
});
