import * as fc from 'fast-check';
import { placesOfMorning } from '../../shared/domain/places-of-morning';
import {
  afterChange,
  replanOffers,
  type AfterSeries,
  type SeriesMorning,
  type SeriesToReplan,
} from '../../shared/domain/replan';
import { proposeRuns, type SeriesRequest } from '../../shared/domain/series-dates';
import { addDays, daysBetween, instantOf, type Weekday } from '../../shared/domain/zone';

const always = { seed: 20_261_207, numRuns: 150 };
const zone = 'America/Chicago';
const places = placesOfMorning({
  rooms: [
    { id: 1, closureMinutes: 60 },
    { id: 2, closureMinutes: 60 },
  ],
  staffPairs: 1,
  arrivalsFrom: '06:00',
  arrivalsUntil: '09:00',
  minutesPerChild: 30,
  limit: 5,
});
const nearDay = fc.integer({ min: -3, max: 50 }).map((days) => addDays('2026-03-01', days));
const weekdays = fc.subarray<Weekday>([1, 2, 3, 4, 5, 6, 7], { minLength: 3 });
const closure = fc.record({
  on: nearDay,
  reason: fc.constant('Ventilation'),
  kind: fc.constantFrom('closure' as const, 'holiday' as const),
});

const search: fc.Arbitrary<SeriesRequest> = fc
  .record({
    from: nearDay,
    weeks: fc.integer({ min: 1, max: 4 }),
    count: fc.integer({ min: 1, max: 5 }),
    open: weekdays,
    receiving: weekdays,
    cutOff: fc.option(fc.constantFrom('07:00', '07:45', '09:00', '11:30')),
    closures: fc.array(closure, { maxLength: 5 }),
    laboratoryClosures: fc.array(closure, { maxLength: 3 }),
    booked: fc.array(fc.record({ on: nearDay, place: fc.constantFrom(...places) }), {
      maxLength: 60,
    }),
    ages: fc.array(fc.integer({ min: 100, max: 3000 }), { minLength: 1, maxLength: 3 }),
    longest: fc.constantFrom(380, 420, 780),
    siblingsMayPart: fc.boolean(),
    heldDays: fc.array(nearDay, { maxLength: 3 }),
    leadDays: fc.integer({ min: 0, max: 4 }),
    hasTurnover: fc.boolean(),
  })
  .map((one) => ({
    zone,
    from: one.from,
    weeks: one.weeks,
    count: one.count,
    clinicDays: one.open.map((weekday) => ({ weekday, from: '06:00', until: '08:30' })),
    closures: one.closures,
    laboratory: {
      receivingWeekdays: one.receiving,
      cutOffTimes: one.cutOff === null ? {} : { 1: one.cutOff, 3: one.cutOff },
      closures: one.laboratoryClosures,
      minutesToLaboratory: 20,
    },
    places,
    booked: one.booked.map(({ on, place }) => ({ on, ...place })),
    ...(one.hasTurnover && {
      turnover: {
        rooms: [
          { id: 1, closureMinutes: 60 },
          { id: 2, closureMinutes: 60 },
        ],
        staffPairs: 1,
        minutesPerChild: 30,
        limit: 5,
      },
    }),
    children: one.ages.map((age, index) => ({
      id: index + 1,
      bornOn: addDays('2026-02-20', -age),
      leastMinutes: 360,
      longestMinutes: one.longest,
    })),
    siblingsMayPart: one.siblingsMayPart,
    heldDays: one.heldDays,
    usualWaitMinutes: 30,
    leadDays: one.leadDays,
    now: instantOf({ on: '2026-03-01', time: '10:00', zone }),
  }));

describe('any proposal', () => {
  it('has runs of as many mornings as asked for, one day after the other, none of them refused', () => {
    fc.assert(
      fc.property(search, (request) => {
        const { days, runs } = proposeRuns(request);
        const refused = new Set(days.filter(({ isPossible }) => !isPossible).map(({ on }) => on));
        for (const { days: run } of runs) {
          expect(run).toHaveLength(request.count);
          run.slice(1).forEach(({ on }, index) => {
            expect(daysBetween(run[index]?.on ?? on, on)).toBe(1);
          });
          for (const { on } of run) {
            expect(refused).not.toContain(on);
            expect(request.closures.map((closed) => closed.on)).not.toContain(on);
            expect(request.laboratory.closures?.map((closed) => closed.on)).not.toContain(on);
            expect(request.heldDays).not.toContain(on);
            expect(daysBetween('2026-03-01', on)).toBeGreaterThanOrEqual(request.leadDays);
          }
        }
      }),
      always,
    );
  });

  it('gives each day a reason or a run', () => {
    fc.assert(
      fc.property(search, (request) => {
        const { days, runs } = proposeRuns(request);
        expect(days).toHaveLength(request.weeks * 7);
        const starts = runs.map((run) => run.days[0]?.on);
        for (const { on, refused, canStart, isPossible } of days) {
          expect(canStart).toBe(refused.length === 0);
          expect(starts.includes(on)).toBe(canStart);
          const becauseOfRun = refused.some(({ code }) => code === 'run-would-break');
          expect(becauseOfRun).toBe(isPossible && !canStart);
        }
      }),
      always,
    );
  });

  it('gives every child one free place, neighbours the youngest first', () => {
    fc.assert(
      fc.property(search, (request) => {
        const bornOn = new Map(request.children.map((child) => [child.id, child.bornOn]));
        for (const { days } of proposeRuns(request).runs)
          for (const { on, places: given, neighbouring } of days) {
            expect(given.map(({ childId }) => childId).sort()).toEqual([...bornOn.keys()]);
            const at = given.map(({ arrivalTime, roomId }) => `${arrivalTime} ${roomId}`);
            expect(new Set(at).size).toBe(given.length);
            const gone = request.booked
              .filter((booked) => booked.on === on)
              .map(({ arrivalTime, roomId }) => `${arrivalTime} ${roomId}`);
            for (const place of at) expect(gone).not.toContain(place);
            if (!neighbouring) {
              expect(request.siblingsMayPart).toBe(true);
              continue;
            }
            const inOrder = [...given].sort(
              (left, right) =>
                left.arrivalTime.localeCompare(right.arrivalTime) || left.roomId - right.roomId,
            );
            const births = inOrder.map(({ childId }) => bornOn.get(childId) ?? '');
            expect(births).toEqual([...births].sort().reverse());
          }
      }),
      always,
    );
  });
});

/** Mornings on different days, in no order, with the numbers that earlier changes left behind. */
const history: fc.Arbitrary<SeriesMorning[]> = fc
  .uniqueArray(fc.integer({ min: 0, max: 14 }), { maxLength: 6 })
  .chain((days) =>
    fc.tuple(
      fc.constant(days),
      fc.shuffledSubarray([1, 2, 3, 4, 5, 6], { minLength: days.length, maxLength: days.length }),
      fc.array(fc.constantFrom('collected' as const, 'planned' as const, 'lost' as const), {
        minLength: days.length,
        maxLength: days.length,
      }),
    ),
  )
  .map(([days, numbers, states]) =>
    days.map((day, index) => ({
      number: numbers[index] ?? 0,
      on: addDays('2026-03-02', day),
      state: states[index] ?? 'lost',
    })),
  );

function expectKept(before: SeriesToReplan, after: AfterSeries): void {
  const specimens = (mornings: readonly SeriesMorning[]): string[] =>
    mornings
      .filter(({ state }) => state === 'collected')
      .map(({ number, on }) => `${number} ${on}`)
      .sort();
  expect(specimens(after.mornings)).toEqual(specimens(before.mornings));
  // Each entry as it was has one that it became.
  const was = after.mornings.flatMap((morning) => (morning.was ? [morning.was] : []));
  expect(new Set(was)).toEqual(new Set(before.mornings));
  expect(was).toHaveLength(before.mornings.length);
  const numbers = after.mornings
    .filter(({ state }) => state !== 'lost')
    .map(({ number }) => number);
  expect(new Set(numbers).size).toBe(numbers.length);
  const lost = before.mornings.filter(({ state }) => state === 'lost');
  for (const morning of after.mornings)
    if (morning.was && lost.includes(morning.was)) expect(morning).toMatchObject(morning.was);
  const days = after.mornings.map(({ on }) => on);
  expect(days).toEqual([...days].sort());
  // Mornings to come are numbered in the order of their days.
  const toCome = after.mornings.filter(({ state }) => state === 'planned');
  const inOrder = toCome.map(({ number }) => number);
  expect(inOrder).toEqual([...inOrder].sort((left, right) => left - right));
}

describe('any change of a series', () => {
  it('loses and renumbers no specimen, and plans the wanted days alone', () => {
    const wanted = fc.array(fc.integer({ min: 0, max: 20 }), { maxLength: 6 });
    fc.assert(
      fc.property(history, wanted, fc.integer({ min: 1, max: 5 }), (mornings, days, longest) => {
        const wantedDays = days.map((day) => addDays('2026-03-02', day));
        const before = { childId: 1, plannedCount: 4, mornings };
        const after = afterChange(before, wantedDays, longest);
        expectKept(before, after);
        const planned = after.mornings.filter(({ state }) => state === 'planned');
        expect(planned.map(({ on }) => on)).toEqual([...new Set(wantedDays)].sort());
        const held = after.mornings.filter(({ state }) => state !== 'lost').map(({ on }) => on);
        expect(after.stillMissing).toBe(Math.max(4 - held.length, 0));
        const gaps = held.slice(1).map((on, index) => daysBetween(held[index] ?? on, on));
        expect(after.isConsecutive).toBe(gaps.every((gap) => gap <= 1));
        expect(after.isBeyondGap).toBe(gaps.some((gap) => gap > longest));
      }),
      { ...always, numRuns: 500 },
    );
  });

  it('is offered without losing or renumbering a specimen', () => {
    fc.assert(
      fc.property(search, history, history, (request, first, second) => {
        const series = [first, second]
          .slice(0, request.children.length)
          .map((mornings, index) => ({ childId: index + 1, plannedCount: 3, mornings }));
        const children = request.children.slice(0, series.length);
        for (const offer of replanOffers({
          series,
          search: { ...request, children },
          longestGapDays: 7,
        }))
          offer.after.forEach((after, index) => {
            const before = series[index];
            if (before) expectKept(before, after);
            if (offer.kind === 'close-with-fewer')
              expect(after.mornings.some(({ state }) => state === 'planned')).toBe(false);
          });
      }),
      always,
    );
  });
});
