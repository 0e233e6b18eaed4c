import { isOnCall, onCallChain, type OnCallTurn } from './on-call';

/** Monday 12 April 2027 begins the week of these cases. */
const turn = (more: Partial<OnCallTurn> = {}): OnCallTurn => ({
  staffId: 1,
  deputyId: null,
  weekdays: [1, 2, 3, 4, 5],
  from: '04:00',
  until: '09:00',
  fromOn: '2027-04-01',
  untilOn: null,
  ...more,
});

describe('whose turn it is', () => {
  const night = { from: '20:00', until: '06:00' } as const;
  test.each([
    ['the first minute', {}, '2027-04-12', '04:00', true],
    ['a minute before', {}, '2027-04-12', '03:59', false],
    ['the end is not included', {}, '2027-04-12', '09:00', false],
    ['a Saturday', {}, '2027-04-17', '05:00', false],
    ['an evening', night, '2027-04-12', '23:00', true],
    ['the morning after a Friday evening', night, '2027-04-17', '05:59', true],
    ['the morning before the first evening', night, '2027-04-12', '05:00', false],
    ['noon between two nights', night, '2027-04-13', '12:00', false],
    ['a whole day until the next', { from: '07:00', until: '07:00' }, '2027-04-13', '06:59', true],
    ['before the first day', { fromOn: '2027-04-13' }, '2027-04-12', '05:00', false],
    ['the first day', { fromOn: '2027-04-12' }, '2027-04-12', '05:00', true],
    ['the first minute of a night', night, '2027-04-12', '20:00', true],
    ['the end of a night is not included', night, '2027-04-13', '06:00', false],
    ['the last day', { untilOn: '2027-04-12' }, '2027-04-12', '05:00', true],
    ['after the last day', { untilOn: '2027-04-12' }, '2027-04-13', '05:00', false],
    ['the end of the last night', { ...night, untilOn: '2027-04-12' }, '2027-04-13', '05:00', true],
  ] as const)('%s', (_what, more, on, time, is) => {
    expect(isOnCall(turn(more), { on, time })).toBe(is);
  });
});

describe('whom to tell, in order', () => {
  const moment = { on: '2027-04-12', time: '05:00' } as const;

  test('each with the deputy behind, then those who are off duty, nobody twice', () => {
    const turns = [
      turn({ staffId: 9, from: '12:00', until: '18:00', deputyId: 1 }),
      turn({ staffId: 1, deputyId: 2 }),
      turn({ staffId: 3, deputyId: 2 }),
    ];
    expect(onCallChain(turns, moment)).toEqual([1, 2, 3, 9]);
  });

  test('off duty, on the first and the last day of a turn, with the deputy where there is one', () => {
    const off = { from: '12:00', until: '18:00' } as const;
    const bounds = { fromOn: '2027-04-12', untilOn: '2027-04-12' };
    expect(onCallChain([turn({ ...off, ...bounds })], moment)).toEqual([1]);
    expect(onCallChain([turn({ ...off, deputyId: 7 })], moment)).toEqual([1, 7]);
    expect(onCallChain([turn({ ...off, fromOn: '2027-04-13' })], moment)).toEqual([]);
  });

  test('a turn that is over for good calls nobody', () => {
    expect(onCallChain([turn({ untilOn: '2027-04-11' })], moment)).toEqual([]);
  });
});
