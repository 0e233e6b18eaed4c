import { allowableItems, type AllowableItem } from '../../shared/domain/fasting-protocol';
import { stopGroups } from '../../shared/domain/fasting-stops';
import type { MorningPlan } from '../series/morning-plans';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { feedPictures, groupedBy, keyOf, standardChildren, type Step } from './night-steps';
import { ownLines } from './own-plan-steps';

const itemPictures: Readonly<Partial<Record<string, string>>> = {
  'solid-food': 'solid-food-not',
  'cows-milk': 'cows-milk-not',
  formula: 'formula-bottle-not',
  'breast-milk': 'breast-feeding-not',
  water: 'water-not',
};

/** Where things have different hours: each that ends before the last, at its own time. */
export function itemStops(night: HouseholdNight, words: FamilyWords): Step[] {
  return standardChildren(night).flatMap((child) => {
    const plan = standardPlanOf(child);
    if (!plan || plan.allSame) return [];
    return stopGroups(plan.stops)
      .slice(0, -1)
      .flatMap(({ stopAt, items }) => {
        const says = items
          .filter((item) => item !== 'other')
          .map((item) => words.text(`step.stop-item.${item}`, { children: child.callMe }));
        const [title, ...lines] = says;
        if (title === undefined) return [];
        return [
          {
            key: keyOf(`item-stop-${items[0]}`, [child]),
            at: stopAt,
            isStop: true,
            title,
            lines,
            pictures: items.flatMap((item) => itemPictures[item] ?? []),
            children: [child],
          },
        ];
      });
  });
}

/** Nothing at all from here on; children who share the minute share the step. */
export function stops(night: HouseholdNight, words: FamilyWords): Step[] {
  const groups = groupedBy(
    standardChildren(night),
    (child) => standardPlanOf(child)?.nothingAt ?? null,
  );
  const lastAt = Math.max(...groups.map(({ at }) => at));
  return groups.map(({ at, children }) => {
    const names = words.list(children);
    const feedings = [...new Set(children.map(({ feeding }) => feeding))];
    const hasOlder = children.some((child) => !standardPlanOf(child)?.isInfant);
    const allAlike = children.every((child) => standardPlanOf(child)?.allSame);
    return {
      key: keyOf('stop', children),
      at,
      isStop: true,
      isLoud: true,
      title: words.text('step.stop.title', { children: names }),
      lines: [
        ...feedings.map((feeding) => words.text(`step.stop.${feeding}`)),
        words.text('step.stop.water'),
        ...medicineLines(children, words),
        ...allowedLines(children, words),
        ...ownLines(children, 'stop', words),
        ...(hasOlder && allAlike
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

/** A child whose plan says what becomes of each medicine is not told that there is none. */
const medicineLines = (children: readonly MorningPlan[], words: FamilyWords): string[] =>
  children.some(({ individualPlan }) => (individualPlan?.body.medicines.length ?? 0) > 0)
    ? []
    : [words.text('step.stop.medicine')];

/** What the protocol allows during the fast; pacifier and arms are named where a baby is among them. */
function allowedLines(children: readonly MorningPlan[], words: FamilyWords): string[] {
  const hasInfant = children.some((child) => standardPlanOf(child)?.isInfant);
  const isAllowed = (item: AllowableItem): boolean =>
    children.every(({ protocol }) => protocol.allowedItems.includes(item));
  return allowableItems
    .filter((item) => isAllowed(item) && (hasInfant || !forBabies.includes(item)))
    .map((item) => words.text(`step.stop.${item}`));
}

const forBabies: readonly AllowableItem[] = ['pacifier', 'cuddling'];
