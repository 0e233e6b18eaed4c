import { randomBytes } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { AcceptStaffInvitationRequest } from '../../shared/contracts/clinic-session';
import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import { record } from '../access-record/record';
import { hashPassword, passwordFault } from '../auth/passwords';
import { endSessionsOf } from '../auth/session-store';
import { hashToken } from '../auth/token-hash';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid, Problem } from '../http/problem';

/** NIST SP 800-63A: an enrolment code sent to an address on file lives 72 hours. */
const invitationHours = 72;

/** A one-use link with which a staff member chooses a password; earlier ones end. Real clock. */
export async function issueStaffInvitation(
  { db, settings }: Pick<Context, 'db' | 'settings'>,
  transaction: Transaction,
  staffId: number,
  language: ClinicLanguage = 'en',
): Promise<string> {
  const token = randomBytes(32).toString('base64url');
  const now = Date.now();
  await change(
    db,
    'UPDATE staff_invitations SET expires_at = :now WHERE staff_id = :staffId AND used_at IS NULL AND expires_at > :now',
    { now: new Date(now), staffId },
    transaction,
  );
  await db.query(
    `INSERT INTO staff_invitations (staff_id, token_hash, expires_at)
     VALUES (:staffId, :tokenHash, :expiresAt)`,
    {
      replacements: {
        staffId,
        tokenHash: hashToken(token),
        expiresAt: new Date(now + invitationHours * 3_600_000),
      },
      transaction,
    },
  );
  return `${settings.origin}/clinic/${language}/join/${token}`;
}

interface InvitationRow {
  id: number;
  staff_id: number;
  email: string;
  full_name: string;
}

/**
 * Uses the link up and sets the password. Sessions that were open end.
 * @throws Problem 410 'invitation-over' for an unknown, used or expired link, all alike; 422 for a guessable password.
 */
export async function acceptStaffInvitation(
  context: Context,
  { token, password }: AcceptStaffInvitationRequest,
): Promise<void> {
  const { db } = context;
  await inTransaction(db, async (transaction) => {
    const now = new Date();
    const [invitation] = await select<InvitationRow>(
      db,
      `SELECT i.id, i.staff_id, s.email, s.full_name FROM staff_invitations i
       JOIN staff s ON s.id = i.staff_id AND s.is_active
       WHERE i.token_hash = :tokenHash AND i.used_at IS NULL AND i.expires_at > :now FOR UPDATE`,
      { tokenHash: hashToken(token), now },
      transaction,
    );
    if (!invitation)
      throw new Problem(
        410,
        'invitation-over',
        'This invitation was used or is over. Ask your administrator for a new one.',
      );
    const fault = passwordFault(password, {
      email: invitation.email,
      fullName: invitation.full_name,
    });
    if (fault !== null) throw invalid([{ path: 'password', message: fault }]);
    const passwordHash = await hashPassword(password);
    await change(
      db,
      'UPDATE staff_invitations SET used_at = :now WHERE id = :id',
      { now, id: invitation.id },
      transaction,
    );
    await change(
      db,
      'UPDATE staff SET password_hash = :passwordHash WHERE id = :id',
      { passwordHash, id: invitation.staff_id },
      transaction,
    );
    await endSessionsOf(db, 'clinic', invitation.staff_id, transaction);
    await record(
      db,
      transaction,
      {
        side: 'clinic',
        id: invitation.staff_id,
        name: invitation.full_name,
        sessionHash: null,
        address: null,
      },
      { action: 'changed', matter: 'password', childIds: [], at: context.clock.now() },
    );
  });
}
