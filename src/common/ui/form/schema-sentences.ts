/**
 * The contracts say in English what is wrong with a field, for both sides of the wire. Here a screen says it in its own
 * language; `test/house` holds this list level with the contracts.
 */
const sentences: Readonly<Record<string, string>> = {
  'Fill this in.': $localize`:@@clinic.schema.fill-in:Fill this in.`,
  'Give a day that exists, as year-month-day.': $localize`:@@clinic.schema.day:Give a day that exists, as year-month-day.`,
  'Give a time between 00:00 and 23:59.': $localize`:@@clinic.schema.time:Give a time between 00:00 and 23:59.`,
  'Give a date and time in UTC.': $localize`:@@clinic.schema.instant:Give a date and time in UTC.`,
  'Give a telephone number with its area code.': $localize`:@@clinic.schema.phone:Give a telephone number with its area code.`,
  'Give an e-mail address.': $localize`:@@clinic.schema.mail:Give an e-mail address.`,
  'Give a telephone number or an e-mail address.': $localize`:@@clinic.schema.phone-or-mail:Give a telephone number or an e-mail address.`,
  'A helper brings the child and answers in the morning, but sees no results.': $localize`:@@clinic.schema.helper:A helper brings the child and answers in the morning, but sees no results.`,
  'Letters and early texts need a yes to messages about visits.': $localize`:@@clinic.schema.visits-first:Letters and early texts need a yes to messages about visits.`,
  'Only texts can come too early.': $localize`:@@clinic.schema.early-texts:Only texts can come too early.`,
  'Choose at least one role.': $localize`:@@clinic.schema.role:Choose at least one role.`,
  'At least 15 characters. A short sentence works well.': $localize`:@@clinic.schema.password:At least 15 characters. A short sentence works well.`,
  'Enter your password to sign.': $localize`:@@clinic.schema.sign:Enter your password to sign.`,
  'Between 0.5 and 120 kg.': $localize`:@@clinic.schema.weight:Between 0.5 and 120 kg.`,
  'Between 0.1 and 100 mL.': $localize`:@@clinic.schema.volume:Between 0.1 and 100 mL.`,
  'A consent by telephone needs a witness.': $localize`:@@clinic.schema.witness:A consent by telephone needs a witness.`,
  'This goes into texts, so it must not be the name. For example “Baby” or “Big girl”.': $localize`:@@clinic.schema.label:This goes into texts, so it must not be the name. For example “Baby” or “Big girl”.`,
  'Choose a country of the list.': $localize`:@@clinic.schema.country:Choose a country of the list.`,
  'Choose at least one language.': $localize`:@@clinic.schema.one-language:Choose at least one language.`,
  'Choose at least one day.': $localize`:@@clinic.schema.one-day:Choose at least one day.`,
  'Between 1 and 60.': $localize`:@@clinic.schema.air:Between 1 and 60.`,
  'Say why in a few words.': $localize`:@@clinic.schema.say-why:Say why in a few words.`,
  'Give a number of minutes.': $localize`:@@clinic.schema.minutes:Give a number of minutes.`,
  'Give whole minutes.': $localize`:@@clinic.schema.whole-minutes:Give whole minutes.`,
  'Give a number of months.': $localize`:@@clinic.schema.months:Give a number of months.`,
  'Give whole months.': $localize`:@@clinic.schema.whole-months:Give whole months.`,
  'Give a number of hours.': $localize`:@@clinic.schema.hours:Give a number of hours.`,
  'Hours cannot be negative.': $localize`:@@clinic.schema.no-negative-hours:Hours cannot be negative.`,
  'Give hours in quarters, such as 4.5.': $localize`:@@clinic.schema.quarters:Give hours in quarters, such as 4.5.`,
  'Give a volume in mL.': $localize`:@@clinic.schema.volume-ml:Give a volume in mL.`,
  'Give whole days.': $localize`:@@clinic.schema.whole-days:Give whole days.`,
  'Between a quarter of an hour and 24 hours.': $localize`:@@clinic.schema.hours-range:Between a quarter of an hour and 24 hours.`,
  'Between 20 and 400 mg/dL.': $localize`:@@clinic.schema.glucose-limit:Between 20 and 400 mg/dL.`,
  'Between 10 and 1000 mg/dL.': $localize`:@@clinic.schema.glucose:Between 10 and 1000 mg/dL.`,
  'Between 1 and 50 mL.': $localize`:@@clinic.schema.sip:Between 1 and 50 mL.`,
  'Give a series or days, not both.': $localize`:@@clinic.schema.series-or-days:Give a series or days, not both.`,
  'The last day comes before the first.': $localize`:@@clinic.schema.last-day:The last day comes before the first.`,
  'This holds signs that nobody can see. Write it again.': $localize`:@@clinic.schema.unseen:This holds signs that nobody can see. Write it again.`,
};

const tooLong = /^At most (\d+) characters\.$/;

/** What a schema said about a field, as the screen says it. */
export function schemaSentence(english: string): string {
  const known = sentences[english];
  if (known !== undefined) return known;
  const most = tooLong.exec(english)?.[1];
  if (most !== undefined)
    return $localize`:@@clinic.schema.too-long:At most ${most}:most: characters.`;
  // What zod says by itself is written for programmers ('Invalid input: expected number, received null').
  return $localize`:@@clinic.schema.unfit:This cannot be right. Look at it again.`;
}
