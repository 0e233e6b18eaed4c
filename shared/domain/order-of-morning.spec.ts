import { nextChild, type WaitingChild } from './order-of-morning';
import { instantOf } from './zone';

const at = (time: string): number => instantOf({ on: '2026-12-09', time, zone: 'America/Chicago' });
const now = at('07:00');
const rooms = [
  { id: 1, freeAt: at('06:50') },
  { id: 2, freeAt: at('06:40') },
];
const child = (childId: number, more: Partial<WaitingChild> = {}): WaitingChild => ({
  childId,
  bornOn: '2024-02-02',
  bookedAt: at('06:30'),
  arrivedAt: at('06:20'),
  isDoorChecked: true,
  readyAt: at('06:30'),
  hungryFromAt: at('00:30'),
  longestMinutes: 780,
  ...more,
});
const next = (...waiting: WaitingChild[]) => nextChild({ waiting, rooms, now });

describe('who is next', () => {
  it('is the only one ready, in the room that has been free longest', () => {
    const others = [
      child(2, { arrivedAt: null }),
      child(3, { isDoorChecked: false }),
      child(4, { readyAt: at('07:01') }),
      child(5, { readyAt: null }),
    ];
    expect(next(child(1), ...others)).toEqual({
      childId: 1,
      roomId: 2,
      reason: 'only-one-ready',
      explanation: {
        rule: 'order-of-morning.only-one-ready',
        // 13 h since 0:30 leave 6 h 30 min.
        inputs: {
          now,
          waiting: 5,
          ready: 1,
          minutesLeft: 390,
          bornOn: '2024-02-02',
          bookedAt: at('06:30'),
        },
      },
    });
  });

  it('is the one nearest its longest fast', () => {
    // 8 h from 0:30 are over at 8:30, 13 h at 13:30.
    expect(next(child(1), child(2, { longestMinutes: 480 }))).toMatchObject({
      childId: 2,
      reason: 'nearest-to-longest-fast',
    });
    expect(next(child(1), child(2, { longestMinutes: 420 }))).toMatchObject({
      childId: 2,
      reason: 'longest-fast-near',
    });
  });

  it('is the youngest among alike, then the one booked first', () => {
    expect(next(child(1), child(2, { bornOn: '2025-05-05' }))).toMatchObject({
      childId: 2,
      reason: 'youngest',
    });
    expect(next(child(1), child(2, { bookedAt: at('06:00') }))).toMatchObject({
      childId: 2,
      reason: 'booked-first',
    });
    const unknown = { hungryFromAt: null };
    expect(next(child(1, unknown), child(2, { ...unknown, bornOn: '2025-05-05' }))).toMatchObject({
      childId: 2,
      reason: 'youngest',
    });
  });

  it('is nobody while nobody is ready or no room is free', () => {
    expect(next()).toMatchObject({ childId: null, reason: 'nobody-ready' });
    const busy = [
      { id: 1, freeAt: null },
      { id: 2, freeAt: at('07:01') },
    ];
    expect(nextChild({ waiting: [child(1)], rooms: busy, now })).toMatchObject({
      childId: null,
      reason: 'no-room-free',
      explanation: { rule: 'order-of-morning.no-room-free', inputs: { ready: 1 } },
    });
  });
});

describe('the boundaries of the order', () => {
  const dueIn = (minutes: number): Partial<WaitingChild> => ({
    hungryFromAt: now,
    longestMinutes: minutes,
  });

  it('a child is ready in the very minute, and a room free in it', () => {
    const free = [{ id: 7, freeAt: now }];
    expect(nextChild({ waiting: [child(1, { readyAt: now })], rooms: free, now })).toMatchObject({
      childId: 1,
      roomId: 7,
    });
  });

  it.each([
    [30, 'longest-fast-near'],
    [31, 'only-one-ready'],
  ])('with %i minutes left the reason is %s', (minutes, reason) => {
    expect(next(child(1, dueIn(minutes)))).toMatchObject({ reason });
  });

  it.each([
    // Less than 15 minutes apart they count as alike, and the younger goes first.
    [114, 2, 'youngest'],
    [115, 1, 'nearest-to-longest-fast'],
  ])('of 100 and %i minutes', (minutes, childId, reason) => {
    const younger = { bornOn: '2025-05-05' };
    expect(next(child(1, dueIn(100)), child(2, { ...dueIn(minutes), ...younger }))).toMatchObject({
      childId,
      reason,
    });
  });

  it('the number of the child and of the room decide where nothing else does', () => {
    const free = [
      { id: 4, freeAt: at('06:30') },
      { id: 3, freeAt: at('06:30') },
    ];
    const waiting = [child(9), child(8)];
    expect(nextChild({ waiting, rooms: free, now })).toMatchObject({ childId: 8, roomId: 3 });
  });

  it('says what it knew when nobody is ready, and where hunger is not known', () => {
    expect(next(child(1, { readyAt: null })).explanation).toEqual({
      rule: 'order-of-morning.nobody-ready',
      inputs: { now, waiting: 1, ready: 0, minutesLeft: null, bornOn: null, bookedAt: null },
    });
    const { inputs } = next(child(1, { hungryFromAt: null })).explanation;
    expect(inputs['minutesLeft']).toBeNull();
    expect(next(child(1, dueIn(90.5))).explanation.inputs['minutesLeft']).toBe(90);
  });
});
