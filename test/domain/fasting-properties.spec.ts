import * as fc from 'fast-check';
import { fastingCheck, type FastingAnswer } from '../../shared/domain/fasting-check';
import {
  fastingPlan,
  wallClockForFamily,
  type FastingPlanRequest,
  type StandardPlan,
} from '../../shared/domain/fasting-plan';
import { items, startingProtocol, type Item } from '../../shared/domain/fasting-protocol';
import { hungerCeiling } from '../../shared/domain/fasting-hours';
import { addDays, instantOf, localTimeOf, timeOfMinutes } from '../../shared/domain/zone';
import { clinicZones, difficultZones } from './support/zones';

const minute = 60_000;
const always = { seed: 20_261_209, numRuns: 200 };

const clockTime = fc.integer({ min: 0, max: 1439 }).map(timeOfMinutes);
const someDay = fc.integer({ min: 0, max: 5843 }).map((days) => addDays('2020-01-01', days));

/** A morning anywhere, for a child of three months or more, under a protocol with hours of its own. */
const asked: fc.Arbitrary<FastingPlanRequest> = fc
  .record({
    zone: fc.constantFrom(...clinicZones, ...difficultZones),
    on: someDay,
    time: fc.integer({ min: 300, max: 600 }).map(timeOfMinutes),
    ageDays: fc.integer({ min: 100, max: 5000 }),
    quarters: fc.array(fc.integer({ min: 4, max: 32 }), {
      minLength: items.length,
      maxLength: items.length,
    }),
    feeding: fc.constantFrom('breast', 'formula', 'breast-and-formula', 'family-food'),
    nothingFrom: fc.option(clockTime),
    usualWaitMinutes: fc.integer({ min: 0, max: 90 }),
  })
  .map(({ zone, on, time, ageDays, quarters, feeding, nothingFrom, usualWaitMinutes }) => ({
    arrivalAt: instantOf({ on, time, zone }),
    zone,
    bornOn: addDays(on, -ageDays),
    feeding,
    protocol: {
      ...startingProtocol,
      usualWaitMinutes,
      bands: [
        {
          fromMonths: 3,
          toMonths: null,
          individualPlan: false,
          leastHours: Object.fromEntries(
            items.map((item, index) => [item, (quarters[index] ?? 4) / 4]),
          ) as Record<Item, number>,
          longestHours: 40,
          nothingFrom,
        },
      ],
    },
    cautions: [],
    travelMinutes: 30,
    readyMinutes: 30,
  }));

function planOf(request: FastingPlanRequest): StandardPlan {
  const plan = fastingPlan(request);
  if (plan.kind !== 'standard') throw new Error(plan.reason);
  return plan;
}

const withoutClock = (request: FastingPlanRequest): FastingPlanRequest => ({
  ...request,
  protocol: {
    ...request.protocol,
    bands: request.protocol.bands.map((band) => ({ ...band, nothingFrom: null })),
  },
});

describe('any fasting plan', () => {
  it('has stops that lie its hours before the arrival, in elapsed time', () => {
    fc.assert(
      fc.property(asked, (request) => {
        for (const { stopAt, leastMinutes } of planOf(withoutClock(request)).stops)
          expect(stopAt + leastMinutes * minute).toBe(request.arrivalAt);
      }),
      always,
    );
  });

  it('is only ever made earlier by a clock time, and never to a day before', () => {
    fc.assert(
      fc.property(asked, (request) => {
        const [plan, byHours] = [planOf(request), planOf(withoutClock(request))];
        plan.stops.forEach(({ item, stopAt, clock }, index) => {
          const other = byHours.stops[index];
          expect(item).toBe(other?.item);
          expect(stopAt).toBeLessThanOrEqual(other?.stopAt ?? 0);
          if (clock === null) expect(stopAt).toBe(other?.stopAt);
          else expect(stopAt).toBeGreaterThanOrEqual(request.arrivalAt - 26 * 60 * minute);
        });
      }),
      always,
    );
  });

  it('has its moments in the order in which a family lives them', () => {
    fc.assert(
      fc.property(asked, (request) => {
        const plan = planOf(request);
        expect(plan.stopAt).toBe(Math.min(...plan.stops.map(({ stopAt }) => stopAt)));
        expect(plan.nothingAt).toBe(Math.max(...plan.stops.map(({ stopAt }) => stopAt)));
        expect(plan.stopReminderAt).toBeLessThan(plan.mealStopAt);
        const moments = [
          plan.stopAt,
          plan.mealStopAt,
          plan.nothingAt,
          plan.arriveAt,
          plan.likelyCollectionAt,
          plan.eatAgainAt,
        ];
        expect(moments).toEqual([...moments].sort((left, right) => left - right));
        expect(plan.wakeAt).toBeLessThan(plan.leaveAt);
        expect(plan.leaveAt).toBeLessThan(plan.arriveAt);
      }),
      always,
    );
  });

  it('never tells a family 00:00 or 12:00', () => {
    const onTheHour = fc.record({
      zone: fc.constantFrom(...clinicZones, ...difficultZones),
      on: someDay,
      time: fc.oneof(clockTime, fc.constantFrom('00:00', '12:00')),
      pick: fc.constantFrom('earlier' as const, 'later' as const),
    });
    fc.assert(
      fc.property(onTheHour, ({ pick, ...clock }) => {
        const stopAt = instantOf(clock, pick);
        const told = wallClockForFamily(stopAt, clock.zone);
        expect(['00:00', '12:00']).not.toContain(localTimeOf(told, clock.zone));
        expect([0, minute]).toContain(stopAt - told);
      }),
      { ...always, numRuns: 1500 },
    );
  });
});

describe('any fasting check', () => {
  const better = { 'long-enough': 2, 'cannot-tell': 1, 'not-long-enough': 0 } as const;

  const judged = (request: FastingPlanRequest, answer: FastingAnswer) => {
    const plan = planOf(request);
    const dawn = plan.arriveAt - 45 * minute;
    const result = fastingCheck({
      answer,
      plan,
      now: dawn,
      arrivalAt: plan.arriveAt,
      likelyCollectionAt: plan.likelyCollectionAt,
      dawnPhone: null,
      lastRoomStartAt: plan.arriveAt + 120 * minute,
      laboratoryCutOffAt: plan.arriveAt + 300 * minute,
    });
    if (!result.ok) throw new Error(result.error);
    return result;
  };
  const ago = fc.integer({ min: 45, max: 45 + 20 * 60 });

  it('never judges a later meal, feed or sip better than an earlier one', () => {
    const kinds = fc.record({
      kind: fc.constantFrom('feed' as const, 'sip' as const),
      item: fc.option(fc.constantFrom<Item>('solid-food', 'breast-milk', 'water'), {
        nil: undefined,
      }),
    });
    fc.assert(
      fc.property(asked, kinds, ago, ago, (request, kind, one, other) => {
        const eaten = (minutesAgo: number) =>
          judged(request, { ...kind, lastIntakeAt: request.arrivalAt - minutesAgo * minute });
        const [early, late] = [eaten(Math.max(one, other)), eaten(Math.min(one, other))];
        expect(better[late.verdict]).toBeLessThanOrEqual(better[early.verdict]);
        expect(late.readyAt ?? 0).toBeGreaterThanOrEqual(early.readyAt ?? 0);
        expect(late.fastedMinutes?.atArrival).toBeLessThanOrEqual(
          early.fastedMinutes?.atArrival ?? 0,
        );
      }),
      always,
    );
  });

  it('lets no sip of water make the longest fast longer', () => {
    fc.assert(
      fc.property(asked, ago, fc.integer({ min: 8, max: 40 }), (request, minutesAgo, longest) => {
        const bands = request.protocol.bands.map((band) => ({ ...band, longestHours: longest }));
        const short = { ...request, protocol: { ...request.protocol, bands } };
        fc.pre(fastingPlan(short).kind === 'standard');
        const without = judged(short, { kind: 'nothing' });
        const sipped = judged(short, {
          kind: 'sip',
          lastIntakeAt: request.arrivalAt - minutesAgo * minute,
        });
        if (without.outcome === 'feed-now-and-call')
          expect(sipped.outcome).toBe('feed-now-and-call');
      }),
      always,
    );
  });

  it('sends a child whose longest fast would pass to eat, whatever else was said', () => {
    fc.assert(
      fc.property(asked, ago, fc.integer({ min: 9, max: 30 }), (request, minutesAgo, longest) => {
        const bands = request.protocol.bands.map((band) => ({ ...band, longestHours: longest }));
        const short = { ...request, protocol: { ...request.protocol, bands } };
        const plan = fastingPlan(short);
        fc.pre(plan.kind === 'standard');
        const lastIntakeAt = request.arrivalAt - minutesAgo * minute;
        const { outcome } = judged(short, { kind: 'feed', lastIntakeAt });
        const now = plan.kind === 'standard' ? plan.likelyCollectionAt : 0;
        const passes = lastIntakeAt + longest * 60 * minute < now;
        if (passes) expect(outcome).toBe('feed-now-and-call');
        if (passes)
          expect(hungerCeiling({ lastIntakeAt, longestMinutes: longest * 60, now })).toBe('feed');
      }),
      always,
    );
  });
});
