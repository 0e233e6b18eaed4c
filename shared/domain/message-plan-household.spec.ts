import {
  messagePlan,
  nightMoments,
  type MessagePlanRequest,
  type MessageTimes,
  type PlannedMorning,
  type PlannedRecipient,
} from './message-plan';
import { instantOf } from './zone';

const zone = 'America/Chicago';
const on = '2026-12-09';
const eve = '2026-12-08';
const at = (time: string, day = on): number => instantOf({ on: day, time, zone });
const times: MessageTimes = {
  zone,
  aheadDays: 3,
  aheadTime: '10:00',
  eveningTime: '18:00',
  questionMinutesBefore: 120,
  nudgeMinutesBefore: 90,
  callListMinutesBefore: 60,
};
const first: PlannedMorning = {
  arrivalAt: at('06:30'),
  stopAt: at('00:30'),
  reminderAt: at('19:30', eve),
  isInfant: false,
  wakeAt: at('05:15'),
  nightCarerId: null,
  escortId: null,
};
const second: PlannedMorning = { ...first, arrivalAt: at('07:00'), stopAt: at('01:00') };
const mother: PlannedRecipient = {
  familyMemberId: 1,
  phone: '+13125550150',
  email: 'm@example.org',
  readsHow: 'well',
  mayText: true,
  mayTextEarly: true,
  mayMail: false,
  isGuardian: true,
};
const aunt = { ...mother, familyMemberId: 2, phone: '+13125550151', isGuardian: false };
const planned = (more: Partial<MessagePlanRequest<PlannedRecipient>> = {}) =>
  messagePlan({
    on,
    mornings: [first, second],
    household: [mother],
    times,
    isAnswered: false,
    followsMorning: false,
    ...more,
  });

describe('brother and sister on one morning', () => {
  it('are spoken of together, in every message', () => {
    expect(planned().messages.map(({ kind, about }) => [kind, about])).toEqual(
      ['ahead', 'evening', 'reminder', 'morning', 'nudge'].map((kind) => [kind, [0, 1]]),
    );
  });

  it('have the first arrival for the question and the last for the end', () => {
    expect(planned().moments).toMatchObject({
      firstArrivalAt: at('06:30'),
      lastArrivalAt: at('07:00'),
      questionAt: at('04:30'),
      firstStopAt: at('00:30'),
    });
    // A child whose times a person tells counts by the time to get up.
    const own = { ...first, stopAt: null, wakeAt: at('05:15') };
    expect(nightMoments([own], on, times).firstStopAt).toBe(at('05:15'));
  });

  const reminders = (...reminderAt: (number | null)[]) =>
    planned({
      mornings: [first, second].map((one, place) => ({
        ...one,
        reminderAt: reminderAt[place] ?? null,
      })),
    })
      .messages.filter(({ kind }) => kind === 'reminder')
      .map(({ dueAt, lastUsefulAt, about }) => [dueAt, lastUsefulAt, about]);

  it('are reminded together until the first stop, or each at its own time', () => {
    expect(reminders(at('19:30', eve), at('19:30', eve))).toEqual([
      [at('19:30', eve), at('00:30'), [0, 1]],
    ]);
    expect(reminders(at('19:30', eve), at('20:00', eve))).toEqual([
      [at('19:30', eve), at('00:30'), [0]],
      [at('20:00', eve), at('01:00'), [1]],
    ]);
  });

  it('are not reminded with or before the evening text, nor without a time', () => {
    expect(reminders(at('18:00', eve), at('17:59', eve))).toEqual([]);
    expect(reminders(null, at('18:01', eve))).toEqual([[at('18:01', eve), at('01:00'), [1]]]);
  });
});

it.each([
  [0, null],
  [1, at('06:29')],
  [119, at('04:31')],
  [120, null],
  [150, null],
])(
  'a nudge %i minutes before the arrival comes after the question, or not at all',
  (minutes, nudgeAt) => {
    expect(planned({ times: { ...times, nudgeMinutesBefore: minutes } }).moments.nudgeAt).toBe(
      nudgeAt,
    );
  },
);

describe('ways to a person', () => {
  const ways = (recipient: PlannedRecipient) =>
    planned({ household: [recipient], followsMorning: true, mornings: [first] }).messages.map(
      ({ kind, channel, address, callReason }) => [kind, channel, address, callReason],
    );
  const byMail = [
    ['evening', 'mail', 'm@example.org', 'evening-text-failed'],
    ['morning', 'mail', 'm@example.org', 'morning-text-failed'],
  ];

  it('are e-mail alone where there is no telephone, and then a lost one makes a call', () => {
    expect(ways({ ...mother, mayMail: true, phone: null })).toEqual(byMail);
    expect(ways({ ...mother, mayMail: true, mayText: false })).toEqual(byMail);
  });

  it('are none by e-mail without an address, or without a yes', () => {
    for (const recipient of [mother, { ...mother, mayMail: true, email: null }])
      expect(ways(recipient).map(([, channel]) => channel)).not.toContain('mail');
  });

  it('are e-mail for a question too early for a text, and a lost one makes a call', () => {
    const early = ways({ ...mother, mayMail: true, mayTextEarly: false });
    expect(early).toContainEqual(byMail[1]);
    expect(early).toContainEqual(['evening', 'mail', 'm@example.org', null]);
  });
});

describe('a person first', () => {
  const calls = (more: Partial<MessagePlanRequest<PlannedRecipient>>) =>
    planned(more).calls.map(({ reason, familyMemberId }) => [reason, familyMemberId]);
  const unread = { ...aunt, readsHow: 'no' as const };

  it('for the named ones who do not read, carer and escort, also where nothing can be written', () => {
    const household = [mother, { ...unread, mayText: false }];
    const expected = [['does-not-read', 2]];
    expect(calls({ household, mornings: [{ ...first, nightCarerId: 2 }] })).toEqual(expected);
    expect(calls({ household, mornings: [first, { ...second, escortId: 2 }] })).toEqual(expected);
  });

  it('not for who has nothing to do with this morning', () => {
    expect(calls({ household: [mother, unread] })).toEqual([]);
  });
});

it('a helper hears of the evening where a morning was given to the helper and no guardian can be written to', () => {
  const household = [{ ...mother, mayText: false }, aunt];
  const { hearEvening, hearMorning } = planned({
    household,
    mornings: [{ ...first, nightCarerId: 1, escortId: 2 }],
  });
  expect(hearEvening.map(({ familyMemberId }) => familyMemberId)).toEqual([2]);
  expect(hearMorning.map(({ familyMemberId }) => familyMemberId)).toEqual([2]);
});
