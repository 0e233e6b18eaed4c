import {
  afterChange,
  numberMornings,
  replanOffers,
  type ReplanRequest,
  type SeriesMorning,
} from './replan';
import { addDays } from './day';
import { instantOf } from './zone';

const zone = 'America/Chicago';
const morning = (number: number, on: string, state: SeriesMorning['state']): SeriesMorning => ({
  number,
  on,
  state,
});
const child = { bornOn: '2024-02-02', leastMinutes: 360, longestMinutes: 780 };
const search: ReplanRequest['search'] = {
  zone,
  from: '2026-12-09',
  weeks: 2,
  clinicDays: ([1, 2, 3, 4, 5] as const).map((weekday) => ({
    weekday,
    from: '06:00',
    until: '09:00',
  })),
  closures: [],
  laboratory: { receivingWeekdays: [1, 2, 3, 4, 5], cutOffTimes: {} },
  places: [
    { arrivalTime: '06:00', roomId: 1 },
    { arrivalTime: '06:30', roomId: 2 },
  ],
  booked: [],
  children: [{ ...child, id: 1 }],
  usualWaitMinutes: 30,
  leadDays: 0,
  now: instantOf({ on: '2026-12-09', time: '08:00', zone }),
};
const offersFor = (
  mornings: readonly SeriesMorning[],
  more: Partial<ReplanRequest['search']> = {},
  plannedCount = 3,
) =>
  replanOffers({
    series: [{ childId: 1, plannedCount, mornings }],
    search: { ...search, ...more },
    longestGapDays: 7,
  });
const shown = (offer: ReturnType<typeof offersFor>[number] | undefined): string[] =>
  (offer?.after[0]?.mornings ?? []).map(
    ({ number, on, state, change }) => `${number} ${on.slice(5)} ${state} ${change}`,
  );

/** Wednesday 9 December 2026, the second morning, was lost; the third is still planned. */
const secondLost = [
  morning(1, '2026-12-08', 'collected'),
  morning(2, '2026-12-09', 'lost'),
  morning(3, '2026-12-10', 'planned'),
];

// Clinical facts 6.2: do not void previous specimens, keep numbers, extend by an eligible laboratory day, flag
// "non-consecutive", let the physician close at 1, 2 or 3 with a reason.
describe('after a lost morning', () => {
  it('the next possible morning comes after those that are planned, and numbers follow the days', () => {
    const [next] = offersFor(secondLost);
    expect(next).toMatchObject({ kind: 'next-possible-morning', day: { on: '2026-12-11' } });
    expect(shown(next)).toEqual([
      '1 12-08 collected kept',
      '2 12-09 lost kept',
      '2 12-10 planned renumbered',
      '3 12-11 planned new',
    ]);
    expect(next?.after[0]).toMatchObject({
      isConsecutive: false,
      longestGapDays: 2,
      isBeyondGap: false,
      stillMissing: 0,
    });
  });

  it('a new run gives up what is planned and keeps what was taken', () => {
    const run = offersFor(secondLost)[1];
    expect(run).toMatchObject({
      kind: 'new-run',
      run: { days: [{ on: '2026-12-10' }, { on: '2026-12-11' }] },
    });
    expect(shown(run)).toEqual([
      '1 12-08 collected kept',
      '2 12-09 lost kept',
      '2 12-10 planned renumbered',
      '3 12-11 planned new',
    ]);
  });

  it('mornings of a run move with their calendar entries, and only what is too many is given up', () => {
    const planned = [14, 15, 16].map((day, index) =>
      morning(index + 1, `2026-12-${day}`, 'planned'),
    );
    const series = { childId: 1, plannedCount: 3, mornings: planned };
    const told = (days: string[]): string[] =>
      afterChange(series, days, 7).mornings.map(
        ({ number, on, change, was }) =>
          `${number} ${on.slice(8)} ${change} from ${was?.on.slice(8)}`,
      );
    expect(told(['2026-12-15', '2026-12-16', '2026-12-17'])).toEqual([
      '1 15 renumbered from 15',
      '2 16 renumbered from 16',
      '3 17 moved from 14',
    ]);
    expect(told(['2026-12-21', '2026-12-22'])).toEqual([
      '3 16 given-up from 16',
      '1 21 moved from 14',
      '2 22 moved from 15',
    ]);
  });

  it('closing keeps the specimens and gives up the rest', () => {
    const close = offersFor(secondLost)[2];
    expect(close).toMatchObject({ kind: 'close-with-fewer', collected: 1, planned: 3 });
    expect(shown(close)).toEqual([
      '1 12-08 collected kept',
      '2 12-09 lost kept',
      '3 12-10 lost given-up',
    ]);
  });

  it('never gives a number that a specimen has', () => {
    const offers = offersFor([
      morning(1, '2026-12-07', 'lost'),
      morning(2, '2026-12-08', 'collected'),
      morning(3, '2026-12-09', 'lost'),
    ]);
    expect(shown(offers[0]).at(-1)).toBe('1 12-10 planned new');
    expect(offers[0]?.after[0]?.stillMissing).toBe(1);
    expect(shown(offers[1]).slice(-2)).toEqual(['1 12-10 planned new', '3 12-11 planned new']);
  });

  it('a gap that is longer than the clinic allows is said', () => {
    const closures = ['2026-12-11', '2026-12-14', '2026-12-15', '2026-12-16', '2026-12-17'].map(
      (on) => ({ on, reason: 'Ventilation' }),
    );
    const [next] = offersFor(secondLost, { closures });
    expect(next).toMatchObject({ day: { on: '2026-12-18' } });
    expect(next?.after[0]).toMatchObject({ longestGapDays: 8, isBeyondGap: true });
  });

  it('nothing is looked for before the last lost or collected day, nor in the past', () => {
    const early = [
      morning(1, '2026-12-10', 'lost'),
      morning(2, '2026-12-14', 'planned'),
      morning(3, '2026-12-15', 'planned'),
    ];
    expect(offersFor(early)[0]).toMatchObject({ day: { on: '2026-12-11' } });
    const now = instantOf({ on: '2026-12-17', time: '08:00', zone });
    expect(offersFor(secondLost, { now, from: '2026-12-17' })[0]).toMatchObject({
      day: { on: '2026-12-17' },
    });
  });

  it('closing is left where no day has a place, also without any specimen', () => {
    const offers = offersFor([morning(1, '2026-12-09', 'lost')], { places: [] });
    expect(offers).toMatchObject([{ kind: 'close-with-fewer', collected: 0, planned: 3 }]);
  });

  it('nothing is offered for a series that is complete', () => {
    const all = [8, 9, 10].map((day, index) =>
      morning(index + 1, `2026-12-${String(day).padStart(2, '0')}`, 'collected'),
    );
    expect(offersFor(all)).toEqual([]);
  });

  it('a series without a lost morning can have a new run, when the family asks for other days', () => {
    const planned = [14, 15, 16].map((day, index) =>
      morning(index + 1, `2026-12-${day}`, 'planned'),
    );
    expect(offersFor(planned).map(({ kind }) => kind)).toEqual(['new-run', 'close-with-fewer']);
  });
});

describe('brothers and sisters', () => {
  const children = [
    { ...child, id: 1 },
    { ...child, id: 2, bornOn: '2026-01-01' },
  ];
  const both = (second: readonly SeriesMorning[]) =>
    replanOffers({
      series: [
        { childId: 1, plannedCount: 3, mornings: secondLost },
        { childId: 2, plannedCount: 3, mornings: second },
      ],
      search: { ...search, children },
      longestGapDays: 7,
    });

  it('get their next morning together, in neighbouring places', () => {
    const [next] = both(secondLost);
    expect(next).toMatchObject({
      kind: 'next-possible-morning',
      day: {
        on: '2026-12-11',
        places: [
          { childId: 2, arrivalTime: '06:00' },
          { childId: 1, arrivalTime: '06:30' },
        ],
      },
    });
  });

  it('get a new run together where both need the same number of mornings', () => {
    expect(both(secondLost)[1]).toMatchObject({
      kind: 'new-run',
      run: { days: [{ on: '2026-12-10' }, { on: '2026-12-11' }] },
    });
  });

  it('come alone where only one of them misses a morning, and then get no run together', () => {
    const complete = secondLost.map((one) => ({ ...one, state: 'collected' as const }));
    const offers = both(complete);
    expect(offers.map(({ kind }) => kind)).toEqual(['next-possible-morning', 'close-with-fewer']);
    expect(offers[0]).toMatchObject({ day: { places: [{ childId: 1 }] } });
    expect(offers[0]?.after[1]?.mornings.map(({ change }) => change)).toEqual(
      Array(3).fill('kept'),
    );
  });
});

describe('whatever happened before', () => {
  const states = ['collected', 'planned', 'lost'] as const;
  const histories = Array.from({ length: 81 }, (_, index) =>
    [0, 1, 2, 3].map((place) =>
      morning(
        place + 1,
        addDays('2026-12-07', place),
        states[Math.floor(index / 3 ** place) % 3] ?? 'lost',
      ),
    ),
  );

  it('no specimen is lost or renumbered, and no number is given twice', () => {
    for (const history of histories)
      for (const { after } of offersFor(history, {}, 4))
        for (const { mornings } of after) {
          const specimens = (all: readonly SeriesMorning[]): string[] =>
            all
              .filter(({ state }) => state === 'collected')
              .map(({ number, on }) => `${number} ${on}`);
          expect(specimens(mornings)).toEqual(specimens(history));
          const numbers = mornings
            .filter(({ state }) => state !== 'lost')
            .map(({ number }) => number);
          expect(new Set(numbers).size).toBe(numbers.length);
          expect(mornings.length).toBeGreaterThanOrEqual(history.length);
        }
  });

  it('numbering again changes nothing', () => {
    for (const history of histories) {
      const once = numberMornings(history);
      expect(numberMornings(once)).toEqual(once);
    }
  });
});
