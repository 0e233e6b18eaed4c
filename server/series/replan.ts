import type { z } from 'zod';
import type { ReplanChange, ReplanOutcome, replanRequest } from '../../shared/contracts/replan';
import type { WillHear } from '../../shared/contracts/series';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { changedMeanwhile, Problem } from '../http/problem';
import { clinicWords } from '../wording/clinic-words';
import { applyReplan } from './apply-replan';
import { waitingFor } from './family-will-hear';
import { placeTaken } from './morning-rows';
import { mayChoose, replanFor } from './replan-proposals';
import { childrenAfter, consequencesOf } from './replan-says';
import { seriesToReplan } from './series-to-replan';

/** Carries what a change would make out of the transaction that is then undone. */
class Undone extends Error {
  constructor(readonly outcome: ReplanOutcome) {
    super('Looked at, not kept');
  }
}

/**
 * What a change would make of the series and what the family would hear. It is made and undone in one transaction, so
 * that what is shown is what will be.
 * @throws Problem like `replanSeries`
 */
export async function previewReplan(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  asked: ReplanChange,
): Promise<ReplanOutcome> {
  const { db, clock } = context;
  try {
    await inTransaction(db, async (transaction) => {
      throw new Undone(await outcomeOf(context, { actor, staff, transaction }, asked, ''));
    });
    throw new Error('A preview is always undone');
  } catch (error) {
    if (!(error instanceof Undone)) throw await withNextReplan(context, staff, asked, error);
    await record(db, undefined, actor, {
      action: 'seen',
      matter: 'replan-preview',
      childIds: error.outcome.children.map(({ childId }) => childId),
      at: clock.now(),
    });
    return error.outcome;
  }
}

/**
 * Changes the mornings of a series: a clinician chooses what becomes of missing ones; whoever plans may move planned
 * ones.
 * @throws Problem 403 'clinician-chooses'; 409 'changed-meanwhile', 'series-closed', 'morning-over'; 'place-taken',
 *   'day-refused' with the next `replan`; 422
 */
export async function replanSeries(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  { reason, versions, ...asked }: z.output<typeof replanRequest>,
): Promise<ReplanOutcome> {
  if (asked.kind !== 'move' && !mayChoose(staff))
    throw new Problem(
      403,
      'clinician-chooses',
      'A clinician chooses what becomes of a series after a lost morning.',
    );
  try {
    return await inTransaction(context.db, async (transaction) => {
      const series = await seriesToReplan(context.db, staff, asked.seriesIds, transaction);
      const isSame = series.every(({ seriesId, version }) =>
        versions.some((one) => one.seriesId === seriesId && one.version === version),
      );
      if (!isSame) throw changedMeanwhile();
      return outcomeOf(context, { actor, staff, transaction }, asked, reason);
    });
  } catch (error) {
    throw await withNextReplan(context, staff, asked, error);
  }
}

async function outcomeOf(
  context: Context,
  by: {
    readonly actor: Actor;
    readonly staff: StaffMember;
    readonly transaction: Parameters<typeof applyReplan>[1];
  },
  asked: ReplanChange,
  reason: string,
): Promise<ReplanOutcome> {
  const { db, clock } = context;
  const { staff, transaction } = by;
  const words = clinicWords(staff.language);
  const [first] = await seriesToReplan(db, staff, asked.seriesIds, transaction);
  const heard = () => waitingFor(db, transaction, words, first.householdId, clock.now());
  const before = await heard();
  const { all, search } = await applyReplan(context, transaction, by, asked, reason);
  const after = await heard();
  return {
    children: childrenAfter(all),
    consequences: consequencesOf(words, asked.kind, all, search.longestGapDays),
    familyWillHear: without(after, before),
    familyWillNotHear: without(before, after),
  };
}

const without = (
  rows: readonly (WillHear[number] & { readonly key: string })[],
  others: readonly { readonly key: string }[],
): WillHear => {
  const known = new Set(others.map(({ key }) => key));
  return rows.filter(({ key }) => !known.has(key)).map(({ at, says }) => ({ at, says }));
};

/** Who came second gets the places that are left together with the answer. */
async function withNextReplan(
  context: Context,
  staff: StaffMember,
  { seriesIds, movedMorningIds }: ReplanChange,
  error: unknown,
): Promise<unknown> {
  const problem = placeTaken(error) ?? error;
  if (!(problem instanceof Problem) || !['place-taken', 'day-refused'].includes(problem.code))
    return problem;
  const replan = await replanFor(context, staff, {
    seriesIds,
    movedMorningIds,
    weeks: 4,
    siblingsMayPart: false,
  });
  return new Problem(problem.status, problem.code, problem.title, { ...problem.more, replan });
}
