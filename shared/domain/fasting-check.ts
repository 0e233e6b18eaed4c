/**
 * What a family's answer at dawn means: hours fasted, the verdict, and what the family is told.
 * The check never cancels a morning; a nurse or clinician decides every doubtful case. Free of
 * zones and libraries: wall-clock answers arrive as instants, doubtful ones with both readings.
 */
import type { Item } from './fasting-protocol';
import type { FastingPlan, StandardPlan } from './fasting-plan';
import { millisecondsPerMinute, type Instant } from './day';

export type FastingAnswerKind = 'nothing' | 'sip' | 'feed' | 'unsure';

export interface FastingAnswer {
  readonly kind: FastingAnswerKind;
  /** What was last taken, where the family said so; the strictest hours count otherwise. */
  readonly item?: Item;
  readonly lastIntakeAt?: Instant;
  /** Both readings of a wall-clock time that occurred twice or never. */
  readonly readings?: { readonly earlier: Instant; readonly later: Instant };
}

export interface DawnPhone {
  readonly answersFrom: Instant;
  readonly answersUntil: Instant;
}

export interface FastingCheckRequest {
  readonly answer: FastingAnswer;
  readonly plan: FastingPlan;
  readonly now: Instant;
  readonly arrivalAt: Instant;
  readonly likelyCollectionAt: Instant;
  readonly dawnPhone: DawnPhone | null;
  /** When the clinic promises to call back; by default when its telephone opens, if still ahead. */
  readonly weCallBy?: Instant | null;
  readonly lastRoomStartAt: Instant | null;
  readonly laboratoryCutOffAt: Instant | null;
}

export type FastingVerdict = 'long-enough' | 'not-long-enough' | 'cannot-tell';

export type FastingOutcome =
  | 'come'
  | 'come-and-wait'
  | 'call-us'
  | 'come-nurse-decides'
  | 'stay-we-call'
  | 'feed-now-and-call';

export type ExplainKey =
  | 'nothing-since-the-stop'
  | 'long-enough-at-arrival'
  | 'ready-after-arrival'
  | 'time-not-known'
  | 'not-sure'
  | 'a-sip'
  | 'clock-change-two-readings'
  | 'longest-fast-would-pass'
  | 'after-last-room-start'
  | 'after-laboratory-cut-off'
  | 'individual-plan'
  | 'nobody-answers-the-phone';

export interface FastedMinutes {
  readonly now: number;
  readonly atArrival: number;
  readonly atCollection: number;
}

export interface FastingCheck {
  readonly ok: true;
  readonly verdict: FastingVerdict;
  /** When the least hours are over, by the later reading; null when the time is not known. */
  readonly readyAt: Instant | null;
  /** By the later reading. */
  readonly fastedMinutes: FastedMinutes | null;
  readonly outcome: FastingOutcome;
  /** Set with come-and-wait. */
  readonly waitUntil: Instant | null;
  /** Set with stay-we-call, and with feed-now-and-call while nobody answers yet. */
  readonly weCallBy: Instant | null;
  readonly phoneAnswers: boolean;
  readonly explain: readonly ExplainKey[];
}

export type FastingCheckError = 'intake-in-the-future' | 'intake-too-long-ago';
export type FastingCheckResult =
  FastingCheck | { readonly ok: false; readonly error: FastingCheckError };

/** An answer about the night before; anything older is a slip of the finger. */
const oldestIntakeMinutes = 24 * 60;
const collectBeforeCeilingMinutes = 30;

type Reading = { readonly earlier: Instant; readonly later: Instant };

export function fastingCheck(request: FastingCheckRequest): FastingCheckResult {
  const { answer, plan, now } = request;
  const reading = readingOf(answer, now);
  if (reading === 'intake-in-the-future' || reading === 'intake-too-long-ago') {
    return { ok: false, error: reading };
  }
  if (plan.kind === 'individual') {
    const fasted = reading ? fastedMinutes(request, reading.later) : null;
    return doubtful(request, ['individual-plan'], { readyAt: null, fastedMinutes: fasted });
  }
  if (reading) return checkedByTime(request, plan, reading);
  if (answer.kind === 'nothing') {
    // The family says that all went as planned: the fast then began at the latest at the stop.
    const asPlanned = { earlier: plan.stopAt, later: plan.stopAt };
    const check = checkedByTime(request, plan, asPlanned);
    return { ...check, explain: ['nothing-since-the-stop', ...check.explain] };
  }
  const why: ExplainKey[] = answer.kind === 'unsure' ? ['not-sure'] : ['time-not-known'];
  return doubtful(request, why, { readyAt: null, fastedMinutes: null });
}

function readingOf(answer: FastingAnswer, now: Instant): Reading | FastingCheckError | null {
  const { lastIntakeAt, readings } = answer;
  const given =
    readings ??
    (lastIntakeAt === undefined ? null : { earlier: lastIntakeAt, later: lastIntakeAt });
  if (!given) return null;
  if (given.earlier > now) return 'intake-in-the-future';
  // A reading that has not come yet cannot be meant.
  const later = given.later > now ? given.earlier : given.later;
  if (later < now - oldestIntakeMinutes * millisecondsPerMinute) return 'intake-too-long-ago';
  return { earlier: given.earlier, later };
}

function checkedByTime(
  request: FastingCheckRequest,
  plan: StandardPlan,
  reading: Reading,
): FastingCheck {
  const { answer, arrivalAt, likelyCollectionAt } = request;
  const least = leastMinutesFor(plan, answer.item) * millisecondsPerMinute;
  const ceilingAt = reading.earlier + plan.longestMinutes * millisecondsPerMinute;
  const readyAt = reading.later + least;
  const enoughByLater = readyAt <= arrivalAt;
  const enoughByEarlier = reading.earlier + least <= arrivalAt;
  const explain: ExplainKey[] = answer.kind === 'sip' ? ['a-sip'] : [];
  const common = { readyAt, fastedMinutes: fastedMinutes(request, reading.later) };
  const differ = enoughByLater !== enoughByEarlier;
  const verdict =
    differ || answer.kind === 'unsure'
      ? 'cannot-tell'
      : enoughByLater
        ? 'long-enough'
        : 'not-long-enough';

  // A child who ate too recently waits until ready; only then can it be collected.
  const collectionAt = Math.max(likelyCollectionAt, enoughByLater ? 0 : readyAt);
  if (ceilingAt < collectionAt) {
    const why: ExplainKey[] = [...explain, 'longest-fast-would-pass'];
    return told(request, { verdict, ...common, outcome: 'feed-now-and-call', explain: why });
  }
  if (verdict === 'cannot-tell') {
    return doubtful(request, [differ ? 'clock-change-two-readings' : 'not-sure'], common);
  }
  if (verdict === 'long-enough') {
    const why: ExplainKey[] = [...explain, 'long-enough-at-arrival'];
    return told(request, { verdict, ...common, outcome: 'come', explain: why });
  }
  return notLongEnough(request, readyAt, ceilingAt, explain, common);
}

function notLongEnough(
  request: FastingCheckRequest,
  readyAt: Instant,
  ceilingAt: Instant,
  explain: ExplainKey[],
  common: Pick<FastingCheck, 'readyAt' | 'fastedMinutes'>,
): FastingCheck {
  const { answer, lastRoomStartAt, laboratoryCutOffAt } = request;
  const obstacles: ExplainKey[] = [];
  if (lastRoomStartAt !== null && readyAt > lastRoomStartAt) {
    obstacles.push('after-last-room-start');
  }
  if (laboratoryCutOffAt !== null && readyAt >= laboratoryCutOffAt) {
    obstacles.push('after-laboratory-cut-off');
  }
  if (readyAt >= ceilingAt) obstacles.push('longest-fast-would-pass');
  const why: ExplainKey[] = [...explain, 'ready-after-arrival', ...obstacles];
  const verdict = 'not-long-enough';
  // How much a sip matters is for a person to say.
  if (obstacles.length > 0 || answer.kind === 'sip') {
    return { ...doubtful(request, why, common), verdict };
  }
  return told(request, { verdict, ...common, outcome: 'come-and-wait', explain: why });
}

/** A person decides: by telephone when somebody answers, else at the door or by calling back. */
function doubtful(
  request: FastingCheckRequest,
  why: readonly ExplainKey[],
  { readyAt, fastedMinutes }: Pick<FastingCheck, 'readyAt' | 'fastedMinutes'>,
): FastingCheck {
  const phoneAnswers = doesPhoneAnswer(request);
  const canPromise = request.answer.kind === 'feed' && promisedCall(request) !== null;
  const outcome = phoneAnswers ? 'call-us' : canPromise ? 'stay-we-call' : 'come-nurse-decides';
  const explain: ExplainKey[] = phoneAnswers ? [...why] : [...why, 'nobody-answers-the-phone'];
  return told(request, { verdict: 'cannot-tell', readyAt, fastedMinutes, outcome, explain });
}

function told(
  request: FastingCheckRequest,
  check: Pick<FastingCheck, 'verdict' | 'readyAt' | 'fastedMinutes' | 'outcome' | 'explain'>,
): FastingCheck {
  const phoneAnswers = doesPhoneAnswer(request);
  const { outcome } = check;
  const waitsForCall =
    outcome === 'stay-we-call' || (outcome === 'feed-now-and-call' && !phoneAnswers);
  return {
    ok: true,
    ...check,
    waitUntil: outcome === 'come-and-wait' ? check.readyAt : null,
    weCallBy: waitsForCall ? promisedCall(request) : null,
    phoneAnswers,
  };
}

function doesPhoneAnswer({ dawnPhone, now }: FastingCheckRequest): boolean {
  return dawnPhone !== null && dawnPhone.answersFrom <= now && now < dawnPhone.answersUntil;
}

/** A time that can still be kept; without one, nobody is asked to stay by the telephone. */
function promisedCall({ weCallBy, dawnPhone, now }: FastingCheckRequest): Instant | null {
  const promised = weCallBy ?? dawnPhone?.answersFrom ?? null;
  return promised !== null && promised > now ? promised : null;
}

function leastMinutesFor(plan: StandardPlan, item: Item | undefined): number {
  return plan.stops.find((stop) => stop.item === item)?.leastMinutes ?? plan.leastMinutes;
}

function fastedMinutes(request: FastingCheckRequest, lastIntakeAt: Instant): FastedMinutes {
  // "Nothing" told before the stop counts from a stop still to come: none yet, not less than none.
  const since = (instant: Instant): number =>
    Math.max(0, Math.floor((instant - lastIntakeAt) / millisecondsPerMinute));
  return {
    now: since(request.now),
    atArrival: since(request.arrivalAt),
    atCollection: since(request.likelyCollectionAt),
  };
}

export type HungerCeiling = 'ok' | 'collect-or-feed' | 'feed';

/**
 * What the row of a child offers. From half an hour before the longest fast: collect now or feed;
 * at the ceiling: feed. Give the earlier reading of a doubtful time.
 */
export function hungerCeiling(request: {
  readonly lastIntakeAt: Instant;
  readonly longestMinutes: number;
  readonly now: Instant;
}): HungerCeiling {
  const { lastIntakeAt, longestMinutes, now } = request;
  const minutesLeft = longestMinutes - (now - lastIntakeAt) / millisecondsPerMinute;
  if (minutesLeft <= 0) return 'feed';
  return minutesLeft <= collectBeforeCeilingMinutes ? 'collect-or-feed' : 'ok';
}
