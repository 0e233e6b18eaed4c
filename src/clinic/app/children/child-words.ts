import type { Caution, Feeding } from '../../../../shared/contracts/common';

export const feedingWords: readonly { readonly value: Feeding; readonly says: string }[] = [
  { value: 'breast', says: $localize`:@@clinic.feeding.breast:Breast milk` },
  { value: 'formula', says: $localize`:@@clinic.feeding.formula:Formula` },
  {
    value: 'breast-and-formula',
    says: $localize`:@@clinic.feeding.both:Breast milk and formula`,
  },
  { value: 'family-food', says: $localize`:@@clinic.feeding.family-food:Family food` },
];

export const cautionWords: readonly { readonly value: Caution; readonly says: string }[] = [
  { value: 'diabetes', says: $localize`:@@clinic.caution.diabetes:Diabetes` },
  { value: 'metabolic-disease', says: $localize`:@@clinic.caution.metabolic:Metabolic disease` },
  {
    value: 'low-blood-sugar',
    says: $localize`:@@clinic.caution.low-sugar:Earlier low blood sugar`,
  },
  {
    value: 'severe-malnutrition',
    says: $localize`:@@clinic.caution.malnutrition:Severe malnutrition`,
  },
  { value: 'prematurity', says: $localize`:@@clinic.caution.prematurity:Prematurity` },
  { value: 'tube-feeding', says: $localize`:@@clinic.caution.tube-feeding:Tube feeding` },
  {
    value: 'morning-medicine',
    says: $localize`:@@clinic.caution.morning-medicine:A medicine due in the morning`,
  },
];

export const feedingSays = (value: Feeding): string =>
  feedingWords.find((word) => word.value === value)?.says ?? value;
export const cautionSays = (value: Caution): string =>
  cautionWords.find((word) => word.value === value)?.says ?? value;
