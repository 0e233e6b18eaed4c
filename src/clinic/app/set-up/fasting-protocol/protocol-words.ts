import type { Caution } from '../../../../../shared/domain/cautions';
import type { AllowableItem, Item } from '../../../../../shared/domain/fasting-protocol';

export const itemWords: Readonly<Record<Item, string>> = {
  'solid-food': $localize`:@@clinic.protocol.solid-food:Solid food`,
  'cows-milk': $localize`:@@clinic.protocol.cows-milk:Cow’s milk`,
  formula: $localize`:@@clinic.protocol.formula:Formula`,
  'breast-milk': $localize`:@@clinic.protocol.breast-milk:Breast milk`,
  water: $localize`:@@clinic.protocol.water:Water and clear drinks`,
  'tube-feed': $localize`:@@clinic.protocol.tube-feed:Tube feed`,
  other: $localize`:@@clinic.protocol.other:Anything else`,
};

export const allowableWords: Readonly<Record<AllowableItem, string>> = {
  pacifier: $localize`:@@clinic.protocol.pacifier:Pacifier`,
  cuddling: $localize`:@@clinic.protocol.cuddling:Comfort in the arms, without feeding`,
  'moist-lips': $localize`:@@clinic.protocol.moist-lips:Moist lips`,
  'tooth-brushing': $localize`:@@clinic.protocol.tooth-brushing:Brushing teeth without swallowing`,
};

export const cautionWords: Readonly<Record<Caution, string>> = {
  diabetes: $localize`:@@clinic.protocol.diabetes:Diabetes`,
  'metabolic-disease': $localize`:@@clinic.protocol.metabolic:Metabolic disease`,
  'low-blood-sugar': $localize`:@@clinic.protocol.low-sugar:Earlier low blood sugar`,
  'severe-malnutrition': $localize`:@@clinic.protocol.malnutrition:Severe malnutrition`,
  prematurity: $localize`:@@clinic.protocol.prematurity:Born too early`,
  'tube-feeding': $localize`:@@clinic.protocol.tube-feeding:Tube feeding`,
  'morning-medicine': $localize`:@@clinic.protocol.morning-medicine:Medicine due in the morning`,
};
