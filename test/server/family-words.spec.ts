import { instantOf } from '../../shared/domain/zone';
import { skiesOf, skyAt } from '../../server/fasting/sky';
import { countedInstant } from '../../server/fasting/told-rows';
import { wordsFrom } from '../../server/fasting/family-words';
import { englishWording } from '../support/words';

const zone = 'America/Los_Angeles';
const words = wordsFrom(englishWording(), zone);

describe('times as a family reads them', () => {
  it('tells the hour that comes twice apart (United States, 7 November 2027, 2:00 becomes 1:00)', () => {
    const first = Date.parse('2027-11-07T08:30:00Z');
    expect(words.time(first)).toBe('1:30 at night, the first time');
    expect(words.time(first + 3_600_000)).toBe('1:30 at night, the second time');
    expect(words.time(first + 2 * 3_600_000)).toBe('2:30 at night');
  });

  it('never says 12:00 of a stop', () => {
    const midnight = instantOf({ on: '2027-04-13', time: '00:00', zone });
    expect(words.stopTime(midnight)).toBe('11:59 at night');
    expect(words.shownStop(midnight)).toEqual({
      at: new Date(midnight).toISOString(),
      clock: '11:59',
      dayPart: 'at night',
    });
    expect(words.stopTime(midnight + 3_600_000)).toBe('1:00 at night');
  });

  it('remembers which texts it used, with their versions', () => {
    const own = wordsFrom(englishWording(), zone);
    own.text('outcome.all-right');
    expect(own.used()).toEqual({ 'outcome.all-right': 1 });
  });
});

describe('the sky', () => {
  it.each([
    ['04:59', 'night'],
    ['05:00', 'first-light'],
    ['07:00', 'morning'],
    ['18:00', 'evening'],
    ['21:00', 'night'],
  ])('at %s is %s', (time, sky) => {
    expect(skyAt(instantOf({ on: '2027-04-13', time, zone }), zone)).toBe(sky);
  });

  it('turns at instants in order, also on the night a clock changes', () => {
    const instants = skiesOf('2027-11-07', zone).map(({ from }) => from);
    expect(instants).toEqual([...instants].sort());
    expect(instants).toContain('2027-11-07T13:00:00.000Z');
  });
});

describe('which of two answers is the newer', () => {
  const received = Date.parse('2027-04-13T13:00:00Z');
  const opens = received - 60 * 60_000;
  it.each([
    ['a tap that was sent later', received - 20 * 60_000, received - 20 * 60_000],
    ['a clock that runs ahead', received + 60_000, received],
    ['a clock from before the question', opens - 1, received],
    ['no device', null, received],
  ])('%s', (_, deviceAt, counted) => {
    expect(countedInstant(deviceAt, received, opens)).toBe(counted);
  });
});
