import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { doorCheckRequest, type DoorCheckRequest } from '../../../../shared/contracts/this-morning';
import type { Instant } from '../../../../shared/domain/zone';
import { doorTime, fieldTime } from './door-time';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

export type TimeField = 'lastFood' | 'lastDrink' | 'woke';
export type Reading = 'earlier' | 'later';

/** Meals and feeds first, then drinks that end no hunger: one tap says what the last thing was. */
export const mealItems = [
  'breast-milk',
  'formula',
  'cows-milk',
  'solid-food',
  'tube-feed',
] as const;
export const drinkItems = ['water', 'other'] as const;
export type MealItem = (typeof mealItems)[number];
export type DrinkItem = (typeof drinkItems)[number];
export type Intake = '' | 'nothing' | 'unknown' | MealItem | DrinkItem;

export const isMeal = (intake: Intake): intake is MealItem =>
  (mealItems as readonly string[]).includes(intake);
export const isDrink = (intake: Intake): intake is DrinkItem =>
  (drinkItems as readonly string[]).includes(intake);

/** What the form holds; empty text is "not asked yet". */
export interface DoorCheckValues {
  readonly intake: Intake;
  readonly lastFood: string;
  readonly lastFoodReading: '' | Reading;
  readonly lastDrink: string;
  readonly lastDrinkReading: '' | Reading;
  readonly medicine: '' | 'none' | 'given';
  readonly medicineSays: string;
  readonly woke: string;
  readonly wokeReading: '' | Reading;
  readonly well: '' | 'well' | 'not-well';
  readonly glucose: string;
  readonly broughtBy: string;
  readonly broughtByOther: string;
  readonly goOnReason: string;
}

export const somebodyElse = 'somebody-else';

export const emptyDoorCheck: DoorCheckValues = {
  intake: '',
  lastFood: '',
  lastFoodReading: '',
  lastDrink: '',
  lastDrinkReading: '',
  medicine: '',
  medicineSays: '',
  woke: '',
  wokeReading: '',
  well: '',
  glucose: '',
  broughtBy: '',
  broughtByOther: '',
  goOnReason: '',
};

/** Starts with what the family said; medicine and "well today" are always asked. */
export function doorCheckStart(row: MorningRow, zone: string): DoorCheckValues {
  const { told } = row;
  const start = { ...emptyDoorCheck, broughtBy: row.escort ?? '' };
  if (told === null) return start;
  const time = fieldTime(told.lastIntakeAt, zone);
  switch (told.answer) {
    case 'nothing':
      return { ...start, intake: 'nothing' };
    case 'unsure':
      return { ...start, intake: 'unknown' };
    case 'feed':
      return { ...start, intake: time === '' ? 'unknown' : fedWith[row.feeding], lastFood: time };
    case 'sip':
      return { ...start, intake: time === '' ? 'unknown' : 'water', lastDrink: time };
  }
}

/** "Milk or food" at home is most likely this; where two are as likely the nurse taps one. */
const fedWith: Readonly<Record<MorningRow['feeding'], Intake>> = {
  breast: 'breast-milk',
  formula: 'formula',
  'breast-and-formula': '',
  'family-food': 'solid-food',
};

const sayTime = (): string =>
  $localize`:@@clinic.door.say-time:Give a time, or choose “Not known”.`;

/** Sentences by field. */
export type DoorCheckFaults = Readonly<Record<string, string>>;

/** The request, or what is still missing beside each field. */
export function doorCheckRequestOf(
  values: DoorCheckValues,
  around: { readonly version: number; readonly now: Instant; readonly zone: string },
): { readonly request: DoorCheckRequest } | { readonly faults: DoorCheckFaults } {
  const faults: Record<string, string> = {};
  const { intake } = values;
  const isKnown = isMeal(intake) || isDrink(intake);
  const time = (field: TimeField, isAsked: boolean): string | null => {
    if (!isAsked || values[field] === '') return null;
    const read = readField(values, field, around);
    if (typeof read === 'number') return new Date(read).toISOString();
    faults[field] = read;
    return null;
  };
  const lastFoodAt = time('lastFood', isKnown);
  const lastDrinkAt = time('lastDrink', isKnown);
  const wokeAt = time('woke', true);
  if (values.intake === '')
    faults['intake'] =
      $localize`:@@clinic.door.say-intake:Say what the family tells about food and drink.`;
  if (isMeal(intake) && values.lastFood === '') faults['lastFood'] = sayTime();
  if (isDrink(intake) && values.lastDrink === '') faults['lastDrink'] = sayTime();
  if (values.medicine === '')
    faults['medicine'] = $localize`:@@clinic.door.say-medicine:Say whether a medicine was given.`;
  if (values.medicine === 'given' && values.medicineSays.trim() === '')
    faults['medicineSays'] = $localize`:@@clinic.door.which-medicine:Which medicine, and when?`;
  if (values.well === '')
    faults['well'] = $localize`:@@clinic.door.say-well:Say whether the child is well today.`;
  const glucose = values.glucose.trim() === '' ? null : Number(values.glucose.trim());
  const broughtBy =
    values.broughtBy === somebodyElse ? values.broughtByOther.trim() : values.broughtBy;
  if (broughtBy === '')
    faults['broughtBy'] = $localize`:@@clinic.door.say-who:Say who brings the child.`;
  if (Object.keys(faults).length > 0) return { faults };
  const parsed = doorCheckRequest.safeParse({
    version: around.version,
    lastFoodAt,
    foodItem: isMeal(intake) ? intake : null,
    lastDrinkAt,
    // Beside a meal only water is asked for.
    drinkItem: lastDrinkAt === null ? null : isDrink(intake) ? intake : 'water',
    isNothingSincePlan: values.intake === 'nothing',
    medicine: values.medicine === 'given' ? values.medicineSays : null,
    wokeAt,
    isWell: values.well === 'well',
    bloodGlucoseMgDl: glucose,
    broughtBy,
    goOnReason: values.goOnReason,
  });
  if (parsed.success) return { request: parsed.data };
  return {
    faults: Object.fromEntries(
      parsed.error.issues.map((issue) => [
        fieldOf(String(issue.path[0])),
        schemaSentence(issue.message),
      ]),
    ),
  };
}

const fieldNames: Readonly<Record<string, string>> = {
  lastFoodAt: 'lastFood',
  lastDrinkAt: 'lastDrink',
  wokeAt: 'woke',
  medicine: 'medicineSays',
  bloodGlucoseMgDl: 'glucose',
};
/** The form's field that a request's path belongs to. */
export const fieldOf = (path: string): string => fieldNames[path] ?? path;

function readField(
  values: DoorCheckValues,
  field: TimeField,
  { now, zone }: { readonly now: Instant; readonly zone: string },
): Instant | string {
  const read = doorTime(values[field], now, zone);
  if (read === null)
    return $localize`:@@clinic.door.clock-time:Give a time between 00:00 and 23:59.`;
  if (read.kind === 'once') return read.at;
  const reading = values[`${field}Reading`];
  if (reading === '')
    return read.kind === 'twice'
      ? $localize`:@@clinic.door.twice:The clock changed: this time came twice. Say which one.`
      : $localize`:@@clinic.door.never:The clock jumped over this time. Say which clock it was.`;
  return read[reading];
}
