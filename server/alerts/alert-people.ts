import type { Sequelize, Transaction } from 'sequelize';
import { onCallChain, type OnCallTurn } from '../../shared/domain/on-call';
import { localPartsOf } from '../../shared/domain/zone';
import type { Weekday } from '../../shared/domain/day';
import { select } from '../database/connection';
import { localTimeOfColumn } from '../sites/sites';

/** A member of the staff as alerts reach them. */
export interface AlertPerson {
  readonly id: number;
  readonly fullName: string;
  readonly email: string;
  readonly phone: string | null;
  readonly byText: boolean;
  readonly byMail: boolean;
  readonly language: string;
}

/** The on-call list of a site, in its order. */
export async function turnsOf(
  db: Sequelize,
  siteId: number,
  transaction?: Transaction,
): Promise<OnCallTurn[]> {
  const rows = await select<{
    staff_id: number;
    deputy_staff_id: number | null;
    weekdays: Weekday[];
    from_time: string;
    until_time: string;
    from_on: string;
    until_on: string | null;
  }>(
    db,
    'SELECT * FROM on_call_turns WHERE site_id = :siteId ORDER BY id',
    { siteId },
    transaction,
  );
  return rows.map((row) => ({
    staffId: row.staff_id,
    deputyId: row.deputy_staff_id,
    weekdays: row.weekdays,
    from: localTimeOfColumn(row.from_time),
    until: localTimeOfColumn(row.until_time),
    fromOn: row.from_on,
    untilOn: row.until_on,
  }));
}

/** Everybody with an account that is in use. */
export async function activeStaff(
  db: Sequelize,
  transaction?: Transaction,
): Promise<(AlertPerson & { readonly roles: readonly string[] })[]> {
  const rows = await select<{
    id: number;
    full_name: string;
    email: string;
    phone: string | null;
    alerts_by_text: 0 | 1;
    alerts_by_mail: 0 | 1;
    alerts_language: string;
    roles: string | null;
  }>(
    db,
    `SELECT id, full_name, email, phone, alerts_by_text, alerts_by_mail, alerts_language,
       (SELECT GROUP_CONCAT(role) FROM staff_roles WHERE staff_id = staff.id) AS roles
     FROM staff WHERE is_active ORDER BY full_name, id`,
    {},
    transaction,
  );
  return rows.map((row) => ({
    id: row.id,
    fullName: row.full_name,
    email: row.email,
    phone: row.phone,
    byText: row.alerts_by_text === 1,
    byMail: row.alerts_by_mail === 1,
    language: row.alerts_language,
    roles: row.roles?.split(',') ?? [],
  }));
}

/** Who hears of it when a site has no on-call list, the first of these roles that somebody holds. */
const insteadOfList = ['lead-clinician', 'clinician', 'administrator'] as const;

/** Whom to tell at this instant, in order; empty only where nobody with an account could act. */
export async function peopleToTell(
  db: Sequelize,
  site: { readonly id: number; readonly zone: string },
  now: number,
  transaction?: Transaction,
): Promise<AlertPerson[]> {
  const { on, time } = localPartsOf(now, site.zone);
  const chain = onCallChain(await turnsOf(db, site.id, transaction), { on, time });
  const staff = await activeStaff(db, transaction);
  const listed = chain.flatMap((id) => staff.find((one) => one.id === id) ?? []);
  if (listed.length > 0) return listed;
  const role = insteadOfList.find((one) => staff.some(({ roles }) => roles.includes(one)));
  return staff.filter(({ roles }) => role !== undefined && roles.includes(role));
}
