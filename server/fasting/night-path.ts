import type { PathStep } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import { addDays, instantOf } from '../../shared/domain/zone';
import type { MorningPlan } from '../series/morning-plans';
import { shownPhone } from '../messages/shown-phone';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { feedPictures, groupedBy, keyOf, standardChildren, type Step } from './night-steps';
import { partAt } from './sky';

const minute = 60_000;
type Mouth = PathStep['mouths'][number]['mouth'];

/** The night of a household as steps in order of time; brothers and sisters share a step where they share its minute. */
export function nightPath(night: HouseholdNight, words: FamilyWords): PathStep[] {
  const steps = [
    supper(night, words),
    ...lastFood(night, words),
    ...lastFeeds(night, words),
    ...stops(night, words),
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
  'stop',
  'wake',
  'answer',
  'leave',
  'arrive',
  'eat-again',
];
const order = (key: string): number => kinds.findIndex((kind) => key.startsWith(kind));

function mouthAt(child: MorningPlan, step: Step, isFirst: boolean): Mouth {
  const plan = standardPlanOf(child);
  if (!plan) return 'none';
  if (step.at < plan.stopAt) return isFirst ? 'starts' : 'full';
  if (step.at === plan.stopAt)
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
    return Math.min(Math.max(usual, plan.earliestLastMealAt), plan.stopAt - 30 * minute);
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
        lines: [words.text('step.last-feed.finish-by', { time: words.stopTime(plan.stopAt) })],
        pictures: feedPictures(children),
        children,
      },
    ];
  });
}

function stops(night: HouseholdNight, words: FamilyWords): Step[] {
  const groups = groupedBy(
    standardChildren(night),
    (child) => standardPlanOf(child)?.stopAt ?? null,
  );
  const lastAt = Math.max(...groups.map(({ at }) => at));
  return groups.map(({ at, children }) => {
    const names = words.list(children);
    const feedings = [...new Set(children.map(({ feeding }) => feeding))];
    const hasInfant = children.some((child) => standardPlanOf(child)?.isInfant);
    const hasOlder = children.some((child) => !standardPlanOf(child)?.isInfant);
    return {
      key: keyOf('stop', children),
      at,
      isStop: true,
      isLoud: true,
      title: words.text('step.stop.title', { children: names }),
      lines: [
        ...feedings.map((feeding) => words.text(`step.stop.${feeding}`)),
        words.text('step.stop.water'),
        words.text('step.stop.medicine'),
        ...(hasInfant ? [words.text('step.stop.pacifier')] : []),
        ...(hasOlder
          ? [words.text('step.stop.before', { time: words.stopTime(at), children: names })]
          : []),
        ...(at === lastAt
          ? [words.text('step.stop.adults', { count: night.children.length })]
          : []),
      ],
      pictures: [
        ...(hasOlder ? ['solid-food-not', 'cows-milk-not'] : []),
        ...feedPictures(children)
          .map((name) => `${name}-not`)
          .filter((name) => name !== 'solid-food-not'),
        'water-not',
      ],
      children,
    };
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
      lines: [words.text('step.wake.line')],
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
      lines: [words.text('step.leave.line')],
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
      words.text('step.arrive.line'),
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
