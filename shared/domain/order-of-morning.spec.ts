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
  lastIntakeAt: at('00:30'),
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
    const unknown = { lastIntakeAt: null };
    expect(next(child(1, unknown), child(2, { ...unknown, bornOn: '2025-05-05' }))).toMatchObject({
      childId: 2,
      reason: 'youngest',
    });
  });

  it('is nobody while nobody is ready or no room is free', () => {
    expect(next()).toEqual({ childId: null, reason: 'nobody-ready' });
    const busy = [
      { id: 1, freeAt: null },
      { id: 2, freeAt: at('07:01') },
    ];
    expect(nextChild({ waiting: [child(1)], rooms: busy, now })).toEqual({
      childId: null,
      reason: 'no-room-free',
    });
  });
});
