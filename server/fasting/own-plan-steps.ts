import {
  arePhrasesSigned,
  medicineAt,
  medicineSays,
  phrasesAt,
  type OwnPlan,
  type PhrasePlace,
} from '../individual-plans/plan-lines';
import type { MorningPlan } from '../series/morning-plans';
import type { FamilyWords } from './family-words';
import { standardPlanOf, type HouseholdNight } from './household-night';
import { groupedBy, keyOf, standardChildren, type Step } from './night-steps';

const minute = 60_000;

/** A child's own plan as far as the family may read it: phrases that nobody signed are told by a person. */
function ownPlanOf(child: MorningPlan, words: FamilyWords): OwnPlan | null {
  const plan = standardPlanOf(child);
  const body = child.individualPlan?.body;
  if (!plan || !body || !arePhrasesSigned(body, words.wording)) return null;
  return { callMe: child.callMe, site: child.site, zone: child.zone, plan, body };
}

/** The signed phrases of these children at one place of the path. */
export const ownLines = (
  children: readonly MorningPlan[],
  place: PhrasePlace,
  words: FamilyWords,
): string[] =>
  children.flatMap((child) => {
    const own = ownPlanOf(child, words);
    return own ? phrasesAt(own, place, words) : [];
  });

/** On waking: what the plan says, medicines that wait, and how late waking may be. */
export function wakeLines(children: readonly MorningPlan[], words: FamilyWords): string[] {
  const late = children.filter((child) => {
    const plan = standardPlanOf(child);
    const within = child.protocol.wakeToCollectionMinutes;
    return plan && within !== null && plan.likelyCollectionAt - plan.wakeAt > within * minute;
  });
  return [
    ...(late.length > 0 ? [words.text('step.wake.late', { children: words.list(late) })] : []),
    ...ownLines(children, 'wake', words),
    ...children.flatMap((child) => {
      const own = ownPlanOf(child, words);
      if (!own)
        return child.individualPlan ? [words.text('own-plan.we-call', { name: child.callMe })] : [];
      return own.body.medicines
        .filter(({ way }) => way !== 'usual-time-with-sip')
        .map((medicine) => medicineSays(own, medicine, words));
    }),
  ];
}

/** A medicine at its usual time with a measured sip is a step of its own. */
export function medicines(night: HouseholdNight, words: FamilyWords): Step[] {
  return night.children.flatMap((child): Step[] => {
    const own = ownPlanOf(child, words);
    if (!own) return [];
    return own.body.medicines.flatMap((medicine, index) =>
      medicine.way === 'usual-time-with-sip' && medicine.time !== null
        ? [
            {
              key: keyOf(`medicine-${index}`, [child]),
              at: medicineAt(own, medicine.time),
              title: medicineSays(own, medicine, words),
              lines: [],
              pictures: ['medicine-bottle'],
              children: [child],
            },
          ]
        : [],
    );
  });
}

/** Usual feeds of the night that fall away, at the time of the first of them. */
export function fallenFeeds(night: HouseholdNight, words: FamilyWords): Step[] {
  const fallen = (child: MorningPlan): number[] =>
    (standardPlanOf(child)?.nightFeeds ?? [])
      .filter(({ fallsAway }) => fallsAway)
      .map(({ at }) => at);
  return groupedBy(
    standardChildren(night),
    (child) => fallen(child)[0] ?? null,
    (child) => fallen(child).join(' '),
  ).map(({ at, children }) => ({
    key: keyOf('night-feed', children),
    at,
    title: words.text('step.night-feed.falls-away', {
      times: words.wording.list(
        (children[0] ? fallen(children[0]) : []).map((at) => words.time(at)),
      ),
    }),
    lines: [],
    pictures: ['sleep'],
    children,
  }));
}
