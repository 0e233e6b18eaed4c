import { type FastingAnswer } from './fasting-check';
import { at, infant, toddler, check, closed, fed, sip } from './fasting-check.testing';

describe('what a plan with different hours for things means', () => {
  if (toddler.kind !== 'standard') throw new Error('individual');
  // Least 6 h for food, 4 h for milk, 2 h for water; stops 1:00, 3:00 and 5:00.
  const minutesOf = (item: string): number =>
    item === 'solid-food' ? 360 : item === 'water' ? 120 : 240;
  const stops = toddler.stops.map((stop) => ({
    ...stop,
    leastMinutes: minutesOf(stop.item),
    stopAt: at('07:00') - minutesOf(stop.item) * 60_000,
  }));
  const plan = { ...toddler, stops, nothingAt: at('05:00') };
  it.each<[string, FastingAnswer, string, string]>([
    ['all went by the plan', { kind: 'nothing' }, 'long-enough', 'come'],
    ['food at 1:00', { ...fed('01:00'), item: 'solid-food' }, 'long-enough', 'come'],
    ['formula at 3:00', { ...fed('03:00'), item: 'formula' }, 'long-enough', 'come'],
    ['milk or food at 2:00: it depends', fed('02:00'), 'cannot-tell', 'call-us'],
    ['milk or food at 3:01: too late for either', fed('03:01'), 'not-long-enough', 'call-us'],
    ['a sip at 5:00', sip('05:00'), 'long-enough', 'come'],
    ['a sip at 5:01', sip('05:01'), 'not-long-enough', 'call-us'],
    ['something, nobody is sure', { ...fed('04:00'), kind: 'unsure' }, 'cannot-tell', 'call-us'],
  ])('%s', (_, answer, verdict, outcome) => {
    expect(check(answer, { plan })).toMatchObject({ verdict, outcome });
  });
});

describe('a sip and the longest fast', () => {
  // Practice 1: hunger counts from the last meal. 8 h from the infant's stop at 3:00 end at 11:00.
  const late = { plan: infant, arrivalAt: at('10:40'), likelyCollectionAt: at('11:10') };
  it.each<[string, FastingAnswer, string]>([
    ['a sip eases no hunger', sip('05:00'), 'feed-now-and-call'],
    ['a feed does', fed('05:00'), 'come'],
    ['a sip after a feed', { ...sip('05:30'), lastMealAt: at('04:00') }, 'come'],
    ['a sip before an early stop', { ...sip('02:00') }, 'feed-now-and-call'],
  ])('%s', (_, answer, outcome) => {
    expect(check(answer, late).outcome).toBe(outcome);
  });
});

describe('an answer that contradicts itself', () => {
  it.each<[string, FastingAnswer, string, string]>([
    [
      'nothing, and a time after the stop',
      { ...fed('04:00'), kind: 'nothing' },
      'cannot-tell',
      'contradictory',
    ],
    [
      'nothing, and a time before it',
      { ...fed('00:30'), kind: 'nothing' },
      'long-enough',
      'long-enough-at-arrival',
    ],
  ])('%s', (_, answer, verdict, why) => {
    const result = check(answer);
    expect(result.verdict).toBe(verdict);
    expect(result.explain).toContain(why);
  });
});

describe('the explanation', () => {
  it('names the rule and what went in', () => {
    expect(check(fed('02:30')).explanation).toEqual({
      rule: 'fasting-check.ready-after-arrival',
      inputs: {
        answer: 'feed',
        item: null,
        lastIntakeAt: at('02:30'),
        earlierReadingAt: null,
        now: at('05:45'),
        arrivalAt: at('07:00'),
        likelyCollectionAt: at('07:30'),
        readyAt: at('08:30'),
        leastMinutes: 360,
        longestMinutes: 780,
        basis: 'protocol',
        reached: 'ready-after-arrival',
      },
    });
    expect(check({ kind: 'unsure' }, closed).explanation).toMatchObject({
      rule: 'fasting-check.nobody-answers-the-phone',
      inputs: { reached: 'not-sure, nobody-answers-the-phone', readyAt: null },
    });
  });
});
