/**
 * The set-out list for a morning. Kinds follow published supply lists (Curry International TB
 * Center, helpful tips and step 1; Médecins Sans Frontières TB guide, appendix 3); the counts are
 * starting values and the clinic's to change.
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

export interface SupplyRule {
  readonly item: SupplyItem;
  readonly perChild: number;
  readonly perMorning: number;
  /** One spare for so many children, rounded up; null has none. */
  readonly childrenPerSpare: number | null;
  /** Only for children under this age. */
  readonly underMonths?: number;
}

export interface SupplyLine {
  readonly item: SupplyItem;
  readonly count: number;
  readonly ofWhichSpare: number;
}

const each = (item: SupplyItem, perChild: number, childrenPerSpare: number | null = null) => ({
  item,
  perChild,
  perMorning: 0,
  childrenPerSpare,
});
const once = (item: SupplyItem) => ({ item, perChild: 0, perMorning: 1, childrenPerSpare: null });

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
  { item: 'eye-protection', perChild: 0, perMorning: 2, childrenPerSpare: null },
  { item: 'respirator', perChild: 0, perMorning: 2, childrenPerSpare: 3 },
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

export function suppliesForMorning(request: {
  readonly children: readonly { readonly ageMonths: number }[];
  readonly rules?: readonly SupplyRule[];
}): SupplyLine[] {
  const { children, rules = startingSupplyRules } = request;
  return rules.flatMap((rule): SupplyLine[] => {
    const concerned = children.filter(
      ({ ageMonths }) => rule.underMonths === undefined || ageMonths < rule.underMonths,
    ).length;
    if (concerned === 0) return [];
    const spare = rule.childrenPerSpare ? Math.ceil(concerned / rule.childrenPerSpare) : 0;
    const count = concerned * rule.perChild + rule.perMorning + spare;
    return [{ item: rule.item, count, ofWhichSpare: spare }];
  });
}
