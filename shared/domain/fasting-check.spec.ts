import { fastingCheck, type FastingAnswer, type FastingCheckRequest } from './fasting-check';
import {
  zone,
  at,
  planOf,
  infant,
  toddler,
  request,
  check,
  closed,
  fed,
  sip,
} from './fasting-check.testing';
import { hungerCeiling } from './fasting-hours';
import { localTimeOf, readings } from './zone';

describe('verdict and outcome', () => {
  type Row = [string, FastingAnswer, Partial<FastingCheckRequest>, string, string];
  it.each<Row>([
    ['nothing since the stop', { kind: 'nothing' }, {}, 'long-enough', 'come'],
    ['nothing, before the telephone opens', { kind: 'nothing' }, closed, 'long-enough', 'come'],
    ['fed exactly at the stop', fed('01:00'), {}, 'long-enough', 'come'],
    ['fed a minute later', fed('01:01'), {}, 'not-long-enough', 'come-and-wait'],
    [
      'fed at 2:30, ready before the last room',
      fed('02:30'),
      {},
      'not-long-enough',
      'come-and-wait',
    ],
    ['fed at 3:00, ready with the last room', fed('03:00'), {}, 'not-long-enough', 'come-and-wait'],
    // A wait is offered only before the last room, the cut-off and the longest fast (practice 3).
    ['fed at 3:01, after the last room', fed('03:01'), {}, 'not-long-enough', 'call-us'],
    [
      'the same before the telephone opens',
      fed('03:01'),
      closed,
      'not-long-enough',
      'stay-we-call',
    ],
    [
      'fed at 2:30, after the cut-off',
      fed('02:30'),
      { laboratoryCutOffAt: at('08:30') },
      'not-long-enough',
      'call-us',
    ],
    [
      'the same, nobody answers that morning',
      fed('03:01'),
      { dawnPhone: null },
      'not-long-enough',
      'come-nurse-decides',
    ],
    [
      'the same, a call is promised',
      fed('03:01'),
      { dawnPhone: null, weCallBy: at('06:00') },
      'not-long-enough',
      'stay-we-call',
    ],
    // How much a sip matters is for a person to say, the sooner the better (practice 3).
    ['a sip at 4:00', sip('04:00'), {}, 'not-long-enough', 'call-us'],
    [
      'a sip before the telephone opens',
      sip('04:00'),
      closed,
      'not-long-enough',
      'come-nurse-decides',
    ],
    ['a sip before the stop', sip('00:30'), {}, 'long-enough', 'come'],
    ['a sip at no known time', { kind: 'sip' }, {}, 'cannot-tell', 'call-us'],
    ['a feed at no known time', { kind: 'feed' }, {}, 'cannot-tell', 'call-us'],
    [
      'the same before the telephone opens',
      { kind: 'feed' },
      closed,
      'cannot-tell',
      'stay-we-call',
    ],
    ['not sure', { kind: 'unsure' }, {}, 'cannot-tell', 'call-us'],
    ['not sure, nobody answers', { kind: 'unsure' }, closed, 'cannot-tell', 'come-nurse-decides'],
    [
      'not sure, with a time',
      { kind: 'unsure', lastIntakeAt: at('00:30') },
      {},
      'cannot-tell',
      'call-us',
    ],
    // Practice 1: a family for whom the longest fast would pass feeds first.
    [
      'no supper, 13 h over at 7:00',
      fed('18:00', '2026-12-08'),
      {},
      'long-enough',
      'feed-now-and-call',
    ],
    [
      'supper at 18:30: over at the likely collection, not before',
      fed('18:30', '2026-12-08'),
      {},
      'long-enough',
      'come',
    ],
    [
      'an infant that is late',
      { kind: 'feed', lastIntakeAt: at('00:30') },
      { plan: infant, arrivalAt: at('08:15'), likelyCollectionAt: at('08:45') },
      'long-enough',
      'feed-now-and-call',
    ],
    ['an infant fed at 3:00', fed('03:00'), { plan: infant }, 'long-enough', 'come'],
    ['an infant fed at 3:30', fed('03:30'), { plan: infant }, 'not-long-enough', 'come-and-wait'],
  ])('%s', (_, answer, more, verdict, outcome) => {
    expect(check(answer, more)).toMatchObject({ verdict, outcome });
  });

  it('of an individual plan is a person’s', () => {
    const plan = planOf('2026-11-01');
    expect(check(fed('02:00'), { plan })).toMatchObject({
      verdict: 'cannot-tell',
      outcome: 'call-us',
      fastedMinutes: { now: 225, atArrival: 300, atCollection: 330 },
      explain: ['individual-plan'],
    });
  });

  it('says until when to wait, and when the clinic calls', () => {
    expect(check(fed('02:30')).waitUntil).toBe(at('08:30'));
    expect(check(fed('02:30')).weCallBy).toBeNull();
    expect(check(fed('03:01'), closed).weCallBy).toBe(at('05:30'));
    expect(check(fed('18:00', '2026-12-08'), closed).weCallBy).toBe(at('05:30'));
    expect(check({ kind: 'nothing' }).waitUntil).toBeNull();
  });

  it('promises no call in the past', () => {
    const more = { now: at('08:30'), arrivalAt: at('08:45'), weCallBy: at('06:00') };
    expect(check(fed('05:00'), more)).toMatchObject({
      outcome: 'come-nurse-decides',
      weCallBy: null,
    });
  });

  it('counts elapsed minutes', () => {
    expect(check(fed('01:00')).fastedMinutes).toEqual({
      now: 285,
      atArrival: 360,
      atCollection: 390,
    });
  });

  it('takes the hours of the thing that was taken', () => {
    if (toddler.kind !== 'standard') throw new Error('individual');
    const stops = toddler.stops.map((stop) =>
      stop.item === 'water' ? { ...stop, leastMinutes: 240 } : stop,
    );
    const plan = { ...toddler, stops };
    expect(check({ ...fed('02:30'), item: 'water' }, { plan }).verdict).toBe('long-enough');
    expect(check({ ...fed('02:30'), item: 'formula' }, { plan }).verdict).toBe('not-long-enough');
    expect(check(fed('02:30'), { plan }).verdict).toBe('not-long-enough');
  });

  it('never cancels a morning', () => {
    const outcomes = new Set<string>();
    for (const kind of ['nothing', 'sip', 'feed', 'unsure'] as const) {
      for (let minutes = 0; minutes <= 600; minutes += 7) {
        for (const now of [at('04:45'), at('05:45')]) {
          const lastIntakeAt = now - minutes * 60_000;
          outcomes.add(check({ kind, lastIntakeAt }, { now }).outcome);
        }
      }
    }
    expect([...outcomes].sort()).toEqual([
      'call-us',
      'come',
      'come-and-wait',
      'come-nurse-decides',
      'stay-we-call',
    ]);
  });
});

describe('a time that occurs twice', () => {
  // Communication facts 8.6, T4: 1:30 on 2026-11-01 is 6:30 or 7:30 UTC.
  const on = '2026-11-01';
  const twice = readings({ on, time: '01:30', zone });
  const answer: FastingAnswer = { kind: 'feed', readings: twice };
  const morning = (time: string, bornOn: string): Partial<FastingCheckRequest> => ({
    plan: planOf(bornOn, time, on),
    now: at('04:45', on),
    arrivalAt: at(time, on),
    likelyCollectionAt: at(time, on) + 30 * 60_000,
    dawnPhone: { answersFrom: at('04:30', on), answersUntil: at('08:00', on) },
    lastRoomStartAt: at('09:00', on),
    laboratoryCutOffAt: at('11:30', on),
  });

  it('is decided by a person where the readings differ', () => {
    // Least 6 h before 7:00: ready at 6:30 or 7:30.
    expect(check(answer, morning('07:00', '2023-05-05'))).toMatchObject({
      verdict: 'cannot-tell',
      outcome: 'call-us',
      explain: ['clock-change-two-readings'],
    });
  });

  it('is long enough where both readings are', () => {
    const result = check(answer, morning('07:30', '2023-05-05'));
    expect(result).toMatchObject({ verdict: 'long-enough', outcome: 'come' });
    expect(localTimeOf(result.readyAt ?? 0, zone)).toBe('07:30');
  });

  it('counts the longest fast from the earlier reading', () => {
    // 5 months, longest 6 h: from the first 1:30 it ends at 6:30, from the second at 7:30.
    const more = morning('06:15', '2026-05-10');
    expect(check(answer, more)).toMatchObject({
      verdict: 'long-enough',
      outcome: 'feed-now-and-call',
    });
    expect(
      check({ ...answer, readings: { earlier: twice.later, later: twice.later } }, more),
    ).toMatchObject({ outcome: 'come' });
  });

  it('drops a reading that has not come yet', () => {
    const now = twice.earlier + 10 * 60_000;
    const result = check(answer, { ...morning('07:00', '2023-05-05'), now });
    expect(result).toMatchObject({ verdict: 'long-enough', fastedMinutes: { now: 10 } });
  });
});

describe('a time that cannot be', () => {
  it.each([
    ['in the future', at('05:46'), 'intake-in-the-future'],
    ['more than a day ago', at('05:44', '2026-12-08'), 'intake-too-long-ago'],
  ])('%s', (_, lastIntakeAt, error) => {
    expect(fastingCheck(request({ kind: 'feed', lastIntakeAt }))).toEqual({ ok: false, error });
  });

  it('is fine a day ago to the minute, and now', () => {
    expect(fastingCheck(request(fed('05:45', '2026-12-08'))).ok).toBe(true);
    expect(fastingCheck(request(fed('05:45'))).ok).toBe(true);
  });
});

describe('the ceiling of hunger', () => {
  // Practice 1: two things from 30 minutes before, feed at the ceiling.
  it.each([
    [449, 'ok'],
    [450, 'collect-or-feed'],
    [479, 'collect-or-feed'],
    [480, 'feed'],
    [700, 'feed'],
  ])('after %i of 480 minutes: %s', (minutes, expected) => {
    const lastIntakeAt = at('00:00');
    const now = lastIntakeAt + minutes * 60_000;
    expect(hungerCeiling({ lastIntakeAt, longestMinutes: 480, now })).toBe(expected);
  });
});
