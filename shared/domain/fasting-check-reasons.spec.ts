import { type ExplainKey, type FastingAnswer, type FastingCheckRequest } from './fasting-check';
import { at, check, closed, fed, infant, planOf, sip, toddler } from './fasting-check.testing';
import { instantOf, readings } from './zone';

if (toddler.kind !== 'standard') throw new Error('individual');
const plan = toddler;
/** Least 6 h for food and 4 h for the rest; stops 1:00 and 3:00. */
const mixed = {
  ...plan,
  nothingAt: at('03:00'),
  stops: plan.stops.map((stop) =>
    stop.item === 'solid-food' ? stop : { ...stop, leastMinutes: 240, stopAt: at('03:00') },
  ),
};
const feed = (time: string): FastingAnswer => ({ kind: 'feed', lastIntakeAt: at(time) });

describe('the reasons that staff read', () => {
  type Row = [string, FastingAnswer, Partial<FastingCheckRequest>, ExplainKey[]];
  it.each<Row>([
    ['nothing', { kind: 'nothing' }, {}, ['nothing-since-the-stop', 'long-enough-at-arrival']],
    [
      'nothing, but the family comes before the hours are over',
      { kind: 'nothing' },
      { arrivalAt: at('06:30') },
      ['nothing-since-the-stop', 'ready-after-arrival'],
    ],
    ['fed in time', feed('00:30'), {}, ['long-enough-at-arrival']],
    ['fed late', feed('02:30'), {}, ['ready-after-arrival']],
    [
      'fed late, and neither rooms nor laboratory end',
      feed('06:00'),
      { now: at('06:00'), lastRoomStartAt: null, laboratoryCutOffAt: null },
      ['ready-after-arrival'],
    ],
    ['fed too late', feed('03:01'), {}, ['ready-after-arrival', 'after-last-room-start']],
    [
      'fed too late, and nobody answers',
      feed('03:01'),
      closed,
      ['ready-after-arrival', 'after-last-room-start', 'nobody-answers-the-phone'],
    ],
    [
      'ready at the very cut-off',
      feed('02:30'),
      { laboratoryCutOffAt: at('08:30') },
      ['ready-after-arrival', 'after-laboratory-cut-off'],
    ],
    [
      'ready at the very end of the longest fast',
      feed('02:30'),
      { plan: { ...plan, longestMinutes: 360 } },
      ['ready-after-arrival', 'longest-fast-would-pass'],
    ],
    ['a sip in time', sip('00:30'), {}, ['a-sip', 'long-enough-at-arrival']],
    ['a late sip', sip('02:00'), {}, ['a-sip', 'ready-after-arrival']],
    ['a sip without a time', { kind: 'sip' }, {}, ['time-not-known']],
    ['a feed without a time', { kind: 'feed' }, {}, ['time-not-known']],
    ['not sure', { kind: 'unsure' }, {}, ['not-sure']],
    ['not sure, with a time', { ...feed('00:30'), kind: 'unsure' }, {}, ['not-sure']],
    ['food or milk at 2:00', feed('02:00'), { plan: mixed }, ['item-not-known']],
    ['food or milk just in time for milk', feed('03:00'), { plan: mixed }, ['item-not-known']],
    ['nothing, at 4:00', { ...feed('04:00'), kind: 'nothing' }, {}, ['contradictory']],
    [
      'nothing, at the very stop',
      { ...feed('01:00'), kind: 'nothing' },
      {},
      ['long-enough-at-arrival'],
    ],
    ['no supper', fed('18:00', '2026-12-08'), {}, ['longest-fast-would-pass']],
    [
      'a sip, and the fast would pass before the child is ready',
      sip('04:00'),
      { plan: { ...plan, longestMinutes: 480 } },
      ['a-sip', 'longest-fast-would-pass'],
    ],
    ['an individual plan', feed('02:00'), { plan: planOf('2026-11-01') }, ['individual-plan']],
  ])('%s', (_, answer, more, explain) => {
    expect(check(answer, more).explain).toEqual(explain);
  });
});

describe('the boundaries of a check', () => {
  it('is ready when the last thing is, where a clock made one stop earlier than its hours', () => {
    const stops = plan.stops.map((stop, index) =>
      index === 0 ? { ...stop, stopAt: at('00:00'), clock: '00:00' } : stop,
    );
    expect(check({ kind: 'nothing' }, { plan: { ...plan, stops } }).readyAt).toBe(at('07:00'));
  });

  it('knows the hours of a contradiction, and no ready time', () => {
    expect(check({ ...feed('04:00'), kind: 'nothing' })).toMatchObject({
      readyAt: null,
      fastedMinutes: { now: 105, atArrival: 180, atCollection: 210 },
    });
  });

  it('takes a second reading that is just now', () => {
    const both = { earlier: at('04:45'), later: at('05:45') };
    expect(check({ kind: 'feed', readings: both }).fastedMinutes?.now).toBe(0);
  });

  it.each([
    ['05:29', false],
    ['05:30', true],
    ['07:59', true],
    ['08:00', false],
  ])('the telephone at %s', (time, answers) => {
    const asked = { now: at(time), arrivalAt: at('08:15'), likelyCollectionAt: at('08:45') };
    expect(check({ kind: 'nothing' }, asked).phoneAnswers).toBe(answers);
  });

  it('promises no call for this very minute, nor where none is waited for', () => {
    const now = at('05:00');
    const promised = (answer: FastingAnswer, weCallBy: number, more = {}) =>
      check(answer, { now, weCallBy, ...more });
    expect(promised(feed('03:01'), now)).toMatchObject({
      outcome: 'come-nurse-decides',
      weCallBy: null,
    });
    expect(promised(feed('03:01'), now + 60_000)).toMatchObject({
      outcome: 'stay-we-call',
      weCallBy: now + 60_000,
    });
    expect(promised({ kind: 'nothing' }, at('06:00')).weCallBy).toBeNull();
    const supper = fed('18:00', '2026-12-08');
    expect(promised(supper, at('06:30'), { now: at('05:45') })).toMatchObject({
      outcome: 'feed-now-and-call',
      weCallBy: null,
    });
  });
});

describe('what went into a check', () => {
  it('has no hours for an individual plan', () => {
    expect(check(feed('02:00'), { plan: planOf('2026-11-01') }).explanation).toMatchObject({
      rule: 'fasting-check.individual-plan',
      inputs: { leastMinutes: null, longestMinutes: null, basis: null, lastIntakeAt: at('02:00') },
    });
  });

  it('has both readings of a time that occurs twice', () => {
    const on = '2026-11-01';
    const zone = 'America/Chicago';
    const twice = readings({ on, time: '01:30', zone });
    const now = instantOf({ on, time: '04:45', zone });
    const asked = { plan: infant, now, arrivalAt: now, dawnPhone: null };
    expect(
      check({ kind: 'feed', readings: twice }, { ...asked, likelyCollectionAt: now }).explanation
        .inputs,
    ).toMatchObject({ lastIntakeAt: twice.later, earlierReadingAt: twice.earlier });
  });
});
