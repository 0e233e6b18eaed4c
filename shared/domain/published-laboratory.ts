/**
 * What laboratories and guidance publish about each number of a laboratory profile, for the
 * clinician who copies the numbers of the clinic's own laboratory. None is a default.
 */
import type { ResultStage } from './specimen-clocks';

export type ProfileField =
  | 'receivingWeekdays'
  | 'neutraliseWithinMinutes'
  | 'receiptWithinMinutes'
  | 'minimumVolumeMl'
  | 'maximumVolumeMl'
  | ResultStage;

export interface PublishedValue {
  readonly field: ProfileField;
  readonly source: string;
  /** In the unit of the field; null where the source gives words only. */
  readonly from: number | null;
  readonly to: number | null;
  /** Words for staff under 'clinic.published.<note>'. */
  readonly note: string | null;
}

const row = (
  field: ProfileField,
  source: string,
  from: number | null,
  to: number | null = from,
  note: string | null = null,
): PublishedValue => ({ field, source, from, to, note });

export const publishedLaboratoryValues: readonly PublishedValue[] = [
  row('receivingWeekdays', 'NorDx 607', null, null, 'monday-to-friday'),
  row('receivingWeekdays', 'KK Women’s and Children’s Hospital', null, null, 'saturday-morning'),
  row('receivingWeekdays', 'Public Health Ontario', null, null, 'monday-to-saturday'),
  row('receivingWeekdays', 'University of Iowa', null, null, 'every-day'),
  row('neutraliseWithinMinutes', 'Curry International TB Center, step 4', 30),
  row('neutraliseWithinMinutes', 'APHL/CDC training, slide 17', 60, 60, 'if-transport-is-late'),
  row('neutraliseWithinMinutes', 'Rady Children’s Hospital', 240),
  row('neutraliseWithinMinutes', 'National Jewish Health', 240, 240, 'if-transport-is-late'),
  row('neutraliseWithinMinutes', 'Public Health Ontario', 360, 360, 'later-is-not-processed'),
  row('neutraliseWithinMinutes', 'Trial in 116 children, 2013', null, null, 'advises-against'),
  row('receiptWithinMinutes', 'Interim LSU Hospital, 2014', 180),
  row('receiptWithinMinutes', 'Washington University', 240, 240, 'later-with-a-comment'),
  row('receiptWithinMinutes', 'Rady Children’s Hospital', 240),
  row('minimumVolumeMl', 'Rady Children’s Hospital', 2),
  row('minimumVolumeMl', 'Public Health Ontario', 5),
  row('minimumVolumeMl', 'Interim LSU Hospital, 2014', 5, 5, 'less-is-rejected'),
  row('minimumVolumeMl', 'APHL/CDC training, slide 17', 5, 10, 'best'),
  row('maximumVolumeMl', 'Rady Children’s Hospital', 10),
  row('maximumVolumeMl', 'APHL/CDC training, slide 17', 15),
  row('smear', 'Clinical Microbiology Reviews, laboratory practice', 1),
  row('smear', 'Public Health Ontario', 1),
  row('amplification', 'Clinical Microbiology Reviews, laboratory practice', 2),
  row('amplification', 'National Jewish Health', 1, 3),
  row('culturePreliminary', 'National Jewish Health', 7, 42, 'interim-reports'),
  row('cultureIdentification', 'Clinical Microbiology Reviews, laboratory practice', 21),
  row('cultureIdentification', 'Trial in 116 children, 2013', 12, 37, 'growth-mean'),
  row('cultureIdentification', 'KK Women’s and Children’s Hospital', 23, 49, 'growth-and-weeks'),
  row('susceptibility', 'Clinical Microbiology Reviews, laboratory practice', 28, 28, 'collection'),
  row('cultureNegativeFinal', 'Indian national programme; Garcia Laboratory', 42),
  row('cultureNegativeFinal', 'Public Health Ontario', 49),
  row('cultureNegativeFinal', 'Labcorp 183753', 43, 56),
  row('cultureNegativeFinal', 'Indiana Regional laboratory', 50, 51),
  row('cultureNegativeFinal', 'Eastern Health, Victoria', 42, 56),
  row('cultureNegativeFinal', 'KK Women’s and Children’s Hospital', 56),
  row('cultureNegativeFinal', 'NorDx 607', 60),
];
