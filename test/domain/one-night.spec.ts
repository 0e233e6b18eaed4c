import { chooseLetter, type SpecimenResults } from '../../shared/domain/letter-choice';
import { fastingCheck } from '../../shared/domain/fasting-check';
import { fastingPlan, type StandardPlan } from '../../shared/domain/fasting-plan';
import { bandFor, startingProtocol } from '../../shared/domain/fasting-protocol';
import { laboratoryCutOffAt } from '../../shared/domain/laboratory-day';
import { placesOfMorning } from '../../shared/domain/places-of-morning';
import { proposeRuns } from '../../shared/domain/series-dates';
import { demoLaboratoryProfile, dueOn, specimenClocks } from '../../shared/domain/specimen-clocks';
import { ageOn, dayOf, instantOf } from '../../shared/domain/zone';
import { familyStopTime, familyTime } from '../../shared/languages/family-time';
import { profileOf } from '../../shared/languages/profiles';

/**
 * One family through the whole chain: a brother of 17 months and a sister of 5 months, on the
 * three mornings after the clock of Chicago goes forward (2026-03-08), by a clinic that is also
 * open on Sunday. Every instant is checked in UTC, so that the machine's own zone cannot help.
 */
const zone = 'America/Chicago';
const now = instantOf({ on: '2026-02-27', time: '15:00', zone });
const family = [
  { id: 1, bornOn: '2024-10-01' },
  { id: 2, bornOn: '2025-10-05' },
];
const profile = { ...demoLaboratoryProfile, receivingWeekdays: [7, 1, 2, 3, 4] as const };

const proposal = proposeRuns({
  zone,
  from: '2026-03-08',
  weeks: 1,
  count: 3,
  clinicDays: ([7, 1, 2, 3, 4] as const).map((weekday) => ({
    weekday,
    from: '06:00',
    until: '09:00',
  })),
  closures: [],
  laboratory: {
    receivingWeekdays: profile.receivingWeekdays,
    cutOffTimes: profile.cutOffTimes,
    minutesToLaboratory: 45,
  },
  places: placesOfMorning({
    rooms: [
      { id: 1, closureMinutes: 60 },
      { id: 2, closureMinutes: 60 },
    ],
    staffPairs: 1,
    arrivalsFrom: '06:00',
    arrivalsUntil: '09:00',
    minutesPerChild: 30,
    limit: 5,
  }),
  booked: [],
  children: family.map(({ id, bornOn }) => {
    const band = bandFor(startingProtocol, ageOn(bornOn, '2026-03-08').months);
    return {
      id,
      bornOn,
      leastMinutes: (band?.leastHours?.['solid-food'] ?? 0) * 60,
      longestMinutes: (band?.longestHours ?? 0) * 60,
    };
  }),
  usualWaitMinutes: startingProtocol.usualWaitMinutes,
  leadDays: 3,
  now,
});

const planOf = (childId: number, on: string): StandardPlan => {
  const day = proposal.runs[0]?.days.find((candidate) => candidate.on === on);
  const place = day?.places.find((candidate) => candidate.childId === childId);
  const child = family.find(({ id }) => id === childId);
  if (!place || !child) throw new Error('No place was found.');
  const plan = fastingPlan({
    arrivalAt: instantOf({ on, time: place.arrivalTime, zone }),
    zone,
    bornOn: child.bornOn,
    feeding: 'family-food',
    protocol: startingProtocol,
    cautions: [],
    travelMinutes: 30,
    readyMinutes: 30,
  });
  if (plan.kind === 'individual') throw new Error(plan.reason);
  return plan;
};
const utc = (instant: number): string => new Date(instant).toISOString();

describe('brother and sister on the night the clock goes forward', () => {
  it('come on three mornings from Sunday, the sister first', () => {
    const [run] = proposal.runs;
    expect(run?.startsInDays).toBe(9);
    expect(run?.days.map(({ on }) => on)).toEqual(['2026-03-08', '2026-03-09', '2026-03-10']);
    expect(run?.days[0]?.places).toEqual([
      { childId: 2, arrivalTime: '06:00', roomId: 1 },
      { childId: 1, arrivalTime: '06:30', roomId: 2 },
    ]);
  });

  it('stop at times that are elapsed hours before they arrive', () => {
    const [sister, brother] = [planOf(2, '2026-03-08'), planOf(1, '2026-03-08')];
    // 4 h before 6:00 CDT (11:00Z) and 6 h before 6:30 CDT (11:30Z).
    expect(utc(sister.stopAt)).toBe('2026-03-08T07:00:00.000Z');
    expect(utc(brother.stopAt)).toBe('2026-03-08T05:30:00.000Z');
    const told = (plan: StandardPlan): string =>
      familyStopTime(plan.stopAt, zone, profileOf('en')).text;
    expect(told(sister)).toBe('Sunday, 8 March, 1:00 at night');
    expect(told(brother)).toBe('Saturday, 7 March, 11:30 at night');
    expect(told(planOf(2, '2026-03-09'))).toBe('Monday, 9 March, 2:00 at night');
    // 6 h before 6:30 on an ordinary night.
    expect(told(planOf(1, '2026-03-09'))).toBe('Monday, 9 March, 12:30 at night');
  });

  it('answer before dawn: one comes, one waits until the hours are over', () => {
    const answered = (childId: number, fedAt: string): ReturnType<typeof fastingCheck> => {
      const plan = planOf(childId, '2026-03-08');
      return fastingCheck({
        answer: { kind: 'feed', lastIntakeAt: Date.parse(fedAt) },
        plan,
        now: Date.parse('2026-03-08T10:15:00Z'),
        arrivalAt: plan.arriveAt,
        likelyCollectionAt: plan.likelyCollectionAt,
        dawnPhone: null,
        lastRoomStartAt: instantOf({ on: '2026-03-08', time: '09:00', zone }),
        laboratoryCutOffAt: laboratoryCutOffAt({ profile, on: '2026-03-08', zone }),
      });
    };
    expect(answered(2, '2026-03-08T06:50:00Z')).toMatchObject({ outcome: 'come' });
    const brother = answered(1, '2026-03-08T06:45:00Z');
    expect(brother).toMatchObject({ verdict: 'not-long-enough', outcome: 'come-and-wait' });
    const waitUntil = brother.ok ? brother.waitUntil : null;
    expect(familyTime(waitUntil ?? 0, zone, profileOf('en')).time).toBe('7:45 in the morning');
  });

  it('have their specimens received in time and a final answer 42 days later', () => {
    const collectedAt = planOf(2, '2026-03-08').likelyCollectionAt;
    const clocks = specimenClocks({
      profile,
      collectedAt,
      neutralisedAt: collectedAt + 12 * 60_000,
      pickedUpAt: collectedAt + 50 * 60_000,
      receivedAt: collectedAt + 95 * 60_000,
      cutOffAt: laboratoryCutOffAt({ profile, on: '2026-03-08', zone }),
      now: collectedAt + 200 * 60_000,
    });
    expect(clocks.map(({ state }) => state)).toEqual(['in-time', 'in-time', 'in-time']);
    const receivedOn = dayOf(collectedAt, zone);
    expect(dueOn({ profile, receivedOn, stage: 'cultureNegativeFinal' })).toBe('2026-04-19');
  });

  it('get a letter only when all three answers are there', () => {
    const negative: SpecimenResults = {
      state: 'reported',
      finality: 'final',
      smear: 'negative',
      amplification: 'not-detected',
      culture: 'negative-final',
    };
    const early: SpecimenResults = {
      ...negative,
      finality: 'preliminary',
      culture: 'no-growth-yet',
    };
    const letterOf = (...specimens: SpecimenResults[]): string =>
      chooseLetter({ specimens, isClosedEarly: false }).letter;
    expect(letterOf(negative, negative, early)).toBe('still-waiting');
    expect(letterOf(negative, negative, negative)).toBe('all-negative');
    expect(letterOf(negative, negative, { ...early, amplification: 'detected' })).toBe('positive');
  });
});
