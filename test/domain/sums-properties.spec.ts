import * as fc from 'fast-check';
import { amplifications, cultures, isPositive, smears } from '../../shared/domain/critical';
import {
  chooseLetter,
  sentencesNotPositive,
  type SpecimenResults,
} from '../../shared/domain/letter-choice';
import { messageSegments } from '../../shared/domain/message-segments';
import { suppliesForMorning, type SupplyCount } from '../../shared/domain/supplies';

const always = { seed: 20_261_210, numRuns: 500 };

describe('any letter', () => {
  const specimen: fc.Arbitrary<SpecimenResults> = fc.record({
    state: fc.constantFrom('planned', 'not-collected', 'rejected', 'awaiting', 'reported'),
    finality: fc.constantFrom('preliminary', 'final'),
    smear: fc.constantFrom(null, ...smears),
    amplification: fc.constantFrom(null, ...amplifications),
    culture: fc.constantFrom(null, ...cultures),
    isHandEntered: fc.boolean(),
    hasChangedMeaning: fc.boolean(),
  });
  const series = fc.record({
    specimens: fc.array(specimen, { maxLength: 5 }),
    isClosedEarly: fc.boolean(),
  });

  it('that is not positive says that tuberculosis is not ruled out', () => {
    fc.assert(
      fc.property(series, (asked) => {
        const { letter, sentences } = chooseLetter(asked);
        const saysResult = sentencesNotPositive.some((key) => sentences.includes(key));
        expect(letter === 'positive' || saysResult).toBe(true);
        expect(sentences.includes('does-not-rule-out')).toBe(saysResult);
      }),
      { ...always, numRuns: 3000 },
    );
  });

  it('never says less than the worst answer, and a positive is telephoned first', () => {
    fc.assert(
      fc.property(series, (asked) => {
        const { letter, positive, mustHaveHappened } = chooseLetter(asked);
        expect(positive).toBe(asked.specimens.some(isPositive));
        expect(letter === 'positive').toBe(positive);
        expect(mustHaveHappened.includes('call-about-positive')).toBe(positive);
      }),
      { ...always, numRuns: 3000 },
    );
  });
});

describe('any text message', () => {
  const short = fc.string({
    unit: fc.constantFrom('a', 'Z', '7', ' ', 'é', 'Δ', '€', '[', '\n'),
    maxLength: 400,
  });
  const long = fc.string({ unit: fc.constantFrom('a', 'á', 'ሀ', '😀', 'ش', ' '), maxLength: 300 });

  it('fills its parts: none is empty, none holds too much', () => {
    fc.assert(
      fc.property(fc.oneof(short, long), (text) => {
        fc.pre(text !== '');
        const { encoding, units, segments, notGsm } = messageSegments(text);
        expect(encoding === 'gsm-7').toBe(notGsm.length === 0);
        const [single, part] = encoding === 'gsm-7' ? [160, 153] : [70, 67];
        if (units <= single) expect(segments).toBe(1);
        else {
          expect(segments * part).toBeGreaterThanOrEqual(units);
          // At the most one unit of each part stays empty, before a pair that is not split.
          expect((segments - 1) * (part - 1)).toBeLessThan(units);
        }
      }),
      always,
    );
  });

  it('is as long as its halves together, and never takes fewer parts than one of them', () => {
    fc.assert(
      fc.property(short, short, (first, second) => {
        fc.pre(first !== '' && second !== '');
        const whole = messageSegments(first + second);
        const halves = [messageSegments(first), messageSegments(second)];
        expect(whole.units).toBe(halves.reduce((sum, { units }) => sum + units, 0));
        for (const half of halves) expect(whole.segments).toBeGreaterThanOrEqual(half.segments);
      }),
      always,
    );
  });
});

describe('any set-out list', () => {
  const rule: fc.Arbitrary<SupplyCount> = fc.record({
    perChild: fc.integer({ min: 0, max: 4 }),
    perMorning: fc.integer({ min: 0, max: 3 }),
    childrenPerSpare: fc.option(fc.integer({ min: 1, max: 5 })),
    underMonths: fc.option(fc.integer({ min: 1, max: 60 })),
  });
  const children = fc.array(fc.record({ ageMonths: fc.integer({ min: 0, max: 80 }) }), {
    maxLength: 10,
  });

  it('adds up: two mornings need as much for their children as one with all of them', () => {
    fc.assert(
      fc.property(children, children, rule, (first, second, one) => {
        const [left, right, both] = [first, second, [...first, ...second]].map((present) => {
          const [line] = suppliesForMorning(present, [one]);
          const fixed = line ? one.perMorning : 0;
          return {
            forChildren: (line?.count ?? 0) - (line?.ofWhichSpare ?? 0) - fixed,
            spare: line?.ofWhichSpare ?? 0,
          };
        });
        expect((left?.forChildren ?? 0) + (right?.forChildren ?? 0)).toBe(both?.forChildren);
        expect(both?.spare).toBeGreaterThanOrEqual(Math.max(left?.spare ?? 0, right?.spare ?? 0));
        expect(both?.spare).toBeLessThanOrEqual((left?.spare ?? 0) + (right?.spare ?? 0));
      }),
      always,
    );
  });

  it('names nothing that is not needed, and counts children of the age alone', () => {
    fc.assert(
      fc.property(children, fc.array(rule), (present, rules) => {
        for (const line of suppliesForMorning(present, rules)) {
          const concerned = present.filter(
            ({ ageMonths }) => line.underMonths === null || ageMonths < line.underMonths,
          ).length;
          expect(concerned).toBeGreaterThan(0);
          expect(line.count).toBeGreaterThan(0);
          expect(line.count - line.ofWhichSpare).toBe(concerned * line.perChild + line.perMorning);
        }
      }),
      always,
    );
  });
});
