import { FormArray, FormControl, FormGroup } from '@angular/forms';
import type { ProtocolValues } from '../../../../../shared/contracts/protocols';
import { cautions, type Caution } from '../../../../../shared/domain/cautions';
import {
  allowableItems,
  items,
  type AllowableItem,
  type Item,
} from '../../../../../shared/domain/fasting-protocol';

type BandValues = ProtocolValues['bands'][number];

const text = (value: string): FormControl<string> => new FormControl(value, { nonNullable: true });
const number = (value: number | null): FormControl<number | null> => new FormControl(value);
const flag = (value: boolean): FormControl<boolean> =>
  new FormControl(value, { nonNullable: true });

const flags = <Name extends string>(
  names: readonly Name[],
  chosen: readonly Name[],
): FormGroup<Record<Name, FormControl<boolean>>> =>
  new FormGroup(
    Object.fromEntries(names.map((name) => [name, flag(chosen.includes(name))])) as Record<
      Name,
      FormControl<boolean>
    >,
  );

const chosenOf = <Name extends string>(names: readonly Name[], of: Record<Name, boolean>): Name[] =>
  names.filter((name) => of[name]);

export function bandForm(band: BandValues) {
  const hours = Object.fromEntries(
    items.map((item) => [item, number(band.leastHours?.[item] ?? null)]),
  ) as Record<Item, FormControl<number | null>>;
  return new FormGroup({
    fromMonths: new FormControl(band.fromMonths, { nonNullable: true }),
    toMonths: number(band.toMonths),
    individualPlan: flag(band.individualPlan),
    leastHours: new FormGroup(hours),
    longestHours: number(band.longestHours),
    nothingFrom: text(band.nothingFrom ?? ''),
  });
}
export type BandForm = ReturnType<typeof bandForm>;

export function protocolForm(values: ProtocolValues) {
  return new FormGroup({
    title: text(values.title),
    effectiveOn: text(values.effectiveOn),
    usualWaitMinutes: number(values.usualWaitMinutes),
    eatAgainAfterMinutes: number(values.eatAgainAfterMinutes),
    wakeToCollectionMinutes: number(values.wakeToCollectionMinutes),
    allowedItems: flags<AllowableItem>(allowableItems, values.allowedItems),
    individualPlanCautions: flags<Caution>(cautions, values.individualPlanCautions),
    bands: new FormArray(values.bands.map(bandForm)),
  });
}
export type ProtocolForm = ReturnType<typeof protocolForm>;

/** Emptied hours count as none, and an emptied number of minutes as no number: the server says so beside the field. */
export function bandValues(form: BandForm): BandValues {
  const { leastHours, nothingFrom, ...band } = form.getRawValue();
  const hours = Object.fromEntries(items.map((item) => [item, leastHours[item] ?? 0])) as Record<
    Item,
    number
  >;
  return {
    ...band,
    leastHours: band.individualPlan ? null : hours,
    nothingFrom: nothingFrom === '' ? null : nothingFrom,
  };
}

export function protocolValues(form: ProtocolForm): ProtocolValues {
  const raw = form.getRawValue();
  return {
    title: raw.title,
    effectiveOn: raw.effectiveOn,
    usualWaitMinutes: raw.usualWaitMinutes ?? Number.NaN,
    eatAgainAfterMinutes: raw.eatAgainAfterMinutes ?? Number.NaN,
    wakeToCollectionMinutes: raw.wakeToCollectionMinutes,
    allowedItems: chosenOf(allowableItems, raw.allowedItems),
    individualPlanCautions: chosenOf(cautions, raw.individualPlanCautions),
    bands: form.controls.bands.controls.map(bandValues),
  };
}

/** The one number of every item, or null where they differ. */
export function everythingOf(form: BandForm): number | null {
  const all = new Set(Object.values(form.controls.leastHours.getRawValue()));
  const [only] = all;
  return all.size === 1 ? (only ?? null) : null;
}

export function setEverything(form: BandForm, hours: number | null): void {
  form.controls.leastHours.setValue(
    Object.fromEntries(items.map((item) => [item, hours])) as Record<Item, number | null>,
  );
}

/** Each band begins where the one before it ends, so that typing an age leaves neither a gap nor an overlap. */
export function alignBands(bands: FormArray<BandForm>): void {
  let from = 0;
  for (const band of bands.controls) {
    if (band.controls.fromMonths.value !== from) band.controls.fromMonths.setValue(from);
    from = (band.controls.toMonths.value ?? from) + 1;
  }
}

/** Two bands with the same hours out of one; one without an end is cut after a year. */
export function splitBand(bands: FormArray<BandForm>, index: number): void {
  const band = bands.at(index);
  const { fromMonths, toMonths } = band.getRawValue();
  const cut = toMonths === null ? fromMonths + 11 : Math.floor((fromMonths + toMonths) / 2);
  const upper = bandForm({ ...bandValues(band), fromMonths: cut + 1, toMonths });
  band.controls.toMonths.setValue(cut);
  bands.insert(index + 1, upper);
}

/** The band before takes over its ages; the first one gives them to the next. */
export function removeBand(bands: FormArray<BandForm>, index: number): void {
  const { toMonths } = bands.at(index).getRawValue();
  bands.removeAt(index);
  if (index > 0) bands.at(index - 1).controls.toMonths.setValue(toMonths);
  alignBands(bands);
}
