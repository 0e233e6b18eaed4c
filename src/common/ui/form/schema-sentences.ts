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
  'Choose at least one role.': $localize`:@@clinic.schema.role:Choose at least one role.`,
  'At least 15 characters. A short sentence works well.': $localize`:@@clinic.schema.password:At least 15 characters. A short sentence works well.`,
  'Enter your password to sign.': $localize`:@@clinic.schema.sign:Enter your password to sign.`,
  'Between 0.5 and 120 kg.': $localize`:@@clinic.schema.weight:Between 0.5 and 120 kg.`,
  'Between 0.1 and 100 mL.': $localize`:@@clinic.schema.volume:Between 0.1 and 100 mL.`,
  'A consent by telephone needs a witness.': $localize`:@@clinic.schema.witness:A consent by telephone needs a witness.`,
  'This goes into texts, so it must not be the name. For example “Baby” or “Big girl”.': $localize`:@@clinic.schema.label:This goes into texts, so it must not be the name. For example “Baby” or “Big girl”.`,
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
