import { byDay, obstacleAt, type BookedPlace, type Turnover } from './booked-places';

const turnover: Turnover = {
  rooms: [
    { id: 1, closureMinutes: 60 },
    { id: 2, closureMinutes: 30 },
  ],
  staffPairs: 1,
  minutesPerChild: 30,
  limit: 5,
};
const booked = (...at: readonly (readonly [string, number?])[]): BookedPlace[] =>
  at.map(([arrivalTime, roomId]) => ({
    on: '2026-12-09',
    arrivalTime,
    ...(roomId && { roomId }),
  }));
const place = (arrivalTime: string, roomId = 1) => ({ arrivalTime, roomId });

describe('a place', () => {
  it.each([
    ['the same place', place('06:30'), booked(['06:30', 1]), 'taken'],
    ['the other room', place('06:30'), booked(['06:30', 2]), null],
    ['a booking without a room', place('06:30'), booked(['06:30']), 'taken'],
    ['another time', place('06:30'), booked(['06:00', 1]), null],
  ])('beside %s, without turnover', (_, asked, others, expected) => {
    expect(obstacleAt(asked, others)).toBe(expected);
  });

  // A child keeps the room 30 minutes, and it stays closed for 60, 30 or, where it is not known, no minutes.
  it.each([
    ['07:29', 1, 'turnover'],
    ['07:30', 1, null],
    ['06:59', 2, 'turnover'],
    ['07:00', 2, null],
    ['06:29', 9, 'turnover'],
    ['06:30', 9, null],
  ])('at %s in room %i after a child at 6:00', (time, roomId, expected) => {
    expect(obstacleAt(place(time, roomId), booked(['06:00', roomId]), turnover)).toBe(expected);
    // Another room's child at another hour changes nothing.
    const others = booked(['06:00', roomId], ['10:00', 7]);
    expect(obstacleAt(place(time, roomId), others, turnover)).toBe(expected);
  });

  it.each([
    ['a pair that is free again', '06:30', booked(['06:00', 2]), 1, null],
    ['a pair that is not', '06:29', booked(['06:00', 2]), 1, 'turnover'],
    ['a pair that is needed later', '06:00', booked(['06:30', 2]), 1, null],
    ['a pair that is needed too soon', '06:01', booked(['06:30', 2]), 1, 'turnover'],
    ['two of two pairs soon', '06:00', booked(['06:10', 2], ['06:20', 3]), 2, 'turnover'],
    ['two of three pairs soon', '06:00', booked(['06:10', 2], ['06:20', 3]), 3, null],
    ['two of two pairs afterwards', '06:00', booked(['06:40', 2], ['06:45', 3]), 2, null],
    ['two, one after the other', '06:30', booked(['06:05', 2], ['06:35', 3]), 2, null],
  ])('with %s', (_, time, others, staffPairs, expected) => {
    expect(obstacleAt(place(time), others, { ...turnover, staffPairs })).toBe(expected);
  });
});

describe('bookings by day', () => {
  const days = ['2026-12-08', '2026-12-09', '2026-12-09', '2026-12-10'].map((on) => ({ on }));

  it('hold all, or those from a day on', () => {
    expect([...byDay(days)].map(([on, entries]) => [on, entries.length])).toEqual([
      ['2026-12-08', 1],
      ['2026-12-09', 2],
      ['2026-12-10', 1],
    ]);
    expect([...byDay(days, '2026-12-09').keys()]).toEqual(['2026-12-09', '2026-12-10']);
  });
});
