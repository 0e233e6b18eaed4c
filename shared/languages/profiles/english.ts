import type { LanguageProfile } from '../profiles';

export const english: LanguageProfile = {
  id: 'en',
  hourCycle: 'h12',
  weekdays: ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'],
  months: [
    'January',
    'February',
    'March',
    'April',
    'May',
    'June',
    'July',
    'August',
    'September',
    'October',
    'November',
    'December',
  ],
  dayParts: [
    { fromHour: 0, untilHour: 5, words: 'at night' },
    { fromHour: 5, untilHour: 12, words: 'in the morning' },
    { fromHour: 12, untilHour: 18, words: 'in the afternoon' },
    { fromHour: 18, untilHour: 21, words: 'in the evening' },
    { fromHour: 21, untilHour: 24, words: 'at night' },
  ],
  patterns: {
    date: '{day} {month}',
    dayText: '{weekday}, {date}',
    time: '{clock} {dayPart}',
    text: '{dayText}, {time}',
  },
};
