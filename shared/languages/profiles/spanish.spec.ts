import { messageSegments } from '../../domain/message-segments';
import { instantOf } from '../../domain/zone';
import { familyDay, familyStopTime, familyTime } from '../family-time';
import { profileOf } from '../profiles';

const zone = 'America/Chicago';
const spanish = profileOf('es');
const at = (on: string, time: string, pick?: 'earlier' | 'later'): number =>
  instantOf({ on, time, zone }, pick);

describe('a time told in Spanish', () => {
  it('has weekday, date, clock and part of the day', () => {
    expect(familyTime(at('2026-12-09', '07:00'), zone, spanish)).toEqual({
      clock: '7:00',
      dayPart: 'de la mañana',
      time: 'las 7:00 de la mañana',
      weekday: 'miércoles',
      date: '9 de diciembre',
      text: 'miércoles, 9 de diciembre, a las 7:00 de la mañana',
      nightBetween: null,
      occurs: 'once',
    });
  });

  it.each([
    ['00:30', 'las 12:30 de la madrugada'],
    ['01:00', 'la 1:00 de la madrugada'],
    ['01:59', 'la 1:59 de la madrugada'],
    ['02:00', 'las 2:00 de la madrugada'],
    ['04:59', 'las 4:59 de la madrugada'],
    ['05:00', 'las 5:00 de la mañana'],
    ['11:00', 'las 11:00 de la mañana'],
    ['11:59', 'las 11:59 de la mañana'],
    ['12:30', 'las 12:30 de la tarde'],
    ['13:00', 'la 1:00 de la tarde'],
    ['18:59', 'las 6:59 de la tarde'],
    ['19:00', 'las 7:00 de la noche'],
    ['21:00', 'las 9:00 de la noche'],
    ['23:59', 'las 11:59 de la noche'],
  ])('%s is %s', (time, expected) => {
    expect(familyTime(at('2026-12-09', time), zone, spanish).time).toBe(expected);
  });

  it('of a stop never reads 12:00 nor names the middle of day or night', () => {
    expect(familyStopTime(at('2026-12-09', '00:00'), zone, spanish).text).toBe(
      'martes, 8 de diciembre, a las 11:59 de la noche',
    );
    for (let minutes = 0; minutes < 24 * 60; minutes += 1) {
      const stopAt = at('2026-12-09', '00:00') + minutes * 60_000;
      const { clock, text } = familyStopTime(stopAt, zone, spanish);
      expect(clock).not.toBe('12:00');
      expect(text).not.toMatch(/medianoche|mediodía|[ap]\. ?m\./);
    }
  });

  it('says which of two, on the night a clock goes back', () => {
    const told = (instant: number) => {
      const { time, occurs } = familyTime(instant, zone, spanish);
      return [time, occurs];
    };
    const halfPastOne = 'la 1:30 de la madrugada';
    expect(told(at('2026-11-01', '01:30', 'earlier'))).toEqual([halfPastOne, 'first']);
    expect(told(at('2026-11-01', '01:30', 'later'))).toEqual([halfPastOne, 'second']);
    expect(told(at('2026-11-01', '02:00'))).toEqual(['las 2:00 de la madrugada', 'once']);
  });

  // Communication facts 8.6, T2: 8 hours before 6:30 on the night the clock goes forward.
  it('follows the clock on the night it goes forward', () => {
    const stopAt = at('2026-03-08', '06:30') - 8 * 3_600_000;
    expect(familyStopTime(stopAt, zone, spanish).text).toBe(
      'sábado, 7 de marzo, a las 9:30 de la noche',
    );
  });

  it('knows the two days around a night', () => {
    expect(familyTime(at('2026-12-09', '03:00'), zone, spanish).nightBetween).toEqual([
      'martes',
      'miércoles',
    ]);
  });

  it('of a day alone has no clock', () => {
    expect(familyDay('2028-02-29', spanish).text).toBe('martes, 29 de febrero');
  });

  // Communication facts 4.3: á, í, ó and ú more than double what a text takes.
  it('spells every word with the letters of a text message, but for Saturday', () => {
    const words = [...spanish.weekdays, ...spanish.months];
    const parts = spanish.dayParts.map(({ words: part }) => part);
    const costly = [...words, ...parts].filter(
      (word) => messageSegments(word).encoding !== 'gsm-7',
    );
    expect(costly).toEqual(['sábado']);
  });
});
