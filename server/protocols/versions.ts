import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import type { SignedVersion, VersionList, VersionState } from '../../shared/contracts/protocols';
import type { Day } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, notFound, Problem } from '../http/problem';
import { siteOf } from '../sites/sites';
import type { ClinicWords } from '../wording/clinic-words';

/** Fasting protocols and laboratory profiles live the same life: drafted, signed, in force, overtaken. */
export interface Kind {
  readonly table: 'fasting_protocols' | 'laboratory_profiles';
  readonly titleColumn: 'title' | 'name';
  /** On the access record. */
  readonly matter: 'fasting-protocol' | 'laboratory-profile';
  readonly what: string;
}

export const protocolKind: Kind = {
  table: 'fasting_protocols',
  titleColumn: 'title',
  matter: 'fasting-protocol',
  what: 'This fasting protocol',
};
export const profileKind: Kind = {
  table: 'laboratory_profiles',
  titleColumn: 'name',
  matter: 'laboratory-profile',
  what: 'This laboratory profile',
};

export interface VersionRow {
  readonly id: number;
  readonly site_id: number;
  readonly version: number;
  readonly title: string;
  readonly effective_on: Day;
  readonly body: unknown;
  readonly has_starting_values: 0 | 1;
  readonly signed_at: Date | null;
  readonly signed_by: string | null;
  readonly changed_at: Date | null;
  readonly changed_by: string | null;
  readonly draft_version: number;
}

/** What a draft is saved as. */
export interface DraftRow {
  readonly title: string;
  readonly effectiveOn: Day;
  readonly body: object;
  readonly hasStartingValues: boolean;
}

const startingColumn = ({ table }: Kind): string =>
  table === 'fasting_protocols' ? 'version_row.has_starting_values' : '0';

async function rowsWhere(
  db: Sequelize,
  kind: Kind,
  where: string,
  replacements: Record<string, unknown>,
  transaction?: Transaction,
): Promise<VersionRow[]> {
  return select<VersionRow>(
    db,
    `SELECT version_row.id, version_row.site_id, version_row.version, version_row.${kind.titleColumn} AS title,
       version_row.effective_on, version_row.body, ${startingColumn(kind)} AS has_starting_values,
       version_row.signed_at, signer.full_name AS signed_by, version_row.changed_at,
       changer.full_name AS changed_by, version_row.draft_version
     FROM ${kind.table} version_row
       LEFT JOIN staff signer ON signer.id = version_row.signed_by_staff_id
       LEFT JOIN staff changer ON changer.id = version_row.changed_by_staff_id
     WHERE version_row.site_id = :siteId ${where}`,
    replacements,
    transaction,
  );
}

/** @throws Problem 404 for another site's, too. */
export async function versionOf(
  db: Sequelize,
  kind: Kind,
  siteId: number,
  id: number,
  transaction?: Transaction,
): Promise<VersionRow> {
  const where = `AND version_row.id = :id ${transaction ? 'FOR UPDATE' : ''}`;
  const [row] = await rowsWhere(db, kind, where, { siteId, id }, transaction);
  if (!row) throw notFound(kind.what);
  return row;
}

/** The signed version in force on a day, or null. */
export async function versionInForce(
  db: Sequelize,
  kind: Kind,
  siteId: number,
  on: Day,
  transaction?: Transaction,
): Promise<VersionRow | null> {
  const [row] = await rowsWhere(
    db,
    kind,
    `AND version_row.signed_at IS NOT NULL AND version_row.effective_on <= :on
     ORDER BY version_row.version DESC LIMIT 1`,
    { siteId, on },
    transaction,
  );
  return row ?? null;
}

function stateOf(row: VersionRow, today: Day, inForceId: number | undefined): VersionState {
  if (row.signed_at === null) return 'draft';
  if (row.id === inForceId) return 'in-force';
  return row.effective_on > today ? 'to-come' : 'past';
}

export function toSignedVersion(
  words: ClinicWords,
  row: VersionRow,
  today: Day,
  inForceId: number | undefined,
): SignedVersion {
  return {
    id: row.id,
    version: row.version,
    title: words.sentence(row.title),
    state: stateOf(row, today, inForceId),
    effectiveOn: row.effective_on,
    isStartingValues: row.has_starting_values === 1,
    signedBy: row.signed_by,
    signedAt: row.signed_at?.toISOString() ?? null,
    changedBy: row.changed_by,
    changedAt: row.changed_at?.toISOString() ?? null,
  };
}

export async function todayAt({ db, clock }: Context, siteId: number): Promise<Day> {
  return dayOf(clock.now(), (await siteOf(db, siteId)).zone);
}

/** Every version of the site, the newest first. */
export async function listVersions(
  context: Context,
  kind: Kind,
  words: ClinicWords,
  siteId: number,
): Promise<VersionList> {
  const today = await todayAt(context, siteId);
  const rows = await rowsWhere(context.db, kind, 'ORDER BY version_row.version DESC', { siteId });
  const inForce = await versionInForce(context.db, kind, siteId, today);
  return {
    today,
    versions: rows.map((row) => toSignedVersion(words, row, today, inForce?.id)),
  };
}

const alreadySigned = (): Problem =>
  new Problem(
    409,
    'already-signed',
    'This version is signed and never changes. Make a new draft from it.',
  );

/** The draft under a lock. @throws Problem 404; 409 'already-signed', 'changed-meanwhile'. */
export async function lockedDraft(
  { db }: Context,
  transaction: Transaction,
  kind: Kind,
  siteId: number,
  { id, draftVersion }: { readonly id: number; readonly draftVersion: number },
): Promise<VersionRow> {
  const row = await versionOf(db, kind, siteId, id, transaction);
  if (row.signed_at !== null) throw alreadySigned();
  if (row.draft_version !== draftVersion) throw changedMeanwhile();
  return row;
}

/**
 * One draft at a time, so that versions are signed in their order.
 * @throws Problem 409 'draft-open' with the id of the draft that is there.
 */
export async function makeDraft(
  context: Context,
  kind: Kind,
  actor: Actor,
  staff: StaffMember,
  submissionKey: string,
  draft: DraftRow,
): Promise<number> {
  const { db, clock } = context;
  const now = clock.now();
  const { siteId } = staff;
  const { id } = await addOnce(
    db,
    { matter: kind.matter, key: submissionKey, at: now },
    async (transaction) => {
      await select(
        db,
        'SELECT id FROM sites WHERE id = :siteId FOR UPDATE',
        { siteId },
        transaction,
      );
      const [open] = await rowsWhere(
        db,
        kind,
        'AND version_row.signed_at IS NULL LIMIT 1',
        { siteId },
        transaction,
      );
      if (open)
        throw new Problem(
          409,
          'draft-open',
          'There is a draft already. Go on with it, or discard it first.',
          { draftId: open.id },
        );
      const [made] = await db.query(
        `INSERT INTO ${kind.table} (site_id, version, ${kind.titleColumn}, effective_on, body,
           ${kind.table === 'fasting_protocols' ? 'has_starting_values,' : ''} changed_by_staff_id, changed_at)
         SELECT :siteId, COALESCE(MAX(version), 0) + 1, :title, :effectiveOn, :body,
           ${kind.table === 'fasting_protocols' ? ':hasStartingValues,' : ''} :staffId, :now
         FROM ${kind.table} WHERE site_id = :siteId`,
        {
          type: QueryTypes.INSERT,
          transaction,
          replacements: {
            ...draft,
            body: JSON.stringify(draft.body),
            siteId,
            staffId: staff.id,
            now: new Date(now),
          },
        },
      );
      await recordChange(context, transaction, kind, actor, made, 'draft-made');
      return made;
    },
  );
  return id;
}

export async function saveDraft(
  context: Context,
  kind: Kind,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
  draft: DraftRow,
): Promise<void> {
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    await lockedDraft(context, transaction, kind, staff.siteId, which);
    await change(
      db,
      `UPDATE ${kind.table} SET ${kind.titleColumn} = :title, effective_on = :effectiveOn, body = :body,
         ${kind.table === 'fasting_protocols' ? 'has_starting_values = :hasStartingValues,' : ''}
         draft_version = draft_version + 1, changed_by_staff_id = :staffId, changed_at = :now
       WHERE id = :id`,
      {
        ...draft,
        body: JSON.stringify(draft.body),
        id: which.id,
        staffId: staff.id,
        now: new Date(clock.now()),
      },
      transaction,
    );
    await recordChange(context, transaction, kind, actor, which.id, 'draft-saved');
  });
}

export async function discardDraft(
  context: Context,
  kind: Kind,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
): Promise<{ done: true }> {
  await inTransaction(context.db, async (transaction) => {
    await lockedDraft(context, transaction, kind, staff.siteId, which);
    await change(
      context.db,
      `DELETE FROM ${kind.table} WHERE id = :id`,
      { id: which.id },
      transaction,
    );
    await recordChange(context, transaction, kind, actor, which.id, 'draft-discarded');
  });
  return { done: true };
}

/** Who changed what and when; nothing here is about one child. */
export function recordChange(
  { db, clock }: Context,
  transaction: Transaction,
  { matter }: Kind,
  actor: Actor,
  id: number,
  what: 'draft-made' | 'draft-saved' | 'draft-discarded' | 'signed',
): Promise<void> {
  return record(db, transaction, actor, {
    action: 'changed',
    matter,
    childIds: [],
    detail: { id, what },
    at: clock.now(),
  });
}
