import { startingProtocol } from './fasting-protocol';
import { publishedFasts, publishedFor, type PublishedHours } from './published-fasting';

describe('published fasts', () => {
  // Clinical facts 7, rows 1 to 7 (row 6: 2 to 3 hours without food), and the study in 865 patients.
  it('are those of the sources, hours for infants and for older children', () => {
    const hours = ({ from, to }: PublishedHours): string =>
      to === null ? `${from}+` : `${from}-${to}`;
    expect(
      publishedFasts.map((fast) => [fast.id, fast.source, hours(fast.infants), hours(fast.older)]),
    ).toEqual([
      ['curry-glossary', 'Curry International TB Center, gastric aspirate glossary', '3-4', '6-8'],
      ['curry-step-1', 'Curry International TB Center, step 1', '7+', '7+'],
      ['medline-plus', 'National Library of Medicine, MedlinePlus 003378', '8-10', '8-10'],
      ['bettercare', 'Bettercare Childhood TB, 3-17', '6+', '6+'],
      ['rutgers', 'Rutgers Global TB Institute, course 2.13b', '2-3', '2-3'],
      ['quest-indiana', 'Indiana Regional laboratory, 908547', '8+', '8+'],
      [
        'time-and-temperature',
        'Study of time, temperature and pH in 865 patients, India',
        '6+',
        '6+',
      ],
    ]);
  });

  // Clinical facts 7, row 50: at the first and the last month of each age.
  it.each([
    [0, 5, 8],
    [5, 5, 8],
    [6, 7, 12],
    [7, 8, 12],
    [8, 8, 16],
    [11, 12, 16],
    [12, 12, 18],
    [23, 24, 18],
    [83, 83, 20],
    [83, 84, 20],
    [84, 90, 24],
  ])(
    'watched in hospital, from %i to %i months: at most %i hours',
    (fromMonths, toMonths, most) => {
      expect(publishedFor({ fromMonths, toMonths }).monitoredHours).toBe(most);
    },
  );

  // Clinical facts 1.2 (rows that were read at the page) and 1.4.
  it.each([
    [3, 5, 2, 10, 8],
    [6, 11, 2, 10, 12],
    [8, 11, 2, 10, 16],
    [12, 23, 2, 10, 18],
    [24, 59, 2, 10, 20],
    [60, null, 2, 10, 20],
    [84, null, 2, 10, 24],
    [0, null, 2, 10, 8],
  ])(
    'for %p to %p months: %p to %p hours, monitored %p',
    (fromMonths, toMonths, from, to, most) => {
      const found = publishedFor({ fromMonths, toMonths });
      expect(found.leastRange).toEqual({ from, to });
      expect(found.monitoredHours).toBe(most);
      expect(found.least).toHaveLength(publishedFasts.length);
    },
  );

  it('give infants their own hours where the source does', () => {
    const glossary = (fromMonths: number) =>
      publishedFor({ fromMonths, toMonths: null }).least.find(({ id }) => id === 'curry-glossary');
    expect(glossary(11)?.hours).toEqual({ from: 3, to: 4 });
    expect(glossary(12)?.hours).toEqual({ from: 6, to: 8 });
  });

  it('hold the starting hours inside their range', () => {
    for (const band of startingProtocol.bands) {
      if (!band.leastHours || band.longestHours === null) continue;
      const { leastRange, monitoredHours } = publishedFor(band);
      for (const hours of Object.values(band.leastHours)) {
        expect(hours).toBeGreaterThanOrEqual(leastRange.from);
        expect(hours).toBeLessThanOrEqual(leastRange.to);
      }
      expect(band.longestHours).toBeLessThan(monitoredHours);
    }
  });
});
