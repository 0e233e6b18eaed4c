import {
  chosenFor,
  messagePlan,
  type MessagePlanRequest,
  type MessageTimes,
  type PlannedMorning,
  type PlannedRecipient,
} from './message-plan';
import { afterQuietHours, isQuiet } from './quiet-hours';
import { instantOf, localTimeOf, dayOf } from './zone';

const zone = 'America/Chicago';
const on = '2026-12-09';
const at = (day: string, time: string): number => instantOf({ on: day, time, zone });
const said = (instant: number): string =>
  `${dayOf(instant, zone).slice(5)} ${localTimeOf(instant, zone)}`;

const times: MessageTimes = {
  zone,
  aheadDays: 3,
  aheadTime: '10:00',
  eveningTime: '18:00',
  questionMinutesBefore: 120,
  nudgeMinutesBefore: 90,
  callListMinutesBefore: 60,
};
const toddler: PlannedMorning = {
  arrivalAt: at(on, '07:00'),
  stopAt: at(on, '01:00'),
  reminderAt: at('2026-12-08', '19:30'),
  isInfant: false,
  wakeAt: at(on, '05:45'),
  nightCarerId: null,
  escortId: null,
};
const baby: PlannedMorning = {
  ...toddler,
  stopAt: at(on, '03:00'),
  reminderAt: at(on, '02:20'),
  isInfant: true,
};
const ownPlan: PlannedMorning = { ...toddler, stopAt: null, reminderAt: null };
const mother: PlannedRecipient = {
  ...{ familyMemberId: 1, phone: '+13125550150', email: null, readsHow: 'well' },
  ...{ mayText: true, mayTextEarly: true, mayMail: false, isGuardian: true },
};
const grandmother = { ...mother, familyMemberId: 2, phone: '+13125550151' };
const request = (
  more: Partial<MessagePlanRequest<PlannedRecipient>> = {},
): MessagePlanRequest<PlannedRecipient> => ({
  ...{ on, mornings: [toddler], household: [mother], times },
  ...{ isAnswered: false, followsMorning: false, ...more },
});
const rows = (more: Partial<MessagePlanRequest<PlannedRecipient>> = {}): string[] =>
  messagePlan(request(more)).messages.map(
    ({ kind, familyMemberId, channel, dueAt, lastUsefulAt }) =>
      `${kind} ${familyMemberId} ${channel} ${said(dueAt)} until ${said(lastUsefulAt)}`,
  );
const dayOnly = { ...mother, mayTextEarly: false };

/**
 * The clinic's times; quiet hours 21:00 to 8:00 (47 CFR 64.1200(c)(1)); a text about a night is of use
 * until the stop, about a morning until the arrival.
 */
describe('the message plan of a household morning', () => {
  it.each<[string, Partial<MessagePlanRequest<PlannedRecipient>>, string[]]>([
    [
      'a mother who agreed to early texts',
      {},
      [
        'ahead 1 sms 12-06 10:00 until 12-08 18:00',
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
        'morning 1 sms 12-09 05:00 until 12-09 07:00',
        'nudge 1 sms 12-09 05:30 until 12-09 07:00',
      ],
    ],
    [
      'without a yes to early texts the evening asks for the page',
      { household: [dayOnly] },
      [
        'ahead 1 sms 12-06 10:00 until 12-08 18:00',
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
      ],
    ],
    [
      'the day after another morning there is no word ahead',
      { household: [dayOnly], followsMorning: true },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
      ],
    ],
    [
      'a baby’s last feed is worth a text at night to who agreed, not to others',
      { mornings: [baby], household: [dayOnly], followsMorning: true },
      ['evening 1 sms 12-08 18:00 until 12-08 21:00'],
    ],
    [
      'and to who agreed',
      { mornings: [baby], followsMorning: true, isAnswered: true },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-09 02:20 until 12-09 03:00',
      ],
    ],
    [
      'nobody who has answered is asked or nudged',
      { isAnswered: true, followsMorning: true },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
      ],
    ],
    [
      'e-mail alone may come in the evening until the stop and is asked for at any hour',
      {
        household: [{ ...mother, mayText: false, mayMail: true, email: 'a@example.org' }],
        followsMorning: true,
      },
      [
        'evening 1 mail 12-08 18:00 until 12-09 01:00',
        'morning 1 mail 12-09 05:00 until 12-09 07:00',
      ],
    ],
    [
      'an own plan has no hours to remind of',
      { mornings: [ownPlan], household: [dayOnly], followsMorning: true },
      ['evening 1 sms 12-08 18:00 until 12-08 21:00'],
    ],
    [
      'the night carer hears the evening, the escort the morning',
      {
        mornings: [{ ...toddler, nightCarerId: 1, escortId: 2 }],
        household: [mother, grandmother],
        followsMorning: true,
      },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
        'morning 2 sms 12-09 05:00 until 12-09 07:00',
        'nudge 2 sms 12-09 05:30 until 12-09 07:00',
      ],
    ],
    [
      'an escort who may not be texted early is asked in the evening',
      {
        mornings: [{ ...toddler, nightCarerId: 1, escortId: 2, reminderAt: null }],
        household: [mother, { ...grandmother, mayTextEarly: false }],
        followsMorning: true,
      },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'evening 2 sms 12-08 18:00 until 12-08 21:00',
      ],
    ],
    [
      'brothers and sisters share one text a moment; the first stop ends its use',
      {
        mornings: [{ ...baby, stopAt: at('2026-12-08', '20:30'), reminderAt: null }, toddler],
        household: [dayOnly],
        followsMorning: true,
      },
      [
        'evening 1 sms 12-08 18:00 until 12-08 20:30',
        'reminder 1 sms 12-08 19:30 until 12-09 01:00',
      ],
    ],
    ['nobody who can be written to', { household: [{ ...mother, mayText: false }] }, []],
    [
      'a nudge of 0 minutes is none, nor one before the question',
      {
        times: { ...times, nudgeMinutesBefore: 0 },
        mornings: [{ ...toddler, reminderAt: null }],
        followsMorning: true,
      },
      [
        'evening 1 sms 12-08 18:00 until 12-08 21:00',
        'morning 1 sms 12-09 05:00 until 12-09 07:00',
      ],
    ],
  ])('%s', (_, more, expected) => {
    expect(rows(more)).toEqual(expected);
  });

  it('says how the evening asks', () => {
    const asks = (more: Partial<MessagePlanRequest<PlannedRecipient>>) =>
      messagePlan(request(more)).messages.find(({ kind }) => kind === 'evening')?.asks;
    expect(asks({})).toBe('text');
    expect(asks({ household: [dayOnly] })).toBe('web');
    const two = { household: [mother, grandmother] };
    expect(asks({ ...two, mornings: [{ ...toddler, nightCarerId: 1, escortId: 2 }] })).toBe(
      'nobody',
    );
  });

  it('gives the call to one way alone', () => {
    const both = { ...mother, mayMail: true, email: 'a@example.org' };
    const { messages } = messagePlan(request({ household: [both], followsMorning: true }));
    expect(messages.map(({ kind, channel, callReason }) => [kind, channel, callReason])).toEqual([
      ['evening', 'sms', 'evening-text-failed'],
      ['evening', 'mail', null],
      ['reminder', 'sms', null],
      ['morning', 'sms', 'morning-text-failed'],
      ['morning', 'mail', null],
      ['nudge', 'sms', null],
    ]);
  });

  it('puts the call list an hour before the arrival', () => {
    expect(said(messagePlan(request()).moments.callListAt)).toBe('12-09 06:00');
  });

  it('calls who does not read before the evening text, and everybody whom nothing reaches', () => {
    const calls = (more: Partial<MessagePlanRequest<PlannedRecipient>>) =>
      messagePlan(request(more)).calls.map(
        ({ reason, familyMemberId, urgentAt }) => `${reason} ${familyMemberId} ${said(urgentAt)}`,
      );
    expect(calls({ household: [{ ...mother, readsHow: 'no' }] })).toEqual([
      'does-not-read 1 12-08 16:00',
    ]);
    expect(calls({ household: [{ ...mother, mayText: false }] })).toEqual([
      'nobody-to-message null 12-08 18:00',
    ]);
    expect(calls({ household: [{ ...mother, readsHow: 'little' }] })).toEqual([]);
  });

  // The clock goes back on 2026-11-01 at 2:00: hours before the arrival are elapsed hours.
  it('counts minutes before an arrival as they elapse when the clock changes', () => {
    const arrivalAt = instantOf({ on: '2026-11-01', time: '03:00', zone });
    const { moments } = messagePlan(
      request({ on: '2026-11-01', mornings: [{ ...toddler, arrivalAt }] }),
    );
    expect(arrivalAt - moments.questionAt).toBe(120 * 60_000);
    expect(localTimeOf(moments.eveningAt, zone)).toBe('18:00');
  });
});

describe('who is chosen', () => {
  it('takes the named who can be reached, else the first by text, else by e-mail', () => {
    const silent = { ...mother, mayText: false };
    const byMail = { ...grandmother, mayText: false, mayMail: true, email: 'g@example.org' };
    const ids = (named: (number | null)[], household: PlannedRecipient[]) =>
      chosenFor(named, household).map(({ familyMemberId }) => familyMemberId);
    expect(ids([2], [mother, grandmother])).toEqual([2]);
    expect(ids([1], [silent, grandmother])).toEqual([2]);
    expect(ids([null], [silent, byMail])).toEqual([2]);
    expect(ids([1, 2], [mother, grandmother])).toEqual([1, 2]);
    expect(ids([], [silent])).toEqual([]);
  });

  it('falls back to a helper only where a morning was given to the helper', () => {
    const silent = { ...mother, mayText: false };
    const helper = { ...grandmother, isGuardian: false };
    expect(chosenFor([1], [silent, helper])).toEqual([]);
    expect(chosenFor([1], [silent, helper], [2])).toEqual([helper]);
    expect(chosenFor([2], [mother, helper])).toEqual([helper]);
    const { messages, calls } = messagePlan(request({ household: [silent, helper] }));
    expect(messages).toEqual([]);
    expect(calls.map(({ reason }) => reason)).toContain('nobody-to-message');
  });

  it('sends one text to a telephone that two of the named share', () => {
    const shared = { ...grandmother, phone: mother.phone };
    expect(chosenFor([1, 2], [mother, shared])).toEqual([mother]);
  });
});

describe('quiet hours', () => {
  it.each([
    ['20:59', false, false],
    ['21:00', true, true],
    ['00:10', true, false],
    ['07:59', true, false],
    ['08:00', false, false],
  ])('%s is quiet: %s; with a yes to early texts: %s', (time, quiet, quietForEarly) => {
    expect(isQuiet(at(on, time), zone, false)).toBe(quiet);
    expect(isQuiet(at(on, time), zone, true)).toBe(quietForEarly);
  });

  it('end at 8:00, or at the day’s beginning for who agreed', () => {
    expect(said(afterQuietHours(at(on, '04:00'), zone))).toBe('12-09 08:00');
    expect(said(afterQuietHours(at(on, '22:00'), zone))).toBe('12-10 08:00');
    expect(said(afterQuietHours(at(on, '04:00'), zone, true))).toBe('12-09 04:00');
    expect(said(afterQuietHours(at(on, '22:00'), zone, true))).toBe('12-10 00:00');
    expect(said(afterQuietHours(at(on, '12:00'), zone))).toBe('12-09 12:00');
  });
});
