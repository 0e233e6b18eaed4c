/**
 * Staggered arrival times of a morning from its rooms and pairs of staff. A pair looks after one
 * child at a time; a room stays closed after each child until its air is clean (by default 60
 * minutes: Curry International TB Center, step 1). Families therefore do not meet at the door.
 */
import { minutesOfTime, timeOfMinutes, type LocalTime } from './day';

export interface Room {
  readonly id: number;
  readonly closureMinutes: number;
}

/** One child's place in a morning. */
export interface Place {
  readonly arrivalTime: LocalTime;
  readonly roomId: number;
}

export interface PlacesRequest {
  readonly rooms: readonly Room[];
  /** Pairs of staff; two staff a child. */
  readonly staffPairs: number;
  readonly arrivalsFrom: LocalTime;
  /** Last arrival, inclusive. */
  readonly arrivalsUntil: LocalTime;
  /** How long a child keeps room and pair. */
  readonly minutesPerChild: number;
  /** The clinic's own ceiling for a morning. */
  readonly limit: number;
}

export function placesOfMorning(request: PlacesRequest): Place[] {
  const { rooms, staffPairs, minutesPerChild, limit } = request;
  if (rooms.length === 0 || staffPairs < 1) return [];
  if (!(minutesPerChild > 0)) throw new RangeError('minutesPerChild must be more than 0.');
  const from = minutesOfTime(request.arrivalsFrom);
  const until = minutesOfTime(request.arrivalsUntil);
  const pairFreeAt = Array.from({ length: staffPairs }, () => from);
  const roomFreeAt = new Map(rooms.map((room) => [room, from]));
  const places: Place[] = [];
  while (places.length < limit) {
    const pair = pairFreeAt.indexOf(Math.min(...pairFreeAt));
    const [room, roomFree] = [...roomFreeAt].reduce((best, next) =>
      next[1] < best[1] ? next : best,
    );
    const start = Math.max(pairFreeAt[pair] ?? from, roomFree);
    if (start > until) break;
    places.push({ arrivalTime: timeOfMinutes(start), roomId: room.id });
    pairFreeAt[pair] = start + minutesPerChild;
    roomFreeAt.set(room, start + minutesPerChild + room.closureMinutes);
  }
  return places;
}
