export interface DateParts {
  day: string;
  month: string;
  year: string;
}
export type DateField = keyof DateParts;

export type ReadDate =
  | { bornOn: string }
  | {
      wrong: 'missing' | 'not-a-number' | 'short-year' | 'no-such-day' | 'to-come';
      field: DateField;
    };

const fields = ['day', 'month', 'year'] as const;

/** Digits of every script to 0-9: a keyboard in Arabic or Burmese types its own. */
export function latinDigits(text: string): string {
  return text.replace(/\p{Nd}/gu, (digit) => {
    const point = digit.codePointAt(0) ?? 0;
    // Decimal digits stand in runs of ten that begin with their zero.
    let zero = point;
    while (point - zero < 9 && /\p{Nd}/u.test(String.fromCodePoint(zero - 1))) zero -= 1;
    return String(point - zero);
  });
}

/**
 * A typed birth date as 'YYYY-MM-DD', or what is wrong and in which field.
 * @param today calendar day of the clinic's clock, 'YYYY-MM-DD'
 */
export function readBirthDate(parts: DateParts, today: string): ReadDate {
  const texts = {
    day: latinDigits(parts.day).trim(),
    month: latinDigits(parts.month).trim(),
    year: latinDigits(parts.year).trim(),
  };
  for (const field of fields) if (texts[field] === '') return { wrong: 'missing', field };
  for (const field of fields) {
    if (!/^\d+$/.test(texts[field])) return { wrong: 'not-a-number', field };
  }
  if (texts.year.length !== 4) return { wrong: 'short-year', field: 'year' };
  const day = Number(texts.day);
  const month = Number(texts.month);
  const year = Number(texts.year);
  if (month < 1 || month > 12) return { wrong: 'no-such-day', field: 'month' };
  // Calendar math only: the day before the first of the next month is the last of this one.
  const daysInMonth = new Date(Date.UTC(year, month, 0)).getUTCDate();
  if (day < 1 || day > daysInMonth) return { wrong: 'no-such-day', field: 'day' };
  const bornOn = `${texts.year}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
  return bornOn > today ? { wrong: 'to-come', field: 'year' } : { bornOn };
}

/**
 * A whole date pasted into one field; null when the text is not one. '2025-10-04' is clear by itself; '4/10/2025' is
 * read in the order in which the fields stand, unless only the other order gives a month.
 */
export function pastedDate(text: string, isMonthFirst: boolean): DateParts | null {
  const clean = latinDigits(text).trim();
  const iso = /^(\d{4})\D(\d{1,2})\D(\d{1,2})$/.exec(clean);
  if (iso) return { year: iso[1] ?? '', month: iso[2] ?? '', day: iso[3] ?? '' };
  const other = /^(\d{1,2})\D+(\d{1,2})\D+(\d{4})$/.exec(clean);
  if (!other) return null;
  const [, first = '', second = '', year = ''] = other;
  const isMonthNow = Number(first) > 12 ? false : Number(second) > 12 ? true : isMonthFirst;
  return isMonthNow ? { month: first, day: second, year } : { day: first, month: second, year };
}
