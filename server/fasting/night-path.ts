import type { PathStep } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { addDays, instantOf } from '../../shared/domain/zone';
import type { MorningPlan } from '../series/morning-plans';
import { shownPhone } from '../messages/shown-phone';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { feedPictures, groupedBy, keyOf, standardChildren, type Step } from './night-steps';
import { itemStops, stops } from './night-stops';
import { fallenFeeds, medicines, ownLines, wakeLines } from './own-plan-steps';
import { partAt } from './sky';

const minute = 60_000;
type Mouth = PathStep['mouths'][number]['mouth'];

/** The night of a household as steps in order of time; brothers and sisters share a step where they share its minute. */
export function nightPath(night: HouseholdNight, words: FamilyWords): PathStep[] {
  const steps = [
    supper(night, words),
    ...lastFood(night, words),
    ...lastFeeds(night, words),
    ...fallenFeeds(night, words),
    ...itemStops(night, words),
    ...stops(night, words),
    ...medicines(night, words),
    ...gettingUp(night, words),
    arrive(night, words),
    ...eatAgain(night, words),
  ]
    .filter((step) => step !== null)
    .sort((left, right) => left.at - right.at || order(left.key) - order(right.key));
  const firstKey = steps[0]?.key;
  return steps.map((step) => ({
    key: step.key,
    part: partAt(step.at, night.on, night.zone),
    time: step.isStop ? words.shownStop(step.at) : words.shown(step.at),
    isAbout: step.isAbout ?? false,
    isLoud: step.isLoud ?? false,
    title: step.title,
    lines: [...step.lines],
    pictures: step.pictures.map((name) => ({ name, caption: words.text(`picture.${name}`) })),
    childIds: step.children.map(({ childId }) => childId),
    mouths: night.children.map((child) => ({
      childId: child.childId,
      mouth: mouthAt(child, step, step.key === firstKey),
    })),
  }));
}

/** Of steps in the same minute: who stops before who still feeds, getting up before the question. */
const kinds = [
  'supper',
  'last-food',
  'last-feed',
  'night-feed',
  'item-stop',
  'stop',
  'wake',
  'medicine',
  'answer',
  'leave',
  'arrive',
  'eat-again',
];
const order = (key: string): number => kinds.findIndex((kind) => key.startsWith(kind));

function mouthAt(child: MorningPlan, step: Step, isFirst: boolean): Mouth {
  const plan = standardPlanOf(child);
  if (!plan) return 'none';
  if (step.at < plan.nothingAt) return isFirst ? 'starts' : 'full';
  if (step.at === plan.nothingAt)
    return step.key.startsWith('stop')
      ? 'ends'
      : order(step.key) < order('stop')
        ? 'full'
        : 'empty';
  if (step.at < plan.eatAgainAt) return 'empty';
  return step.at === plan.eatAgainAt ? 'begins' : 'full';
}

function supper(night: HouseholdNight, words: FamilyWords): Step | null {
  const children = standardChildren(night);
  if (children.length === 0) return null;
  return {
    key: 'supper',
    at: instantOf({ on: addDays(night.on, -1), time: '18:00', zone: night.zone }),
    isAbout: true,
    title: words.text('step.supper.title', { children: words.list(children) }),
    lines: [words.text('step.supper.line')],
    pictures: ['solid-food'],
    children,
  };
}

/** Older children eat once more before bed, not so early that their longest fast would pass. */
function lastFood(night: HouseholdNight, words: FamilyWords): Step[] {
  const usual = instantOf({ on: addDays(night.on, -1), time: '20:30', zone: night.zone });
  const groups = groupedBy(standardChildren(night), (child) => {
    const plan = standardPlanOf(child);
    if (!plan || plan.isInfant) return null;
    const mealAt = plan.lastMealAt ?? Math.max(usual, plan.earliestLastMealAt);
    return Math.min(mealAt, plan.mealStopAt - 30 * minute);
  });
  return groups.map(({ at, children }) => ({
    key: keyOf('last-food', children),
    at,
    isAbout: true,
    title: words.text('step.last-food.title', { children: words.list(children) }),
    lines: [],
    pictures: ['solid-food', 'sleep'],
    children,
  }));
}

function lastFeeds(night: HouseholdNight, words: FamilyWords): Step[] {
  const groups = groupedBy(
    standardChildren(night),
    (child) => standardPlanOf(child)?.lastFeedAt ?? null,
    ({ feeding }) => feeding,
  );
  return groups.flatMap(({ at, children }) => {
    const [first] = children;
    const plan = first ? standardPlanOf(first) : null;
    if (!first || !plan) return [];
    return [
      {
        key: keyOf('last-feed', children),
        at,
        title: words.text(`step.last-feed.title.${first.feeding}`, {
          children: words.list(children),
        }),
        lines: [
          words.text('step.last-feed.finish-by', { time: words.stopTime(plan.mealStopAt) }),
          ...ownLines(children, 'last-feed', words),
        ],
        pictures: feedPictures(children),
        children,
      },
    ];
  });
}

/** Wake, answer, leave: the household does these together, by its earliest child. */
function gettingUp(night: HouseholdNight, words: FamilyWords): Step[] {
  const { children, site } = night;
  const [sample] = children;
  if (!sample) return [];
  const leaveAt = leaveAtOf(night);
  const names = words.list(children);
  return [
    {
      key: 'wake',
      at: leaveAt - sample.readyMinutes * minute,
      title: words.text('step.wake.title', { children: names }),
      lines: [words.text('step.wake.line'), ...wakeLines(children, words)],
      pictures: ['wake', 'bring-food-for-after'],
      children,
    },
    {
      key: 'answer',
      at: night.questionOpensAt,
      title: words.text('step.answer.title', { count: children.length }),
      lines: [
        words.text('step.answer.line', { time: words.time(night.callListAt) }),
        words.text('step.answer.line-call', { phone: shownPhone(site.phone, site.country) }),
      ],
      pictures: ['answer-us'],
      children,
    },
    {
      key: 'leave',
      at: leaveAt,
      title: words.text('step.leave.title', { children: names }),
      lines: standardChildren(night).length > 0 ? [words.text('step.leave.line')] : [],
      pictures: ['leave-home'],
      children,
    },
  ];
}

export function leaveAtOf({ children, firstArrivalAt }: HouseholdNight): Instant {
  return firstArrivalAt - (children[0]?.travelMinutes ?? 0) * minute;
}

function arrive(night: HouseholdNight, words: FamilyWords): Step {
  const inOrder = [...night.children].sort((left, right) => left.arrivalAt - right.arrivalAt);
  const [first, ...then] = inOrder;
  return {
    key: 'arrive',
    at: night.firstArrivalAt,
    isLoud: true,
    title: words.text('step.arrive.title', { door: night.site.door }),
    lines: [
      ...(first && then.length > 0
        ? [words.text('step.arrive.order', { first: first.callMe, then: words.list(then) })]
        : []),
      ...(standardChildren(night).length > 0 ? [words.text('step.arrive.line')] : []),
      ...ownLines(inOrder, 'arrive', words),
    ],
    pictures: ['arrive'],
    children: night.children,
  };
}

function eatAgain(night: HouseholdNight, words: FamilyWords): Step[] {
  const groups = groupedBy(
    standardChildren(night),
    (child) => standardPlanOf(child)?.eatAgainAt ?? null,
    ({ feeding }) => feeding,
  );
  const lastAt = Math.max(...groups.map(({ at }) => at));
  return groups.map(({ at, children }) => ({
    key: keyOf('eat-again', children),
    at,
    isAbout: true,
    title: words.text(`step.eat-again.title.${children[0]?.feeding ?? 'family-food'}`, {
      children: words.list(children),
    }),
    lines: [
      words.text('step.eat-again.line'),
      ...(at === lastAt && children[0]
        ? [
            words.text('step.eat-again.done', {
              number: children[0].number,
              total: children[0].ofPlanned,
            }),
          ]
        : []),
    ],
    pictures: ['feed-again'],
    children,
  }));
}
