import { createHash } from 'node:crypto';
import type { Sequelize, Transaction } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';

export interface Seal {
  readonly firstId: number;
  readonly lastId: number;
  readonly chainHash: string;
}

const mostRowsASeal = 1000;
/** Younger rows wait: the ids of the children of a view are written just after its row. */
const settlesAfterMs = 60_000;
const chainStart = '0'.repeat(64);

/**
 * Seals what the access record took up since the last seal: each seal is a SHA-256 over the one before and over its
 * rows, so that no row can be changed, taken out or put in later without every following seal failing. In batches and by
 * the sender, so that views do not wait for each other. One sealer works at a time.
 * @param now business clock, epoch milliseconds.
 * @returns the new seal, or null when there was nothing to seal.
 */
export async function sealRecords(db: Sequelize, now: number): Promise<Seal | null> {
  const lock = { lock: `threedawn-seal-${db.getDatabaseName()}` };
  // One transaction keeps the lock and another does the work, so that the lock outlasts the commit.
  return db.transaction(async (holder) => {
    const [got] = await select<{ got: number }>(
      db,
      'SELECT GET_LOCK(:lock, 0) AS got',
      lock,
      holder,
    );
    if (got?.got !== 1) return null;
    try {
      return await inTransaction(db, (transaction) => addSeal(db, transaction, now));
    } finally {
      await select(db, 'SELECT RELEASE_LOCK(:lock) AS freed', lock, holder);
    }
  });
}

async function addSeal(db: Sequelize, transaction: Transaction, now: number): Promise<Seal | null> {
  const last = await lastSeal(db, transaction);
  const firstId = (last?.lastId ?? 0) + 1;
  const lastId = await lastSettledId(db, transaction, firstId, now);
  if (lastId === null) return null;
  const previousHash = last?.chainHash ?? chainStart;
  const chainHash = await hashOf(db, previousHash, firstId, lastId, transaction);
  await change(
    db,
    `INSERT INTO access_seals (first_id, last_id, chain_hash, sealed_at)
     VALUES (:firstId, :lastId, :chainHash, :now)`,
    { firstId, lastId, chainHash, now: new Date(now) },
    transaction,
  );
  return { firstId, lastId, chainHash };
}

/**
 * Computes the chain again, all of it or its newest seals. Compare the newest hash with the one in the log: who rewrote
 * everything shows there.
 */
export async function verifySeals(
  db: Sequelize,
  newest = Number.MAX_SAFE_INTEGER,
): Promise<'whole' | 'broken' | 'not-sealed-yet'> {
  let { previous, sealId } = await sealBefore(db, newest);
  for (;;) {
    const [seal] = await select<Seal & { id: number }>(
      db,
      `SELECT id, first_id AS firstId, last_id AS lastId, chain_hash AS chainHash FROM access_seals
       WHERE id > :sealId ORDER BY id LIMIT 1`,
      { sealId },
    );
    if (!seal) return sealId === 0 ? 'not-sealed-yet' : 'whole';
    const isJoined = seal.firstId === previous.lastId + 1 && seal.lastId >= seal.firstId;
    if (!isJoined) return 'broken';
    const hash = await hashOf(db, previous.chainHash, seal.firstId, seal.lastId);
    if (hash !== seal.chainHash) return 'broken';
    previous = seal;
    sealId = seal.id;
  }
}

/** The seal before the newest ones, which is trusted; the empty beginning when they are all. */
async function sealBefore(
  db: Sequelize,
  newest: number,
): Promise<{ previous: Seal; sealId: number }> {
  const [seal] = await select<Seal & { id: number }>(
    db,
    `SELECT id, first_id AS firstId, last_id AS lastId, chain_hash AS chainHash FROM access_seals
     ORDER BY id DESC LIMIT 1 OFFSET :newest`,
    { newest },
  );
  if (!seal) return { previous: { firstId: 0, lastId: 0, chainHash: chainStart }, sealId: 0 };
  return { previous: seal, sealId: seal.id };
}

async function lastSeal(db: Sequelize, transaction: Transaction): Promise<Seal | undefined> {
  const [seal] = await select<Seal>(
    db,
    `SELECT first_id AS firstId, last_id AS lastId, chain_hash AS chainHash FROM access_seals
     ORDER BY id DESC LIMIT 1`,
    {},
    transaction,
  );
  return seal;
}

async function lastSettledId(
  db: Sequelize,
  transaction: Transaction,
  firstId: number,
  now: number,
): Promise<number | null> {
  const rows = await select<{ id: number; at: Date }>(
    db,
    // Shared locks wait for rows that a transaction has written but not committed yet.
    `SELECT id, at FROM access_records WHERE id >= :firstId ORDER BY id LIMIT :most LOCK IN SHARE MODE`,
    { firstId, most: mostRowsASeal },
    transaction,
  );
  const young = rows.findIndex((row) => row.at.getTime() > now - settlesAfterMs);
  const settled = young === -1 ? rows : rows.slice(0, young);
  return settled.at(-1)?.id ?? null;
}

interface CanonicalRow {
  id: number;
  at: Date;
  side: string;
  actor_id: number | null;
  actor_name: string;
  action: string;
  matter: string;
  detail: string;
  session_hash: string | null;
  address: string | null;
}

async function hashOf(
  db: Sequelize,
  previousHash: string,
  firstId: number,
  lastId: number,
  transaction?: Transaction,
): Promise<string> {
  const range = { firstId, lastId };
  const rows = await select<CanonicalRow>(
    db,
    // As text: parsed and written again, the same detail could read differently.
    `SELECT id, at, side, actor_id, actor_name, action, matter, CONCAT(detail, '') AS detail, session_hash, address
     FROM access_records WHERE id BETWEEN :firstId AND :lastId ORDER BY id`,
    range,
    transaction,
  );
  const children = await select<{ access_record_id: number; child_id: number }>(
    db,
    `SELECT access_record_id, child_id FROM access_record_children
     WHERE access_record_id BETWEEN :firstId AND :lastId ORDER BY access_record_id, child_id`,
    range,
    transaction,
  );
  const childIdsOf = new Map<number, number[]>();
  for (const { access_record_id: id, child_id: childId } of children)
    childIdsOf.set(id, [...(childIdsOf.get(id) ?? []), childId]);
  const hash = createHash('sha256').update(previousHash);
  for (const row of rows) hash.update(`\n${canonical(row, childIdsOf.get(row.id) ?? [])}`);
  return hash.digest('hex');
}

const canonical = (row: CanonicalRow, childIds: readonly number[]): string =>
  JSON.stringify([
    row.id,
    row.at.toISOString(),
    row.side,
    row.actor_id,
    row.actor_name,
    row.action,
    row.matter,
    row.detail,
    row.session_hash,
    row.address,
    childIds,
  ]);
