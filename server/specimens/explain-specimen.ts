import type { Explanation } from '../../shared/domain/explanation';
import { explainDueOn, type SpecimenClock } from '../../shared/domain/specimen-clocks';
import type { LaboratoryProfile, ResultStage } from '../../shared/domain/specimen-clocks';
import { hoursInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';

export interface ExplainedProfile extends Pick<
  LaboratoryProfile,
  'name' | 'version' | 'resultDays'
> {
  readonly zone: string;
}

/** A clock as a line that staff can follow: what it was counted from, by which rule, and whose rule that is. */
export function clockExplained(
  words: ClinicWords,
  profile: ExplainedProfile,
  { explanation }: SpecimenClock,
): Explanation {
  const { rule, inputs } = explanation;
  const clock = (name: string): string => {
    const at = inputs[name];
    return typeof at === 'number' ? words.clock(at, profile.zone) : '';
  };
  const within = inputs['withinMinutes'];
  const way = inputs['minutesToLaboratory'];
  return {
    ...explanation,
    says: words.text(`clinic.explain.${rule}`, {
      collected: clock('collectedAt'),
      due: clock('dueAt'),
      receipt: clock('receiptDueAt'),
      within: typeof within === 'number' ? hoursInWords(words, within) : '',
      way: typeof way === 'number' ? hoursInWords(words, way) : '',
      laboratory: profile.name,
      version: profile.version,
    }),
  };
}

/** The day of a result as such a line. */
export function dueDayExplained(
  words: ClinicWords,
  profile: ExplainedProfile,
  receivedOn: string,
  stage: ResultStage,
): Explanation {
  const explanation = explainDueOn({ profile, receivedOn, stage });
  return {
    ...explanation,
    says: words.text(`clinic.explain.${explanation.rule}`, {
      stage: words.text(`clinic.explain.stage.${stage}`),
      received: words.day(receivedOn),
      count: profile.resultDays[stage],
      due: words.day(String(explanation.inputs['dueOn'])),
      laboratory: profile.name,
      version: profile.version,
    }),
  };
}
