// Compares what every family should have heard with what it received, and says where they differ. Small, and
// independent of the product: it reads the ledger of the run, the phones and mailboxes, and the call list.
import { hour, minute } from './calendar.mjs';
import { expectedOf, isAnsweredBy } from './expected.mjs';
import { Households } from './households.mjs';
import { aDay, checkDoubles, checkEach, receivedOf, within } from './receipts.mjs';

/** The rules that must hold, and how each is told. */
export const rules = {
  lost: 'lost without a call task',
  doubled: 'doubled',
  'opted-out': 'after an opt-out',
  quiet: 'in the quiet hours beyond the exemptions',
  late: 'before its moment or after its last useful time',
  'asked-again': 'asked although the answer was there',
  'not-due': 'to somebody for whom nothing was due',
  unsigned: 'in a language without signed words',
  unsafe: 'with unsafe words',
  stray: 'to an address of nobody',
  'no-call': 'families that a person had to call and nobody was told',
  'state-unknown': 'mornings without a known state',
};

const endStates = new Set(['collected', 'not-collected', 'lost']);
/** A text that is in the middle of being sent when the answer comes cannot be held back. */
const inFlight = minute;
/** Who does not read is called before the evening text goes to others. */
const callsBefore = 2 * hour;

/**
 * @param books { site, lines, calls, states, labels, texts, mails, endAt }
 * @returns `{ violations, counts }`; a violation has rule, family, on and says
 */
export function compare(books) {
  const households = new Households(books);
  const received = receivedOf(books);
  const violations = [];
  const counts = newCounts();
  const report = (rule, { address, at, label }, says) => {
    const owner = households.ofAddress(address);
    violations.push({
      rule,
      family: owner?.household.family ?? null,
      household: owner?.household.id ?? null,
      on: label?.morningOn ?? morningNear(owner?.household, at),
      at,
      says: `${label?.kind ?? 'a text'} to ${address} ${says}`,
    });
  };
  const { mailDoubles } = checkEach({ ...books, received, households, report });
  checkDoubles({ received, households, report });
  counts.mailDoubles = mailDoubles;
  for (const { label, channel } of received)
    bump(counts.received, `${label?.kind ?? 'on no record'} (${channel})`);
  const byDay = groupByDay(received);
  for (const household of households.all)
    for (const day of household.days.values())
      checkDay({ books, households, counts, violations, report }, day, byDay);
  checkOptOuts({ books, households, violations });
  return { violations, counts };
}

/** The family's next morning from an instant on, for what nobody has noted a morning for. */
function morningNear(household, at) {
  const days = [...(household?.days.values() ?? [])];
  return days.find(({ children }) => children.some(({ arrivalAt }) => arrivalAt > at))?.on ?? null;
}

const newCounts = () => ({
  expected: {},
  arrived: {},
  calledInstead: {},
  received: {},
  mailDoubles: 0,
  remindersWithoutCall: 0,
  days: 0,
  mornings: 0,
});

const bump = (table, key) => (table[key] = (table[key] ?? 0) + 1);

function groupByDay(received) {
  const groups = new Map();
  for (const message of received) {
    if (!message.label) continue;
    const key = `${message.label.household}:${message.label.morningOn}`;
    if (!groups.has(key)) groups.set(key, []);
    groups.get(key).push(message);
  }
  return groups;
}

function checkDay(work, day, byDay) {
  const { books, households, counts, violations, report } = work;
  const { times, messages, calls } = expectedOf(day, books.site, households);
  if (times.firstArrivalAt > books.endAt) return;
  counts.days += 1;
  const got = byDay.get(`${day.household.id}:${day.on}`) ?? [];
  const since = Math.min(day.lostAt ?? Infinity, times.eveningAt);
  const called = callsAbout(books.calls, day, { ...times, since });
  const fail = (rule, says) =>
    violations.push({
      rule,
      family: day.household.family,
      household: day.household.id,
      on: day.on,
      at: times.firstArrivalAt,
      says,
    });
  for (const one of messages) {
    const isOver = day.lostAt !== null && day.lostAt <= one.from;
    if (isOver && one.kind !== 'visit-cancelled') continue;
    if (asksForAnswer(one.kind) && isAnsweredBy(day, one.from)) continue;
    const name = `${one.kind} (${one.channel})`;
    bump(counts.expected, name);
    const address = one.channel === 'sms' ? one.adult.phone : one.adult.email;
    const has = got.some(
      (message) =>
        isOfKind(message.label, one.kind) &&
        message.address === address &&
        within(message, one.from, one.until),
    );
    if (has) bump(counts.arrived, name);
    else if (!isExcused(one, day, households, messages)) {
      const instead = callsAbout(books.calls, day, { ...times, since: one.from });
      if (instead.length > 0) bump(counts.calledInstead, name);
      else if (one.kind === 'reminder') counts.remindersWithoutCall += 1;
      else fail('lost', `${name} to ${address} neither arrived nor made a call`);
    } else bump(counts.calledInstead, `${name}, needless meanwhile`);
  }
  for (const reason of calls)
    if (called.length === 0) fail('no-call', `${reason}, and nobody was told to call`);
  checkMoments({ got, day, times, report });
  checkWhom({ got, day, messages, report });
  const isKnown =
    isAnsweredBy(day, times.callListAt + 2 * minute) ||
    called.length > 0 ||
    (day.lostAt !== null && day.lostAt <= times.callListAt);
  if (!isKnown) fail('state-unknown', 'no answer before dawn, and nobody was told to call');
  for (const { morningId } of day.children) {
    counts.mornings += 1;
    const state = books.states.get(morningId);
    if (!endStates.has(state)) fail('state-unknown', `morning ${morningId} ended as "${state}"`);
  }
}

/** A morning that is called off, or closed by the clinic, is told by a message of its own. */
const isOfKind = ({ kind }, expected) =>
  expected === 'visit-cancelled'
    ? kind === expected || kind.endsWith('-closed')
    : kind === expected;

const asksForAnswer = (kind) => kind === 'morning' || kind === 'nudge';

/** Needless by the time it would have gone: answered, switched off, or an e-mail beside a text. */
function isExcused({ kind, channel, adult, until }, day, households, messages) {
  if (asksForAnswer(kind) && isAnsweredBy(day, until)) return true;
  if (channel === 'sms') return households.offSince(adult.phone, until) !== null;
  return messages.some((other) => other.channel === 'sms' && other.adult === adult);
}

/** Nothing of a night comes outside its window, for a morning that is lost, or after the answer. */
function checkMoments({ got, day, times, report }) {
  const windows = {
    ahead: () => [times.aheadAt ?? Infinity, times.eveningAt],
    nudge: () => [times.nudgeAt ?? Infinity, times.firstArrivalAt],
    evening: (message) => [
      times.eveningAt,
      message.channel === 'sms' ? times.eveningTextUntil : times.firstStopAt,
    ],
    reminder: () => [times.eveningAt, Math.max(...times.stops.map(({ at }) => at))],
    morning: () => [times.questionAt, times.firstArrivalAt],
  };
  for (const message of got) {
    const window = windows[message.label.kind];
    if (!window) continue;
    const [from, until] = window(message);
    if (!within(message, from, until)) report('late', message, 'came outside its time');
    if (day.lostAt !== null && message.at > day.lostAt + inFlight)
      report('late', message, 'came after the morning was given up');
    if (asksForAnswer(message.label.kind) && isAnsweredBy(day, message.at - inFlight))
      report('asked-again', message, 'came after the answer');
  }
}

/** Only to whom it was due; after a change, such as switching texts off or on, the next in line may hear. */
function checkWhom({ got, day, messages, report }) {
  for (const message of got) {
    const { kind } = message.label;
    if (kind !== 'evening' && kind !== 'morning') continue;
    const isDue = messages.some(
      ({ kind: due, channel, adult }) =>
        due === kind &&
        channel === message.channel &&
        message.address === (channel === 'sms' ? adult.phone : adult.email),
    );
    const hasChanged = day.household.changes.some((at) => at >= day.plannedAt && at <= message.at);
    if (!isDue && !hasChanged) report('not-due', message, 'was not due for this person');
  }
}

/** Tasks for this family from a moment to the arrival, from the evening on unless told; or an opt-out two days before. */
function callsAbout(calls, day, { eveningAt, firstArrivalAt, since = eveningAt }) {
  const { household } = day;
  const adults = household.adults.map(({ id }) => id);
  const isOurs = ({ childId, familyMemberId }) =>
    household.children.has(childId) || adults.includes(familyMemberId);
  const inNight = (instant) =>
    instant >= Math.min(since, eveningAt - callsBefore) - hour && instant <= firstArrivalAt;
  return calls.filter(
    (call) =>
      isOurs(call) &&
      (inNight(call.urgentAt) ||
        inNight(call.createdAt) ||
        (call.reason === 'opted-out' &&
          call.createdAt >= firstArrivalAt - 2 * aDay &&
          call.createdAt <= firstArrivalAt)),
  );
}

/** A family that switches texts off within two days of a morning is called at once. */
function checkOptOuts({ books, households, violations }) {
  for (const { direction, status, phone, at } of books.texts) {
    if (direction !== 'in' || status === 'not-taken') continue;
    if (households.offSince(phone, at) !== at) continue;
    const owner = households.ofAddress(phone);
    if (!owner) continue;
    const { household } = owner;
    const near = [...household.days.values()].filter((day) => {
      const first = Math.min(...day.children.map(({ arrivalAt }) => arrivalAt));
      const isOpen = day.plannedAt < at && (day.lostAt === null || day.lostAt > at);
      return isOpen && first > at && first <= at + 2 * aDay;
    });
    if (near.length === 0) continue;
    const isTold = books.calls.some(
      ({ reason, childId, createdAt }) =>
        reason === 'opted-out' &&
        household.children.has(childId) &&
        createdAt <= at + 5 * minute &&
        createdAt >= at - 2 * aDay,
    );
    if (!isTold)
      violations.push({
        rule: 'no-call',
        family: household.family,
        household: household.id,
        on: near[0].on,
        at,
        says: 'opted out shortly before a morning, and nobody was told to call',
      });
  }
}
