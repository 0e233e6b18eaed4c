import { parseArgs } from 'node:util';
import type { Transaction } from 'sequelize';
import { addStaffRequest } from '../../shared/contracts/clinic-session';
import { record, systemActor } from '../access-record/record';
import type { Context } from '../context';
import { readSettings, SettingsError } from '../config/settings';
import { inTransaction, select } from '../database/connection';
import { openContext } from '../open-context';
import { firstSiteFaults, insertFirstSite } from '../sites/first-site';
import type { FirstSite } from '../sites/first-site';
import { insertStaff } from './people';
import { issueStaffInvitation } from './staff-invitations';

/** Why no administrator was made, in words for the person at the terminal. */
export class Refused extends Error {}

/**
 * Makes the first administrator, and the first site of an installation that has none, and answers the one-use link with which a password is chosen. There is no default
 * account and no default password.
 * @throws Refused when there is an administrator already, when name or e-mail cannot be used, or when a site is missing
 *   and nothing is said about it.
 */
export async function makeFirstAdministrator(
  context: Context,
  person: { readonly fullName: string; readonly email: string },
  clinic: FirstSite | null = null,
): Promise<string> {
  const parsed = addStaffRequest.safeParse({ ...person, roles: ['administrator'] });
  if (!parsed.success)
    throw new Refused(
      parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).join('\n'),
    );
  const { db } = context;
  return inTransaction(db, async (transaction) => {
    const [existing] = await select<{ id: number }>(
      db,
      `SELECT s.id FROM staff s JOIN staff_roles r ON r.staff_id = s.id
       WHERE r.role = 'administrator' AND s.is_active LIMIT 1 FOR UPDATE`,
      {},
      transaction,
    );
    if (existing)
      throw new Refused(
        'There is an administrator already. Administrators add people under "People".',
      );
    await makeSite(context, transaction, clinic);
    const staffId = await insertStaff(context, transaction, parsed.data);
    const link = await issueStaffInvitation(context, transaction, staffId);
    await record(db, transaction, systemActor('first-administrator'), {
      action: 'changed',
      matter: 'people',
      childIds: [],
      detail: { staffId, roles: ['administrator'] },
      at: context.clock.now(),
    });
    return link;
  });
}

async function makeSite(
  { db }: Context,
  transaction: Transaction,
  clinic: FirstSite | null,
): Promise<void> {
  const [site] = await select<{ id: number }>(db, 'SELECT id FROM sites LIMIT 1', {}, transaction);
  if (site) return;
  const faults = clinic === null ? ['nothing is known about it'] : firstSiteFaults(clinic);
  if (clinic === null || faults.length > 0)
    throw new Refused(
      `This installation has no clinic yet (${faults.join('; ')}). Add: --clinic "Name" --zone America/Los_Angeles --phone +12065550110`,
    );
  await insertFirstSite(db, transaction, clinic);
}

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      name: { type: 'string' },
      email: { type: 'string' },
      clinic: { type: 'string' },
      zone: { type: 'string' },
      phone: { type: 'string' },
    },
  });
  if (!values.name || !values.email)
    throw new Refused(
      'Say who: npm run first-administrator -- --name "Full Name" --email name@example.org',
    );
  const context = await openContext(readSettings(process.env), 'first-administrator');
  try {
    const { name: fullName, email, clinic: name, zone, phone } = values;
    const clinic = name && zone && phone ? { name, zone, phone } : null;
    const link = await makeFirstAdministrator(context, { fullName, email }, clinic);
    process.stdout.write(
      `${values.name} is the first administrator. Within 72 hours, choose a password here (the link works once):\n${link}\n`,
    );
  } finally {
    await context.close();
  }
}

if (require.main === module)
  main().catch((error: unknown) => {
    const isPlain = error instanceof Refused || error instanceof SettingsError;
    const says = error instanceof Error ? (isPlain ? error.message : error.stack) : String(error);
    process.stderr.write(`${says}\n`);
    process.exitCode = isPlain ? 2 : 1;
  });
