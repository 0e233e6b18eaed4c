import { instantOf } from '../../domain/zone';
import { familyDay, familyStopTime, familyTime } from '../family-time';
import { arabic } from './arabic';

const zone = 'America/Chicago';
const at = (on: string, time: string, pick?: 'earlier' | 'later'): number =>
  instantOf({ on, time, zone }, pick);

describe('times in Arabic', () => {
  it('have weekday, date, clock and part of the day', () => {
    expect(familyTime(at('2026-12-09', '07:00'), zone, arabic)).toEqual({
      clock: '7:00',
      dayPart: 'صباحًا',
      time: '7:00 صباحًا',
      weekday: 'الأربعاء',
      date: '9 ديسمبر',
      text: 'الأربعاء 9 ديسمبر، 7:00 صباحًا',
      nightBetween: null,
      occurs: 'once',
    });
    expect(familyDay('2026-12-09', arabic).text).toBe('الأربعاء 9 ديسمبر');
  });

  it.each([
    ['00:30', '12:30 ليلًا'],
    ['01:00', '1:00 ليلًا'],
    ['03:59', '3:59 ليلًا'],
    ['04:00', '4:00 فجرًا'],
    ['05:00', '5:00 صباحًا'],
    ['11:59', '11:59 صباحًا'],
    ['12:30', '12:30 ظهرًا'],
    ['15:00', '3:00 عصرًا'],
    ['18:00', '6:00 مساءً'],
    ['21:00', '9:00 مساءً'],
    ['22:00', '10:00 ليلًا'],
    ['23:59', '11:59 ليلًا'],
  ])('%s is %s', (time, expected) => {
    expect(familyTime(at('2026-12-09', time), zone, arabic).time).toBe(expected);
  });

  it('name the two days of the night', () => {
    const between = (on: string, time: string) =>
      familyTime(at(on, time), zone, arabic).nightBetween;
    expect(between('2026-12-09', '01:00')).toEqual(['الثلاثاء', 'الأربعاء']);
    expect(between('2026-12-13', '23:59')).toEqual(['الأحد', 'الاثنين']);
  });

  it('say which of two, on the night a clock goes back', () => {
    const told = (pick: 'earlier' | 'later') =>
      familyTime(at('2026-11-01', '01:30', pick), zone, arabic);
    expect([told('earlier').time, told('earlier').occurs]).toEqual(['1:30 ليلًا', 'first']);
    expect([told('later').time, told('later').occurs]).toEqual(['1:30 ليلًا', 'second']);
  });

  // Communication facts 8.6, T2: eight hours back over the night when an hour is missing.
  it('follow the clock on the night it goes forward', () => {
    const stop = at('2026-03-08', '06:30') - 8 * 3_600_000;
    expect(familyStopTime(stop, zone, arabic).text).toBe('السبت 7 مارس، 9:30 مساءً');
  });

  it('of a stop never read 12:00 nor midnight', () => {
    expect(familyStopTime(at('2027-01-01', '00:00'), zone, arabic).text).toBe(
      'الخميس 31 ديسمبر، 11:59 ليلًا',
    );
    for (let minutes = 0; minutes < 24 * 60; minutes += 1) {
      const stop = familyStopTime(at('2026-12-09', '00:00') + minutes * 60_000, zone, arabic);
      expect(stop.clock).not.toBe('12:00');
      expect(stop.text).not.toMatch(/منتصف/);
    }
  });

  it('use digits that every telephone shows and codes are typed in', () => {
    const { text } = familyTime(at('2026-12-09', '07:00'), zone, arabic);
    expect(text).not.toMatch(/[\u0660-\u0669\u06f0-\u06f9]/);
  });
});
