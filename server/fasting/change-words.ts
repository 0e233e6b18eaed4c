import type { OutcomeKind } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { longestEndsAt } from '../../shared/domain/fasting-plan';
import { invalid } from '../http/problem';
import type { MorningPlan } from '../series/morning-plans';
import { shownPhone } from '../messages/shown-phone';
import { callBackMinutes, dawnPhoneOf } from './check-child';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { newestFood } from './morning-outcome';
import type { ToldRow } from './told-rows';

const minute = 60_000;
/** Later than this after the booked time nobody waits: the family says that it is not coming today. */
const mostLateMinutes = 180;

export type MorningChange =
  | { readonly kind: 'late'; readonly newArrivalAt: string }
  | { readonly kind: 'ill'; readonly isAwake: boolean }
  | { readonly kind: 'not-coming' };

/** What a change says to the family, and what it says of itself. */
export interface ChangeSaying {
  readonly kind: OutcomeKind;
  readonly heading: string;
  readonly lines: readonly string[];
  readonly questionKey: string;
  readonly answerKey: string;
  readonly answer: string;
  readonly toldUs: (plan: MorningPlan) => string;
  readonly weCallBy: Instant | null;
}

/** @throws Problem 422 'newArrivalAt' for a new time that is none. */
export function sayingOf(
  submission: MorningChange,
  night: HouseholdNight,
  before: readonly ToldRow[],
  words: FamilyWords,
  now: Instant,
): ChangeSaying {
  switch (submission.kind) {
    case 'ill':
      return submission.isAwake ? foodFirst(night, words) : emergency(night, words);
    case 'not-coming':
      return notComing(night, words);
    case 'late':
      return late(Date.parse(submission.newArrivalAt), night, before, words, now);
  }
}

function foodFirst({ site }: HouseholdNight, words: FamilyWords): ChangeSaying {
  return {
    kind: 'food-first',
    heading: words.text('outcome.food-first.heading'),
    lines: [
      words.text('outcome.food-first.line'),
      words.text('outcome.food-first.worse', { emergency: site.emergencyNumber }),
      words.text('outcome.food-first.call', { phone: shownPhone(site.phone, site.country) }),
    ],
    questionKey: 'change.ill.asks',
    answerKey: 'change.ill.awake',
    answer: words.text('change.ill.awake'),
    toldUs: ({ callMe }) => words.text('told-us.ill-awake', { name: callMe }),
    weCallBy: null,
  };
}

function emergency({ site }: HouseholdNight, words: FamilyWords): ChangeSaying {
  return {
    kind: 'emergency',
    heading: words.text('outcome.emergency.heading', { emergency: site.emergencyNumber }),
    lines: [words.text('outcome.emergency.nothing'), words.text('outcome.emergency.later')],
    questionKey: 'change.ill.asks',
    answerKey: 'change.ill.not-awake',
    answer: words.text('change.ill.not-awake'),
    toldUs: ({ callMe }) => words.text('told-us.ill-not-awake', { name: callMe }),
    weCallBy: null,
  };
}

function notComing({ site }: HouseholdNight, words: FamilyWords): ChangeSaying {
  return {
    kind: 'not-coming',
    heading: words.text('outcome.not-coming.heading'),
    lines: [
      words.text('outcome.not-coming.line'),
      words.text('outcome.not-coming.ill', { emergency: site.emergencyNumber }),
    ],
    questionKey: 'change.not-coming.asks',
    answerKey: 'change.not-coming.confirm',
    answer: words.text('change.not-coming.confirm'),
    toldUs: ({ callMe }) => words.text('told-us.not-coming', { name: callMe }),
    weCallBy: null,
  };
}

/** A late child whose longest fast would pass is fed now; the test can wait (PRACTICE 1). */
function late(
  newArrivalAt: Instant,
  night: HouseholdNight,
  before: readonly ToldRow[],
  words: FamilyWords,
  now: Instant,
): ChangeSaying {
  const { site, firstArrivalAt } = night;
  const limit = firstArrivalAt + mostLateMinutes * minute;
  if (newArrivalAt <= Math.max(now, firstArrivalAt) || newArrivalAt > limit)
    throw invalid([
      { path: 'newArrivalAt', message: 'Choose a time after the booked one, on the same morning.' },
    ]);
  const time = words.time(newArrivalAt);
  const common = {
    questionKey: 'change.late.asks',
    answerKey: 'change.late.choice',
    answer: words.text('change.late.choice', { time }),
    toldUs: ({ callMe }: MorningPlan) => words.text('told-us.late', { name: callMe, time }),
  };
  const phone = night.children[0] ? dawnPhoneOf(night.children[0]) : null;
  const doesAnswer = phone !== null && phone.answersFrom <= now && now < phone.answersUntil;
  const hasOwnPlan = (plan: MorningPlan): boolean => standardPlanOf(plan) === null;
  // Nobody has set how long a child with a plan of its own may wait; while nobody can be asked, food comes first.
  const hungry = night.children.filter((plan) =>
    hasOwnPlan(plan) ? !doesAnswer : wouldPass(plan, newArrivalAt, before),
  );
  if (hungry.length === 0 && phone !== null && night.children.some(hasOwnPlan))
    return { ...common, ...askAboutOwnPlan(night, words, phone.answersUntil) };
  if (hungry.length === 0)
    return {
      ...common,
      kind: 'late-noted',
      heading: words.text('outcome.late-noted.heading', { time }),
      lines: [
        words.text('outcome.late-noted.line', { door: site.door }),
        words.text('outcome.still-nothing', { children: words.list(night.children) }),
      ],
      weCallBy: null,
    };
  const others = night.children.filter((plan) => !hungry.includes(plan) && !hasOwnPlan(plan));
  const weCallBy =
    phone !== null && now < phone.answersFrom ? phone.answersFrom + callBackMinutes * minute : null;
  return {
    ...common,
    kind: 'feed-now-and-call',
    heading: words.text('outcome.feed-now-and-call.heading', { children: words.list(hungry) }),
    lines: [
      words.text('outcome.feed-now-and-call.why'),
      ...(doesAnswer
        ? [
            words.text('outcome.feed-now-and-call.phone', {
              phone: shownPhone(site.phone, site.country),
              time: words.time(phone.answersUntil),
            }),
          ]
        : []),
      ...(weCallBy === null
        ? []
        : [words.text('outcome.feed-now-and-call.we-call', { weCallBy: words.time(weCallBy) })]),
      ...(others.length === 0
        ? []
        : [words.text('outcome.feed-now-and-call.others', { children: words.list(others) })]),
    ],
    weCallBy,
  };
}

/** How long a child with a plan of its own may wait, only a person knows: the family calls before it leaves. */
function askAboutOwnPlan(
  { children, site }: HouseholdNight,
  words: FamilyWords,
  answersUntil: Instant,
): Pick<ChangeSaying, 'kind' | 'heading' | 'lines' | 'weCallBy'> {
  const others = children.filter((plan) => standardPlanOf(plan) !== null);
  return {
    kind: 'call-us',
    heading: words.text('outcome.call-us.heading'),
    lines: [
      words.text('outcome.call-us.phone', {
        phone: shownPhone(site.phone, site.country),
        time: words.time(answersUntil),
      }),
      ...(others.length === 0
        ? []
        : [words.text('outcome.call-us.until-then', { children: words.list(others) })]),
    ],
    weCallBy: null,
  };
}

/** By the last intake as told, else by the plan's stop. */
function wouldPass(plan: MorningPlan, newArrivalAt: Instant, before: readonly ToldRow[]): boolean {
  const standard = standardPlanOf(plan);
  if (!standard) return false;
  const told = newestFood(before, plan.morningId);
  const fedAt = told?.answer === 'feed' ? told.last_intake_at?.getTime() : undefined;
  const likelyCollectionAt = newArrivalAt + plan.site.usualWaitMinutes * minute;
  return longestEndsAt(fedAt ?? standard.mealStopAt, standard) < likelyCollectionAt;
}
