import type { VersionState } from '../../../../../shared/contracts/protocols';

const states: Readonly<Record<VersionState, string>> = {
  draft: $localize`:@@clinic.versions.draft:Draft`,
  'to-come': $localize`:@@clinic.versions.to-come:Signed, not in force yet`,
  'in-force': $localize`:@@clinic.versions.in-force:In force`,
  past: $localize`:@@clinic.versions.past:Past`,
};

export const stateSays = (state: VersionState): string => states[state];

/** Problems by the path of their field; a request wraps the values, an answer does not. */
export const faultsByField = (
  faults: Iterable<readonly [string, string]>,
): ReadonlyMap<string, string> =>
  new Map([...faults].map(([path, message]) => [path.replace(/^values\./, ''), message]));
