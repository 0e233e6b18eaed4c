import type { LanguageProfile } from '../profiles';

/**
 * Spanish of the United States. The article belongs to the time, because it changes with the hour:
 * "a las 7:00", "a la 1:00". The hours after 0:00 are "de la madrugada", which cannot be taken for
 * the evening before; noon and the hour after it are "de la tarde", which a text message can spell.
 */
export const spanish: LanguageProfile = {
  id: 'es',
  hourCycle: 'h12',
  weekdays: ['lunes', 'martes', 'miércoles', 'jueves', 'viernes', 'sábado', 'domingo'],
  months: [
    'enero',
    'febrero',
    'marzo',
    'abril',
    'mayo',
    'junio',
    'julio',
    'agosto',
    'septiembre',
    'octubre',
    'noviembre',
    'diciembre',
  ],
  dayParts: [
    { fromHour: 0, untilHour: 5, words: 'de la madrugada' },
    { fromHour: 5, untilHour: 12, words: 'de la mañana' },
    { fromHour: 12, untilHour: 19, words: 'de la tarde' },
    { fromHour: 19, untilHour: 24, words: 'de la noche' },
  ],
  patterns: {
    date: '{day} de {month}',
    dayText: '{weekday}, {date}',
    time: 'las {clock} {dayPart}',
    timeAtOne: 'la {clock} {dayPart}',
    text: '{dayText}, a {time}',
  },
};
