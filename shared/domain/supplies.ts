/**
 * The set-out list for a morning. Kinds follow published supply lists (Curry International TB
 * Center, helpful tips and step 1; Médecins Sans Frontières TB guide, appendix 3). The counts of a
 * clinic are its own; what is here are starting values that it takes over and changes.
 */

export const supplyItems = [
  'feeding-tube',
  'syringe',
  'lubricant',
  'position-check',
  'sterile-water',
  'specimen-tube',
  'neutralising-agent',
  'specimen-label',
  'requisition',
  'specimen-bag',
  'gloves-pair',
  'gown',
  'eye-protection',
  'respirator',
  'escort-mask',
  'holding-wrap',
  'tissues',
  'alcohol-wipes',
  'glucose-strip',
  'fast-sugar',
  'infant-feed',
  'cool-box',
  'door-sign',
] as const;
export type SupplyItem = (typeof supplyItems)[number];

export interface SupplyCount {
  readonly perChild: number;
  readonly perMorning: number;
  /** One spare for so many children, rounded up; null has none. */
  readonly childrenPerSpare: number | null;
  /** Only for children under this age; null is for all. */
  readonly underMonths: number | null;
}

export interface SupplyRule extends SupplyCount {
  readonly item: SupplyItem;
}

export interface CountedSupply {
  readonly count: number;
  readonly ofWhichSpare: number;
}

const each = (
  item: SupplyItem,
  perChild: number,
  childrenPerSpare: number | null = null,
): SupplyRule => ({ item, perChild, perMorning: 0, childrenPerSpare, underMonths: null });
const once = (item: SupplyItem, perMorning = 1): SupplyRule => ({
  item,
  perChild: 0,
  perMorning,
  childrenPerSpare: null,
  underMonths: null,
});

export const startingSupplyRules: readonly SupplyRule[] = [
  each('feeding-tube', 1, 2),
  each('syringe', 2, 2),
  each('lubricant', 1),
  each('position-check', 1, 2),
  each('sterile-water', 1, 3),
  each('specimen-tube', 1, 2),
  each('neutralising-agent', 1, 3),
  each('specimen-label', 2),
  each('requisition', 1),
  each('specimen-bag', 1, 3),
  // Two staff a child; respirators are kept for the morning, one pair of staff.
  each('gloves-pair', 2, 1),
  each('gown', 2),
  once('eye-protection', 2),
  { ...once('respirator', 2), childrenPerSpare: 3 },
  each('escort-mask', 1, 2),
  each('holding-wrap', 1),
  each('tissues', 1),
  each('alcohol-wipes', 2),
  each('glucose-strip', 1, 3),
  once('fast-sugar'),
  { ...each('infant-feed', 1), underMonths: 12 },
  once('cool-box'),
  once('door-sign'),
];

/** What lies ready for these children, spares included; what nobody needs is left out. */
export function suppliesForMorning<Rule extends SupplyCount>(
  children: readonly { readonly ageMonths: number }[],
  rules: readonly Rule[],
): (Rule & CountedSupply)[] {
  return rules.flatMap((rule) => {
    const concerned = children.filter(
      ({ ageMonths }) => rule.underMonths === null || ageMonths < rule.underMonths,
    ).length;
    if (concerned === 0) return [];
    const spare = rule.childrenPerSpare ? Math.ceil(concerned / rule.childrenPerSpare) : 0;
    const count = concerned * rule.perChild + rule.perMorning + spare;
    return count === 0 ? [] : [{ ...rule, count, ofWhichSpare: spare }];
  });
}
