import type { IndividualPlanBodyInput } from '../../../../shared/contracts/individual-plans';
import { items, type Item } from '../../../../shared/domain/fasting-protocol';
import {
  phrasesWithGlucose,
  planPhrases,
  type MedicineWay,
  type PlanPhrase,
} from '../../../../shared/domain/individual-plan';

/** Text as it stands in the fields; empty says nothing. */
export interface StopFields {
  hours: string;
  from: string;
}
export interface MedicineFields {
  name: string;
  way: MedicineWay;
  time: string;
  sipMl: string;
}
export interface OwnPlanFields {
  stops: Record<Item, StopFields>;
  longestHours: string;
  lastFeedTime: string;
  phrases: Record<PlanPhrase, boolean>;
  glucoseMgDl: string;
  medicines: MedicineFields[];
}

const byKey = <Key extends string, Value>(
  keys: readonly Key[],
  valueOf: (key: Key) => Value,
): Record<Key, Value> =>
  Object.fromEntries(keys.map((key) => [key, valueOf(key)])) as Record<Key, Value>;

export const emptyMedicine: MedicineFields = {
  name: '',
  way: 'after-the-test',
  time: '',
  sipMl: '',
};

/** Starts from the newest version, else empty: no hour is suggested by the screen. */
export function ownPlanFields(body?: IndividualPlanBodyInput): OwnPlanFields {
  const text = (value: number | string | null | undefined): string =>
    value === null || value === undefined ? '' : String(value);
  return {
    stops: byKey(items, (item) => {
      const stop = body?.stops.find((one) => one.item === item);
      return { hours: text(stop?.leastHours), from: text(stop?.nothingFrom) };
    }),
    longestHours: text(body?.longestHours),
    lastFeedTime: text(body?.lastFeedTime),
    phrases: byKey(planPhrases, (key) => body?.phrases.some((one) => one.key === key) ?? false),
    glucoseMgDl: text(body?.phrases.find(({ glucoseMgDl }) => glucoseMgDl)?.glucoseMgDl),
    medicines: (body?.medicines ?? []).map(({ name, way, time, sipMl }) => ({
      name,
      way,
      time: text(time),
      sipMl: text(sipMl),
    })),
  };
}

/** The same fields, free to be changed. */
export const copyOf = (fields: OwnPlanFields): OwnPlanFields => ({
  ...fields,
  stops: byKey(items, (item) => ({ ...fields.stops[item] })),
  phrases: { ...fields.phrases },
  medicines: fields.medicines.map((medicine) => ({ ...medicine })),
});

const numberOf = (text: string): number | null =>
  text.trim() === '' ? null : Number(text.trim().replace(',', '.'));
const timeOf = (text: string): string | null => (text === '' ? null : text);

/** The body as it is sent; what is not a number is found by the contract. */
export function ownPlanBody(fields: OwnPlanFields): IndividualPlanBodyInput {
  return {
    stops: items.flatMap((item) => {
      const { hours, from } = fields.stops[item];
      if (hours.trim() === '' && from === '') return [];
      return [{ item, leastHours: numberOf(hours), nothingFrom: timeOf(from) }];
    }),
    longestHours: numberOf(fields.longestHours) ?? 0,
    lastFeedTime: timeOf(fields.lastFeedTime),
    phrases: planPhrases
      .filter((key) => fields.phrases[key])
      .map((key) => ({
        key,
        glucoseMgDl: phrasesWithGlucose.includes(key) ? numberOf(fields.glucoseMgDl) : null,
      })),
    medicines: fields.medicines.map(({ name, way, time, sipMl }) => ({
      name,
      way,
      time: way === 'usual-time-with-sip' ? timeOf(time) : null,
      sipMl: way === 'usual-time-with-sip' ? numberOf(sipMl) : null,
    })),
  };
}

/** The name of the field on the screen that a path of the request belongs to. */
export function fieldOfPath(path: string, body: IndividualPlanBodyInput): string {
  const [part = '', index = '', rest = ''] = path.replace(/^body\./, '').split('.');
  if (part === 'stops')
    return `stops.${(index === '' ? undefined : body.stops[Number(index)]?.item) ?? items[0]}`;
  if (part === 'phrases') return rest === 'glucoseMgDl' ? 'glucoseMgDl' : 'phrases';
  if (part === 'medicines') return `medicines.${index}`;
  return part;
}
