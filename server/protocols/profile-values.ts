import type { FieldProblem, ProfileValues } from '../../shared/contracts/protocols';
import { validateProfile } from '../../shared/domain/laboratory-profile-problems';
import type { Day } from '../../shared/domain/day';
import { demoLaboratoryProfile, type LaboratoryProfile } from '../../shared/domain/specimen-clocks';
import type { ClinicWords } from '../wording/clinic-words';
import { dayProblems, type When } from './protocol-values';
import { wholeProfileBody, type ProfileBody, type StoredProfileBody } from './protocols';
import type { DraftRow, VersionRow } from './versions';

export function profileValuesOf(row: VersionRow): ProfileValues {
  const body = wholeProfileBody(row.body as StoredProfileBody);
  return {
    name: row.title,
    effectiveOn: row.effective_on,
    receivingWeekdays: [...body.receivingWeekdays],
    receivingFromTimes: { ...body.receivingFromTimes },
    cutOffTimes: { ...body.cutOffTimes },
    minutesToLaboratory: body.minutesToLaboratory,
    neutraliseWithinMinutes: body.neutraliseWithinMinutes,
    receiptWithinMinutes: body.receiptWithinMinutes,
    minimumVolumeMl: body.minimumVolumeMl,
    maximumVolumeMl: body.maximumVolumeMl,
    resultDays: { ...body.resultDays },
  };
}

export function profileFrom(values: ProfileValues, version: number): LaboratoryProfile {
  return { ...bodyOf(values), ...values, version, signedBy: null, signedOn: null };
}

function bodyOf(values: ProfileValues): ProfileBody {
  const { name: _name, effectiveOn: _on, ...body } = values;
  const receivingWeekdays = [...body.receivingWeekdays].sort();
  return { ...body, receivingWeekdays, isDemo: false };
}

export const profileRowOf = (values: ProfileValues): DraftRow => ({
  title: values.name,
  effectiveOn: values.effectiveOn,
  body: bodyOf(values),
  hasStartingValues: false,
});

/** Numbers to begin with where no profile is in force; the name is the clinic's to give. */
export function firstProfileValues(effectiveOn: Day): ProfileValues {
  const { receivingFromTimes, cutOffTimes, receivingWeekdays, resultDays } = demoLaboratoryProfile;
  return {
    name: '',
    effectiveOn,
    receivingWeekdays: [...receivingWeekdays],
    receivingFromTimes: { ...receivingFromTimes },
    cutOffTimes: { ...cutOffTimes },
    minutesToLaboratory: demoLaboratoryProfile.minutesToLaboratory,
    neutraliseWithinMinutes: demoLaboratoryProfile.neutraliseWithinMinutes,
    receiptWithinMinutes: demoLaboratoryProfile.receiptWithinMinutes,
    minimumVolumeMl: demoLaboratoryProfile.minimumVolumeMl,
    maximumVolumeMl: demoLaboratoryProfile.maximumVolumeMl,
    resultDays: { ...resultDays },
  };
}

/** Everything to mend before signing, each with the path of its field. */
export const profileProblems = (
  words: ClinicWords,
  values: ProfileValues,
  when: When,
): FieldProblem[] =>
  [...dayProblems(values.effectiveOn, when), ...validateProfile(profileFrom(values, 0))].map(
    ({ path, message }) => ({ path, message: words.sentence(message) }),
  );
