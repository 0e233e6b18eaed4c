import {
  phrasePlaces,
  type IndividualPlanBody,
  type PlanMedicine,
} from '../../shared/domain/individual-plan';
import type { StandardPlan } from '../../shared/domain/fasting-plan';
import { lastBefore } from '../../shared/domain/fasting-stops';
import type { Instant } from '../../shared/domain/day';
import { shownPhone } from '../messages/shown-phone';
import type { Site } from '../sites/sites';
import type { Wording, WordingParams } from '../wording/render';

export type PhrasePlace = (typeof phrasePlaces)[keyof typeof phrasePlaces];

/** Words of a family with the times of its clinic. */
export interface PlanWords {
  readonly wording: Wording;
  text(key: string, params?: WordingParams): string;
  time(at: Instant): string;
  stopTime(at: Instant): string;
}

export interface OwnPlan {
  readonly callMe: string;
  readonly site: Site;
  readonly zone: string;
  readonly plan: StandardPlan;
  readonly body: IndividualPlanBody;
}

/** Every wording that this plan says: unsigned in a language, a person calls instead. */
export const phraseKeysOf = (body: IndividualPlanBody): string[] => [
  ...body.phrases.map(({ key }) => `own-plan.phrase.${key}`),
  ...new Set(body.medicines.map(({ way }) => `own-plan.medicine.${way}`)),
];

/** Whether all that the plan says may be read in this language. */
export const arePhrasesSigned = (body: IndividualPlanBody, wording: Wording): boolean =>
  wording.isSignedOff(phraseKeysOf(body));

/** The chosen phrases of one place on the night path, in the family's words. */
export function phrasesAt(own: OwnPlan, place: PhrasePlace, words: PlanWords): string[] {
  return own.body.phrases
    .filter(({ key }) => phrasePlaces[key] === place)
    .map(({ key, glucoseMgDl }) =>
      words.text(`own-plan.phrase.${key}`, {
        name: own.callMe,
        stop: words.stopTime(stopFor(own.plan, key)),
        value: glucoseMgDl ?? '',
        phone: shownPhone(own.site.phone, own.site.country),
        door: own.site.door,
      }),
    );
}

/** A phrase about the tube names the tube's own time. */
function stopFor(plan: StandardPlan, key: string): Instant {
  const tube = plan.stops.find(({ item }) => item === 'tube-feed')?.stopAt;
  return key.startsWith('tube-') ? (tube ?? plan.mealStopAt) : plan.mealStopAt;
}

export function medicineSays(
  { zone, plan }: Pick<OwnPlan, 'zone' | 'plan'>,
  { name, way, time, sipMl }: PlanMedicine,
  words: PlanWords,
): string {
  return words.text(`own-plan.medicine.${way}`, {
    medicine: name,
    time: time === null ? '' : words.time(medicineAt({ zone, plan }, time)),
    ml: sipMl ?? '',
  });
}

export const medicineAt = ({ zone, plan }: Pick<OwnPlan, 'zone' | 'plan'>, time: string): Instant =>
  lastBefore(plan.arriveAt, time, zone);

/** The whole plan as lines in order of time, for the clinician who composes it. */
export function ownPlanLines(own: OwnPlan, feeding: string, words: PlanWords): string[] {
  const { plan, body, callMe } = own;
  const children = callMe;
  const timed: { readonly at: Instant; readonly says: string; readonly isStop?: boolean }[] = [
    ...(plan.lastFeedAt === null
      ? []
      : [
          {
            at: plan.lastFeedAt,
            says: words.text(`step.last-feed.title.${feeding}`, { children }),
          },
        ]),
    ...plan.stops
      .filter(({ item }) => item !== 'other')
      .map(({ item, stopAt }) => ({
        at: stopAt,
        says: words.text(`step.stop-item.${item}`, { children }),
        isStop: true,
      })),
    { at: plan.wakeAt, says: words.text('step.wake.title', { children }) },
    {
      at: plan.arriveAt,
      says: words.text('step.arrive.title', { door: own.site.door }),
    },
  ].sort((left, right) => left.at - right.at);
  return [
    ...timed.map(({ at, says, isStop }) =>
      words.text('own-plan.line', { time: isStop ? words.stopTime(at) : words.time(at), says }),
    ),
    ...(['last-feed', 'stop', 'wake', 'arrive'] as const).flatMap((place) =>
      phrasesAt(own, place, words),
    ),
    ...body.medicines.map((medicine) => medicineSays(own, medicine, words)),
  ];
}
