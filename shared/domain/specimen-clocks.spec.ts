import { laboratoryCutOffAt } from './laboratory-day';
import {
  demoLaboratoryProfile,
  dueDays,
  dueOn,
  explainDueOn,
  isOverdue,
  resultStages,
  specimenClocks,
  type SpecimenClocksRequest,
} from './specimen-clocks';
import { instantOf } from './zone';

const zone = 'America/Chicago';
const at = (time: string): number => instantOf({ on: '2026-12-09', time, zone });
const base: SpecimenClocksRequest = {
  profile: { ...demoLaboratoryProfile, minutesToLaboratory: 30 },
  collectedAt: at('07:30'),
  neutralisedAt: null,
  pickedUpAt: null,
  receivedAt: null,
  cutOffAt: at('11:30'),
  now: at('07:40'),
};
const states = (change: Partial<SpecimenClocksRequest>): string[] =>
  specimenClocks({ ...base, ...change }).map(({ step, state }) => `${step} ${state}`);

describe('the clocks of a specimen', () => {
  it('run from collection', () => {
    expect(specimenClocks(base)).toMatchObject([
      {
        step: 'neutralise',
        dueAt: at('08:00'),
        doneAt: null,
        minutes: 10,
        limitMinutes: 30,
        state: 'running',
      },
      {
        step: 'pick-up',
        dueAt: at('11:00'),
        doneAt: null,
        minutes: 10,
        limitMinutes: 210,
        state: 'running',
      },
      {
        step: 'receipt',
        dueAt: at('11:30'),
        doneAt: null,
        minutes: 10,
        limitMinutes: 240,
        state: 'running',
      },
    ]);
  });

  it.each<[string, Partial<SpecimenClocksRequest>, string]>([
    ['two thirds gone', { now: at('07:50') }, 'neutralise soon'],
    ['at the limit', { now: at('08:00') }, 'neutralise soon'],
    ['a minute after', { now: at('08:01') }, 'neutralise late'],
    ['done in time', { neutralisedAt: at('08:00'), now: at('09:00') }, 'neutralise in-time'],
    ['done late', { neutralisedAt: at('08:10'), now: at('09:00') }, 'neutralise done-late'],
    ['received without a pick-up noted', { receivedAt: at('10:30') }, 'pick-up in-time'],
    ['received', { receivedAt: at('11:30') }, 'receipt in-time'],
    ['received late', { receivedAt: at('11:31') }, 'receipt done-late'],
  ])('%s', (_, change, expected) => {
    expect(states(change)).toContain(expected);
  });

  it('end at the last receipt of the day where it comes first', () => {
    const [, , receipt] = specimenClocks({ ...base, cutOffAt: at('09:00') });
    expect(receipt?.dueAt).toBe(at('09:00'));
    const [, , open] = specimenClocks({ ...base, collectedAt: at('08:30'), cutOffAt: null });
    expect(open?.dueAt).toBe(at('12:30'));
  });

  it('have none for neutralising where the laboratory does not want it', () => {
    const profile = { ...demoLaboratoryProfile, neutraliseWithinMinutes: null };
    expect(states({ profile })).toEqual(['pick-up running', 'receipt running']);
  });
});

describe('how a clock was reached', () => {
  const rules = (change: Partial<SpecimenClocksRequest>): string[] =>
    specimenClocks({ ...base, ...change }).map(({ explanation }) => explanation.rule);

  it('names the limit that counted', () => {
    expect(rules({ cutOffAt: null })).toEqual([
      'specimen.neutralise-within',
      'specimen.pick-up-before-receipt',
      'specimen.receipt-within',
    ]);
    expect(rules({ cutOffAt: at('11:29') })[2]).toBe('specimen.receipt-by-cut-off');
    expect(rules({ cutOffAt: at('11:31') })[2]).toBe('specimen.receipt-within');
  });

  it('gives what it was counted from, and the version of the profile', () => {
    const [neutralise, pickUp, receipt] = specimenClocks({ ...base, cutOffAt: at('09:00') });
    const common = { collectedAt: at('07:30'), profileVersion: 1 };
    expect(neutralise?.explanation.inputs).toEqual({
      ...common,
      withinMinutes: 30,
      dueAt: at('08:00'),
    });
    expect(pickUp?.explanation.inputs).toEqual({
      ...common,
      withinMinutes: 240,
      cutOffAt: at('09:00'),
      receiptDueAt: at('09:00'),
      minutesToLaboratory: 30,
      dueAt: at('08:30'),
    });
    expect(receipt?.explanation.inputs).toEqual({
      ...common,
      withinMinutes: 240,
      cutOffAt: at('09:00'),
      receiptDueAt: at('09:00'),
      dueAt: at('09:00'),
    });
  });

  // Clinical facts 7, row 35: 42 days from 2026-12-09.
  it('and of a result the days of its stage', () => {
    const profile = { ...demoLaboratoryProfile, version: 4 };
    const request = { profile, receivedOn: '2026-12-09', stage: 'cultureNegativeFinal' } as const;
    expect(explainDueOn(request)).toEqual({
      rule: 'specimen.result-days',
      inputs: {
        stage: 'cultureNegativeFinal',
        receivedOn: '2026-12-09',
        days: 42,
        dueOn: '2027-01-20',
        profileVersion: 4,
      },
    });
  });
});

describe('when results are due', () => {
  // Clinical facts 7: rows 31, 32 and 35.
  it.each([
    ['smear', '2026-12-09', '2026-12-10'],
    ['amplification', '2026-12-09', '2026-12-11'],
    ['cultureNegativeFinal', '2026-12-09', '2027-01-20'],
    ['cultureNegativeFinal', '2028-01-18', '2028-02-29'],
    ['cultureNegativeFinal', '2027-01-18', '2027-03-01'],
  ] as const)('%s received on %s: %s', (stage, receivedOn, expected) => {
    expect(dueOn({ profile: demoLaboratoryProfile, receivedOn, stage })).toBe(expected);
  });

  // Clinical facts 7, rows 36 and 37: 49 days in Ontario, 8 weeks, 60 days.
  it.each([
    [49, '2027-01-27'],
    [56, '2027-02-03'],
    [60, '2027-02-07'],
  ])('negative after %i days by another profile', (cultureNegativeFinal, expected) => {
    const resultDays = { ...demoLaboratoryProfile.resultDays, cultureNegativeFinal };
    const receivedOn = '2026-12-09';
    expect(dueOn({ profile: { resultDays }, receivedOn, stage: 'cultureNegativeFinal' })).toBe(
      expected,
    );
  });

  it('has a day for every stage', () => {
    const days = dueDays(demoLaboratoryProfile, '2026-12-09');
    expect(Object.keys(days)).toEqual([...resultStages]);
  });

  it.each([
    ['2027-01-20', false, false],
    ['2027-01-21', false, true],
    ['2027-01-21', true, false],
  ])('on %s, reported %p: overdue %p', (today, isReported, expected) => {
    expect(isOverdue({ dueOn: '2027-01-20', today, isReported })).toBe(expected);
  });
});

describe('the demo profile', () => {
  // Clinical facts 7: rows 19 and 21.
  it('lies in the published ranges', () => {
    expect(demoLaboratoryProfile.neutraliseWithinMinutes).toBeGreaterThanOrEqual(30);
    expect(demoLaboratoryProfile.neutraliseWithinMinutes).toBeLessThanOrEqual(360);
    expect(demoLaboratoryProfile.minimumVolumeMl).toBe(5);
    expect(demoLaboratoryProfile.maximumVolumeMl).toBe(15);
  });

  it('has a last receipt on receiving days only', () => {
    const profile = demoLaboratoryProfile;
    expect(laboratoryCutOffAt({ profile, on: '2026-12-09', zone })).toBe(at('11:30'));
    expect(laboratoryCutOffAt({ profile, on: '2026-12-12', zone })).toBeNull();
    const always = { ...profile, cutOffTimes: {} };
    expect(laboratoryCutOffAt({ profile: always, on: '2026-12-09', zone })).toBeNull();
  });
});
