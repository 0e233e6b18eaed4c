import {
  bandFor,
  startingProtocol,
  validateProtocol,
  type FastingBand,
  type FastingProtocol,
} from './fasting-protocol';

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
    ...band,
  })),
});

const under3 = { toMonths: 2, individualPlan: true, leastHours: null, longestHours: null };
const problemsOf = (protocol: FastingProtocol): [string, string][] =>
  validateProtocol(protocol).map(({ path, code }) => [path, code]);

describe('the starting protocol', () => {
  // The table of the product page "Starting protocol".
  it.each([
    [0, null, null],
    [2, null, null],
    [3, 4, 6],
    [5, 4, 6],
    [6, 4, 8],
    [11, 4, 8],
    [12, 6, 12],
    [23, 6, 12],
    [24, 6, 13],
    [59, 6, 13],
    [60, 6, 14],
    [17 * 12, 6, 14],
  ])('at %i months: least %p, longest %p', (ageMonths, least, longest) => {
    const band = bandFor(startingProtocol, ageMonths);
    expect(band?.individualPlan).toBe(least === null);
    expect(band?.longestHours).toBe(longest);
    expect(new Set(Object.values(band?.leastHours ?? {}))).toEqual(
      new Set(least === null ? [] : [least]),
    );
  });

  it('holds, is unsigned and says that it is to be confirmed', () => {
    expect(validateProtocol(startingProtocol)).toEqual([]);
    expect(startingProtocol).toMatchObject({ isStartingValues: true, signedBy: null });
  });

  // Clinical facts 1.4 (H1): fasts monitored in hospital, by age.
  it('stays under the limits of monitored fasts', () => {
    for (const [ageMonths, limit] of [
      [5, 8],
      [7, 12],
      [11, 16],
      [23, 18],
      [83, 20],
      [84, 24],
    ] as const) {
      expect(bandFor(startingProtocol, ageMonths)?.longestHours).toBeLessThan(limit);
    }
  });
});

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

  it('has no band for an age it leaves out', () => {
    expect(bandFor(withBands([under3, { fromMonths: 4 }]), 3)).toBeNull();
  });
});
