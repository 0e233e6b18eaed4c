/** Circumstances in which a clinician composes the plan (clinical facts 1.4; product rules). */
export const cautions = [
  'diabetes',
  'metabolic-disease',
  'low-blood-sugar',
  'severe-malnutrition',
  'prematurity',
  'tube-feeding',
  'morning-medicine',
] as const;
export type Caution = (typeof cautions)[number];
