import { placesOfMorning, type PlacesRequest } from './places-of-morning';

const demo: PlacesRequest = {
  rooms: [
    { id: 1, closureMinutes: 60 },
    { id: 2, closureMinutes: 60 },
  ],
  staffPairs: 1,
  arrivalsFrom: '06:00',
  arrivalsUntil: '09:00',
  minutesPerChild: 30,
  limit: 5,
};
const shown = (request: PlacesRequest): string[] =>
  placesOfMorning(request).map(({ arrivalTime, roomId }) => `${arrivalTime} room ${roomId}`);

describe('the places of a morning', () => {
  it('of the demo clinic are five, in two rooms by one pair of staff', () => {
    expect(shown(demo)).toEqual([
      '06:00 room 1',
      '06:30 room 2',
      '07:30 room 1',
      '08:00 room 2',
      '09:00 room 1',
    ]);
  });

  it('in one room come every 90 minutes (30 and the hour the room is closed)', () => {
    expect(shown({ ...demo, rooms: demo.rooms.slice(0, 1) })).toEqual([
      '06:00 room 1',
      '07:30 room 1',
      '09:00 room 1',
    ]);
  });

  // CDC 2003 airborne table: 23 minutes at 12 changes an hour for 99 %.
  it('come closer together in a room that is clean sooner', () => {
    const rooms = [{ id: 7, closureMinutes: 23 }];
    expect(shown({ ...demo, rooms, limit: 3 })).toEqual([
      '06:00 room 7',
      '06:53 room 7',
      '07:46 room 7',
    ]);
  });

  it('with two pairs fill two rooms at once', () => {
    expect(shown({ ...demo, staffPairs: 2, limit: 4 })).toEqual([
      '06:00 room 1',
      '06:00 room 2',
      '07:30 room 1',
      '07:30 room 2',
    ]);
  });

  it('are none without rooms or staff, and stop at the last arrival', () => {
    expect(shown({ ...demo, rooms: [] })).toEqual([]);
    expect(shown({ ...demo, staffPairs: 0 })).toEqual([]);
    expect(shown({ ...demo, arrivalsUntil: '06:00' })).toEqual(['06:00 room 1']);
    expect(shown({ ...demo, limit: 1 })).toHaveLength(1);
  });

  it('never put two children into a room or with a pair at once', () => {
    for (const minutesPerChild of [15, 20, 25, 40]) {
      for (const closureMinutes of [0, 35, 69]) {
        const rooms = [1, 2, 3].map((id) => ({ id, closureMinutes }));
        const places = placesOfMorning({ ...demo, rooms, minutesPerChild, limit: 50 });
        const minutes = places.map(({ arrivalTime, roomId }) => {
          const [hour, minute] = arrivalTime.split(':').map(Number);
          return { start: (hour ?? 0) * 60 + (minute ?? 0), roomId };
        });
        minutes.forEach((place, index) => {
          for (const other of minutes.slice(0, index)) {
            expect(place.start - other.start).toBeGreaterThanOrEqual(minutesPerChild);
            if (other.roomId === place.roomId) {
              expect(place.start - other.start).toBeGreaterThanOrEqual(
                minutesPerChild + closureMinutes,
              );
            }
          }
        });
      }
    }
  });

  it('refuse a child that takes no time', () => {
    expect(() => placesOfMorning({ ...demo, minutesPerChild: 0 })).toThrow('more than 0');
  });
});
