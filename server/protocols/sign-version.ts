import type { Transaction } from 'sequelize';
import type { FieldProblem, SignVersionRequest } from '../../shared/contracts/protocols';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { checkPasswordAgain } from '../auth/password-again';
import type { Context } from '../context';
import { change, inTransaction } from '../database/connection';
import { Problem } from '../http/problem';
import { announce } from '../live/announce';
import { lockedDraft, recordChange, type Kind, type VersionRow } from './versions';

export interface Signing {
  readonly kind: Kind;
  /** What must be mended first. */
  readonly problems: (row: VersionRow) => FieldProblem[];
  /** What follows in the same transaction. */
  readonly after: (transaction: Transaction, row: VersionRow) => Promise<void>;
}

/**
 * Signs a draft, with the password entered again. From its day on it takes over, also for mornings that are planned
 * already; nothing changes it any more.
 * @throws Problem 404; 409 'already-signed', 'changed-meanwhile'; 422 with the field to mend, or for a wrong password.
 */
export async function signVersion(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
  { draftVersion, password }: SignVersionRequest,
  { kind, problems, after }: Signing,
): Promise<void> {
  await checkPasswordAgain(context, staff, password);
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    const row = await lockedDraft(context, transaction, kind, staff.siteId, { id, draftVersion });
    const errors = problems(row);
    if (errors.length > 0)
      throw new Problem(422, 'not-ready', 'This version cannot be signed yet.', { errors });
    await change(
      db,
      `UPDATE ${kind.table} SET signed_by_staff_id = :staffId, signed_at = :now
         ${kind.table === 'fasting_protocols' ? ', has_starting_values = FALSE' : ''}
       WHERE id = :id AND signed_at IS NULL`,
      { id, staffId: staff.id, now: new Date(clock.now()) },
      transaction,
    );
    await recordChange(context, transaction, kind, actor, id, 'signed');
    await after(transaction, row);
    await announce(db, transaction, 'mornings');
  });
}
