/**
 * Which message goes to whom about one household's morning, when, by which channel, until when it is
 * of use, and when a person takes over. Pure: rows, words and the outbox are the server's. The times
 * are the clinic's; the order of channels is text, e-mail, a person, and who does not read gets the
 * person first.
 */
import { afterQuietHours, isQuiet, quietFrom } from './quiet-hours';
import {
  addDays,
  instantOf,
  millisecondsPerMinute,
  type Day,
  type Instant,
  type LocalTime,
} from './zone';

/** An adult of the household and what this person agreed to; guardians come first in the list. */
export interface PlannedRecipient {
  readonly familyMemberId: number;
  readonly phone: string | null;
  readonly email: string | null;
  readonly readsHow: 'well' | 'little' | 'no';
  readonly mayText: boolean;
  /** A yes of its own for texts before 8 in the morning. */
  readonly mayTextEarly: boolean;
  readonly mayMail: boolean;
  /** A helper hears of the mornings given to the helper, and of no others. */
  readonly isGuardian: boolean;
}

export interface PlannedMorning {
  readonly arrivalAt: Instant;
  /** The end of the last feed or meal; null for a child whose times a person tells. */
  readonly stopAt: Instant | null;
  readonly reminderAt: Instant | null;
  readonly isInfant: boolean;
  /** When the family gets up, by which an own plan counts as begun. */
  readonly wakeAt: Instant;
  readonly nightCarerId: number | null;
  readonly escortId: number | null;
}

/** Set by the clinic for its site. */
export interface MessageTimes {
  readonly zone: string;
  readonly aheadDays: number;
  readonly aheadTime: LocalTime;
  readonly eveningTime: LocalTime;
  readonly questionMinutesBefore: number;
  /** 0 is no nudge. */
  readonly nudgeMinutesBefore: number;
  readonly callListMinutesBefore: number;
}

export interface MessagePlanRequest<Recipient extends PlannedRecipient> {
  /** The day of the mornings. */
  readonly on: Day;
  /** At least one; youngest child first. */
  readonly mornings: readonly PlannedMorning[];
  readonly household: readonly Recipient[];
  readonly times: MessageTimes;
  /** Somebody has answered for every child. */
  readonly isAnswered: boolean;
  /** The household has a morning in the days before this one and knows the way. */
  readonly followsMorning: boolean;
}

export type MessageKind = 'ahead' | 'evening' | 'reminder' | 'morning' | 'nudge';

export interface PlannedMessage {
  readonly kind: MessageKind;
  readonly familyMemberId: number;
  readonly channel: 'sms' | 'mail';
  readonly address: string;
  readonly dueAt: Instant;
  readonly lastUsefulAt: Instant;
  /** Places in `mornings` that the message speaks of. */
  readonly about: readonly number[];
  /** How the evening text says that the answer is given: by text, on the page, or by somebody else. */
  readonly asks: 'text' | 'web' | 'nobody';
  /** Reason of the call when the message does not arrive; null where another way takes over. */
  readonly callReason: string | null;
}

export interface PlannedCall {
  readonly reason: 'nobody-to-message' | 'does-not-read';
  readonly familyMemberId: number | null;
  readonly urgentAt: Instant;
}

export interface MessagePlan<Recipient extends PlannedRecipient> {
  readonly moments: NightMoments;
  readonly hearEvening: readonly Recipient[];
  readonly hearMorning: readonly Recipient[];
  readonly messages: readonly PlannedMessage[];
  readonly calls: readonly PlannedCall[];
}

export interface NightMoments {
  readonly aheadAt: Instant;
  readonly eveningAt: Instant;
  readonly questionAt: Instant;
  readonly nudgeAt: Instant | null;
  readonly callListAt: Instant;
  readonly firstArrivalAt: Instant;
  readonly lastArrivalAt: Instant;
  /** The earliest stop; for a child with a plan of its own the time to get up. */
  readonly firstStopAt: Instant;
}

/** Who does not read hears from a person this long before the evening text. */
const personFirstMinutes = 120;

export function nightMoments(
  mornings: readonly Pick<PlannedMorning, 'arrivalAt' | 'stopAt' | 'wakeAt'>[],
  on: Day,
  times: MessageTimes,
): NightMoments {
  const { zone } = times;
  const firstArrivalAt = Math.min(...mornings.map(({ arrivalAt }) => arrivalAt));
  const before = (minutes: number): Instant => firstArrivalAt - minutes * millisecondsPerMinute;
  const aheadAt = instantOf({ on: addDays(on, -times.aheadDays), time: times.aheadTime, zone });
  const { nudgeMinutesBefore, questionMinutesBefore } = times;
  const hasNudge = nudgeMinutesBefore > 0 && nudgeMinutesBefore < questionMinutesBefore;
  return {
    aheadAt: afterQuietHours(aheadAt, zone),
    eveningAt: instantOf({ on: addDays(on, -1), time: times.eveningTime, zone }),
    questionAt: before(questionMinutesBefore),
    nudgeAt: hasNudge ? before(nudgeMinutesBefore) : null,
    callListAt: before(times.callListMinutesBefore),
    firstArrivalAt,
    lastArrivalAt: Math.max(...mornings.map(({ arrivalAt }) => arrivalAt)),
    firstStopAt: Math.min(...mornings.map(stopOrWakeAt)),
  };
}

const stopOrWakeAt = ({ stopAt, wakeAt }: Pick<PlannedMorning, 'stopAt' | 'wakeAt'>): Instant =>
  stopAt ?? wakeAt;

export function messagePlan<Recipient extends PlannedRecipient>(
  request: MessagePlanRequest<Recipient>,
): MessagePlan<Recipient> {
  const { mornings, household, on, times, isAnswered } = request;
  const moments = nightMoments(mornings, on, times);
  const hearEvening = chosenFor(
    mornings.map(({ nightCarerId }) => nightCarerId),
    household,
    mornings.map(({ escortId }) => escortId),
  );
  const hearMorning = chosenFor(
    mornings.map(({ escortId, nightCarerId }) => escortId ?? nightCarerId),
    household,
  );
  const night = { ...request, moments };
  const messages = [...new Set([...hearEvening, ...hearMorning])].flatMap((recipient) => {
    const hearsEvening = hearEvening.includes(recipient);
    const hearsMorning = hearMorning.includes(recipient);
    const getsQuestion = hearsMorning && mayBeAsked(recipient, moments, times.zone);
    // Who answers in the morning and may not be texted then is asked the evening before.
    const isAskedInEvening = hearsMorning && !getsQuestion;
    const asks = !hearsMorning ? 'nobody' : getsQuestion ? 'text' : 'web';
    return [
      ...(hearsEvening && !request.followsMorning ? aheadFor(recipient, night) : []),
      ...(hearsEvening || isAskedInEvening ? eveningFor(recipient, night, asks) : []),
      ...(hearsEvening ? remindersFor(recipient, night) : []),
      ...(hearsMorning && !isAnswered ? questionFor(recipient, night, getsQuestion) : []),
    ];
  });
  return { moments, hearEvening, hearMorning, messages, calls: callsFor(request, moments) };
}

/**
 * Who hears about a night or a morning: the people named for it, and where nobody is named or can be
 * written to, the first adult who can be, texts before e-mail and guardians before helpers. One
 * person a moment, unless several are named; people who share a telephone get one text.
 */
export function chosenFor<Recipient extends PlannedRecipient>(
  named: readonly (number | null)[],
  household: readonly Recipient[],
  alsoGivenTo: readonly (number | null)[] = [],
): Recipient[] {
  const those = household.filter(
    (recipient) => named.includes(recipient.familyMemberId) && canBeReached(recipient),
  );
  if (those.length > 0) return those.filter(isFirstAtItsAddress);
  const mayKnow = household.filter(
    ({ isGuardian, familyMemberId }) => isGuardian || alsoGivenTo.includes(familyMemberId),
  );
  const first = mayKnow.find(({ mayText }) => mayText) ?? mayKnow.find(({ mayMail }) => mayMail);
  return first ? [first] : [];
}

const canBeReached = ({ mayText, mayMail }: PlannedRecipient): boolean => mayText || mayMail;

function isFirstAtItsAddress(
  recipient: PlannedRecipient,
  place: number,
  all: readonly PlannedRecipient[],
): boolean {
  const address = ({ mayText, phone, email }: PlannedRecipient) => (mayText ? phone : email);
  return all.findIndex((other) => address(other) === address(recipient)) === place;
}

/** Whether the morning question may go to this person as a text when it is due. */
const mayBeAsked = (recipient: PlannedRecipient, { questionAt }: NightMoments, zone: string) =>
  recipient.mayText && !isQuiet(questionAt, zone, recipient.mayTextEarly);

type Night = Omit<MessagePlanRequest<PlannedRecipient>, 'isAnswered'> & {
  readonly moments: NightMoments;
};

type Way = Pick<PlannedMessage, 'dueAt' | 'lastUsefulAt'>;

/** By text and by e-mail, as agreed to. Where a text goes too, a lost e-mail needs no call. */
function byChannels(
  recipient: PlannedRecipient,
  ways: { readonly sms: Way | null; readonly mail: Way | null },
  said: Pick<PlannedMessage, 'kind' | 'about' | 'callReason'> & {
    readonly asks?: PlannedMessage['asks'];
  },
): PlannedMessage[] {
  const { familyMemberId, phone, email, mayMail } = recipient;
  const goesByText = recipient.mayText && phone !== null && ways.sms !== null;
  const common = { familyMemberId, asks: 'nobody' as const, ...said };
  return [
    ...(goesByText && ways.sms
      ? [{ ...common, ...ways.sms, channel: 'sms' as const, address: phone }]
      : []),
    ...(mayMail && email !== null && ways.mail
      ? [
          {
            ...common,
            ...ways.mail,
            channel: 'mail' as const,
            address: email,
            callReason: goesByText ? null : said.callReason,
          },
        ]
      : []),
  ];
}

const allOf = ({ mornings }: Night): number[] => mornings.map((_, place) => place);

function aheadFor(recipient: PlannedRecipient, night: Night): PlannedMessage[] {
  const { aheadAt, eveningAt } = night.moments;
  const way = { dueAt: aheadAt, lastUsefulAt: eveningAt };
  const said = { kind: 'ahead', about: allOf(night), callReason: 'message-failed' } as const;
  return byChannels(recipient, { sms: way, mail: way }, said);
}

function eveningFor(
  recipient: PlannedRecipient,
  night: Night,
  asks: PlannedMessage['asks'],
): PlannedMessage[] {
  const { eveningAt, firstStopAt } = night.moments;
  const lastTextAt = Math.min(firstStopAt, quietFrom(addDays(night.on, -1), night.times.zone));
  return byChannels(
    recipient,
    {
      sms: { dueAt: eveningAt, lastUsefulAt: lastTextAt },
      mail: { dueAt: eveningAt, lastUsefulAt: firstStopAt },
    },
    { kind: 'evening', about: allOf(night), asks, callReason: 'evening-text-failed' },
  );
}

/**
 * The reminder goes before the stop, when there is still time to eat. In the quiet hours only a
 * baby's last feed is worth waking somebody who agreed to it; an older child sleeps, and the evening
 * text has told the time: a lost reminder wakes nobody.
 */
function remindersFor(recipient: PlannedRecipient, night: Night): PlannedMessage[] {
  const { mornings, moments, times } = night;
  const moment = new Map<Instant, number[]>();
  for (const [place, { reminderAt, isInfant }] of mornings.entries()) {
    if (reminderAt === null || reminderAt <= moments.eveningAt) continue;
    const isAwake = !isQuiet(reminderAt, times.zone, false);
    const isLastFeed = isInfant && !isQuiet(reminderAt, times.zone, recipient.mayTextEarly);
    if (isAwake || isLastFeed) moment.set(reminderAt, [...(moment.get(reminderAt) ?? []), place]);
  }
  return [...moment].flatMap(([dueAt, about]) => {
    const stops = mornings.filter((_, place) => about.includes(place)).map(stopOrWakeAt);
    const sms = { dueAt, lastUsefulAt: Math.min(...stops) };
    return byChannels(
      recipient,
      { sms, mail: null },
      { kind: 'reminder', about, callReason: null },
    );
  });
}

/** The question, and a nudge after it; both are withdrawn with the answer. */
function questionFor(
  recipient: PlannedRecipient,
  night: Night,
  getsQuestion: boolean,
): PlannedMessage[] {
  const { questionAt, nudgeAt, firstArrivalAt } = night.moments;
  const about = allOf(night);
  const way = { dueAt: questionAt, lastUsefulAt: firstArrivalAt };
  const isNudged =
    getsQuestion && nudgeAt !== null && !isQuiet(nudgeAt, night.times.zone, recipient.mayTextEarly);
  return [
    ...byChannels(
      recipient,
      { sms: getsQuestion ? way : null, mail: way },
      { kind: 'morning', about, callReason: 'morning-text-failed' },
    ),
    // The call list takes over from the nudge.
    ...(isNudged
      ? byChannels(
          recipient,
          { sms: { dueAt: nudgeAt, lastUsefulAt: firstArrivalAt }, mail: null },
          { kind: 'nudge', about, callReason: null },
        )
      : []),
  ];
}

function callsFor(
  { mornings, household }: MessagePlanRequest<PlannedRecipient>,
  { eveningAt }: NightMoments,
): PlannedCall[] {
  const named = mornings.flatMap(({ nightCarerId, escortId }) => [nightCarerId, escortId]);
  if (chosenFor(named, household).length === 0)
    return [{ reason: 'nobody-to-message', familyMemberId: null, urgentAt: eveningAt }];
  const urgentAt = eveningAt - personFirstMinutes * millisecondsPerMinute;
  // Asked of everybody named, also of who cannot be written to: not reading is what the person is for.
  const those = household.filter(({ familyMemberId }) => named.includes(familyMemberId));
  const heard = new Set([...those, ...chosenFor(named, household)]);
  return [...heard]
    .filter(({ readsHow }) => readsHow === 'no')
    .map(({ familyMemberId }) => ({ reason: 'does-not-read' as const, familyMemberId, urgentAt }));
}
