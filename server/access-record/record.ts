import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';

/** Who acts, as the access record keeps it. */
export interface Actor {
  readonly side: 'clinic' | 'family' | 'system';
  readonly id: number | null;
  readonly name: string;
  readonly sessionHash: string | null;
  readonly address: string | null;
}

export const systemActor = (name: string): Actor => ({
  side: 'system',
  id: null,
  name,
  sessionHash: null,
  address: null,
});

export interface AccessEntry {
  readonly action: 'seen' | 'changed';
  /** What was seen or changed, for example 'this-morning', 'door-check', 'letter'. */
  readonly matter: string;
  readonly childIds: readonly number[];
  readonly detail?: Readonly<Record<string, unknown>>;
  /** Business time, epoch milliseconds. */
  readonly at: number;
}

/**
 * Writes one row a view or change, with the ids of the children concerned, in the caller's transaction when it changes
 * something. The table takes inserts only; the sender seals the rows in batches by a hash chain.
 */
export async function record(
  db: Sequelize,
  transaction: Transaction | undefined,
  actor: Actor,
  entry: AccessEntry,
): Promise<void> {
  const [id] = await db.query(
    `INSERT INTO access_records (at, side, actor_id, actor_name, action, matter, detail, session_hash, address)
     VALUES (:at, :side, :actorId, :actorName, :action, :matter, :detail, :sessionHash, :address)`,
    {
      replacements: {
        at: new Date(entry.at),
        side: actor.side,
        actorId: actor.id,
        actorName: actor.name,
        action: entry.action,
        matter: entry.matter,
        detail: JSON.stringify(entry.detail ?? {}),
        sessionHash: actor.sessionHash,
        address: actor.address,
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  if (entry.childIds.length === 0) return;
  const rows = [...new Set(entry.childIds)].map((childId) => `(${Number(id)}, ${Number(childId)})`);
  await db.query(
    `INSERT INTO access_record_children (access_record_id, child_id) VALUES ${rows.join(', ')}`,
    { transaction },
  );
}
