import type { Instant } from '../../shared/domain/day';
import type { MorningPlan } from '../series/morning-plans';
import { standardPlanOf, type HouseholdNight } from './household-night';

/** A step before the lanes are drawn: when, what, and whose. */
export interface Step {
  readonly key: string;
  readonly at: Instant;
  readonly isStop?: boolean;
  readonly isAbout?: boolean;
  readonly isLoud?: boolean;
  readonly title: string;
  readonly lines: readonly string[];
  readonly pictures: readonly string[];
  readonly children: readonly MorningPlan[];
}

export const standardChildren = (night: HouseholdNight): MorningPlan[] =>
  night.children.filter((child) => standardPlanOf(child) !== null);

export function feedPictures(children: readonly MorningPlan[]): string[] {
  const names = children.flatMap(({ feeding }) => {
    if (feeding === 'breast') return ['breast-feeding'];
    if (feeding === 'formula') return ['formula-bottle'];
    return feeding === 'breast-and-formula' ? ['breast-feeding', 'formula-bottle'] : ['solid-food'];
  });
  return [...new Set(names)];
}

export const keyOf = (kind: string, children: readonly MorningPlan[]): string =>
  `${kind}-${children.map(({ childId }) => childId).join('-')}`;

/** Children by the instant of their step, and by what else must be the same; the youngest first in each group. */
export function groupedBy(
  children: readonly MorningPlan[],
  atOf: (child: MorningPlan) => Instant | null,
  alsoSame: (child: MorningPlan) => string = () => '',
): { at: Instant; children: MorningPlan[] }[] {
  const groups = new Map<string, { at: Instant; children: MorningPlan[] }>();
  for (const child of children) {
    const at = atOf(child);
    if (at === null) continue;
    const key = `${at} ${alsoSame(child)}`;
    const group = groups.get(key);
    if (group) group.children.push(child);
    else groups.set(key, { at, children: [child] });
  }
  return [...groups.values()];
}
