/** Names of the weekdays, Monday first. */
export const weekdayWords: readonly string[] = [
  $localize`:@@clinic.weekday.1:Monday`,
  $localize`:@@clinic.weekday.2:Tuesday`,
  $localize`:@@clinic.weekday.3:Wednesday`,
  $localize`:@@clinic.weekday.4:Thursday`,
  $localize`:@@clinic.weekday.5:Friday`,
  $localize`:@@clinic.weekday.6:Saturday`,
  $localize`:@@clinic.weekday.7:Sunday`,
];

/** 'Monday, Tuesday' of 1 and 2. */
export const weekdaysSay = (weekdays: readonly number[]): string =>
  weekdays.map((weekday) => weekdayWords[weekday - 1] ?? '').join(', ');
