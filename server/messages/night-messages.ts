import { addDays, instantOf, millisecondsPerMinute, type Instant } from '../../shared/domain/zone';
import { familyDay, familyTime } from '../../shared/languages/family-time';
import type { MorningPlan } from '../series/morning-plans';
import type { Wording } from '../wording/render';
import { noting, stopTimeSays, type DraftMessage, type NotedWording } from './draft-message';
import { isQuiet, quietFrom } from './quiet-hours';
import type { Recipient } from './recipients';
import { shownPhone } from './shown-phone';

/** What one person is written about one night and morning. */
export interface NightFor {
  readonly recipient: Recipient;
  readonly wording: Wording;
  /** The household's page of that morning. */
  readonly url: string;
  /** Planned mornings of the household on that day, youngest child first. */
  readonly plans: readonly [MorningPlan, ...MorningPlan[]];
  readonly hearsEvening: boolean;
  readonly hearsMorning: boolean;
  /** Somebody has answered for every child already. */
  readonly isAnswered: boolean;
}

export interface NightTimes {
  readonly eveningAt: Instant;
  readonly questionAt: Instant;
  readonly firstArrivalAt: Instant;
  readonly lastArrivalAt: Instant;
  /** The earliest stop; for a child with a plan of its own the time to get up. */
  readonly firstStopAt: Instant;
}

/** How long the household's page stays open after the last arrival. */
const linkHours = 2;
export const linkExpiresAt = ({ lastArrivalAt }: NightTimes): Instant =>
  lastArrivalAt + linkHours * 60 * millisecondsPerMinute;

export function nightTimes(plans: readonly [MorningPlan, ...MorningPlan[]]): NightTimes {
  const [{ site, on }] = plans;
  const arrivals = plans.map((plan) => plan.arrivalAt);
  const firstArrivalAt = Math.min(...arrivals);
  return {
    eveningAt: instantOf({ on: addDays(on, -1), time: site.eveningTextTime, zone: site.zone }),
    questionAt: firstArrivalAt - site.morningQuestionMinutesBefore * millisecondsPerMinute,
    firstArrivalAt,
    lastArrivalAt: Math.max(...arrivals),
    firstStopAt: Math.min(...plans.map(stopOrWakeAt)),
  };
}

function stopOrWakeAt({ plan, arrivalAt, travelMinutes, readyMinutes }: MorningPlan): Instant {
  if (plan.kind === 'standard') return plan.stopAt;
  return arrivalAt - (travelMinutes + readyMinutes) * millisecondsPerMinute;
}

/** Every text and e-mail for this person; texts that quiet hours forbid are left out. */
export function messagesFor(night: NightFor): DraftMessage[] {
  const times = nightTimes(night.plans);
  return [
    ...(night.hearsEvening || asksInTheEvening(night, times) ? evening(night, times) : []),
    ...(night.hearsEvening ? reminders(night, times) : []),
    ...(night.hearsMorning && !night.isAnswered ? morning(night, times) : []),
  ];
}

/** Whether the morning question may go to this person as a text when it is due. */
function getsMorningText({ recipient, plans }: NightFor, times: NightTimes): boolean {
  const [{ zone }] = plans;
  return recipient.mayText && !isQuiet(times.questionAt, zone, recipient.mayTextEarly);
}

/** Who answers in the morning and may not be texted then is asked the evening before. */
const asksInTheEvening = (night: NightFor, times: NightTimes): boolean =>
  night.hearsMorning && !getsMorningText(night, times);

function evening(night: NightFor, times: NightTimes): DraftMessage[] {
  const { recipient, wording, plans, url } = night;
  const [{ site, zone, on }] = plans;
  const { profile } = wording;
  const arrival = familyTime(times.firstArrivalAt, zone, profile);
  const night_ = { from: familyDay(addDays(on, -1), profile).weekday, to: arrival.weekday };
  const common = {
    clinic: site.shortName,
    phone: shownPhone(site.phone, site.country),
    url,
    weekday: arrival.weekday,
    date: arrival.date,
    time: arrival.time,
    door: site.door,
    ...night_,
  };
  const compose = (build: (noted: NotedWording, lines: string) => Composed): Written => {
    const noted = noting(wording);
    const lines = plans.map((plan) => eveningLine(noted, plan)).join('\n');
    return { ...build(noted, lines), ...versionsOf(noted) };
  };
  const text = (): Written =>
    compose((noted, lines) => ({
      subject: null,
      body: noted.text('message.evening.text', {
        ...common,
        lines,
        ask: askOf(noted, night, times, common),
      }),
    }));
  const mail = (): Written =>
    compose((noted, lines) => ({
      subject: noted.text('message.evening.subject', common),
      body: noted.text('message.evening.mail', { ...common, lines, address: site.address }),
    }));
  const lastTextAt = Math.min(times.firstStopAt, quietFrom(addDays(on, -1), zone));
  return byChannels(recipient, {
    text: { ...at('evening', times.eveningAt, lastTextAt), write: text },
    mail: { ...at('evening', times.eveningAt, times.firstStopAt), write: mail },
    callReason: 'evening-text-failed',
  });
}

function askOf(
  noted: NotedWording,
  night: NightFor,
  times: NightTimes,
  common: { readonly url: string; readonly phone: string },
): string {
  if (!night.hearsMorning) return noted.text('message.evening.ask-plan', common);
  if (!getsMorningText(night, times)) return noted.text('message.evening.ask-web', common);
  const [{ zone }] = night.plans;
  const askTime = familyTime(times.questionAt, zone, noted.wording.profile).time;
  return noted.text('message.evening.ask-text', { ...common, askTime });
}

const eveningLine = (noted: NotedWording, { plan, familyLabel, zone }: MorningPlan): string =>
  plan.kind === 'standard'
    ? noted.text('message.evening.line', {
        label: familyLabel,
        time: stopTimeSays(noted, plan.stopAt, zone),
      })
    : noted.text('message.evening.line-individual', { label: familyLabel });

/**
 * The reminder goes before the stop, when there is still time to eat. In the quiet hours only a baby's last feed is
 * worth waking somebody who agreed to it; an older child sleeps, and the evening text has told the time.
 */
function reminders(night: NightFor, times: NightTimes): DraftMessage[] {
  const { recipient, wording, plans } = night;
  if (!recipient.mayText) return [];
  const [{ zone, site }] = plans;
  const due = plans.filter(({ plan }) => {
    if (plan.kind !== 'standard' || plan.stopReminderAt <= times.eveningAt) return false;
    const isAwake = !isQuiet(plan.stopReminderAt, zone, false);
    const isLastFeed = plan.isInfant && !isQuiet(plan.stopReminderAt, zone, recipient.mayTextEarly);
    return isAwake || isLastFeed;
  });
  const moments = new Map<Instant, MorningPlan[]>();
  for (const morning of due) {
    if (morning.plan.kind !== 'standard') continue;
    const { stopReminderAt } = morning.plan;
    moments.set(stopReminderAt, [...(moments.get(stopReminderAt) ?? []), morning]);
  }
  return [...moments].flatMap(([dueAt, those]) =>
    byChannels(
      { ...recipient, mayMail: false },
      {
        text: {
          ...at('reminder', dueAt, Math.min(...those.map(stopOrWakeAt))),
          write: () => {
            const noted = noting(wording);
            const lines = those.map((morning) => reminderLine(noted, morning)).join('\n');
            const body = noted.text('message.reminder.text', {
              clinic: site.shortName,
              lines,
              phone: shownPhone(site.phone, site.country),
            });
            return { subject: null, body, ...versionsOf(noted) };
          },
        },
        // The evening text has told the time; a lost reminder wakes nobody.
        callReason: null,
      },
    ),
  );
}

function reminderLine(noted: NotedWording, { plan, familyLabel, zone }: MorningPlan): string {
  if (plan.kind !== 'standard') throw new RangeError('A plan without hours has no reminder');
  const { profile } = noted.wording;
  const time = stopTimeSays(noted, plan.stopAt, zone);
  if (plan.lastFeedAt === null)
    return noted.text('message.reminder.line', { label: familyLabel, time });
  const fromTime = familyTime(plan.lastFeedAt, zone, profile).time;
  return noted.text('message.reminder.line-feed', { label: familyLabel, fromTime, time });
}

function morning(night: NightFor, times: NightTimes): DraftMessage[] {
  const { recipient, wording, plans, url } = night;
  const [{ site }] = plans;
  const compose = (keys: { subject: string | null; body: string }): Written => {
    const noted = noting(wording);
    const lines = plans.map((plan) => questionLine(noted, plan)).join('\n');
    const params = {
      clinic: site.shortName,
      phone: shownPhone(site.phone, site.country),
      url,
      lines,
      count: plans.length,
    };
    return {
      subject: keys.subject && noted.text(keys.subject, params),
      body: noted.text(keys.body, params),
      ...versionsOf(noted),
    };
  };
  const moment = at('morning', times.questionAt, times.firstArrivalAt);
  return byChannels(
    { ...recipient, mayText: getsMorningText(night, times) },
    {
      text: {
        ...moment,
        write: () => compose({ subject: null, body: 'message.morning.text' }),
      },
      mail: {
        ...moment,
        write: () => compose({ subject: 'message.morning.subject', body: 'message.morning.mail' }),
      },
      callReason: 'morning-text-failed',
    },
  );
}

const questionLine = (noted: NotedWording, { plan, familyLabel, zone }: MorningPlan): string =>
  plan.kind === 'standard'
    ? noted.text('message.morning.line', {
        label: familyLabel,
        time: stopTimeSays(noted, plan.stopAt, zone),
      })
    : noted.text('message.morning.line-individual', { label: familyLabel });

interface Composed {
  readonly subject: string | null;
  readonly body: string;
}
type Written = Composed & Pick<DraftMessage, 'wordingVersions'>;
type Moment = Pick<DraftMessage, 'kind' | 'dueAt' | 'lastUsefulAt'>;

const at = (kind: DraftMessage['kind'], dueAt: Instant, lastUsefulAt: Instant): Moment => ({
  kind,
  dueAt,
  lastUsefulAt,
});

const versionsOf = (noted: NotedWording): Pick<DraftMessage, 'wordingVersions'> => ({
  wordingVersions: noted.wording.versions(noted.used()),
});

function byChannels(
  recipient: Recipient,
  ways: {
    readonly text: Moment & { readonly write: () => Written };
    readonly mail?: Moment & { readonly write: () => Written };
    readonly callReason: string | null;
  },
): DraftMessage[] {
  const { familyMemberId, language, phone, email } = recipient;
  const drafts: DraftMessage[] = [];
  const add = (
    channel: DraftMessage['channel'],
    address: string,
    { write, ...moment }: Moment & { readonly write: () => Written },
    callReason: string | null,
  ): void => {
    drafts.push({ ...moment, ...write(), channel, familyMemberId, address, language, callReason });
  };
  if (recipient.mayText && phone !== null) add('sms', phone, ways.text, ways.callReason);
  // Where a text goes too, a lost e-mail needs no call.
  if (recipient.mayMail && email !== null && ways.mail)
    add('mail', email, ways.mail, recipient.mayText ? null : ways.callReason);
  return drafts;
}
