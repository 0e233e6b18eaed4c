import { startingSupplyRules, suppliesForMorning, supplyItems } from './supplies';

describe('supplies for a morning', () => {
  const five = [4, 9, 17, 30, 60].map((ageMonths) => ({ ageMonths }));
  const lineOf = (item: string, children = five) =>
    suppliesForMorning({ children }).find((line) => line.item === item);

  it('count a child each, and spares on top', () => {
    expect(lineOf('feeding-tube')).toEqual({ item: 'feeding-tube', count: 8, ofWhichSpare: 3 });
    expect(lineOf('requisition')).toEqual({ item: 'requisition', count: 5, ofWhichSpare: 0 });
    expect(lineOf('cool-box')).toEqual({ item: 'cool-box', count: 1, ofWhichSpare: 0 });
  });

  it('count infants alone for infant feeds', () => {
    expect(lineOf('infant-feed')?.count).toBe(2);
    expect(lineOf('infant-feed', [{ ageMonths: 12 }])).toBeUndefined();
  });

  it('are none for an empty morning', () => {
    expect(suppliesForMorning({ children: [] })).toEqual([]);
  });

  it('name every kind once', () => {
    expect(startingSupplyRules.map(({ item }) => item).sort()).toEqual([...supplyItems].sort());
  });

  it('follow the clinic’s own rules', () => {
    const rules = [
      { item: 'syringe', perChild: 3, perMorning: 1, childrenPerSpare: null },
    ] as const;
    expect(suppliesForMorning({ children: five, rules })).toEqual([
      { item: 'syringe', count: 16, ofWhichSpare: 0 },
    ]);
  });
});
