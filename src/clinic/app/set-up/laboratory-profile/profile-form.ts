import { FormControl, FormGroup } from '@angular/forms';
import type { ProfileValues } from '../../../../../shared/contracts/protocols';
import type { Weekday } from '../../../../../shared/domain/day';
import { resultStages, type ResultStage } from '../../../../../shared/domain/specimen-clocks';

export const weekdays = [1, 2, 3, 4, 5, 6, 7] as const satisfies readonly Weekday[];

const text = (value: string): FormControl<string> => new FormControl(value, { nonNullable: true });
const number = (value: number | null): FormControl<number | null> => new FormControl(value);

function dayForm(values: ProfileValues, weekday: Weekday) {
  return new FormGroup({
    receives: new FormControl(values.receivingWeekdays.includes(weekday), { nonNullable: true }),
    from: text(values.receivingFromTimes[`${weekday}`] ?? ''),
    until: text(values.cutOffTimes[`${weekday}`] ?? ''),
  });
}
type DayForm = ReturnType<typeof dayForm>;

export function profileForm(values: ProfileValues) {
  const days = Object.fromEntries(
    weekdays.map((weekday) => [`${weekday}`, dayForm(values, weekday)]),
  ) as Record<`${Weekday}`, DayForm>;
  const stages = Object.fromEntries(
    resultStages.map((stage) => [stage, number(values.resultDays[stage])]),
  ) as Record<ResultStage, FormControl<number | null>>;
  return new FormGroup({
    name: text(values.name),
    effectiveOn: text(values.effectiveOn),
    days: new FormGroup(days),
    minutesToLaboratory: number(values.minutesToLaboratory),
    neutraliseWithinMinutes: number(values.neutraliseWithinMinutes),
    receiptWithinMinutes: number(values.receiptWithinMinutes),
    minimumVolumeMl: number(values.minimumVolumeMl),
    maximumVolumeMl: number(values.maximumVolumeMl),
    resultDays: new FormGroup(stages),
  });
}
export type ProfileForm = ReturnType<typeof profileForm>;

/** An emptied number is no number: the server says so beside the field. */
export function profileValues(form: ProfileForm): ProfileValues {
  const { days, resultDays, ...raw } = form.getRawValue();
  const receivingWeekdays = weekdays.filter((weekday) => days[`${weekday}`].receives);
  const times = (which: 'from' | 'until') =>
    Object.fromEntries(
      receivingWeekdays
        .map((weekday) => [`${weekday}`, days[`${weekday}`][which]] as const)
        .filter(([, time]) => time !== ''),
    );
  return {
    name: raw.name,
    effectiveOn: raw.effectiveOn,
    receivingWeekdays,
    receivingFromTimes: times('from'),
    cutOffTimes: times('until'),
    neutraliseWithinMinutes: raw.neutraliseWithinMinutes,
    minutesToLaboratory: raw.minutesToLaboratory ?? Number.NaN,
    receiptWithinMinutes: raw.receiptWithinMinutes ?? Number.NaN,
    minimumVolumeMl: raw.minimumVolumeMl ?? Number.NaN,
    maximumVolumeMl: raw.maximumVolumeMl ?? Number.NaN,
    resultDays: Object.fromEntries(
      resultStages.map((stage) => [stage, resultDays[stage] ?? Number.NaN]),
    ) as Record<ResultStage, number>,
  };
}
