/** What must be mended before a clinician may sign a laboratory profile, each beside its field. */
import { minutesOfTime } from './day';
import { resultStages, type LaboratoryProfile } from './specimen-clocks';

export type ProfileProblemCode =
  | 'name-missing'
  | 'no-receiving-days'
  | 'closes-before-it-opens'
  | 'minutes-not-positive'
  | 'minutes-negative'
  | 'neutralised-after-receipt'
  | 'courier-takes-too-long'
  | 'volume-not-positive'
  | 'volumes-reversed'
  | 'days-not-positive'
  | 'preliminary-after-final'
  | 'susceptibility-before-identification';

export interface ProfileProblem {
  readonly path: string;
  readonly code: ProfileProblemCode;
  readonly message: string;
}

type Add = (path: string, code: ProfileProblemCode, message: string) => void;

/** Everything that must be mended before a clinician may sign; empty when the profile holds. */
export function validateProfile(profile: LaboratoryProfile): ProfileProblem[] {
  const problems: ProfileProblem[] = [];
  const add: Add = (path, code, message) => {
    problems.push({ path, code, message });
  };
  if (profile.name.trim() === '') {
    add('name', 'name-missing', 'Give the name of the laboratory.');
  }
  addReceivingProblems(profile, add);
  addMinuteProblems(profile, add);
  addVolumeProblems(profile, add);
  addDayProblems(profile, add);
  return problems;
}

function addReceivingProblems(profile: LaboratoryProfile, add: Add): void {
  const { receivingWeekdays, receivingFromTimes, cutOffTimes } = profile;
  if (receivingWeekdays.length === 0) {
    add('receivingWeekdays', 'no-receiving-days', 'Choose at least one receiving day.');
  }
  for (const weekday of receivingWeekdays) {
    const from = receivingFromTimes[weekday];
    const until = cutOffTimes[weekday];
    if (from === undefined || until === undefined) continue;
    if (minutesOfTime(until) > minutesOfTime(from)) continue;
    add(
      `cutOffTimes.${weekday}`,
      'closes-before-it-opens',
      `Must be later than the first receipt at ${from}.`,
    );
  }
}

function addMinuteProblems(profile: LaboratoryProfile, add: Add): void {
  const { neutraliseWithinMinutes, receiptWithinMinutes, minutesToLaboratory } = profile;
  if (!(receiptWithinMinutes > 0)) {
    add('receiptWithinMinutes', 'minutes-not-positive', 'Minutes must be more than 0.');
  }
  if (!(minutesToLaboratory >= 0)) {
    add('minutesToLaboratory', 'minutes-negative', 'The way to the laboratory is negative.');
  } else if (receiptWithinMinutes > 0 && minutesToLaboratory >= receiptWithinMinutes) {
    add(
      'minutesToLaboratory',
      'courier-takes-too-long',
      `Must be less than the ${receiptWithinMinutes} minutes to receipt.`,
    );
  }
  if (neutraliseWithinMinutes === null) return;
  if (!(neutraliseWithinMinutes > 0)) {
    add('neutraliseWithinMinutes', 'minutes-not-positive', 'Minutes must be more than 0.');
  } else if (neutraliseWithinMinutes > receiptWithinMinutes) {
    // A later limit would let a specimen reach the laboratory as it was collected.
    add(
      'neutraliseWithinMinutes',
      'neutralised-after-receipt',
      `Must not be more than the ${receiptWithinMinutes} minutes to receipt.`,
    );
  }
}

function addVolumeProblems({ minimumVolumeMl, maximumVolumeMl }: LaboratoryProfile, add: Add) {
  if (!(minimumVolumeMl > 0)) {
    add('minimumVolumeMl', 'volume-not-positive', 'The volume must be more than 0.');
  }
  if (!(maximumVolumeMl > minimumVolumeMl)) {
    add('maximumVolumeMl', 'volumes-reversed', `Must be more than ${minimumVolumeMl} mL.`);
  }
}

function addDayProblems({ resultDays }: LaboratoryProfile, add: Add): void {
  for (const stage of resultStages) {
    if (Number.isInteger(resultDays[stage]) && resultDays[stage] > 0) continue;
    add(`resultDays.${stage}`, 'days-not-positive', 'Give at least 1 day.');
  }
  if (resultDays.culturePreliminary > resultDays.cultureNegativeFinal) {
    add(
      'resultDays.culturePreliminary',
      'preliminary-after-final',
      'Must not be later than the final negative.',
    );
  }
  if (resultDays.susceptibility < resultDays.cultureIdentification) {
    add(
      'resultDays.susceptibility',
      'susceptibility-before-identification',
      'Must not be before the identification.',
    );
  }
}
