import type { FastingAnswer, OutcomeKind } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import type { FastingCheck, FastingOutcome } from '../../shared/domain/fasting-check';
import type { MorningPlan } from '../series/morning-plans';
import { shownPhone } from '../messages/shown-phone';
import { dawnPhoneOf, type ToldAnswer } from './check-child';
import type { FamilyWords } from './family-words';
import { dueAt, standardPlanOf, type HouseholdNight } from './household-night';

export interface CheckedChild {
  readonly plan: MorningPlan;
  readonly told: ToldAnswer;
  readonly check: FastingCheck;
}

/** What a household is told together: the strictest of its children's outcomes. */
export interface HouseholdOutcome {
  readonly kind: OutcomeKind;
  readonly heading: string;
  readonly lines: readonly string[];
  readonly weCallBy: Instant | null;
  readonly waitUntil: Instant | null;
}

const strictestFirst: readonly FastingOutcome[] = [
  'feed-now-and-call',
  'stay-we-call',
  'call-us',
  'come-nurse-decides',
  'come-and-wait',
  'come',
];

export function householdOutcome(
  night: HouseholdNight,
  checked: readonly CheckedChild[],
  words: FamilyWords,
): HouseholdOutcome {
  const kind =
    strictestFirst.find((outcome) => checked.some(({ check }) => check.outcome === outcome)) ??
    'come-nurse-decides';
  const weCallBy = earliest(checked.map(({ check }) => check.weCallBy));
  const waitUntil = latest(checked.map(({ check }) => check.waitUntil));
  return { kind, weCallBy, waitUntil, ...sayings[kind]({ night, checked, words, weCallBy }) };
}

interface Saying {
  readonly night: HouseholdNight;
  readonly checked: readonly CheckedChild[];
  readonly words: FamilyWords;
  readonly weCallBy: Instant | null;
}
type Said = Pick<HouseholdOutcome, 'heading' | 'lines'>;

const plansOf = (checked: readonly CheckedChild[]): MorningPlan[] =>
  checked.map(({ plan }) => plan);
const withOutcome = (checked: readonly CheckedChild[], outcome: FastingOutcome): MorningPlan[] =>
  plansOf(checked.filter(({ check }) => check.outcome === outcome));

/** The household comes when its first child is due. */
const comesAt = (night: HouseholdNight): Instant => Math.min(...night.children.map(dueAt));

const sayings: Readonly<Record<FastingOutcome, (saying: Saying) => Said>> = {
  come: ({ night, checked, words }) => ({
    heading: words.text('outcome.come.heading', {
      door: night.site.door,
      time: words.time(comesAt(night)),
    }),
    lines: stillNothing(checked, words),
  }),

  'come-and-wait': ({ night, checked, words }) => {
    const waiting = checked.filter(({ check }) => check.waitUntil !== null);
    const time = words.time(comesAt(night));
    const waits = waiting.map(({ plan, check }) => ({
      name: plan.callMe,
      waitUntil: words.time(check.waitUntil ?? dueAt(plan)),
    }));
    const [only, ...more] = waits;
    const isOne = only !== undefined && more.length === 0;
    return {
      heading: isOne
        ? words.text('outcome.come-and-wait.heading', { ...only, time })
        : words.text('outcome.come-and-wait.heading-many', { time }),
      lines: [
        words.text('outcome.all-right'),
        ...(isOne ? [] : waits.map((wait) => words.text('outcome.come-and-wait.child', wait))),
        ...stillNothing(checked, words),
      ],
    };
  },

  'call-us': ({ night, checked, words }) => ({
    heading: words.text('outcome.call-us.heading'),
    lines: [
      words.text('outcome.all-right'),
      words.text('outcome.call-us.phone', phoneOf(night, words)),
      ...nothingFor(checked, words, 'outcome.call-us.until-then'),
    ],
  }),

  'come-nurse-decides': ({ night, checked, words }) => ({
    heading: words.text('outcome.come-nurse-decides.heading', { time: words.time(comesAt(night)) }),
    lines: [
      words.text('outcome.all-right'),
      words.text('outcome.come-nurse-decides.tell', {
        children: words.list(withOutcome(checked, 'come-nurse-decides')),
        door: night.site.door,
      }),
      ...stillNothing(checked, words),
    ],
  }),

  'stay-we-call': ({ night, checked, words, weCallBy }) => {
    const by = words.time(weCallBy ?? comesAt(night));
    return {
      heading: words.text('outcome.stay-we-call.heading', { weCallBy: by }),
      lines: [
        words.text('outcome.all-right'),
        words.text('outcome.stay-we-call.keep-phone'),
        ...nothingFor(checked, words, 'outcome.stay-we-call.until-then'),
        words.text('outcome.stay-we-call.no-call', {
          phone: shownPhone(night.site.phone, night.site.country),
          weCallBy: by,
        }),
      ],
    };
  },

  'feed-now-and-call': ({ night, checked, words, weCallBy }) => {
    const fed = withOutcome(checked, 'feed-now-and-call');
    const others = plansOf(checked).filter(
      (plan) => !fed.includes(plan) && standardPlanOf(plan) !== null,
    );
    const doesPhoneAnswer = checked.some(({ check }) => check.phoneAnswers);
    return {
      heading: words.text('outcome.feed-now-and-call.heading', { children: words.list(fed) }),
      lines: [
        words.text('outcome.feed-now-and-call.why'),
        ...(doesPhoneAnswer
          ? [words.text('outcome.feed-now-and-call.phone', phoneOf(night, words))]
          : []),
        ...(!doesPhoneAnswer && weCallBy !== null
          ? [words.text('outcome.feed-now-and-call.we-call', { weCallBy: words.time(weCallBy) })]
          : []),
        ...(others.length > 0
          ? [words.text('outcome.feed-now-and-call.others', { children: words.list(others) })]
          : []),
      ],
    };
  },
};

function phoneOf({ site, children }: HouseholdNight, words: FamilyWords) {
  const [sample] = children;
  const until = sample ? dawnPhoneOf(sample).answersUntil : 0;
  return { phone: shownPhone(site.phone, site.country), time: words.time(until) };
}

const stillNothing = (checked: readonly CheckedChild[], words: FamilyWords): string[] =>
  nothingFor(checked, words, 'outcome.still-nothing');

/**
 * Who goes on with nothing by mouth. A child with a plan of its own keeps to that one: a family is never told to let such
 * a child go on without food for a time that nobody has set.
 */
function nothingFor(checked: readonly CheckedChild[], words: FamilyWords, key: string): string[] {
  const plans = plansOf(checked).filter((plan) => standardPlanOf(plan) !== null);
  return plans.length === 0 ? [] : [words.text(key, { children: words.list(plans) })];
}

/** What the family chose, as one sentence for "You told us". */
export function toldUsSays(plan: MorningPlan, told: ToldAnswer, words: FamilyWords): string {
  const name = plan.callMe;
  const { answer, lastIntakeAt } = told;
  const standard = standardPlanOf(plan);
  switch (answer) {
    case 'nothing':
      if (!standard) return words.text('told-us.nothing-individual', { name });
      return standard.allSame
        ? words.text('told-us.nothing', { name, time: words.stopTime(standard.stopAt) })
        : words.text('told-us.nothing-items', { name });
    case 'unsure':
      return words.text('told-us.unsure', { name });
    case 'sip':
    case 'feed':
      return lastIntakeAt === null
        ? words.text(`told-us.${answer}-unknown`, { name })
        : words.text(`told-us.${answer}`, { name, finishedAt: words.time(lastIntakeAt) });
  }
}

/** Question and answers as they stand on the family's screen. */
export function questionWords(
  plan: MorningPlan,
  words: FamilyWords,
): { asks: string; choices: { answer: FastingAnswer; says: string }[] } {
  const name = plan.callMe;
  const standard = standardPlanOf(plan);
  return {
    asks: !standard
      ? words.text('question.asks-individual', { name })
      : standard.allSame
        ? words.text('question.asks', { name, time: words.stopTime(standard.stopAt) })
        : words.text('question.asks-items', { name }),
    choices: [
      { answer: 'nothing', says: words.text('question.choice.nothing') },
      { answer: 'sip', says: words.text('question.choice.sip') },
      { answer: 'feed', says: words.text(`question.choice.feed.${plan.feeding}`) },
      { answer: 'unsure', says: words.text('question.choice.unsure') },
    ],
  };
}

const earliest = (instants: readonly (Instant | null)[]): Instant | null => {
  const known = instants.filter((at) => at !== null);
  return known.length === 0 ? null : Math.min(...known);
};
const latest = (instants: readonly (Instant | null)[]): Instant | null => {
  const known = instants.filter((at) => at !== null);
  return known.length === 0 ? null : Math.max(...known);
};
