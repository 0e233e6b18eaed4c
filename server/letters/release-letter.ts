import type { Transaction } from 'sequelize';
import type { LetterSigned } from '../../shared/contracts/letters';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { tellLetterWaits } from '../messages/letter-waiting';
import { currentResultIds } from '../results/current-results';

export const sameIds = (a: readonly number[], b: readonly number[]): boolean =>
  [...a].sort((x, y) => x - y).join() === [...b].sort((x, y) => x - y).join();

export async function releaseIn(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  staff: StaffMember,
  letterId: number,
  childId: number,
): Promise<void> {
  const now = context.clock.now();
  const touched = await change(
    context.db,
    `UPDATE letters SET state = 'released', released_at = :now, released_by_staff_id = :staffId, version = version + 1
     WHERE id = :letterId AND state = 'signed'`,
    { letterId, staffId: staff.id, now: new Date(now) },
    transaction,
  );
  if (touched === 0) return;
  await tellLetterWaits(context, transaction, letterId);
  await record(context.db, transaction, actor, {
    action: 'changed',
    matter: 'letter-released',
    childIds: [childId],
    detail: { letterId },
    at: now,
  });
}

interface SignedLetter {
  readonly child_id: number;
  readonly series_id: number;
  readonly state: string;
  readonly choice: { readonly results: readonly number[] };
}

/**
 * Releases a signed letter to the family; releasing twice tells the family once.
 * @throws Problem 404; 409 'results-changed' when a result came or was corrected after the signature: what was signed is
 * no longer what the results say, and nothing positive is told by a letter first.
 */
export async function releaseLetter(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  letterId: number,
): Promise<LetterSigned> {
  return inTransaction(context.db, async (transaction) => {
    // The series is held, as by whoever enters a result, so that none arrives between the look and the release.
    const [letter] = await select<SignedLetter>(
      context.db,
      `SELECT letters.child_id, letters.series_id, letters.state, letters.choice
       FROM letters JOIN series ON series.id = letters.series_id
       WHERE letters.id = :letterId AND series.site_id = :siteId FOR UPDATE`,
      { letterId, siteId: staff.siteId },
      transaction,
    );
    if (!letter || letter.state === 'withdrawn') throw notFound('This letter');
    if (letter.state === 'signed') {
      const now = await currentResultIds(context.db, letter.series_id, transaction);
      if (!sameIds(letter.choice.results, now))
        throw new Problem(
          409,
          'results-changed',
          'A result has changed since this letter was signed. Read the results and sign a new letter.',
        );
    }
    await releaseIn(context, transaction, actor, staff, letterId, letter.child_id);
    await announce(context.db, transaction, 'letters', letterId);
    return { letterId, state: 'released' };
  });
}
