/**
 * Short days and times in the reader's language, Gregorian and in Latin digits whatever the language's own habit.
 * By the browser's own tables: Angular's would come with every page for these two lines.
 */
const tagOf = (locale: string): string =>
  // Browsers have no Haitian Creole and would fall back to the phone's own language.
  `${locale.startsWith('ht') ? 'fr-HT' : locale}-u-ca-gregory-nu-latn`;

/** 'Wed 9' for a calendar day 'YYYY-MM-DD'; no zone is converted. */
export function shortDay(on: string, locale: string): string {
  const day = new Date(`${on}T12:00:00.000Z`);
  return new Intl.DateTimeFormat(tagOf(locale), {
    weekday: 'short',
    day: 'numeric',
    timeZone: 'UTC',
  })
    .formatToParts(day)
    .filter(({ type }) => type === 'weekday' || type === 'day')
    .map(({ value }) => value)
    .sort((a, b) => Number(/^\d/.test(a)) - Number(/^\d/.test(b)))
    .join(' ');
}

/** An instant by the phone's own clock and zone: 'Tue, Dec 8, 7:38 PM'. */
export function phoneTime(instant: string, locale: string, withDay = true): string {
  return new Intl.DateTimeFormat(tagOf(locale), {
    ...(withDay ? { weekday: 'short', day: 'numeric', month: 'short' } : {}),
    hour: 'numeric',
    minute: '2-digit',
  }).format(new Date(instant));
}
