import { startingProtocol, type FastingBand, type FastingProtocol } from './fasting-protocol';
import { cautionsAlwaysIndividual, validateProtocol } from './fasting-protocol-problems';
import { individualPlanProblems, phrasePlaces, planPhrases } from './individual-plan';
import { validateProfile } from './laboratory-profile-problems';
import { demoLaboratoryProfile, type LaboratoryProfile } from './specimen-clocks';

/** What the one who sets the clinic up reads, word by word, and where each limit lies. */
const [newborn, infant] = startingProtocol.bands as [FastingBand, FastingBand];
const allAges: FastingBand = { ...infant, toMonths: null, longestHours: 12 };
const bands = (...given: readonly Partial<FastingBand>[]): FastingProtocol => ({
  ...startingProtocol,
  bands: given.map((band) => ({ ...allAges, ...band })),
});
const one = (change: Partial<FastingBand> & Record<string, unknown>): FastingProtocol =>
  bands(newborn, change);
const changed = (change: Partial<FastingProtocol>): FastingProtocol => ({
  ...startingProtocol,
  ...change,
});
const least = (hours: number, water = hours): FastingBand['leastHours'] =>
  Object.fromEntries(
    Object.keys(allAges.leastHours ?? {}).map((item) => [item, item === 'water' ? water : hours]),
  ) as FastingBand['leastHours'];

describe('a fasting protocol', () => {
  const sentences = (protocol: FastingProtocol, lastArrivalTime: string | null = null) =>
    validateProtocol(protocol, { lastArrivalTime }).map(({ path, message }) => [path, message]);

  it.each<[string, FastingProtocol, string[][]]>([
    ['as shipped', startingProtocol, []],
    ['no bands', bands(), [['bands', 'Add at least one age band.']]],
    [
      'a late beginning',
      bands({ fromMonths: 3 }),
      [['bands.0.fromMonths', 'The first band must begin at 0 months.']],
    ],
    [
      'an end',
      one({ toMonths: 59 }),
      [['bands.1.toMonths', 'The last band must have no upper age.']],
    ],
    [
      'an open band in the middle',
      bands(newborn, {}, { fromMonths: 12 }),
      [['bands.1.toMonths', 'Only the last band may be without an upper age.']],
    ],
    [
      'a gap',
      bands(newborn, { fromMonths: 5 }),
      [['bands.1.fromMonths', 'No band holds 3 to 4 months.']],
    ],
    [
      'an overlap',
      bands(newborn, { toMonths: 12 }, { fromMonths: 11 }),
      [['bands.2.fromMonths', 'Two bands hold 11 to 12 months.']],
    ],
    [
      'a band that ends before it begins',
      bands(newborn, { fromMonths: 3, toMonths: 2 }, { fromMonths: 3 }),
      [['bands.1.toMonths', 'The band ends before it begins.']],
    ],
    ['a band of one month', bands(newborn, { toMonths: 3 }, { fromMonths: 4 }), []],
    [
      'a standard plan under 3 months',
      bands({ fromMonths: 0 }),
      [['bands.0.individualPlan', 'Children under 3 months always get an individual plan.']],
    ],
    [
      'no hours',
      one({ leastHours: null, longestHours: null }),
      [
        ['bands.1.leastHours', 'Give the least hours.'],
        ['bands.1.longestHours', 'Give the longest fast.'],
      ],
    ],
    [
      'hours of nothing',
      one({ leastHours: least(4, 0) }),
      [['bands.1.leastHours.water', 'Hours must be more than 0.']],
    ],
    [
      'a longest fast that is not longer, by the strictest thing',
      one({ leastHours: least(4, 2), longestHours: 4 }),
      [['bands.1.longestHours', 'Must be longer than 4 hours.']],
    ],
    ['a wait that just fits', one({ longestHours: 4.5 }), []],
    [
      'a wait that does not',
      one({ longestHours: 4.25 }),
      [['bands.1.longestHours', 'The usual wait alone would pass it.']],
    ],
    ['no wait and no pause', changed({ usualWaitMinutes: 0, eatAgainAfterMinutes: 0 }), []],
    [
      'negative minutes',
      changed({ usualWaitMinutes: -1, eatAgainAfterMinutes: -1 }),
      [
        ['usualWaitMinutes', 'The usual wait cannot be negative.'],
        ['eatAgainAfterMinutes', 'The time to the next feed is negative.'],
      ],
    ],
    [
      'waking advice of no minutes',
      changed({ wakeToCollectionMinutes: 0 }),
      [['wakeToCollectionMinutes', 'Minutes must be more than 0.']],
    ],
    [
      'waking advice within the wait',
      changed({ wakeToCollectionMinutes: 30 }),
      [['wakeToCollectionMinutes', 'Must be more than the usual wait of 30 minutes.']],
    ],
    [
      'diabetes without a plan of its own',
      changed({
        individualPlanCautions: startingProtocol.individualPlanCautions.filter(
          (caution) => caution !== 'diabetes',
        ),
      }),
      [['individualPlanCautions.diabetes', 'Children with this always get an individual plan.']],
    ],
  ])('with %s', (_, protocol, expected) => {
    expect(sentences(protocol)).toEqual(expected);
  });

  it('with a clock time that the last arrival makes too long', () => {
    const protocol = one({ nothingFrom: '20:00' });
    // 20:00 to 7:30 and half an hour of waiting are the 12 hours, to the minute.
    expect(sentences(protocol, '07:30')).toEqual([]);
    expect(sentences(protocol, '07:31')).toEqual([
      [
        'bands.1.nothingFrom',
        'From 20:00 to the last arrival at 07:31 with the usual wait passes the longest fast.',
      ],
    ]);
    expect(sentences(protocol)).toEqual([]);
    expect(validateProtocol(protocol)).toEqual([]);
    expect(sentences(one({ nothingFrom: null }), '23:00')).toEqual([]);
  });

  it('may leave the clinic’s own choice with prematurity and morning medicines alone', () => {
    expect([...cautionsAlwaysIndividual].sort()).toEqual([
      'diabetes',
      'low-blood-sugar',
      'metabolic-disease',
      'severe-malnutrition',
      'tube-feeding',
    ]);
  });
});

describe('a laboratory profile', () => {
  const sentences = (change: Partial<LaboratoryProfile>) =>
    validateProfile({ ...demoLaboratoryProfile, ...change }).map(({ message }) => message);
  const days = (change: Partial<LaboratoryProfile['resultDays']>) =>
    sentences({ resultDays: { ...demoLaboratoryProfile.resultDays, ...change } });

  it.each<[Partial<LaboratoryProfile>, string]>([
    [{ name: ' ' }, 'Give the name of the laboratory.'],
    [{ receivingWeekdays: [] }, 'Choose at least one receiving day.'],
    [{ receivingFromTimes: { 2: '11:30' } }, 'Must be later than the first receipt at 11:30.'],
    [{ receiptWithinMinutes: 0, neutraliseWithinMinutes: null }, 'Minutes must be more than 0.'],
    [{ minutesToLaboratory: -1 }, 'The way to the laboratory is negative.'],
    [{ minutesToLaboratory: 240 }, 'Must be less than the 240 minutes to receipt.'],
    [{ neutraliseWithinMinutes: 0 }, 'Minutes must be more than 0.'],
    [{ neutraliseWithinMinutes: 241 }, 'Must not be more than the 240 minutes to receipt.'],
    [{ minimumVolumeMl: 0 }, 'The volume must be more than 0.'],
    [{ minimumVolumeMl: 5, maximumVolumeMl: 5 }, 'Must be more than 5 mL.'],
  ])('with %j', (change, sentence) => {
    expect(sentences(change)).toEqual([sentence]);
  });

  it('with days in the wrong order, and with the same day', () => {
    const { cultureNegativeFinal, cultureIdentification } = demoLaboratoryProfile.resultDays;
    expect(days({ smear: 0 })).toEqual(['Give at least 1 day.']);
    expect(days({ culturePreliminary: cultureNegativeFinal + 1 })).toEqual([
      'Must not be later than the final negative.',
    ]);
    expect(days({ culturePreliminary: cultureNegativeFinal })).toEqual([]);
    expect(days({ susceptibility: cultureIdentification - 1 })).toEqual([
      'Must not be before the identification.',
    ]);
    expect(days({ susceptibility: cultureIdentification })).toEqual([]);
  });

  it('may neutralise until the very receipt, open earlier than it closes, or close alone', () => {
    expect(sentences({ neutraliseWithinMinutes: 240 })).toEqual([]);
    expect(sentences({ receivingFromTimes: { 2: '11:29' } })).toEqual([]);
    expect(sentences({ receivingFromTimes: { 2: '11:30' }, cutOffTimes: {} })).toEqual([]);
  });
});

describe('a plan of a child’s own', () => {
  const body = {
    stops: [{ item: 'formula' as const, leastHours: 4, nothingFrom: null }],
    longestHours: 8,
    lastFeedTime: null,
    phrases: [],
    medicines: [],
  };
  const medicine = { name: 'A', way: 'usual-time-with-sip' as const, time: '06:00', sipMl: 5 };
  const sentences = (change: object) =>
    individualPlanProblems({ ...body, ...change }).map(({ path, message }) => [path, message]);
  const [stop] = body.stops;

  it.each<[string, object, string[][]]>([
    ['all it needs', { medicines: [medicine] }, []],
    ['nothing', { stops: [] }, [['stops', 'Give hours or a clock time for at least one thing.']]],
    [
      'neither hours nor a clock',
      { stops: [{ ...stop, leastHours: null }] },
      [['stops.0.leastHours', 'Give hours or a clock time.']],
    ],
    ['a clock alone', { stops: [{ ...stop, leastHours: null, nothingFrom: '02:00' }] }, []],
    [
      'hours of nothing',
      { stops: [{ ...stop, leastHours: 0 }] },
      [['stops.0.leastHours', 'Hours must be more than 0.']],
    ],
    [
      'hours as long as the longest fast',
      { longestHours: 4 },
      [['longestHours', 'Must be longer than 4 hours.']],
    ],
    ['a thing twice', { stops: [stop, stop] }, [['stops.1.item', 'This thing is named twice.']]],
    [
      'no longest fast',
      { longestHours: 0, stops: [{ ...stop, leastHours: null, nothingFrom: '02:00' }] },
      [['longestHours', 'Hours must be more than 0.']],
    ],
    [
      'a low sugar without its number',
      { phrases: [{ key: 'glucose-low-feed-and-call', glucoseMgDl: null }] },
      [['phrases.0.glucoseMgDl', 'Give the blood sugar under which the child is fed.']],
    ],
    [
      'a sentence twice',
      {
        phrases: [
          { key: 'let-sleep', glucoseMgDl: null },
          { key: 'let-sleep', glucoseMgDl: null },
        ],
      },
      [['phrases.1.key', 'This sentence is chosen twice.']],
    ],
    [
      'a medicine at no time',
      { medicines: [{ ...medicine, time: '25:00', sipMl: 0 }] },
      [
        ['medicines.0.time', 'Give the usual time.'],
        ['medicines.0.sipMl', 'Give the most water in mL.'],
      ],
    ],
    [
      'a medicine without time and water',
      { medicines: [{ ...medicine, time: null, sipMl: null }] },
      [
        ['medicines.0.time', 'Give the usual time.'],
        ['medicines.0.sipMl', 'Give the most water in mL.'],
      ],
    ],
  ])('with %s', (_, change, expected) => {
    expect(sentences(change)).toEqual(expected);
  });

  it('has its sentences where they are to be done', () => {
    expect(planPhrases.map((key) => phrasePlaces[key])).toEqual([
      'last-feed',
      'wake',
      'wake',
      'wake',
      'arrive',
      'stop',
      'stop',
    ]);
  });
});
