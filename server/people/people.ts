import { QueryTypes, UniqueConstraintError } from 'sequelize';
import type { Sequelize, Transaction } from 'sequelize';
import type { z } from 'zod';
import type {
  AddStaffAnswer,
  addStaffRequest,
  ChangeRolesRequest,
  StaffList,
} from '../../shared/contracts/clinic-session';
import { isStaffRole } from '../../shared/access/rights';
import { record } from '../access-record/record';
import type { Actor } from '../access-record/record';
import { endSessionsOf } from '../auth/session-store';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid, notFound, Problem } from '../http/problem';
import { mailStaffInvitation } from './invitation-mail';
import { issueStaffInvitation } from './staff-invitations';

type StaffPerson = StaffList['staff'][number];

interface StaffRow {
  id: number;
  full_name: string;
  credentials: string | null;
  email: string;
  roles: string | null;
  is_active: number;
  has_password: number;
}

async function staffRows(
  db: Sequelize,
  staffId?: number,
  transaction?: Transaction,
): Promise<StaffPerson[]> {
  const rows = await select<StaffRow>(
    db,
    `SELECT s.id, s.full_name, s.credentials, s.email, s.is_active, s.password_hash IS NOT NULL AS has_password,
       (SELECT GROUP_CONCAT(r.role ORDER BY r.role) FROM staff_roles r WHERE r.staff_id = s.id) AS roles
     FROM staff s ${staffId === undefined ? '' : 'WHERE s.id = :staffId'}
     ORDER BY s.is_active DESC, s.full_name, s.id`,
    { staffId },
    transaction,
  );
  return rows.map((row) => ({
    id: row.id,
    fullName: row.full_name,
    credentials: row.credentials,
    email: row.email,
    roles: row.roles?.split(',') ?? [],
    isActive: Number(row.is_active) === 1,
    hasPassword: Number(row.has_password) === 1,
  }));
}

async function staffPerson(
  db: Sequelize,
  staffId: number,
  transaction?: Transaction,
): Promise<StaffPerson> {
  const [person] = await staffRows(db, staffId, transaction);
  if (!person) throw notFound('This person');
  return person;
}

export async function listStaff({ db }: Context): Promise<StaffList> {
  return { staff: await staffRows(db) };
}

function checkRoles(roles: readonly string[]): void {
  const errors = roles.flatMap((role, index) =>
    isStaffRole(role) ? [] : [{ path: `roles.${index}`, message: 'There is no such role.' }],
  );
  if (errors.length > 0) throw invalid(errors);
}

async function putRoles(
  db: Sequelize,
  transaction: Transaction,
  staffId: number,
  roles: readonly string[],
): Promise<void> {
  await change(db, 'DELETE FROM staff_roles WHERE staff_id = :staffId', { staffId }, transaction);
  for (const role of new Set(roles))
    await db.query('INSERT INTO staff_roles (staff_id, role) VALUES (:staffId, :role)', {
      replacements: { staffId, role },
      transaction,
    });
}

/** @throws UniqueConstraintError when the e-mail belongs to somebody already. */
export async function insertStaff(
  context: Context,
  transaction: Transaction,
  person: z.output<typeof addStaffRequest>,
): Promise<number> {
  const [id] = await context.db.query(
    `INSERT INTO staff (full_name, credentials, email, is_active, created_at)
     VALUES (:fullName, :credentials, :email, TRUE, :now)`,
    {
      replacements: {
        fullName: person.fullName,
        credentials: person.credentials,
        email: person.email,
        now: new Date(context.clock.now()),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  await putRoles(context.db, transaction, Number(id), person.roles);
  return Number(id);
}

/**
 * Adds a staff member without a password; the one-use link goes by e-mail and is answered once.
 * @throws Problem 422 at 'email' when somebody has this e-mail, at 'roles.N' for an unknown role.
 */
export async function addStaff(
  context: Context,
  actor: Actor,
  { language }: Pick<StaffMember, 'language'>,
  request: z.output<typeof addStaffRequest>,
): Promise<AddStaffAnswer> {
  checkRoles(request.roles);
  const { db } = context;
  try {
    return await inTransaction(db, async (transaction) => {
      const id = await insertStaff(context, transaction, request);
      const invitationLink = await issueStaffInvitation(context, transaction, id, language);
      await mailStaffInvitation(context, transaction, {
        staffId: id,
        ...request,
        invitationLink,
        language,
      });
      await recordChange(context, transaction, actor, { staffId: id, roles: request.roles });
      return { staff: await staffPerson(db, id, transaction), invitationLink };
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError)
      throw invalid([{ path: 'email', message: 'Somebody has this e-mail address already.' }]);
    throw error;
  }
}

/**
 * Gives a staff member these roles and no others; sessions end, so that the new rights hold at once.
 * @throws Problem 409 'last-administrator' when nobody could manage people any more.
 */
export function changeRoles(
  context: Context,
  actor: Actor,
  staffId: number,
  { roles }: ChangeRolesRequest,
): Promise<StaffPerson> {
  checkRoles(roles);
  return inTransaction(context.db, async (transaction) => {
    await staffPerson(context.db, staffId, transaction);
    if (!roles.includes('administrator')) await keepAnAdministrator(context, transaction, staffId);
    await putRoles(context.db, transaction, staffId, roles);
    await endSessionsOf(context.db, 'clinic', staffId, transaction);
    await recordChange(context, transaction, actor, { staffId, roles });
    return staffPerson(context.db, staffId, transaction);
  });
}

/** Ends an account: no sign-in, no session, no open invitation. The name stays on the record. */
export function deactivateStaff(
  context: Context,
  actor: Actor,
  staffId: number,
): Promise<StaffPerson> {
  if (actor.id === staffId)
    throw new Problem(409, 'own-account', 'Another administrator ends your account.');
  const { db } = context;
  return inTransaction(db, async (transaction) => {
    await staffPerson(db, staffId, transaction);
    await keepAnAdministrator(context, transaction, staffId);
    await change(
      db,
      'UPDATE staff SET is_active = FALSE WHERE id = :staffId',
      { staffId },
      transaction,
    );
    await endSessionsOf(db, 'clinic', staffId, transaction);
    await recordChange(context, transaction, actor, { staffId, isActive: false });
    return staffPerson(db, staffId, transaction);
  });
}

async function keepAnAdministrator(
  { db }: Context,
  transaction: Transaction,
  staffId: number,
): Promise<void> {
  const others = await select<{ id: number }>(
    db,
    `SELECT s.id FROM staff s JOIN staff_roles r ON r.staff_id = s.id AND r.role = 'administrator'
     WHERE s.is_active FOR UPDATE`,
    {},
    transaction,
  );
  const isOne = others.some(({ id }) => id === staffId);
  if (isOne && others.length === 1)
    throw new Problem(409, 'last-administrator', 'This is the last administrator.');
}

function recordChange(
  { db, clock }: Context,
  transaction: Transaction,
  actor: Actor,
  detail: Readonly<Record<string, unknown>>,
): Promise<void> {
  return record(db, transaction, actor, {
    action: 'changed',
    matter: 'people',
    childIds: [],
    detail,
    at: clock.now(),
  });
}
