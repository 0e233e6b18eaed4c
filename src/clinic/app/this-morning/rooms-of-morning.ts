import type { ThisMorning } from '../../../../shared/contracts/this-morning';
import { clockIn } from '../../../common/ui/clinic-times';
import type { LaneStretch } from '../../../common/ui/room-lane/room-lane';
import { isOnRuler, minuteOn, type RulerScale } from '../../../common/ui/ruler/ruler-scale';
import type { MarkName } from '../../../common/ui/state-mark/mark-shapes';
import { roomsNow } from './next-step';

export interface RoomLine {
  readonly id: number;
  readonly name: string;
  readonly says: string;
  readonly mark: MarkName;
  readonly stretches: readonly LaneStretch[];
  /** Who is planned in this room and has not begun, in order of arrival. */
  readonly then: string;
}

/** The drawing's width of a collection that is still to come; nothing is computed from it. */
const drawnMinutes = 13;

/** Each room on the ruler of the children: what it was used for, until when it is closed, who is planned. */
export function roomLines(sheet: ThisMorning, scale: RulerScale, now: number): RoomLine[] {
  const free = new Map(roomsNow(sheet).map((room) => [room.id, room.isFree]));
  return sheet.rooms.map((room) => {
    const rows = sheet.rows.filter((row) => row.room.id === room.id);
    const waiting = rows.filter(
      ({ state, fedAt }) => (state === 'planned' || state === 'here') && fedAt === null,
    );
    const stretches: LaneStretch[] = [];
    const add = (kind: LaneStretch['kind'], from: number, until: number): void => {
      if (!isOnRuler(scale, from)) return;
      const at = minuteOn(scale, from);
      stretches.push({ kind, at, minutes: Math.max(3, minuteOn(scale, until) - at) });
    };
    for (const { collection } of rows)
      if (collection)
        add(
          'busy',
          Date.parse(collection.begunAt),
          collection.endedAt === null ? now : Date.parse(collection.endedAt),
        );
    if (room.opensAt !== null) add('shut', lastEnd(rows) ?? now, Date.parse(room.opensAt));
    for (const { bar, arrivalAt } of waiting) {
      const at = Date.parse(bar?.likelyCollectionAt ?? arrivalAt);
      add('plan', Math.max(at, now), Math.max(at, now) + drawnMinutes * 60_000);
    }
    return {
      id: room.id,
      name: room.name,
      says: room.says,
      mark: room.opensAt !== null ? 'closed' : free.get(room.id) ? 'free' : 'busy',
      stretches,
      then: waiting
        .map(({ fullName, expectedAt, arrivalAt }) => {
          const name = fullName.split(/\s+/)[0] ?? fullName;
          return `${name} ${clockIn(expectedAt ?? arrivalAt, sheet.site.zone)}`;
        })
        .join(', '),
    };
  });
}

function lastEnd(rows: ThisMorning['rows']): number | null {
  const ends = rows.flatMap(({ collection }) =>
    collection?.endedAt ? [Date.parse(collection.endedAt)] : [],
  );
  return ends.length === 0 ? null : Math.max(...ends);
}
