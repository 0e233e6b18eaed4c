import type { z } from 'zod';
import type { beginCollectionRequest, MorningChanged } from '../../shared/contracts/this-morning';
import { doorFast } from '../../shared/domain/door-check';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { changedMeanwhile, notFound, Problem } from '../http/problem';
import { isClinician } from './door-check';
import { heardAtTheDoor } from './fast-so-far';
import type { DoorCheckRow } from './morning-facts';
import { changeMorning, updateMorning, type ChangeStep } from './morning-change';

export type BeginCollection = z.output<typeof beginCollectionRequest>;

const minute = 60_000;

interface RoomUse {
  closure_minutes: number;
  is_in_use: 0 | 1;
  last_ended_at: Date | null;
}

/**
 * The child goes into a room. The nurse's door check opens this; too short a fast needs a clinician's reason on
 * that check, past the longest fast a clinician gives the reason there or here. A room whose air is not clean yet warns
 * and never blocks.
 * @throws Problem 403 'clinician-decides' when somebody else gives the reason, 409 'not-long-enough' and
 * 'longest-fast-passed' without one.
 */
export function beginCollection(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  { version, roomId, ceilingReason }: BeginCollection,
): Promise<MorningChanged> {
  return changeMorning(context, actor, staff, morningId, 'collection-begun', async (step) => {
    const { plan, now, transaction } = step;
    if (await isBegunAlready(context, step, staff, { version, roomId, ceilingReason }))
      return { isRepeated: true };
    if (plan.state !== 'here')
      throw plan.arrivedAt === null
        ? new Problem(409, 'not-here-yet', 'This child has not arrived yet.')
        : new Problem(409, 'morning-over', 'The collection of this morning has begun or is over.');
    if (ceilingReason !== null && !isClinician(staff))
      throw new Problem(
        403,
        'clinician-decides',
        'A clinician decides to go on and gives the reason.',
        { errors: [{ path: 'ceilingReason', message: 'A clinician gives this reason.' }] },
      );
    const check = await lastDoorCheck(context, step);
    refuseUnlessOpen(step, check, ceilingReason);
    const warnings = await roomWarnings(context, step, roomId);
    await updateMorning(context.db, step, version, { state: 'collecting' });
    await context.db.query(
      `INSERT INTO collections (morning_id, room_id, begun_at, begun_by_staff_id, ceiling_reason)
       VALUES (:morningId, :roomId, :now, :staffId, :ceilingReason)`,
      {
        replacements: {
          morningId,
          roomId,
          ceilingReason,
          now: new Date(now),
          staffId: staff.id,
        },
        transaction,
      },
    );
    await context.db.query(
      `UPDATE series SET state = 'collecting', version = version + 1 WHERE id = :seriesId AND state = 'planned'`,
      { replacements: { seriesId: plan.seriesId }, transaction },
    );
    if (check?.verdict === 'cannot-tell')
      warnings.push(step.words.text('clinic.warning.cannot-tell'));
    return { warnings, detail: ceilingReason === null ? { roomId } : { roomId, ceilingReason } };
  });
}

async function isBegunAlready(
  context: Context,
  { plan, transaction }: ChangeStep,
  staff: StaffMember,
  { version, roomId }: BeginCollection,
): Promise<boolean> {
  const [begun] = await select<{ room_id: number; begun_by_staff_id: number }>(
    context.db,
    'SELECT room_id, begun_by_staff_id FROM collections WHERE morning_id = :morningId AND ended_at IS NULL',
    { morningId: plan.morningId },
    transaction,
  );
  if (!begun) return false;
  const isSame =
    begun.room_id === roomId &&
    begun.begun_by_staff_id === staff.id &&
    plan.version === version + 1;
  if (!isSame) throw changedMeanwhile();
  return true;
}

async function lastDoorCheck(
  context: Context,
  { plan, transaction }: ChangeStep,
): Promise<DoorCheckRow | null> {
  const [check] = await select<DoorCheckRow>(
    context.db,
    'SELECT * FROM door_checks WHERE morning_id = :morningId ORDER BY id DESC LIMIT 1',
    { morningId: plan.morningId },
    transaction,
  );
  return check ?? null;
}

function refuseUnlessOpen(
  { plan, now, words }: ChangeStep,
  check: DoorCheckRow | null,
  ceilingReason: string | null,
): void {
  if (!check || (plan.fedAt !== null && check.checked_at.getTime() <= plan.fedAt))
    throw new Problem(409, 'door-check-first', 'Check at the door first.');
  const at = (instant: number) =>
    doorFast({ ...heardAtTheDoor(check), plan: plan.plan, now: instant });
  const { readyAt, ceiling } = at(now);
  if (readyAt !== null && readyAt > now && check.go_on_reason === null)
    throw new Problem(
      409,
      'not-long-enough',
      `Not fasted long enough until ${words.clock(readyAt, plan.zone)}. A clinician decides to go on and gives the reason.`,
      { readyAt: new Date(readyAt).toISOString() },
    );
  if (ceiling !== 'feed' || ceilingReason !== null) return;
  // A reason given while hunger pressed was given for this; one for too short a fast was not.
  const knewOfCeiling = at(check.checked_at.getTime()).ceiling !== 'ok';
  if (check.go_on_reason === null || !knewOfCeiling)
    throw new Problem(
      409,
      'longest-fast-passed',
      'The longest fast has passed: feed the child. A clinician decides to go on and gives the reason.',
    );
}

/** @throws Problem 404 for a room of another site, 409 while another child is inside. */
async function roomWarnings(
  context: Context,
  { plan, now, transaction, words }: ChangeStep,
  roomId: number,
): Promise<string[]> {
  // Locks the room, so that two children do not begin in it at once.
  const [room] = await select<{ id: number }>(
    context.db,
    'SELECT id FROM rooms WHERE id = :roomId AND site_id = :siteId FOR UPDATE',
    { roomId, siteId: plan.siteId },
    transaction,
  );
  if (!room) throw notFound('This room');
  const [use] = await select<RoomUse>(
    context.db,
    `SELECT rooms.closure_minutes, COALESCE(MAX(collections.id IS NOT NULL AND collections.ended_at IS NULL), 0) AS is_in_use,
       MAX(collections.ended_at) AS last_ended_at
     FROM rooms
       LEFT JOIN collections ON collections.room_id = rooms.id AND collections.begun_at > :yesterday
     WHERE rooms.id = :roomId GROUP BY rooms.id`,
    { roomId, yesterday: new Date(now - 24 * 60 * minute) },
    transaction,
  );
  if (!use) throw notFound('This room');
  if (Number(use.is_in_use) === 1)
    throw new Problem(409, 'room-in-use', 'Another child is in this room.');
  const opensAt =
    use.last_ended_at === null ? 0 : use.last_ended_at.getTime() + use.closure_minutes * minute;
  if (opensAt <= now) return [];
  return [words.text('clinic.warning.room-closed', { at: words.clock(opensAt, plan.zone) })];
}
