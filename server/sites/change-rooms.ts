import { QueryTypes } from 'sequelize';
import type { AddRoomRequest, RoomClosure, SaveRoomRequest } from '../../shared/contracts/set-up';
import type { Day } from '../../shared/domain/day';
import { closureMinutesOf } from '../../shared/domain/room-closure';
import { record, type Actor } from '../access-record/record';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, invalid, notFound } from '../http/problem';
import { siteOf } from './sites';

/** The columns of a closure: the minutes always, what they were computed from where they were. */
const valuesOf = (closure: RoomClosure): Record<string, number | null> =>
  closure.by === 'minutes'
    ? { closureMinutes: closure.minutes, airChangesPerHour: null, clearedPercent: null }
    : {
        closureMinutes: closureMinutesOf(closure),
        airChangesPerHour: closure.airChangesPerHour,
        clearedPercent: closure.clearedPercent,
      };

export async function addRoom(
  { db, clock }: Context,
  actor: Actor,
  { siteId, name, closure, submissionKey }: AddRoomRequest,
): Promise<number> {
  const now = clock.now();
  const added = await addOnce(
    db,
    { matter: 'room', key: submissionKey, at: now },
    async (transaction) => {
      await siteOf(db, siteId, transaction);
      const [roomId] = await db.query(
        `INSERT INTO rooms (site_id, name, closure_minutes, air_changes_per_hour, cleared_percent)
         VALUES (:siteId, :name, :closureMinutes, :airChangesPerHour, :clearedPercent)`,
        {
          type: QueryTypes.INSERT,
          replacements: { siteId, name, ...valuesOf(closure) },
          transaction,
        },
      );
      await record(db, transaction, actor, {
        action: 'changed',
        matter: 'room-added',
        childIds: [],
        detail: { siteId, roomId: Number(roomId), name, ...valuesOf(closure) },
        at: now,
      });
      return Number(roomId);
    },
  );
  return added.id;
}

/**
 * Changes a room. A room with mornings to come stays in use; a longer closure holds for what is planned from now on.
 * @returns its site. @throws Problem 404, 409 'changed-meanwhile', 422 'isInUse'
 */
export async function saveRoom(
  { db, clock }: Context,
  actor: Actor,
  roomId: number,
  { name, closure, isInUse, version }: SaveRoomRequest,
): Promise<number> {
  return inTransaction(db, async (transaction) => {
    const [room] = await select<{ siteId: number }>(
      db,
      'SELECT site_id AS siteId FROM rooms WHERE id = :roomId FOR UPDATE',
      { roomId },
      transaction,
    );
    if (!room) throw notFound('This room');
    const [held] = await select<{ last: Day | null }>(
      db,
      `SELECT MAX(planned_on) AS last FROM mornings
       WHERE room_id = :roomId AND state IN ('planned', 'here', 'collecting') AND arrival_at > :now`,
      { roomId, now: new Date(clock.now()) },
      transaction,
    );
    if (!isInUse && held?.last)
      throw invalid([
        {
          path: 'isInUse',
          message: 'Mornings are planned in this room. It stays in use until they are over.',
        },
      ]);
    const kept = await change(
      db,
      `UPDATE rooms SET name = :name, closure_minutes = :closureMinutes, is_in_use = :isInUse,
         air_changes_per_hour = :airChangesPerHour, cleared_percent = :clearedPercent, version = version + 1
       WHERE id = :roomId AND version = :version`,
      { roomId, name, isInUse, version, ...valuesOf(closure) },
      transaction,
    );
    if (kept === 0) throw changedMeanwhile();
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'room',
      childIds: [],
      detail: { roomId, name, isInUse, ...valuesOf(closure) },
      at: clock.now(),
    });
    return room.siteId;
  });
}
