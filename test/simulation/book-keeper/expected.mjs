// What every family must hear about a morning: who, by which way, from when until when.
import { dayBefore, instantOf, minute } from './calendar.mjs';
import {
  cancellationWithin,
  infantReminderBefore,
  isInfant,
  isQuiet,
  leastHours,
} from './rules.mjs';

/**
 * The moments of one household and day. A clinic sets evening, question and call list; the rest follows from the
 * arrival and the protocol.
 */
export function momentsOf(day, site) {
  const { zone } = site;
  const arrivals = day.children.map(({ arrivalAt }) => arrivalAt);
  const firstArrivalAt = Math.min(...arrivals);
  const stops = day.children.map(({ childId, arrivalAt }) => {
    const { bornOn } = day.household.children.get(childId);
    const hours = leastHours(bornOn, day.on);
    return { isInfant: isInfant(bornOn, day.on), at: arrivalAt - (hours ?? 0) * 60 * minute };
  });
  const firstStopAt = Math.min(...stops.map(({ at }) => at));
  const evening = dayBefore(day.on);
  return {
    eveningAt: instantOf(evening, site.eveningTextTime, zone),
    eveningTextUntil: Math.min(firstStopAt, instantOf(evening, '21:00', zone)),
    firstStopAt,
    stops,
    aheadAt: aheadOf(day.on, site),
    questionAt: firstArrivalAt - site.morningQuestionMinutesBefore * minute,
    nudgeAt: nudgeOf(firstArrivalAt, site),
    callListAt: firstArrivalAt - site.callListMinutesBefore * minute,
    firstArrivalAt,
  };
}

/** Days before, out of the quiet hours; null where the clinic sends none. */
function aheadOf(on, { aheadTextDays = 0, aheadTextTime, zone }) {
  if (aheadTextDays === 0) return null;
  let day = on;
  for (let days = 0; days < aheadTextDays; days += 1) day = dayBefore(day);
  return instantOf(day, aheadTextTime, zone);
}

function nudgeOf(firstArrivalAt, { nudgeMinutesBefore = 0, morningQuestionMinutesBefore }) {
  if (nudgeMinutesBefore === 0 || nudgeMinutesBefore >= morningQuestionMinutesBefore) return null;
  return firstArrivalAt - nudgeMinutesBefore * minute;
}

/**
 * Expected messages of a day: `{ kind, channel, adult, from, until }`, and the reasons why a person must call where
 * nothing may be written. One text for each household and moment.
 */
export function expectedOf(day, site, households) {
  const times = momentsOf(day, site);
  const messages = [];
  const calls = [];
  const { aheadAt, eveningAt, questionAt, nudgeAt, firstArrivalAt } = times;
  if (day.lostAt !== null && day.lostAt < eveningAt)
    return { times, ...cancellationOf(day, households) };
  if (day.plannedAt > eveningAt) return { times, messages, calls };
  if (day.isClosed) {
    const closing = closingOf(day, site, households);
    messages.push(...closing.messages);
    calls.push(...closing.calls);
  }
  const evening = households.whoHears(day, null, eveningAt);
  const morning = households.whoHears(day, day.escortId, questionAt);
  if (!evening) calls.push('nobody can be written to');
  for (const adult of new Set([evening, morning].filter(Boolean))) {
    if (!households.hasWords(adult)) calls.push('no signed words in the language');
    else if (adult.readsHow === 'no') calls.push('does not read');
  }
  const first = aheadAt === null ? null : households.whoHears(day, null, aheadAt);
  // Who came the day before knows the way.
  if (first && day.plannedAt < aheadAt && !followsAnother(day, aheadAt))
    messages.push(
      ...byWays('ahead', first, households, { at: aheadAt, text: eveningAt, mail: eveningAt }),
    );
  const asked = hearsQuestionByText(morning, questionAt, site, households);
  const hearEvening = new Set([evening, ...(asked ? [] : [bringer(day, households, eveningAt)])]);
  for (const adult of [...hearEvening].filter(Boolean))
    messages.push(
      ...byWays('evening', adult, households, {
        at: eveningAt,
        text: times.eveningTextUntil,
        mail: times.firstStopAt,
      }),
    );
  if (evening)
    for (const stop of times.stops) {
      const at = stop.at - infantReminderBefore;
      if (!stop.isInfant || !households.mayText(evening, at) || !households.hasWords(evening))
        continue;
      if (at <= eveningAt || isQuiet(at, site.zone, households.mayTextEarly(evening, at))) continue;
      messages.push({ kind: 'reminder', channel: 'sms', adult: evening, from: at, until: stop.at });
    }
  if (morning && !isAnsweredBy(day, questionAt)) {
    const ways = byWays('morning', morning, households, {
      at: questionAt,
      text: firstArrivalAt,
      mail: firstArrivalAt,
    });
    messages.push(...ways.filter(({ channel }) => channel === 'mail' || asked));
  }
  const isNudged =
    asked && nudgeAt !== null && hearsQuestionByText(morning, nudgeAt, site, households);
  if (isNudged && !isAnsweredBy(day, nudgeAt))
    messages.push({
      kind: 'nudge',
      channel: 'sms',
      adult: morning,
      from: nudgeAt,
      until: firstArrivalAt,
    });
  return { times, messages: messages.filter(({ adult }) => households.hasWords(adult)), calls };
}

/** Once it is called off nothing of the night may come, and the family is told at once, or called. */
function cancellationOf(day, households) {
  const from = day.lostAt;
  const adult = households.whoHears(day, day.escortId, from);
  if (!adult || !households.hasWords(adult))
    return { messages: [], calls: ['called off, and nobody may be written to'] };
  const until = from + cancellationWithin;
  const ways = byWays('visit-cancelled', adult, households, { at: from, text: until, mail: until });
  return { messages: ways, calls: [] };
}

/** A clinic that closes before dawn texts at once who agreed to early texts, and calls everybody else. */
function closingOf(day, site, households) {
  const from = day.lostAt;
  const adult = households.whoHears(day, day.escortId, from);
  const hearsByText =
    adult !== null &&
    households.mayText(adult, from) &&
    households.hasWords(adult) &&
    adult.readsHow !== 'no' &&
    !isQuiet(from, site.zone, households.mayTextEarly(adult, from));
  if (!hearsByText) return { messages: [], calls: ['the clinic closed, and no text may go'] };
  const until = from + cancellationWithin;
  return {
    messages: [{ kind: 'visit-cancelled', channel: 'sms', adult, from, until }],
    calls: [],
  };
}

const followsAnother = ({ on, household }, since) =>
  [...household.days.values()].some(
    (other) => other.on < on && other.children.some(({ arrivalAt }) => arrivalAt > since),
  );

const bringer = (day, households, instant) => households.whoHears(day, day.escortId, instant);

function hearsQuestionByText(adult, questionAt, site, households) {
  if (!adult || !households.mayText(adult, questionAt)) return false;
  return !isQuiet(questionAt, site.zone, households.mayTextEarly(adult, questionAt));
}

function byWays(kind, adult, households, { at, text, mail }) {
  return [
    ...(households.mayText(adult, at)
      ? [{ kind, channel: 'sms', adult, from: at, until: text }]
      : []),
    ...(households.mayMail(adult) ? [{ kind, channel: 'mail', adult, from: at, until: mail }] : []),
  ];
}

/** Whether the family had told the clinic about this morning by an instant. */
export const isAnsweredBy = (day, instant) => day.answers.some(({ at }) => at <= instant);
