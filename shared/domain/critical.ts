/**
 * Positive: M. tuberculosis complex by amplification or identified culture. Critical: whatever a
 * person must tell before any letter. Laboratories call back smear, first amplification and first
 * culture positives (NorDx 607; Qatar reference laboratory guide 2019); a trace result is on our
 * list because it may be the only sign in a young child (WHO handbook, module 5, 2022).
 */

export const smears = ['negative', 'positive'] as const;
export type Smear = (typeof smears)[number];

export const amplifications = ['not-detected', 'detected', 'trace', 'invalid'] as const;
export type Amplification = (typeof amplifications)[number];

export const cultures = [
  'no-growth-yet',
  'negative-final',
  'growing',
  'contaminated',
  'mtb-complex',
  'not-tuberculous',
] as const;
/** `growing` means acid-fast bacilli not yet identified. */
export type Culture = (typeof cultures)[number];

export interface SpecimenFindings {
  readonly smear: Smear | null;
  readonly amplification: Amplification | null;
  readonly culture: Culture | null;
}

export type CriticalReason =
  | 'amplification-detected'
  | 'culture-identified'
  | 'smear-positive'
  | 'amplification-trace'
  | 'culture-growing';

export function isPositive({ amplification, culture }: SpecimenFindings): boolean {
  return amplification === 'detected' || culture === 'mtb-complex';
}

/** The reasons in the order of their weight; empty when nothing is critical. */
export function criticalReasons(findings: SpecimenFindings): CriticalReason[] {
  const { smear, amplification, culture } = findings;
  const reasons: CriticalReason[] = [];
  if (amplification === 'detected') reasons.push('amplification-detected');
  if (culture === 'mtb-complex') reasons.push('culture-identified');
  if (smear === 'positive') reasons.push('smear-positive');
  if (amplification === 'trace') reasons.push('amplification-trace');
  if (culture === 'growing') reasons.push('culture-growing');
  return reasons;
}

export function isCritical(findings: SpecimenFindings): boolean {
  return criticalReasons(findings).length > 0;
}
