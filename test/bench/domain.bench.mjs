// What the computations of the domain cost, beside a bare conversion of a wall clock to an instant by
// luxon: the one thing that every one of them has to do.
import { createRequire } from 'node:module';
import { DateTime } from 'luxon';
import { inRoot } from '../../server/bootstrap/folders.mjs';
import { medianOf } from './support/table.mjs';

const require = createRequire(import.meta.url);
const built = (name) => require(inRoot('build/shared/domain', `${name}.js`));

export const name = 'Domain';

const zone = 'America/Chicago';
const rounds = 15;
const minutesAMorning = 30;

export function run() {
  const { addDays, instantOf } = built('zone');
  const { fastingPlan } = built('fasting-plan');
  const { startingProtocol } = built('fasting-protocol');
  const { placesOfMorning } = built('places-of-morning');
  const { proposeRuns } = built('series-dates');

  const conversions = repeated(4_000, (index) =>
    DateTime.fromObject(
      { year: 2026, month: 1 + (index % 12), day: 1 + (index % 28), hour: 6, minute: index % 60 },
      { zone },
    ).toMillis(),
  );
  const plan = (index) =>
    fastingPlan({
      arrivalAt: instantOf({ on: addDays('2026-01-01', index % 360), time: '06:30', zone }),
      zone,
      bornOn: '2024-10-01',
      feeding: 'family-food',
      protocol: startingProtocol,
      cautions: [],
      travelMinutes: 30,
      readyMinutes: 30,
      usual: { lastMealTime: '19:30', nightFeedTimes: ['23:30', '03:00'] },
    });

  const rooms = [
    { id: 1, closureMinutes: 60 },
    { id: 2, closureMinutes: 60 },
  ];
  const staff = { staffPairs: 1, minutesPerChild: minutesAMorning, limit: 5 };
  const hours = { from: '06:00', until: '09:00' };
  const places = placesOfMorning({
    rooms,
    ...staff,
    arrivalsFrom: '06:00',
    arrivalsUntil: '09:00',
  });
  const bookings = (count, firstDay, days) =>
    Array.from({ length: count }, (_, index) => ({
      on: addDays(firstDay, index % days),
      ...places[Math.floor(index / days) % places.length],
    }));
  const child = {
    leastMinutes: 360,
    longestMinutes: 780,
    usualLastMealTime: '19:30',
    nightFeedTimes: ['23:30', '03:00'],
  };
  const proposal = (booked) => () =>
    proposeRuns({
      zone,
      from: '2026-03-01',
      weeks: 12,
      count: 3,
      clinicDays: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, ...hours })),
      closures: [],
      laboratory: { receivingWeekdays: [1, 2, 3, 4, 5], cutOffTimes: {}, minutesToLaboratory: 45 },
      places,
      booked,
      turnover: { rooms, ...staff },
      children: [
        { ...child, id: 1, bornOn: '2024-02-02' },
        { ...child, id: 2, bornOn: '2025-06-03', leastMinutes: 240, longestMinutes: 480 },
        { ...child, id: 3, bornOn: '2021-05-05' },
      ],
      usualWaitMinutes: 30,
      leadDays: 2,
      now: Date.parse('2026-02-20T16:00:00Z'),
    });
  // A clinic that is known for years: 2,000 mornings to come, and 100,000 that are over.
  const coming = bookings(2_000, '2026-03-01', 1_000);
  const past = bookings(100_000, '1999-01-04', 9_900);

  const cost = inTurns({
    conversion: conversions,
    plan: repeated(400, plan),
    proposal: repeated(4, proposal(coming)),
    emptyProposal: repeated(4, proposal([])),
    longProposal: repeated(4, proposal([...past, ...coming])),
  });
  const beside = (what, value, limit) => ({
    what,
    value: micro(value),
    of: `${micro(cost.conversion)} a conversion`,
    ratio: value / cost.conversion,
    limit,
  });
  return [
    beside('A fasting plan', cost.plan, 50),
    beside('12 weeks for 3 siblings, nothing booked', cost.emptyProposal, 2_000),
    beside('12 weeks for 3 siblings, 2,000 mornings booked', cost.proposal, 2_000),
    {
      what: 'The same with 100,000 past mornings handed in',
      value: micro(cost.longProposal),
      of: `${micro(cost.proposal)} without them`,
      ratio: cost.longProposal / cost.proposal,
      limit: 1.5,
    },
  ];
}

const micro = (milliseconds) => `${(milliseconds * 1000).toFixed(1)} µs`;

/** Milliseconds of one piece of work, when it is done so many times in a row. */
function repeated(times, work) {
  return () => {
    const startedAt = performance.now();
    for (let index = 0; index < times; index += 1) work(index);
    return (performance.now() - startedAt) / times;
  };
}

/** The median of each over all rounds, one after the other in each round; the first round warms up. */
function inTurns(measured) {
  const taken = Object.fromEntries(Object.keys(measured).map((what) => [what, []]));
  for (let round = 0; round <= rounds; round += 1)
    for (const [what, measure] of Object.entries(measured)) {
      const cost = measure();
      if (round > 0) taken[what].push(cost);
    }
  return Object.fromEntries(Object.entries(taken).map(([what, costs]) => [what, medianOf(costs)]));
}
