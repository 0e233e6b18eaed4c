import type { AccessRecordList } from '../../shared/contracts/set-up';
import type { Context } from '../context';
import { select } from '../database/connection';
import { record } from './record';
import type { Actor } from './record';
import { verifySeals } from './seal';

export interface AccessRecordFilter {
  readonly childId?: number;
  readonly staffId?: number;
  /** First day shown, 'YYYY-MM-DD' in UTC. */
  readonly from?: string;
}

interface RecordRow {
  id: number;
  at: Date;
  side: 'clinic' | 'family' | 'system';
  actor_name: string;
  action: 'seen' | 'changed';
  matter: string;
  detail: Record<string, unknown>;
  address: string | null;
}

interface ChildRow {
  access_record_id: number;
  child_id: number;
  full_name: string | null;
}

const mostRows = 200;

/** The newest rows that fit the filter. Reading the record of children is itself put on record. */
export async function readAccessRecord(
  context: Context,
  actor: Actor,
  filter: AccessRecordFilter,
): Promise<AccessRecordList> {
  const { db } = context;
  const rows = await select<RecordRow>(
    db,
    `SELECT r.id, r.at, r.side, r.actor_name, r.action, r.matter, r.detail, r.address FROM access_records r
     WHERE TRUE
     ${filter.childId === undefined ? '' : 'AND r.id IN (SELECT access_record_id FROM access_record_children WHERE child_id = :childId)'}
     ${filter.staffId === undefined ? '' : "AND r.side = 'clinic' AND r.actor_id = :staffId"}
     ${filter.from === undefined ? '' : 'AND r.at >= :from'}
     ORDER BY r.id DESC LIMIT ${mostRows}`,
    {
      ...filter,
      from: filter.from === undefined ? null : new Date(`${filter.from}T00:00:00.000Z`),
    },
  );
  const children = await childrenOf(context, rows);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'access-record',
    childIds: [...new Set([...children.values()].flat().map(({ id }) => id))],
    detail: { ...filter },
    at: context.clock.now(),
  });
  return {
    rows: rows.map((row) => ({
      id: row.id,
      at: row.at.toISOString(),
      side: row.side,
      actor: row.actor_name,
      action: row.action,
      matter: row.matter,
      children: children.get(row.id) ?? [],
      address: row.address,
      detail: row.detail,
    })),
    chain: await verifySeals(db),
  };
}

async function childrenOf(
  { db }: Context,
  rows: readonly RecordRow[],
): Promise<Map<number, { id: number; fullName: string }[]>> {
  const byRecord = new Map<number, { id: number; fullName: string }[]>();
  if (rows.length === 0) return byRecord;
  const found = await select<ChildRow>(
    db,
    `SELECT a.access_record_id, a.child_id, c.full_name FROM access_record_children a
     LEFT JOIN children c ON c.id = a.child_id
     WHERE a.access_record_id IN (:ids) ORDER BY a.child_id`,
    { ids: rows.map(({ id }) => id) },
  );
  for (const row of found)
    byRecord.set(row.access_record_id, [
      ...(byRecord.get(row.access_record_id) ?? []),
      { id: row.child_id, fullName: row.full_name ?? '' },
    ]);
  return byRecord;
}
