import { startingProtocol, type FastingBand, type FastingProtocol } from './fasting-protocol';
import { cautionsAlwaysIndividual, validateProtocol } from './fasting-protocol-problems';

const hours = (least: number): FastingBand['leastHours'] => ({
  'solid-food': least,
  'cows-milk': least,
  formula: least,
  'breast-milk': least,
  water: least,
  'tube-feed': least,
  other: least,
});

const withBands = (bands: readonly Partial<FastingBand>[]): FastingProtocol => ({
  ...startingProtocol,
  bands: bands.map((band) => ({
    fromMonths: 0,
    toMonths: null,
    individualPlan: false,
    leastHours: hours(6),
    longestHours: 12,
    nothingFrom: null,
    ...band,
  })),
});

const under3 = { toMonths: 2, individualPlan: true, leastHours: null, longestHours: null };
const problemsOf = (protocol: FastingProtocol): [string, string][] =>
  validateProtocol(protocol).map(({ path, code }) => [path, code]);

describe('a protocol that cannot be signed', () => {
  it.each<[string, FastingProtocol, [string, string][]]>([
    ['without bands', withBands([]), [['bands', 'no-bands']]],
    ['with a gap', withBands([under3, { fromMonths: 4 }]), [['bands.1.fromMonths', 'gap']]],
    [
      'with an overlap',
      withBands([under3, { fromMonths: 3, toMonths: 12 }, { fromMonths: 12 }]),
      [['bands.2.fromMonths', 'overlap']],
    ],
    [
      'with an end',
      withBands([under3, { fromMonths: 3, toMonths: 59 }]),
      [['bands.1.toMonths', 'not-to-the-end']],
    ],
    ['beginning late', withBands([{ fromMonths: 3 }]), [['bands.0.fromMonths', 'not-from-birth']]],
    [
      'with an open band in the middle',
      withBands([under3, { fromMonths: 3 }, { fromMonths: 12 }]),
      [['bands.1.toMonths', 'open-band-not-last']],
    ],
    [
      'with a longest fast as short as the least',
      withBands([under3, { fromMonths: 3, longestHours: 6 }]),
      [['bands.1.longestHours', 'longest-not-above-least']],
    ],
    [
      'whose longest fast ends during the usual wait',
      withBands([under3, { fromMonths: 3, longestHours: 6.25 }]),
      [['bands.1.longestHours', 'wait-passes-longest']],
    ],
    [
      'without hours',
      withBands([under3, { fromMonths: 3, leastHours: null, longestHours: null }]),
      [
        ['bands.1.leastHours', 'hours-missing'],
        ['bands.1.longestHours', 'hours-missing'],
      ],
    ],
    [
      'with hours that are no number',
      withBands([under3, { fromMonths: 3, leastHours: hours(Number.NaN) }]),
      Object.keys(hours(1) ?? {}).map((item) => [
        `bands.1.leastHours.${item}`,
        'hours-not-positive',
      ]),
    ],
    [
      'with standard hours under 3 months',
      withBands([{}]),
      [['bands.0.individualPlan', 'under-3-months-without-individual-plan']],
    ],
    [
      'with a negative wait',
      { ...startingProtocol, usualWaitMinutes: -1 },
      [['usualWaitMinutes', 'minutes-negative']],
    ],
  ])('%s', (_, protocol, expected) => {
    expect(problemsOf(protocol)).toEqual(expected);
  });
});

describe('a clock-time rule', () => {
  const nothingFrom = (time: string, longestHours: number, lastArrivalTime: string | null) =>
    validateProtocol(withBands([under3, { fromMonths: 3, longestHours, nothingFrom: time }]), {
      lastArrivalTime,
    }).map(({ path, code }) => `${path} ${code}`);
  const passes = ['bands.1.nothingFrom nothing-from-passes-longest'];

  // Clinical facts 1.3: from midnight to an arrival at 08:30 a child fasts at least 8.5 hours.
  it.each<[string, number, string | null, string[]]>([
    ['00:00', 8, '08:30', passes],
    ['00:00', 9, '08:30', []],
    ['00:00', 8.75, '08:30', passes],
    ['22:00', 11, '08:30', []],
    ['22:00', 10.75, '08:30', passes],
    ['08:45', 14, '08:30', passes],
    ['00:00', 8, null, []],
  ])('from %s, longest %p hours, last arrival %s', (time, longest, lastArrival, expected) => {
    expect(nothingFrom(time, longest, lastArrival)).toEqual(expected);
  });
});

describe('conditions and advice', () => {
  const paths = (change: Partial<FastingProtocol>): string[] =>
    validateProtocol({ ...startingProtocol, ...change }).map(({ path, code }) => `${path} ${code}`);

  it('always hold the plan of a child whom a fast can harm', () => {
    expect(cautionsAlwaysIndividual).toContain('diabetes');
    expect(paths({ individualPlanCautions: cautionsAlwaysIndividual })).toEqual([]);
    const without = cautionsAlwaysIndividual.filter((caution) => caution !== 'low-blood-sugar');
    expect(paths({ individualPlanCautions: without })).toEqual([
      'individualPlanCautions.low-blood-sugar caution-needs-individual-plan',
    ]);
  });

  it('leave room for the way and the wait', () => {
    expect(paths({ wakeToCollectionMinutes: 120 })).toEqual([]);
    expect(paths({ wakeToCollectionMinutes: 0 })).toEqual([
      'wakeToCollectionMinutes minutes-not-positive',
    ]);
    expect(paths({ wakeToCollectionMinutes: 30 })).toEqual([
      'wakeToCollectionMinutes wake-advice-under-wait',
    ]);
    expect(paths({ eatAgainAfterMinutes: -1 })).toEqual(['eatAgainAfterMinutes minutes-negative']);
  });
});
