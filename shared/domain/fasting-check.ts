/**
 * What a family's answer at dawn means: hours fasted, the verdict, and what the family is told.
 * The check never cancels a morning; a nurse or clinician decides every doubtful case. Free of
 * zones and libraries: wall-clock answers arrive as instants, doubtful ones with both readings.
 */
import type { Explanation } from './explanation';
import { leastMinutesOf } from './fasting-hours';
import type {
  ExplainKey,
  FastedMinutes,
  FastingAnswer,
  FastingCheck,
  FastingCheckRequest,
  FastingCheckResult,
  FastingCheckError,
} from './fasting-answer';
import type { StandardPlan } from './fasting-plan';
import { millisecondsPerMinute, type Instant } from './day';

export type * from './fasting-answer';

/** A check before it can say how it was reached. */
type Checked = Omit<FastingCheck, 'explanation'>;

/** An answer about the night before; anything older is a slip of the finger. */
const oldestIntakeMinutes = 24 * 60;

type Reading = { readonly earlier: Instant; readonly later: Instant };

export function fastingCheck(request: FastingCheckRequest): FastingCheckResult {
  const reading = readingOf(request.answer, request.now);
  if (reading === 'intake-in-the-future' || reading === 'intake-too-long-ago') {
    return { ok: false, error: reading };
  }
  const check = checked(request, reading);
  return { ...check, explanation: explanationOf(request, check, reading) };
}

function checked(request: FastingCheckRequest, reading: Reading | null): Checked {
  const { answer, plan } = request;
  if (plan.kind === 'individual') {
    const fasted = reading ? fastedMinutes(request, reading.later) : null;
    return doubtful(request, ['individual-plan'], { readyAt: null, fastedMinutes: fasted });
  }
  // "Nothing" beside a time after the stop: only one of the two can be meant, and nobody knows which.
  if (answer.kind === 'nothing' && reading && reading.later > plan.nothingAt) {
    const fasted = fastedMinutes(request, reading.later);
    return doubtful(request, ['contradictory'], { readyAt: null, fastedMinutes: fasted });
  }
  if (reading) return checkedByTime(request, plan, reading);
  if (answer.kind === 'nothing') return asPlanned(request, plan);
  const why: ExplainKey[] = answer.kind === 'unsure' ? ['not-sure'] : ['time-not-known'];
  return doubtful(request, why, { readyAt: null, fastedMinutes: null });
}

/** The family says that all went by the plan: each thing was last taken at its stop at the latest. */
function asPlanned(request: FastingCheckRequest, plan: StandardPlan): Checked {
  const readyAt = Math.max(
    ...plan.stops.map((stop) => stop.stopAt + stop.leastMinutes * millisecondsPerMinute),
  );
  const ceilingAt = plan.mealStopAt + plan.longestMinutes * millisecondsPerMinute;
  const found = {
    verdict: readyAt <= request.arrivalAt ? ('long-enough' as const) : ('not-long-enough' as const),
    readyAt,
    fastedMinutes: fastedMinutes(request, plan.mealStopAt),
  };
  return settled(request, { ...found, ceilingAt, why: ['nothing-since-the-stop'] });
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
): Checked {
  const { answer, arrivalAt } = request;
  const { strictest, mildest } = leastMinutesOf(plan, answer.kind, answer.item);
  const readyAt = reading.later + strictest * millisecondsPerMinute;
  // The least hours by the later reading, the longest fast by the earlier. A sip of water ends no
  // hunger: the ceiling goes on from the last meal.
  const hungryFrom =
    answer.kind === 'sip'
      ? Math.min(answer.lastMealAt ?? plan.mealStopAt, reading.earlier)
      : reading.earlier;
  const isEnough = readyAt <= arrivalAt;
  const differs = isEnough !== reading.earlier + strictest * millisecondsPerMinute <= arrivalAt;
  const dependsOnItem =
    !isEnough && reading.later + mildest * millisecondsPerMinute <= arrivalAt && !differs;
  const isUnclear = differs || dependsOnItem || answer.kind === 'unsure';
  return settled(request, {
    verdict: isUnclear ? 'cannot-tell' : isEnough ? 'long-enough' : 'not-long-enough',
    readyAt,
    fastedMinutes: fastedMinutes(request, reading.later),
    ceilingAt: hungryFrom + plan.longestMinutes * millisecondsPerMinute,
    why: answer.kind === 'sip' ? ['a-sip'] : [],
    unclear: differs ? 'clock-change-two-readings' : dependsOnItem ? 'item-not-known' : 'not-sure',
  });
}

interface Found extends Pick<Checked, 'verdict' | 'fastedMinutes'> {
  readonly readyAt: Instant;
  readonly ceilingAt: Instant;
  readonly why: readonly ExplainKey[];
  readonly unclear?: ExplainKey;
}

/** From verdict and ceiling to what the family is told: hunger first, then doubt, then the wait. */
function settled(request: FastingCheckRequest, found: Found): Checked {
  const { verdict, readyAt, ceilingAt, why } = found;
  const common = { readyAt, fastedMinutes: found.fastedMinutes };
  const isEnough = readyAt <= request.arrivalAt;
  // A child who ate too recently waits until ready; only then can it be collected.
  const collectionAt = Math.max(request.likelyCollectionAt, isEnough ? 0 : readyAt);
  if (ceilingAt < collectionAt) {
    const explain: ExplainKey[] = [...why, 'longest-fast-would-pass'];
    return told(request, { verdict, ...common, outcome: 'feed-now-and-call', explain });
  }
  if (verdict === 'cannot-tell') {
    return doubtful(request, [...why, found.unclear ?? 'not-sure'], common);
  }
  if (verdict === 'long-enough') {
    const explain: ExplainKey[] = [...why, 'long-enough-at-arrival'];
    return told(request, { verdict, ...common, outcome: 'come', explain });
  }
  return notLongEnough(request, readyAt, ceilingAt, why, common);
}

function notLongEnough(
  request: FastingCheckRequest,
  readyAt: Instant,
  ceilingAt: Instant,
  explain: readonly ExplainKey[],
  common: Pick<Checked, 'readyAt' | 'fastedMinutes'>,
): Checked {
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
  { readyAt, fastedMinutes }: Pick<Checked, 'readyAt' | 'fastedMinutes'>,
): Checked {
  const phoneAnswers = doesPhoneAnswer(request);
  const canPromise = request.answer.kind === 'feed' && promisedCall(request) !== null;
  const outcome = phoneAnswers ? 'call-us' : canPromise ? 'stay-we-call' : 'come-nurse-decides';
  const explain: ExplainKey[] = phoneAnswers ? [...why] : [...why, 'nobody-answers-the-phone'];
  return told(request, { verdict: 'cannot-tell', readyAt, fastedMinutes, outcome, explain });
}

function told(
  request: FastingCheckRequest,
  check: Pick<Checked, 'verdict' | 'readyAt' | 'fastedMinutes' | 'outcome' | 'explain'>,
): Checked {
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

/** What went in and which rule decided, for staff and for the record. */
function explanationOf(
  { answer, plan, now, arrivalAt, likelyCollectionAt }: FastingCheckRequest,
  check: Checked,
  reading: Reading | null,
): Explanation {
  const standard = plan.kind === 'standard' ? plan : null;
  return {
    rule: `fasting-check.${check.explain[check.explain.length - 1] ?? check.verdict}`,
    inputs: {
      answer: answer.kind,
      item: answer.item ?? null,
      lastIntakeAt: reading?.later ?? null,
      earlierReadingAt: reading && reading.earlier !== reading.later ? reading.earlier : null,
      now,
      arrivalAt,
      likelyCollectionAt,
      readyAt: check.readyAt,
      leastMinutes: standard?.leastMinutes ?? null,
      longestMinutes: standard?.longestMinutes ?? null,
      basis: standard?.basis ?? null,
      reached: check.explain.join(', '),
    },
  };
}
