import { select } from '../database/connection';
import type { Context } from '../context';
import { invalid } from '../http/problem';
import type { StaffMember } from './current-user';
import { verifyPassword } from './passwords';

/** Signing asks for the password once more. @throws Problem 422 beside the field 'password'. */
export async function checkPasswordAgain(
  { db }: Context,
  staff: StaffMember,
  password: string,
): Promise<void> {
  const [row] = await select<{ password_hash: string | null }>(
    db,
    'SELECT password_hash FROM staff WHERE id = :id',
    { id: staff.id },
  );
  if (!(await verifyPassword(row?.password_hash ?? null, password)))
    throw invalid([{ path: 'password', message: 'This is not your password.' }]);
}
