import type { LanguageProfile } from '../profiles';

export const arabic: LanguageProfile = {
  id: 'ar',
  hourCycle: 'h12',
  weekdays: ['الاثنين', 'الثلاثاء', 'الأربعاء', 'الخميس', 'الجمعة', 'السبت', 'الأحد'],
  // Families here come from many countries; these names stand on the telephones and papers of this one.
  months: [
    'يناير',
    'فبراير',
    'مارس',
    'أبريل',
    'مايو',
    'يونيو',
    'يوليو',
    'أغسطس',
    'سبتمبر',
    'أكتوبر',
    'نوفمبر',
    'ديسمبر',
  ],
  dayParts: [
    { fromHour: 0, untilHour: 4, words: 'ليلًا' },
    { fromHour: 4, untilHour: 5, words: 'فجرًا' },
    { fromHour: 5, untilHour: 12, words: 'صباحًا' },
    { fromHour: 12, untilHour: 15, words: 'ظهرًا' },
    { fromHour: 15, untilHour: 18, words: 'عصرًا' },
    { fromHour: 18, untilHour: 22, words: 'مساءً' },
    { fromHour: 22, untilHour: 24, words: 'ليلًا' },
  ],
  patterns: {
    date: '{day} {month}',
    dayText: '{weekday} {date}',
    // No marks around the digits: a colon between digits stays in order beside Arabic words (Unicode
    // Standard Annex 9, W2 and W4), and each mark would be paid for in a text message.
    time: '{clock} {dayPart}',
    text: '{dayText}، {time}',
  },
};
