import type { PauseMorningAnswer } from '../../shared/contracts/replan';
import { dayOf, instantOf } from '../../shared/domain/zone';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { raiseCall } from '../calls/calls';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { clinicWords } from '../wording/clinic-words';
import { loseOneMorning } from './lose-morning';
import { morningPlansOf } from './morning-plans';
import { insertReplan } from './replan-record';

/** In the afternoon a family knows how the child is, and the evening text is not sent yet. */
const askAgainTime = '16:00';

/**
 * The child is ill this morning: no visit, the specimens stay, the mornings after it too. In the afternoon somebody
 * asks how the child is, before the evening text for the next morning goes out.
 * @throws Problem 404; 409 'not-today', 'morning-over'
 */
export async function pauseMorning(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  reason: string,
): Promise<PauseMorningAnswer> {
  const { db, clock } = context;
  const now = clock.now();
  const words = clinicWords(staff.language);
  return inTransaction(db, async (transaction) => {
    const [plan] = await morningPlansOf(db, { morningIds: [morningId] }, transaction);
    if (!plan) throw notFound('This morning');
    const { seriesId, childId, householdId, on, zone, number } = plan;
    const isNew = await loseOneMorning(
      context,
      transaction,
      { actor, staff },
      morningId,
      reason,
      () => {
        if (on !== dayOf(now, zone))
          throw new Problem(
            409,
            'not-today',
            'Only a morning of today can be paused. Give up or move a later one.',
          );
      },
    );
    const askAt = Math.max(now, instantOf({ on, time: askAgainTime, zone }));
    const askedAgainSays = words.text('clinic.replan.asked-again', {
      time: words.clock(askAt, zone),
    });
    if (!isNew) return { askedAgainSays };
    await insertReplan(db, transaction, {
      seriesId,
      kind: 'pause',
      reason,
      before: [{ number, on, state: 'planned' }],
      after: [{ number, on, state: 'lost' }],
      staffId: staff.id,
      now,
    });
    await raiseCall(db, transaction, {
      reason: 'paused-ask-again',
      openKey: `paused-ask-again:${seriesId}:${on}`,
      householdId,
      childId,
      seriesId,
      isForClinician: false,
      urgentAt: askAt,
      now,
    });
    return { askedAgainSays };
  });
}
