import { latinDigits, pastedDate, readBirthDate } from './birth-date';

const today = '2027-04-14';
const read = (day: string, month: string, year: string) =>
  readBirthDate({ day, month, year }, today);

describe('a typed birth date', () => {
  it.each([
    ['4', '10', '2025', '2025-10-04'],
    [' 04 ', '10', '2025', '2025-10-04'],
    ['29', '2', '2024', '2024-02-29'],
    ['٤', '١٠', '٢٠٢٥', '2025-10-04'],
    ['၄', '၁၀', '၂၀၂၅', '2025-10-04'],
    ['14', '4', '2027', '2027-04-14'],
  ])('reads %s / %s / %s', (day, month, year, bornOn) => {
    expect(read(day, month, year)).toEqual({ bornOn });
  });

  it.each([
    ['', '10', '2025', 'missing', 'day'],
    ['4', '', '2025', 'missing', 'month'],
    ['4', '10', ' ', 'missing', 'year'],
    ['4', 'Oct', '2025', 'not-a-number', 'month'],
    ['4', '10', '25', 'short-year', 'year'],
    ['4', '13', '2025', 'no-such-day', 'month'],
    ['31', '4', '2025', 'no-such-day', 'day'],
    ['29', '2', '2025', 'no-such-day', 'day'],
    ['0', '2', '2025', 'no-such-day', 'day'],
    ['15', '4', '2027', 'to-come', 'year'],
  ])('says what is wrong with %s / %s / %s, and where', (day, month, year, wrong, field) => {
    expect(read(day, month, year)).toEqual({ wrong, field });
  });
});

describe('a pasted date', () => {
  it.each([
    ['2025-10-04', true, ['4', '10', '2025']],
    ['10/04/2025', true, ['4', '10', '2025']],
    ['04/10/2025', false, ['4', '10', '2025']],
    ['4.10.2025', false, ['4', '10', '2025']],
    ['25/10/2025', true, ['25', '10', '2025']],
    ['10/25/2025', false, ['25', '10', '2025']],
    ['٠٤/١٠/٢٠٢٥', false, ['4', '10', '2025']],
  ])('reads %s with the month first: %s', (text, isMonthFirst, [day, month, year]) => {
    const parts = pastedDate(text, isMonthFirst);
    expect(parts && [Number(parts.day), Number(parts.month), parts.year].map(String)).toEqual([
      day,
      month,
      year,
    ]);
  });

  it('leaves anything else to the field it was pasted into', () => {
    expect(pastedDate('12', true)).toBeNull();
    expect(pastedDate('October 2025', true)).toBeNull();
  });
});

it('turns the digits of every script into 0 to 9 and leaves letters alone', () => {
  expect(latinDigits('०१२ ۳۴ ٥٦ ၇၈ 9x')).toBe('012 34 56 78 9x');
});
