import type { Weekday } from '../../../../../shared/domain/day';
import type { ResultStage } from '../../../../../shared/domain/specimen-clocks';

export const weekdayWords: Readonly<Record<Weekday, string>> = {
  1: $localize`:@@clinic.weekday.1:Monday`,
  2: $localize`:@@clinic.weekday.2:Tuesday`,
  3: $localize`:@@clinic.weekday.3:Wednesday`,
  4: $localize`:@@clinic.weekday.4:Thursday`,
  5: $localize`:@@clinic.weekday.5:Friday`,
  6: $localize`:@@clinic.weekday.6:Saturday`,
  7: $localize`:@@clinic.weekday.7:Sunday`,
};

type MinuteField = 'minutesToLaboratory' | 'neutraliseWithinMinutes' | 'receiptWithinMinutes';
type VolumeField = 'minimumVolumeMl' | 'maximumVolumeMl';

export const numberWords: Readonly<Record<MinuteField | VolumeField, string>> = {
  minutesToLaboratory: $localize`:@@clinic.profile.way:Way to the laboratory, minutes`,
  neutraliseWithinMinutes: $localize`:@@clinic.profile.neutralise:Neutralise within, minutes (empty where the laboratory does it)`,
  receiptWithinMinutes: $localize`:@@clinic.profile.receipt:Receipt within, minutes from collection`,
  minimumVolumeMl: $localize`:@@clinic.profile.minimum:Least volume, mL`,
  maximumVolumeMl: $localize`:@@clinic.profile.maximum:Most volume, mL`,
};

export const stageWords: Readonly<Record<ResultStage, string>> = {
  smear: $localize`:@@clinic.profile.smear:Smear, days from receipt`,
  amplification: $localize`:@@clinic.profile.amplification:Amplification, days`,
  culturePreliminary: $localize`:@@clinic.profile.preliminary:Preliminary culture, days`,
  cultureIdentification: $localize`:@@clinic.profile.identification:Identification, days`,
  susceptibility: $localize`:@@clinic.profile.susceptibility:Susceptibility, days`,
  cultureNegativeFinal: $localize`:@@clinic.profile.negative:Final negative culture, days`,
};
