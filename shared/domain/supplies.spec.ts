import { startingSupplyRules, suppliesForMorning, supplyItems } from './supplies';

describe('supplies for a morning', () => {
  const five = [4, 9, 17, 30, 60].map((ageMonths) => ({ ageMonths }));
  const lineOf = (item: string, children = five) => {
    const line = suppliesForMorning(children, startingSupplyRules).find((one) => one.item === item);
    return line && { count: line.count, ofWhichSpare: line.ofWhichSpare };
  };

  it('count a child each, and spares on top', () => {
    expect(lineOf('feeding-tube')).toEqual({ count: 8, ofWhichSpare: 3 });
    expect(lineOf('requisition')).toEqual({ count: 5, ofWhichSpare: 0 });
    expect(lineOf('cool-box')).toEqual({ count: 1, ofWhichSpare: 0 });
    expect(lineOf('respirator')).toEqual({ count: 4, ofWhichSpare: 2 });
  });

  it('count infants alone for infant feeds', () => {
    expect(lineOf('infant-feed')?.count).toBe(2);
    expect(lineOf('infant-feed', [{ ageMonths: 12 }])).toBeUndefined();
  });

  it('are none for an empty morning', () => {
    expect(suppliesForMorning([], startingSupplyRules)).toEqual([]);
  });

  it('name every kind once', () => {
    expect(startingSupplyRules.map(({ item }) => item).sort()).toEqual([...supplyItems].sort());
  });

  it('follow the clinic’s own counts, and leave out what it sets to nothing', () => {
    const own = { item: 'syringe', childrenPerSpare: null, underMonths: null };
    const rules = [
      { ...own, perChild: 3, perMorning: 1 },
      { ...own, item: 'gown', perChild: 0, perMorning: 0 },
    ];
    expect(suppliesForMorning(five, rules)).toEqual([{ ...rules[0], count: 16, ofWhichSpare: 0 }]);
  });

  it('add up: children, morning and spares, and never fall with one child more', () => {
    const ages = [1, 5, 11, 12, 25, 40, 61, 100];
    for (let children = 1; children <= ages.length; children += 1) {
      const present = ages.slice(0, children).map((ageMonths) => ({ ageMonths }));
      for (const line of suppliesForMorning(present, startingSupplyRules)) {
        const concerned = present.filter(
          ({ ageMonths }) => line.underMonths === null || ageMonths < line.underMonths,
        ).length;
        expect(line.count - line.ofWhichSpare).toBe(concerned * line.perChild + line.perMorning);
        const more = lineOf(line.item, [...present, { ageMonths: 3 }])?.count ?? 0;
        expect(more).toBeGreaterThanOrEqual(line.count);
      }
    }
  });
});
