import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import type { Day } from '../../shared/domain/day';
import {
  protocolDefaults,
  type FastingBand,
  type FastingProtocol,
} from '../../shared/domain/fasting-protocol';
import { profileDefaults, type LaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { dayOf } from '../../shared/domain/zone';

export interface StoredProtocol extends FastingProtocol {
  readonly id: number;
  readonly siteId: number;
  readonly signedAt: number | null;
  /** Whose hours these are, as every screen with hours shows it. */
  readonly says: string;
}

export interface StoredProfile extends LaboratoryProfile {
  readonly id: number;
  readonly siteId: number;
  readonly signedAt: number | null;
  readonly says: string;
}

/** What the `body` column of a fasting protocol holds. */
export type ProtocolBody = Pick<
  FastingProtocol,
  | 'usualWaitMinutes'
  | 'eatAgainAfterMinutes'
  | 'allowedItems'
  | 'individualPlanCautions'
  | 'wakeToCollectionMinutes'
  | 'bands'
>;
/** What the `body` column of a laboratory profile holds. */
export type ProfileBody = Omit<
  LaboratoryProfile,
  'version' | 'name' | 'effectiveOn' | 'signedBy' | 'signedOn'
>;

interface SignedRow<Body> {
  id: number;
  site_id: number;
  short_name: string;
  zone: string;
  version: number;
  effective_on: Day;
  body: Body;
  signed_by: string | null;
  signed_at: Date | null;
}

type ProtocolRow = SignedRow<StoredProtocolBody> & { title: string; has_starting_values: 0 | 1 };
type ProfileRow = SignedRow<StoredProfileBody> & { name: string };

const signedFrom = (table: string): string =>
  `SELECT signed.*, sites.short_name, sites.zone, staff.full_name AS signed_by
   FROM ${table} signed
   JOIN sites ON sites.id = signed.site_id
   LEFT JOIN staff ON staff.id = signed.signed_by_staff_id`;

/** Of the signed versions whose day has come, the newest. */
const inForce = `WHERE signed.site_id = :siteId AND signed.effective_on <= :on AND signed.signed_at IS NOT NULL
   ORDER BY signed.version DESC LIMIT 1`;

/**
 * SQL for the id of the version in force on a day, as `inForce` says it: a version that is signed later takes over on
 * its day, also for mornings planned before. Before any is in force, what the series was planned with holds.
 */
export const idInForce = (
  table: 'fasting_protocols' | 'laboratory_profiles',
  {
    siteId,
    on,
    otherwise,
  }: { readonly siteId: string; readonly on: string; readonly otherwise: string },
): string =>
  `COALESCE((SELECT in_force.id FROM ${table} in_force
     WHERE in_force.site_id = ${siteId} AND in_force.effective_on <= ${on} AND in_force.signed_at IS NOT NULL
     ORDER BY in_force.version DESC LIMIT 1), ${otherwise})`;

export async function laboratoryProfileOf(
  db: Sequelize,
  id: number,
  transaction?: Transaction,
): Promise<StoredProfile> {
  const [profile] = await profilesWhere(db, 'WHERE signed.id = :id', { id }, transaction);
  if (!profile) throw notFound('This laboratory profile');
  return profile;
}

/**
 * The signed protocol in force on a day.
 * @throws Problem 409 'no-signed-protocol' when no clinician has signed one that is in force by then.
 */
export async function currentProtocol(
  db: Sequelize,
  siteId: number,
  on: Day,
  transaction?: Transaction,
): Promise<StoredProtocol> {
  const [protocol] = await protocolsWhere(db, inForce, { siteId, on }, transaction);
  if (!protocol)
    throw new Problem(
      409,
      'no-signed-protocol',
      'No fasting protocol is signed for that day. A clinician signs one before mornings are planned.',
    );
  return protocol;
}

/**
 * The signed laboratory profile in force on a day.
 * @throws Problem 409 'no-signed-profile'
 */
export async function currentProfile(
  db: Sequelize,
  siteId: number,
  on: Day,
  transaction?: Transaction,
): Promise<StoredProfile> {
  const [profile] = await profilesWhere(db, inForce, { siteId, on }, transaction);
  if (!profile)
    throw new Problem(
      409,
      'no-signed-profile',
      'No laboratory profile is signed for that day. A clinician signs one before mornings are planned.',
    );
  return profile;
}

/** Every version of a site, the newest first. */
export const protocolsOfSite = (db: Sequelize, siteId: number): Promise<StoredProtocol[]> =>
  protocolsWhere(db, 'WHERE signed.site_id = :siteId ORDER BY signed.version DESC', { siteId });

export const profilesOfSite = (db: Sequelize, siteId: number): Promise<StoredProfile[]> =>
  profilesWhere(db, 'WHERE signed.site_id = :siteId ORDER BY signed.version DESC', { siteId });

export const protocolsByIds = async (
  db: Sequelize,
  ids: readonly number[],
  transaction?: Transaction,
): Promise<StoredProtocol[]> =>
  ids.length === 0
    ? []
    : protocolsWhere(db, 'WHERE signed.id IN (:ids)', { ids: [...new Set(ids)] }, transaction);

async function protocolsWhere(
  db: Sequelize,
  where: string,
  replacements: Record<string, unknown>,
  transaction?: Transaction,
): Promise<StoredProtocol[]> {
  const rows = await select<ProtocolRow>(
    db,
    `${signedFrom('fasting_protocols')} ${where}`,
    replacements,
    transaction,
  );
  return rows.map((row) => {
    const hasStartingValues = row.has_starting_values === 1;
    return {
      ...wholeProtocolBody(row.body),
      ...signatureOf(row),
      title: row.title,
      isStartingValues: hasStartingValues,
      says:
        `${row.short_name} fasting protocol, version ${row.version}.` +
        (hasStartingValues ? ' Starting values, to be confirmed by the clinic.' : ''),
    };
  });
}

/** A body as it is stored may be older than some of its fields. */
export type StoredProtocolBody = Partial<ProtocolBody> &
  Pick<ProtocolBody, 'usualWaitMinutes' | 'eatAgainAfterMinutes'> & {
    readonly bands: readonly (Omit<FastingBand, 'nothingFrom'> & Partial<FastingBand>)[];
  };

export function wholeProtocolBody(body: StoredProtocolBody): ProtocolBody {
  return {
    ...protocolDefaults,
    ...body,
    bands: body.bands.map((band) => ({ ...band, nothingFrom: band.nothingFrom ?? null })),
  };
}

/** A body as it is stored may be older than some of its fields. */
export type StoredProfileBody = Omit<ProfileBody, keyof typeof profileDefaults> &
  Partial<Pick<ProfileBody, keyof typeof profileDefaults>>;

export const wholeProfileBody = (body: StoredProfileBody): ProfileBody => ({
  ...profileDefaults,
  ...body,
});

async function profilesWhere(
  db: Sequelize,
  where: string,
  replacements: Record<string, unknown>,
  transaction?: Transaction,
): Promise<StoredProfile[]> {
  const rows = await select<ProfileRow>(
    db,
    `${signedFrom('laboratory_profiles')} ${where}`,
    replacements,
    transaction,
  );
  return rows.map((row) => ({
    ...wholeProfileBody(row.body),
    ...signatureOf(row),
    name: row.name,
    says: `${row.name}, version ${row.version}.`,
  }));
}

function signatureOf(row: SignedRow<unknown>) {
  return {
    id: row.id,
    siteId: row.site_id,
    version: row.version,
    effectiveOn: row.effective_on,
    signedBy: row.signed_by,
    signedAt: row.signed_at?.getTime() ?? null,
    signedOn: row.signed_at ? dayOf(row.signed_at.getTime(), row.zone) : null,
  };
}
