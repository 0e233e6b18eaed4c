import {
  messagePlan,
  nightMoments,
  type MessagePlan,
  type MessageTimes,
  type NightMoments,
  type PlannedMessage,
  type PlannedMorning,
} from '../../shared/domain/message-plan';
import { inShortAlphabet, messageSegments } from '../../shared/domain/message-segments';
import { addDays, millisecondsPerMinute, type Instant } from '../../shared/domain/zone';
import { familyDay, familyTime } from '../../shared/languages/family-time';
import type { MorningPlan } from '../series/morning-plans';
import type { Site } from '../sites/sites';
import type { Wording } from '../wording/render';
import { noting, stopTimeSays, type DraftMessage, type NotedWording } from './draft-message';
import { stopLines } from './stop-lines';
import type { Recipient } from './recipients';
import { shownPhone } from './shown-phone';

export type NightPlans = readonly [MorningPlan, ...MorningPlan[]];

/** How long the household's page stays open after the last arrival. */
const linkHours = 2;
export const linkExpiresAt = ({ lastArrivalAt }: Pick<NightMoments, 'lastArrivalAt'>): Instant =>
  lastArrivalAt + linkHours * 60 * millisecondsPerMinute;

export const messageTimesOf = (site: Site): MessageTimes => ({
  zone: site.zone,
  aheadDays: site.aheadTextDays,
  aheadTime: site.aheadTextTime,
  eveningTime: site.eveningTextTime,
  questionMinutesBefore: site.morningQuestionMinutesBefore,
  nudgeMinutesBefore: site.nudgeMinutesBefore,
  callListMinutesBefore: site.callListMinutesBefore,
});

const plannedMorning = (morning: MorningPlan): PlannedMorning => {
  const { plan, arrivalAt, travelMinutes, readyMinutes } = morning;
  const wakeAt = arrivalAt - (travelMinutes + readyMinutes) * millisecondsPerMinute;
  const isStandard = plan.kind === 'standard';
  return {
    arrivalAt,
    stopAt: isStandard ? plan.stopAt : null,
    reminderAt: isStandard ? plan.stopReminderAt : null,
    isInfant: isStandard && plan.isInfant,
    wakeAt,
    nightCarerId: morning.nightCarerFamilyMemberId,
    escortId: morning.escortFamilyMemberId,
  };
};

export function nightTimes(plans: NightPlans): NightMoments {
  const [{ site, on }] = plans;
  return nightMoments(plans.map(plannedMorning), on, messageTimesOf(site));
}

/** The plan of the night's messages from the rows. @param plans youngest child first. */
export function planOfNight(
  plans: NightPlans,
  household: readonly Recipient[],
  more: { readonly isAnswered: boolean; readonly followsMorning: boolean },
): MessagePlan<Recipient> {
  const [{ site, on }] = plans;
  const mornings = plans.map(plannedMorning);
  return messagePlan({ on, mornings, household, times: messageTimesOf(site), ...more });
}

/** What one person is written about one night and morning. */
export interface NightFor {
  readonly recipient: Recipient;
  readonly wording: Wording;
  /** The household's page of that morning. */
  readonly url: string;
  readonly plans: NightPlans;
  readonly moments: NightMoments;
}

/** A planned message in the words of its language. */
export function drafted(planned: PlannedMessage, night: NightFor): DraftMessage {
  const { kind, channel, familyMemberId, address, callReason, dueAt, lastUsefulAt } = planned;
  const { language, isWithoutConsent } = night.recipient;
  const noted = noting(night.wording);
  const { body, bodyOfNews = null, ...written } = writers[kind](noted, planned, night);
  const spelled = (text: string): string => (channel === 'sms' ? inShortAlphabet(text) : text);
  return {
    ...{ kind, channel, familyMemberId, address, callReason, dueAt, lastUsefulAt, language },
    isWithoutConsent: channel === 'sms' && isWithoutConsent,
    ...written,
    body: spelled(body),
    bodyOfNews: bodyOfNews === null ? null : spelled(bodyOfNews),
    wordingVersions: noted.wording.versions(noted.used()),
  };
}

type Written = Pick<DraftMessage, 'subject' | 'body' | 'facts'> &
  Partial<Pick<DraftMessage, 'bodyOfNews'>>;
type Writer = (noted: NotedWording, planned: PlannedMessage, night: NightFor) => Written;

const writers: Readonly<Record<PlannedMessage['kind'], Writer>> = {
  ahead,
  evening,
  reminder,
  morning,
  nudge,
};

/** What every message of the night may say. */
function commonOf(noted: NotedWording, { plans, moments, url }: NightFor) {
  const [{ site, zone, on }] = plans;
  const { profile } = noted.wording;
  const arrival = familyTime(moments.firstArrivalAt, zone, profile);
  return {
    clinic: site.shortName,
    phone: shownPhone(site.phone, site.country),
    url,
    weekday: arrival.weekday,
    date: arrival.date,
    time: arrival.time,
    door: site.door,
    address: site.address,
    from: familyDay(addDays(on, -1), profile).weekday,
    to: arrival.weekday,
  };
}

const factOfStop = ({ plan }: MorningPlan): number | null =>
  plan.kind === 'standard' ? plan.stopAt : null;

function ahead(noted: NotedWording, { channel }: PlannedMessage, night: NightFor): Written {
  const common = commonOf(noted, night);
  const facts = ['ahead', night.moments.firstArrivalAt, common.door];
  if (channel === 'mail')
    return {
      subject: noted.text('message.ahead.subject', common),
      body: noted.text('message.ahead.mail', common),
      bodyOfNews: noted.text('message.changed.mail', common),
      facts,
    };
  return {
    subject: null,
    body: noted.text('message.ahead.text', common),
    bodyOfNews: noted.text('message.changed.text', common),
    facts,
  };
}

function evening(noted: NotedWording, planned: PlannedMessage, night: NightFor): Written {
  const { plans, moments } = night;
  const common = commonOf(noted, night);
  const lines = plans.map((plan) => eveningLine(noted, plan)).join('\n');
  const stops = plans.map(factOfStop);
  const facts = ['evening', moments.firstArrivalAt, common.door, planned.asks, ...stops];
  if (planned.channel === 'mail')
    return {
      subject: noted.text('message.evening.subject', common),
      body: noted.text('message.evening.mail', { ...common, lines }),
      facts,
    };
  const says = (key: string, ask: string): string =>
    noted.text(`message.evening.${key}`, {
      ...common,
      lines,
      ask: noted.text(`message.evening.${ask}`, common),
    });
  const fitting = (key: string, shortKey: string): string => {
    const full = says(key, askKeys[planned.asks]);
    return isAffordable(full) ? full : says(shortKey, shortAskKeys[planned.asks]);
  };
  return {
    subject: null,
    body: fitting('text', 'short'),
    bodyOfNews: fitting('news', 'news-short'),
    facts,
  };
}

const askKeys = { nobody: 'ask-plan', web: 'ask-web', text: 'ask-text' } as const;
const shortAskKeys = { nobody: 'ask-short', web: 'ask-web-short', text: 'ask-short' } as const;

/** Two parts in the short alphabet, three in another: beyond that the page tells the rest. */
function isAffordable(body: string): boolean {
  const { encoding, segments } = messageSegments(inShortAlphabet(body));
  return segments <= (encoding === 'gsm-7' ? 2 : 3);
}

const eveningLine = (noted: NotedWording, morning: MorningPlan): string =>
  stopLines(noted, morning, 'message.evening.line');

function reminder(noted: NotedWording, { about, dueAt }: PlannedMessage, night: NightFor): Written {
  const those = night.plans.filter((_, place) => about.includes(place));
  const { clinic, phone } = commonOf(noted, night);
  const lines = those.map((plan) => reminderLine(noted, plan)).join('\n');
  return {
    subject: null,
    body: noted.text('message.reminder.text', { clinic, lines, phone }),
    facts: ['reminder', dueAt, ...those.map(factOfStop)],
  };
}

function reminderLine(noted: NotedWording, morning: MorningPlan): string {
  const { plan, familyLabel, zone } = morning;
  if (plan.kind !== 'standard') throw new RangeError('A plan without hours has no reminder');
  if (!plan.allSame) return stopLines(noted, morning, 'message.reminder.line');
  const { profile } = noted.wording;
  const time = stopTimeSays(noted, plan.stopAt, zone);
  if (plan.lastFeedAt === null)
    return noted.text('message.reminder.line', { label: familyLabel, time });
  const fromTime = familyTime(plan.lastFeedAt, zone, profile).time;
  return noted.text('message.reminder.line-feed', { label: familyLabel, fromTime, time });
}

function morning(noted: NotedWording, { channel }: PlannedMessage, night: NightFor): Written {
  const { plans } = night;
  const lines = plans.map((plan) => questionLine(noted, plan)).join('\n');
  const params = { ...commonOf(noted, night), lines, count: plans.length };
  const facts = ['morning', ...plans.map(factOfStop)];
  if (channel === 'sms')
    return { subject: null, body: noted.text('message.morning.text', params), facts };
  return {
    subject: noted.text('message.morning.subject', params),
    body: noted.text('message.morning.mail', params),
    facts,
  };
}

function nudge(noted: NotedWording, _planned: PlannedMessage, night: NightFor): Written {
  const body = noted.text('message.nudge.text', commonOf(noted, night));
  return { subject: null, body, facts: ['nudge'] };
}

const questionLine = (noted: NotedWording, morning: MorningPlan): string =>
  stopLines(noted, morning, 'message.morning.line');
