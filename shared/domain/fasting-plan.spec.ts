import {
  cautions,
  fastingPlan,
  longestEndsAt,
  wallClockForFamily,
  type FastingPlanRequest,
  type StandardPlan,
} from './fasting-plan';
import { startingProtocol } from './fasting-protocol';
import { dayOf, instantOf, localTimeOf } from './zone';

const zone = 'America/Chicago';
const request = (
  on: string,
  time: string,
  bornOn: string,
  more: Partial<FastingPlanRequest> = {},
): FastingPlanRequest => ({
  arrivalAt: instantOf({ on, time, zone }),
  zone,
  bornOn,
  feeding: 'family-food',
  protocol: startingProtocol,
  cautions: [],
  travelMinutes: 25,
  readyMinutes: 35,
  ...more,
});
const standard = (asked: FastingPlanRequest): StandardPlan => {
  const plan = fastingPlan(asked);
  if (plan.kind !== 'standard') throw new Error(`individual: ${plan.reason}`);
  return plan;
};
const local = (instant: number): string => `${dayOf(instant, zone)} ${localTimeOf(instant, zone)}`;

/** A protocol of one least hour for all, to check published hours beside our own. */
const protocolOf = (least: number, longest: number): typeof startingProtocol => ({
  ...startingProtocol,
  bands: startingProtocol.bands.map((band) =>
    band.leastHours
      ? {
          ...band,
          leastHours: {
            ...band.leastHours,
            ...Object.fromEntries(Object.keys(band.leastHours).map((item) => [item, least])),
          },
          longestHours: longest,
        }
      : band,
  ),
});

describe('the stop time', () => {
  it.each([
    // Clinical facts 7, row 54.
    ['6 h before 7:00', '2026-12-09', '07:00', 6, '2026-12-09 01:00'],
    // Clinical facts 7, row 55, and 1.3 for 3, 8 and 10 hours.
    ['4 h before 7:00', '2026-12-09', '07:00', 4, '2026-12-09 03:00'],
    ['3 h before 7:00', '2026-12-09', '07:00', 3, '2026-12-09 04:00'],
    ['8 h before 7:00', '2026-12-09', '07:00', 8, '2026-12-08 23:00'],
    ['10 h before 7:00', '2026-12-09', '07:00', 10, '2026-12-08 21:00'],
    // Communication facts 8.6, T2: elapsed hours on the night the clock goes forward.
    ['8 h before 6:30 in March', '2026-03-08', '06:30', 8, '2026-03-07 21:30'],
    ['6 h before 7:00 in March', '2026-03-08', '07:00', 6, '2026-03-08 00:00'],
    // The night the clock goes back has an hour more.
    ['8 h before 6:30 in November', '2026-11-01', '06:30', 8, '2026-10-31 23:30'],
    ['4 h before 6:00 in November', '2026-11-01', '06:00', 4, '2026-11-01 02:00'],
    ['on a leap day', '2028-02-29', '06:00', 8, '2028-02-28 22:00'],
    ['after a leap day', '2028-03-01', '06:00', 8, '2028-02-29 22:00'],
  ])('%s', (_, on, time, least, expected) => {
    const plan = standard(request(on, time, '2020-01-01', { protocol: protocolOf(least, 16) }));
    expect(local(plan.stopAt)).toBe(expected);
    expect(plan.allSame).toBe(true);
    expect(plan.arriveAt - plan.stopAt).toBe(least * 3_600_000);
  });

  it('is the earliest where things differ', () => {
    const protocol = protocolOf(4, 12);
    const bands = protocol.bands.map((band) =>
      band.leastHours ? { ...band, leastHours: { ...band.leastHours, 'solid-food': 6 } } : band,
    );
    const plan = standard(
      request('2026-12-09', '07:00', '2026-05-01', { protocol: { ...protocol, bands } }),
    );
    expect(plan.allSame).toBe(false);
    expect(local(plan.stopAt)).toBe('2026-12-09 01:00');
    expect(plan.stops.map(({ item, stopAt }) => [item, localTimeOf(stopAt, zone)])).toEqual([
      ['solid-food', '01:00'],
      ['cows-milk', '03:00'],
      ['formula', '03:00'],
      ['breast-milk', '03:00'],
      ['water', '03:00'],
      ['other', '03:00'],
    ]);
  });

  it('of 00:00 is told as 23:59 on the evening before, others as they are', () => {
    const at = (on: string, time: string): number => instantOf({ on, time, zone });
    expect(local(wallClockForFamily(at('2026-12-09', '00:00'), zone))).toBe('2026-12-08 23:59');
    expect(local(wallClockForFamily(at('2026-12-09', '12:00'), zone))).toBe('2026-12-09 11:59');
    expect(local(wallClockForFamily(at('2026-12-09', '01:00'), zone))).toBe('2026-12-09 01:00');
    // It depends on the clinic's zone, not on UTC.
    expect(local(wallClockForFamily(at('2026-12-08', '18:00'), zone))).toBe('2026-12-08 18:00');
  });
});

describe('the plan of a child', () => {
  it('of 8 months has a last feed to the minute', () => {
    const plan = standard(
      request('2026-12-09', '07:00', '2026-04-01', { feeding: 'breast-and-formula' }),
    );
    expect(plan).toMatchObject({ isInfant: true, leastMinutes: 240, longestMinutes: 480 });
    expect({
      lastFeed: local(plan.lastFeedAt ?? 0),
      reminder: local(plan.stopReminderAt),
      stop: local(plan.stopAt),
      wake: local(plan.wakeAt),
      leave: local(plan.leaveAt),
      collection: local(plan.likelyCollectionAt),
      eatAgain: local(plan.eatAgainAt),
      earliestLastMeal: local(plan.earliestLastMealAt),
    }).toEqual({
      lastFeed: '2026-12-09 02:20',
      reminder: '2026-12-09 02:20',
      stop: '2026-12-09 03:00',
      wake: '2026-12-09 06:00',
      leave: '2026-12-09 06:35',
      collection: '2026-12-09 07:30',
      eatAgain: '2026-12-09 07:45',
      earliestLastMeal: '2026-12-08 23:30',
    });
  });

  it('of 3 years is reminded half an hour before bedtime', () => {
    const bedtimeAt = instantOf({ on: '2026-12-08', time: '19:30', zone });
    const plan = standard(request('2026-12-09', '07:00', '2023-05-05', { bedtimeAt }));
    expect(plan.lastFeedAt).toBeNull();
    expect(local(plan.stopReminderAt)).toBe('2026-12-08 19:00');
    expect(local(longestEndsAt(bedtimeAt, plan))).toBe('2026-12-09 08:30');
  });

  it('is reminded before the stop even when it goes to bed after it', () => {
    const bedtimeAt = instantOf({ on: '2026-12-09', time: '02:00', zone });
    const plan = standard(request('2026-12-09', '07:00', '2023-05-05', { bedtimeAt }));
    expect(local(plan.stopReminderAt)).toBe('2026-12-09 00:30');
  });

  // The age is counted on the clinic's day of the morning.
  it.each([
    ['2026-09-10', 'under-3-months'],
    ['2026-09-09', null],
  ])('born on %s', (bornOn, reason) => {
    const plan = fastingPlan(request('2026-12-09', '06:00', bornOn, { feeding: 'breast' }));
    expect(plan.kind === 'individual' ? plan.reason : null).toBe(reason);
  });

  it.each(cautions.map((caution) => [caution]))('with %s gets no standard plan', (caution) => {
    const plan = fastingPlan(request('2026-12-09', '07:00', '2023-05-05', { cautions: [caution] }));
    expect(plan).toEqual({
      kind: 'individual',
      reason: caution,
      reasons: [caution],
      ageMonths: 43,
      explanation: {
        rule: 'fasting-plan.individual-plan-missing',
        inputs: {
          ageMonths: 43,
          reasons: caution,
          arrivalAt: instantOf({ on: '2026-12-09', time: '07:00', zone }),
          protocolVersion: 1,
        },
      },
    });
  });

  it('with a condition that this clinic’s protocol does not hold back goes as any other', () => {
    const protocol = { ...startingProtocol, individualPlanCautions: ['diabetes'] as const };
    const asked = (caution: 'tube-feeding' | 'diabetes') =>
      fastingPlan(request('2026-12-09', '07:00', '2023-05-05', { protocol, cautions: [caution] }));
    const plan = asked('tube-feeding');
    expect(plan.kind === 'standard' && plan.stops.map(({ item }) => item)).toContain('tube-feed');
    expect(asked('diabetes')).toMatchObject({ kind: 'individual', reason: 'diabetes' });
  });

  it('names every reason, the age first', () => {
    const plan = fastingPlan(
      request('2026-12-09', '07:00', '2026-11-01', { cautions: ['prematurity', 'tube-feeding'] }),
    );
    expect(plan).toMatchObject({ reasons: ['under-3-months', 'prematurity', 'tube-feeding'] });
  });

  it('is individual under 3 months whatever the protocol says', () => {
    const bands = [{ ...protocolOf(4, 8).bands[1]!, fromMonths: 0, toMonths: null }];
    const plan = fastingPlan(
      request('2026-12-09', '07:00', '2026-11-01', { protocol: { ...startingProtocol, bands } }),
    );
    expect(plan).toMatchObject({ kind: 'individual', reason: 'under-3-months' });
  });

  it('is individual where the protocol asks for it, has no band, or the wait is too long', () => {
    const older = (bands: typeof startingProtocol.bands, usualWaitMinutes?: number) =>
      fastingPlan(
        request('2026-12-09', '07:00', '2026-07-01', {
          protocol: { ...startingProtocol, bands },
          usualWaitMinutes,
        }),
      );
    const individual = { ...startingProtocol.bands[0]!, toMonths: null };
    expect(older([individual])).toMatchObject({ reason: 'age-band' });
    expect(older([])).toMatchObject({ reason: 'not-in-protocol' });
    // 4 h and a wait of 2 h 1 min pass the 6 h of a child of 5 months.
    expect(older(startingProtocol.bands, 121)).toMatchObject({ reason: 'fast-too-long' });
    expect(older(startingProtocol.bands, 120).kind).toBe('standard');
  });
});
