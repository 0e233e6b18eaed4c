import { validateProfile } from './laboratory-profile-problems';
import { demoLaboratoryProfile, type LaboratoryProfile } from './specimen-clocks';

const problems = (change: Partial<LaboratoryProfile>): string[] =>
  validateProfile({ ...demoLaboratoryProfile, ...change }).map(
    ({ path, code }) => `${path} ${code}`,
  );
const days = (change: Partial<LaboratoryProfile['resultDays']>): Partial<LaboratoryProfile> => ({
  resultDays: { ...demoLaboratoryProfile.resultDays, ...change },
});

describe('a laboratory profile', () => {
  it('holds with the demo values', () => {
    expect(problems({})).toEqual([]);
  });

  it('holds where the laboratory neutralises', () => {
    expect(problems({ neutraliseWithinMinutes: null })).toEqual([]);
  });

  it.each<[string, Partial<LaboratoryProfile>, string]>([
    ['without a name', { name: ' ' }, 'name name-missing'],
    ['that never receives', { receivingWeekdays: [] }, 'receivingWeekdays no-receiving-days'],
    [
      'that closes as it opens',
      { receivingFromTimes: { 2: '11:30' } },
      'cutOffTimes.2 closes-before-it-opens',
    ],
    [
      'without time to receipt',
      { receiptWithinMinutes: 0, neutraliseWithinMinutes: null },
      'receiptWithinMinutes minutes-not-positive',
    ],
    [
      'whose courier needs all the time',
      { minutesToLaboratory: 240 },
      'minutesToLaboratory courier-takes-too-long',
    ],
    ['with a negative way', { minutesToLaboratory: -1 }, 'minutesToLaboratory minutes-negative'],
    [
      'that neutralises after 0 minutes',
      { neutraliseWithinMinutes: 0 },
      'neutraliseWithinMinutes minutes-not-positive',
    ],
    [
      'that neutralises after the receipt',
      { neutraliseWithinMinutes: 241 },
      'neutraliseWithinMinutes neutralised-after-receipt',
    ],
    ['that takes nothing', { minimumVolumeMl: 0 }, 'minimumVolumeMl volume-not-positive'],
    [
      'with its volumes turned round',
      { minimumVolumeMl: 5, maximumVolumeMl: 5 },
      'maximumVolumeMl volumes-reversed',
    ],
    ['with a smear on the same day', days({ smear: 0 }), 'resultDays.smear days-not-positive'],
    ['with half a day', days({ amplification: 1.5 }), 'resultDays.amplification days-not-positive'],
    [
      'preliminary after final',
      days({ culturePreliminary: 43 }),
      'resultDays.culturePreliminary preliminary-after-final',
    ],
    [
      'susceptible before it is identified',
      days({ susceptibility: 36 }),
      'resultDays.susceptibility susceptibility-before-identification',
    ],
  ])('cannot be signed %s', (_, change, expected) => {
    expect(problems(change)).toEqual([expected]);
  });

  it('may close before its opening time on a day it does not receive', () => {
    expect(problems({ receivingFromTimes: { 6: '12:00' }, cutOffTimes: { 6: '08:00' } })).toEqual(
      [],
    );
  });
});
