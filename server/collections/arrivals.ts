import type { FeedRequest, MorningChanged } from '../../shared/contracts/this-morning';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { closeUnansweredCall } from '../fasting/family-calls';
import type { Context } from '../context';
import { Problem } from '../http/problem';
import { changeMorning, updateMorning } from './morning-change';

/** The child is at the door. A second tap changes nothing. */
export function noteArrival(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  { version }: { version: number },
): Promise<MorningChanged> {
  return changeMorning(context, actor, staff, morningId, 'arrival', async (step) => {
    if (step.plan.arrivedAt !== null) return { isRepeated: true };
    if (step.plan.state !== 'planned')
      throw new Problem(409, 'morning-over', 'This morning is over. Plan a new one.');
    await updateMorning(context.db, step, version, {
      state: 'here',
      arrived_at: new Date(step.now),
    });
    await closeUnansweredCall(context.db, step.transaction, step.plan, step.now);
    return {};
  });
}

/** Fed, or gone home. Fed before the collection ends the fast: the door is checked again before any "begin". */
export function noteFeeding(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  { version, event }: FeedRequest,
): Promise<MorningChanged> {
  return changeMorning(context, actor, staff, morningId, event, async (step) => {
    const { plan } = step;
    const already = event === 'fed' ? plan.fedAt : plan.leftAt;
    if (already !== null) return { isRepeated: true };
    if (plan.arrivedAt === null)
      throw new Problem(409, 'not-here-yet', 'This child has not arrived yet.');
    if (plan.state === 'collecting')
      throw new Problem(409, 'collection-runs', 'A collection runs. End it first.');
    await updateMorning(context.db, step, version, {
      [event === 'fed' ? 'fed_at' : 'left_at']: new Date(step.now),
    });
    const isBefore = event === 'fed' && plan.state === 'here';
    return {
      warnings: isBefore ? [step.words.text('clinic.warning.fed-before')] : [],
    };
  });
}
