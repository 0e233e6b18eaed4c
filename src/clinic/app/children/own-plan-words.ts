import type { Item } from '../../../../shared/domain/fasting-protocol';
import type { MedicineWay, PlanPhrase } from '../../../../shared/domain/individual-plan';

/** What the composer calls things; the family's sentences are wording and stand in the look ahead. */
export const itemWords: Readonly<Record<Item, string>> = {
  'solid-food': $localize`:@@clinic.own-plan.item.solid-food:Solid food`,
  'cows-milk': $localize`:@@clinic.own-plan.item.cows-milk:Cow’s milk`,
  formula: $localize`:@@clinic.own-plan.item.formula:Formula`,
  'breast-milk': $localize`:@@clinic.own-plan.item.breast-milk:Breast milk`,
  water: $localize`:@@clinic.own-plan.item.water:Water`,
  'tube-feed': $localize`:@@clinic.own-plan.item.tube-feed:Tube feed`,
  other: $localize`:@@clinic.own-plan.item.other:Anything else by mouth`,
};

export const phraseWords: Readonly<Record<PlanPhrase, string>> = {
  'finish-last-feed': $localize`:@@clinic.own-plan.phrase.finish:Finish the last feed by the stop`,
  'let-sleep': $localize`:@@clinic.own-plan.phrase.sleep:Let the child sleep as long as possible`,
  'glucose-on-waking': $localize`:@@clinic.own-plan.phrase.glucose:Check blood glucose on waking`,
  'glucose-low-feed-and-call': $localize`:@@clinic.own-plan.phrase.low:Glucose below the number: feed, then call us`,
  'come-straight-in': $localize`:@@clinic.own-plan.phrase.come:Go straight to the nurse: this child is first`,
  'tube-pump-off': $localize`:@@clinic.own-plan.phrase.pump:Feeding pump off at the tube’s time`,
  'tube-open-nothing-through': $localize`:@@clinic.own-plan.phrase.tube:Nothing through the tube after its time`,
};

export const wayWords: Readonly<Record<MedicineWay, string>> = {
  'after-the-test': $localize`:@@clinic.own-plan.way.after:After the test`,
  'usual-time-with-sip': $localize`:@@clinic.own-plan.way.sip:Usual time, measured sip`,
  'clinician-decides': $localize`:@@clinic.own-plan.way.decides:Clinician decides`,
};
