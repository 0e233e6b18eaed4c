import { replanOffers, type ReplanRequest, type SeriesMorning } from './replan';
import { instantOf } from './zone';

const zone = 'America/Chicago';
const morning = (number: number, on: string, state: SeriesMorning['state']): SeriesMorning => ({
  number,
  on,
  state,
});
/** Wednesday 9 December 2026, the second morning, was lost. */
const request: ReplanRequest = {
  lostOn: '2026-12-09',
  plannedCount: 3,
  mornings: [
    morning(1, '2026-12-08', 'collected'),
    morning(2, '2026-12-09', 'lost'),
    morning(3, '2026-12-10', 'planned'),
  ],
  longestGapDays: 7,
  search: {
    zone,
    weeks: 2,
    clinicDays: ([1, 2, 3, 4, 5] as const).map((weekday) => ({
      weekday,
      from: '06:00',
      until: '09:00',
    })),
    closures: [],
    laboratory: { receivingWeekdays: [1, 2, 3, 4, 5], cutOffTimes: {} },
    places: [{ arrivalTime: '06:00', roomId: 1 }],
    booked: [],
    children: [{ id: 1, bornOn: '2024-02-02', leastMinutes: 360, longestMinutes: 780 }],
    usualWaitMinutes: 30,
    leadDays: 0,
    now: instantOf({ on: '2026-12-09', time: '08:00', zone }),
  },
};

describe('after a lost morning', () => {
  it('offers the next possible morning, a new run, and closing with fewer', () => {
    expect(replanOffers(request)).toMatchObject([
      {
        kind: 'next-possible-morning',
        number: 2,
        day: { on: '2026-12-11' },
        gapDays: 1,
        isConsecutive: true,
        isBeyondGap: false,
      },
      {
        kind: 'new-run',
        numbers: [2, 3],
        run: { days: [{ on: '2026-12-10' }, { on: '2026-12-11' }] },
      },
      { kind: 'close-with-fewer', collected: 1, planned: 3 },
    ]);
  });

  it('keeps the numbers of what was taken', () => {
    const mornings = [
      morning(1, '2026-12-07', 'lost'),
      morning(2, '2026-12-08', 'collected'),
      morning(3, '2026-12-09', 'lost'),
    ];
    const offers = replanOffers({ ...request, mornings });
    expect(offers[0]).toMatchObject({ number: 3, gapDays: 2, isConsecutive: false });
    expect(offers[1]).toMatchObject({ kind: 'new-run', numbers: [1, 3] });
  });

  it('says when the gap is longer than the clinic allows', () => {
    const closures = ['2026-12-11', '2026-12-14', '2026-12-15', '2026-12-16', '2026-12-17'].map(
      (on) => ({ on, reason: 'Ventilation' }),
    );
    const [next] = replanOffers({ ...request, search: { ...request.search, closures } });
    expect(next).toMatchObject({ day: { on: '2026-12-18' }, gapDays: 8, isBeyondGap: true });
  });

  it('offers no closing when nothing was collected, and no date when there is none', () => {
    const mornings = [morning(1, '2026-12-09', 'lost')];
    const places: ReplanRequest['search']['places'] = [];
    const asked = { ...request, mornings, search: { ...request.search, places } };
    expect(replanOffers(asked)).toEqual([]);
  });
});
