import { doorFast, type DoorFast, type DoorFastRequest } from './door-check';
import { at, planOf, toddler } from './fasting-check.testing';

if (toddler.kind !== 'standard') throw new Error('individual');
/** Food 6 h, stop 1:00; water 4 h, stop 3:00; anything else 8 h. */
const plan = {
  ...toddler,
  leastMinutes: 480,
  nothingAt: at('03:00'),
  stops: toddler.stops.map((stop) =>
    stop.item === 'water'
      ? { ...stop, leastMinutes: 240, stopAt: at('03:00') }
      : stop.item === 'other'
        ? { ...stop, leastMinutes: 480, stopAt: at('01:00') - 120 * 60_000 }
        : stop,
  ),
};
const door = (more: Partial<DoorFastRequest>): DoorFast =>
  doorFast({
    food: null,
    drink: null,
    isNothingSincePlan: false,
    plan,
    now: at('07:10'),
    ...more,
  });
const food = { at: at('01:00'), item: 'solid-food' as const };
const water = (time: string) => ({ at: at(time), item: 'water' as const });

describe('the rule that the door check names', () => {
  it.each<[string, Partial<DoorFastRequest>]>([
    ['long-enough', { food }],
    ['not-long-enough', { food: { ...food, at: at('02:00') } }],
    ['long-enough', { isNothingSincePlan: true, drink: water('03:00') }],
    ['contradictory', { isNothingSincePlan: true, drink: water('03:01') }],
    ['time-not-known', {}],
    ['individual-plan-missing', { plan: planOf('2026-11-01') }],
  ])('%s', (rule, more) => {
    expect(door(more).explanation.rule).toBe(`door-check.${rule}`);
  });
});

describe('what the door check knows', () => {
  it('of nothing since the plan: the last meal was at its stop', () => {
    expect(door({ isNothingSincePlan: true }).lastIntakeAt).toBe(plan.mealStopAt);
    expect(door({ food, drink: water('02:30') }).lastIntakeAt).toBe(at('02:30'));
    expect(door({ food: { ...food, at: at('00:10') } }).lastIntakeAt).toBe(at('00:10'));
  });

  it('of food and drink that nobody named: the hours of meals, and the strictest of all', () => {
    expect(door({ food: { ...food, item: null } }).readyAt).toBe(at('07:00'));
    expect(door({ food, drink: { at: at('01:30'), item: null } }).readyAt).toBe(at('09:30'));
    expect(door({ food, drink: water('02:30') }).readyAt).toBe(at('07:00'));
  });

  it('of a sip alone: before the last meal’s stop it was the last thing, after it the plan counts', () => {
    expect(door({ drink: water('00:59') }).readyAt).toBe(at('04:59'));
    expect(door({ drink: water('01:00') }).readyAt).toBe(at('07:00'));
    expect(door({ drink: water('02:00') }).readyAt).toBe(at('07:00'));
  });

  it('where it cannot tell: what was said, and no times of its own', () => {
    const own = { plan: planOf('2026-11-01') };
    expect(door({ ...own, food, drink: water('02:00') })).toMatchObject({
      verdict: 'cannot-tell',
      readyAt: null,
      lastIntakeAt: at('02:00'),
      hungryFromAt: at('01:00'),
      ceiling: 'ok',
      explanation: {
        inputs: {
          foodAt: at('01:00'),
          drinkAt: at('02:00'),
          readyAt: null,
          hungryFromAt: at('01:00'),
          longestEndsAt: null,
          leastMinutes: null,
          longestMinutes: null,
        },
      },
    });
    expect(door({ ...own, food })).toMatchObject({ lastIntakeAt: at('01:00') });
    expect(door({ ...own, drink: water('02:00') })).toMatchObject({
      lastIntakeAt: at('02:00'),
      hungryFromAt: null,
    });
    expect(door(own)).toMatchObject({ lastIntakeAt: null, hungryFromAt: null });
    expect(door({ isNothingSincePlan: true, drink: water('04:00'), food })).toMatchObject({
      lastIntakeAt: at('04:00'),
    });
  });
});
