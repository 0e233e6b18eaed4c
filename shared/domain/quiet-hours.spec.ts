import { afterQuietHours, isQuiet, quietFrom } from './quiet-hours';
import { instantOf } from './zone';

const zone = 'America/Chicago';
const at = (time: string, on = '2026-12-09'): number => instantOf({ on, time, zone });
const nextDay = '2026-12-10';

// 47 CFR 64.1200(c)(1): before 8:00 and after 21:00 of the clock of the one who is called.
describe('quiet hours', () => {
  it.each([
    ['20:59', false, false],
    ['21:00', true, true],
    ['23:59', true, true],
    ['00:00', true, false],
    ['04:30', true, false],
    ['07:59', true, false],
    ['08:00', false, false],
    ['12:00', false, false],
  ])('%s is quiet: %s, and for who agreed to early texts: %s', (time, usually, early) => {
    expect(isQuiet(at(time), zone, false)).toBe(usually);
    expect(isQuiet(at(time), zone, true)).toBe(early);
  });

  it.each([
    ['20:59', at('20:59'), at('20:59')],
    ['21:00', at('08:00', nextDay), at('00:00', nextDay)],
    ['23:30', at('08:00', nextDay), at('00:00', nextDay)],
    ['00:00', at('08:00'), at('00:00')],
    ['04:30', at('08:00'), at('04:30')],
    ['08:00', at('08:00'), at('08:00')],
  ])('a text of %s goes out when they are over', (time, usually, early) => {
    expect(afterQuietHours(at(time), zone)).toBe(usually);
    expect(afterQuietHours(at(time), zone, true)).toBe(early);
  });

  it('go by the recipient’s clock', () => {
    // 21:30 in Chicago is 19:30 in Los Angeles.
    expect(isQuiet(at('21:30'), 'America/Los_Angeles', false)).toBe(false);
    expect(quietFrom('2026-12-09', zone)).toBe(at('21:00'));
    expect(quietFrom('2026-12-09', 'America/Los_Angeles')).toBe(at('23:00'));
  });
});
