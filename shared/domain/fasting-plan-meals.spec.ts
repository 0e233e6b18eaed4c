import {
  composedPlan,
  fastingPlan,
  wallClockForFamily,
  type FastingPlanRequest,
  type Feeding,
  type StandardPlan,
} from './fasting-plan';
import { startingProtocol, type FastingBand, type Item } from './fasting-protocol';
import { instantOf, localTimeOf } from './zone';

const zone = 'America/Chicago';
const on = '2026-12-09';
const at = (time: string): number => instantOf({ on, time, zone });
/** Hours that differ for each thing; the stops before 7:00 are a minute of their own. */
const leastHours: Record<Item, number> = {
  'solid-food': 6,
  'cows-milk': 7,
  formula: 4,
  'breast-milk': 3,
  water: 8,
  'tube-feed': 5,
  other: 9,
};
const band: FastingBand = {
  fromMonths: 3,
  toMonths: null,
  individualPlan: false,
  leastHours,
  longestHours: 16,
  nothingFrom: null,
};
const request = (more: Partial<FastingPlanRequest> = {}): FastingPlanRequest => ({
  arrivalAt: at('07:00'),
  zone,
  bornOn: '2026-04-01',
  feeding: 'family-food',
  protocol: { ...startingProtocol, bands: [band] },
  cautions: [],
  travelMinutes: 30,
  readyMinutes: 30,
  ...more,
});
const standard = (more: Partial<FastingPlanRequest> = {}): StandardPlan => {
  const plan = fastingPlan(request(more));
  if (plan.kind !== 'standard') throw new Error(plan.reason);
  return plan;
};

describe('the last meal', () => {
  it.each<[Feeding, string]>([
    ['breast', '04:00'],
    ['formula', '03:00'],
    ['breast-and-formula', '03:00'],
    ['family-food', '00:00'],
  ])('of a child that takes %s ends with what it takes', (feeding, expected) => {
    expect(localTimeOf(standard({ feeding }).mealStopAt, zone)).toBe(expected);
  });

  it('of family food is the food, where milk may be taken longer', () => {
    const bands = [{ ...band, leastHours: { ...leastHours, 'cows-milk': 2, 'breast-milk': 8 } }];
    const plan = standard({ protocol: { ...startingProtocol, bands } });
    expect(localTimeOf(plan.mealStopAt, zone)).toBe('01:00');
  });

  const composed = (hours: Partial<Record<Item, number | string>>): StandardPlan =>
    composedPlan({
      ...request(),
      ageMonths: 8,
      feeding: 'breast',
      rules: Object.fromEntries(
        Object.entries(hours).map(([item, rule]) => [
          item,
          typeof rule === 'number'
            ? { leastMinutes: rule * 60, nothingFrom: null }
            : { leastMinutes: null, nothingFrom: rule },
        ]),
      ),
      longestMinutes: 600,
      usualWaitMinutes: 30,
      eatAgainAfterMinutes: 15,
      protocolVersion: 1,
      individualVersion: 2,
    });

  it('is any meal where the plan names none of the child’s own, and anything where it names no meal', () => {
    expect(localTimeOf(composed({ water: 6, formula: 4 }).mealStopAt, zone)).toBe('03:00');
    expect(localTimeOf(composed({ other: 6, 'tube-feed': 5 }).mealStopAt, zone)).toBe('02:00');
    expect(localTimeOf(composed({ water: 6, other: 5 }).mealStopAt, zone)).toBe('01:00');
  });

  it('is explained by the clock that made the earliest stop', () => {
    const { explanation, basis } = composed({ 'solid-food': 4, water: '02:00' });
    expect(basis).toBe('individual');
    expect(explanation).toMatchObject({
      rule: 'fasting-plan.individual',
      inputs: { clock: '02:00', stopAt: at('02:00'), nothingAt: at('03:00'), leastMinutes: 300 },
    });
    expect(composed({ 'solid-food': 6, water: '02:00' }).explanation.inputs['clock']).toBeNull();
  });
});

describe('a plan by the protocol', () => {
  it('says so, with the strictest hours', () => {
    expect(standard().explanation).toMatchObject({
      rule: 'fasting-plan.protocol',
      inputs: { leastMinutes: 540, longestMinutes: 960, individualVersion: null, clock: null },
    });
    expect(standard().basis).toBe('protocol');
  });

  it.each([
    ['2025-12-09', false],
    ['2025-12-10', true],
  ])('of a child born on %s: an infant, %s', (bornOn, isInfant) => {
    expect(standard({ bornOn }).isInfant).toBe(isInfant);
  });

  it('cannot be made without a band, or without its longest fast, and names every reason', () => {
    const told = (bands: readonly FastingBand[], more: Partial<FastingPlanRequest> = {}) => {
      const plan = fastingPlan(request({ ...more, protocol: { ...startingProtocol, bands } }));
      return plan.kind === 'standard' ? plan : [plan.reasons, plan.explanation.inputs['reasons']];
    };
    expect(told([])).toEqual([['not-in-protocol'], 'not-in-protocol']);
    expect(told([{ ...band, longestHours: null }])).toEqual([
      ['not-in-protocol'],
      'not-in-protocol',
    ]);
    expect(told([], { bornOn: '2026-11-01', cautions: ['prematurity'] })).toEqual([
      ['under-3-months', 'prematurity', 'not-in-protocol'],
      'under-3-months, prematurity, not-in-protocol',
    ]);
  });
});

it.each([
  ['00:00', '23:59'],
  ['12:00', '11:59'],
  ['00:30', '00:30'],
  ['12:01', '12:01'],
  ['06:00', '06:00'],
])('a stop at %s is told as %s', (time, told) => {
  expect(localTimeOf(wallClockForFamily(at(time), zone), zone)).toBe(told);
});
