import type { ReplanKind, ReplanOutcome } from '../../../../shared/contracts/replan';

/** What each choice is called, in a few words. */
export const offerSays: Readonly<Record<ReplanKind, string>> = {
  'next-possible-morning': $localize`:@@clinic.replan.next:The next possible morning`,
  'new-run': $localize`:@@clinic.replan.run:A new run of mornings`,
  'close-with-fewer': $localize`:@@clinic.replan.close:Close with what there is`,
  move: $localize`:@@clinic.replan.move:Other days or times for planned mornings`,
};

type Change = ReplanOutcome['children'][number]['after'][number]['change'];

export const changeSays: Readonly<Record<Change, string>> = {
  kept: $localize`:@@clinic.replan.kept:stays`,
  moved: $localize`:@@clinic.replan.moved:moves`,
  renumbered: $localize`:@@clinic.replan.renumbered:new number`,
  new: $localize`:@@clinic.replan.new:new`,
  'given-up': $localize`:@@clinic.replan.given-up:given up`,
};

export const stateSays: Readonly<Record<string, string>> = {
  planned: $localize`:@@clinic.morning.planned:planned`,
  here: $localize`:@@clinic.morning.here:here`,
  collecting: $localize`:@@clinic.morning.collecting:being collected`,
  collected: $localize`:@@clinic.morning.collected:collected`,
  'not-collected': $localize`:@@clinic.morning.not-collected:not collected`,
  lost: $localize`:@@clinic.morning.lost:lost`,
};
