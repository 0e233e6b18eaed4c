import { instantOf } from '../domain/zone';
import { familyDay, familyStopTime, familyTime } from './family-time';
import { profileOf } from './profiles';

const zone = 'America/Chicago';
const english = profileOf('en');
const at = (on: string, time: string, pick?: 'earlier' | 'later'): number =>
  instantOf({ on, time, zone }, pick);

describe('a time told to a family', () => {
  it('has weekday, date, clock and part of the day', () => {
    expect(familyTime(at('2026-12-09', '07:00'), zone, english)).toEqual({
      clock: '7:00',
      dayPart: 'in the morning',
      time: '7:00 in the morning',
      weekday: 'Wednesday',
      date: '9 December',
      text: 'Wednesday, 9 December, 7:00 in the morning',
      nightBetween: null,
      occurs: 'once',
    });
  });

  it.each([
    ['00:30', '12:30 at night'],
    ['01:00', '1:00 at night'],
    ['04:59', '4:59 at night'],
    ['05:00', '5:00 in the morning'],
    ['11:59', '11:59 in the morning'],
    ['12:30', '12:30 in the afternoon'],
    ['17:59', '5:59 in the afternoon'],
    ['18:00', '6:00 in the evening'],
    ['20:59', '8:59 in the evening'],
    ['21:00', '9:00 at night'],
    ['23:59', '11:59 at night'],
  ])('%s is %s', (time, expected) => {
    expect(familyTime(at('2026-12-09', time), zone, english).time).toBe(expected);
  });

  it('knows the two days around a night', () => {
    const between = (on: string, time: string) =>
      familyTime(at(on, time), zone, english).nightBetween;
    expect(between('2026-12-08', '21:00')).toEqual(['Tuesday', 'Wednesday']);
    expect(between('2026-12-09', '03:00')).toEqual(['Tuesday', 'Wednesday']);
    expect(between('2026-12-13', '18:00')).toEqual(['Sunday', 'Monday']);
    expect(between('2026-12-09', '05:00')).toBeNull();
  });

  it('says which of two, on the night a clock goes back', () => {
    const occurs = (instant: number) => familyTime(instant, zone, english).occurs;
    expect(occurs(at('2026-11-01', '01:30', 'earlier'))).toBe('first');
    expect(occurs(at('2026-11-01', '01:30', 'later'))).toBe('second');
    expect(occurs(at('2026-11-01', '02:00'))).toBe('once');
  });

  it('of a stop never reads 12:00 nor midnight', () => {
    expect(familyStopTime(at('2026-12-09', '00:00'), zone, english).text).toBe(
      'Tuesday, 8 December, 11:59 at night',
    );
    expect(familyStopTime(at('2027-01-01', '00:00'), zone, english).text).toBe(
      'Thursday, 31 December, 11:59 at night',
    );
    for (let minutes = 0; minutes < 24 * 60; minutes += 1) {
      const { clock, text } = familyStopTime(
        at('2026-12-09', '00:00') + minutes * 60_000,
        zone,
        english,
      );
      expect(clock).not.toBe('12:00');
      expect(text).not.toMatch(/midnight|\bnoon\b| AM\b| PM\b/);
    }
  });

  // Communication facts 8.6, T2.
  it('follows the clock of the clinic', () => {
    const stop = at('2026-03-08', '06:30') - 8 * 3_600_000;
    expect(familyStopTime(stop, zone, english).text).toBe('Saturday, 7 March, 9:30 at night');
    expect(familyStopTime(stop, 'Asia/Tokyo', english).text).toBe(
      'Sunday, 8 March, 12:30 in the afternoon',
    );
  });

  it('of a day alone has no clock', () => {
    expect(familyDay('2028-02-29', english).text).toBe('Tuesday, 29 February');
    expect(() => familyDay('2027-02-29', english)).toThrow('Not a calendar day');
  });

  it('counts to 23 where a language does', () => {
    const profile = { ...english, hourCycle: 'h23' as const };
    expect(familyTime(at('2026-12-09', '00:05'), zone, profile).clock).toBe('0:05');
    expect(familyTime(at('2026-12-09', '18:30'), zone, profile).clock).toBe('18:30');
  });

  it('refuses a profile with words missing', () => {
    expect(() => familyTime(at('2026-12-09', '07:00'), zone, { ...english, dayParts: [] })).toThrow(
      'No part of the day',
    );
    expect(() => familyDay('2026-12-09', { ...english, months: ['January'] })).toThrow('lacks');
  });
});
