import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { nextStep, roomsNow, type Surroundings } from './next-step';
import { aRow, aSheet, aSpecimen, checkedRow, hereRow } from './row.testing';

const around: Surroundings = {
  now: Date.parse('2027-04-06T11:20:00.000Z'),
  zone: 'America/Chicago',
  rooms: [
    { id: 1, name: 'Room 1', isFree: true },
    { id: 2, name: 'Room 2', isFree: true },
  ],
  suggestion: null,
  has: () => true,
};
const acts = (row: MorningRow, more: Partial<Surroundings> = {}): string[] =>
  nextStep(row, { ...around, ...more }).offers.map(({ act }) => act);

test.each<[string, MorningRow, string[]]>([
  ['not here, has answered', aRow(), ['arrive']],
  ['not here, not heard from', aRow({ said: [] }), ['call', 'arrive']],
  ['not here, not sure', aRow({ verdict: 'cannot-tell' }), ['call', 'arrive']],
  ['here', hereRow(), ['door-check']],
  [
    'here and near the longest fast',
    hereRow({ ceiling: 'collect-or-feed' }),
    ['door-check', 'feed'],
  ],
  ['checked at the door', checkedRow(), ['begin']],
  ['checked, not long enough', checkedRow({ readyAt: '2027-04-06T11:40:00.000Z' }), []],
  ['checked, cannot tell', checkedRow({ verdict: 'cannot-tell', readyAt: null }), ['begin']],
  ['near the longest fast', checkedRow({ ceiling: 'collect-or-feed' }), ['begin', 'feed']],
  ['past the longest fast', checkedRow({ ceiling: 'feed' }), ['feed', 'go-on']],
  ['fed before the collection', checkedRow({ fedAt: '2027-04-06T11:10:00.000Z' }), ['left']],
  ['in a room', checkedRow({ state: 'collecting' }), ['collected', 'not-collected']],
  ['collected', aRow({ state: 'collected', specimen: aSpecimen() }), ['neutralise', 'feed']],
  [
    'neutralised, not labelled',
    aRow({
      state: 'collected',
      specimen: aSpecimen({ label: null, neutralisedAt: '2027-04-06T11:10:00.000Z' }),
    }),
    ['label', 'feed'],
  ],
  [
    'neutralised',
    aRow({
      state: 'collected',
      specimen: aSpecimen({ neutralisedAt: '2027-04-06T11:10:00.000Z' }),
    }),
    ['feed'],
  ],
  ['not collected', aRow({ state: 'not-collected' }), ['feed']],
  [
    'not collected and fed',
    aRow({ state: 'not-collected', fedAt: '2027-04-06T11:10:00.000Z' }),
    ['left'],
  ],
  [
    'gone',
    aRow({
      state: 'not-collected',
      fedAt: '2027-04-06T11:10:00.000Z',
      leftAt: '2027-04-06T11:15:00.000Z',
    }),
    [],
  ],
  ['lost', aRow({ state: 'lost' }), []],
])('%s', (_, row, expected) => {
  expect(acts(row)).toEqual(expected);
});

test('near the longest fast both choices weigh the same and say what they lead to', () => {
  const step = nextStep(checkedRow({ ceiling: 'collect-or-feed' }), around);
  expect(step).toMatchObject({ isPair: true, filled: 2 });
  expect(step.offers.map(({ leadsTo }) => leadsTo)).toEqual(['Room 1 is free', 'plan again']);
});

test('past the longest fast only "feed" is suggested', () => {
  expect(nextStep(checkedRow({ ceiling: 'feed' }), around)).toMatchObject({
    isPair: true,
    filled: 1,
  });
});

test('the room is the suggested one, else the planned one when free, else the first free one', () => {
  const roomOf = (more: Partial<Surroundings>): number | undefined =>
    nextStep(checkedRow(), { ...around, ...more }).offers[0]?.roomId;
  expect(roomOf({})).toBe(1);
  expect(
    roomOf({
      suggestion: { morningId: 4, roomId: 2, says: '', explains: { rule: '', inputs: {} } },
    }),
  ).toBe(2);
  expect(
    roomOf({
      rooms: [
        { id: 1, name: 'Room 1', isFree: false },
        { id: 2, name: 'Room 2', isFree: true },
      ],
    }),
  ).toBe(2);
});

test('a room is free when its air is clean and nobody is inside', () => {
  const sheet = aSheet([checkedRow({ state: 'collecting', room: { id: 2, name: 'Room 2' } })]);
  expect(roomsNow(sheet).map(({ isFree }) => isFree)).toEqual([true, false]);
  const [first, second] = sheet.rooms;
  const closed = { ...first!, opensAt: '2027-04-06T12:07:00.000Z' };
  expect(roomsNow({ rows: [], rooms: [closed, second!] })[0]?.isFree).toBe(false);
});

test('the front desk sees only what it may do', () => {
  const has = (right: string): boolean => ['mornings.read', 'arrivals.write'].includes(right);
  expect(acts(aRow(), { has })).toEqual(['arrive']);
  expect(acts(checkedRow(), { has })).toEqual([]);
});
