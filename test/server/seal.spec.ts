import type { Sequelize } from 'sequelize';
import { record, systemActor } from '../../server/access-record/record';
import { sealRecords, verifySeals } from '../../server/access-record/seal';
import { connect, select } from '../../server/database/connection';
import { migratedTestDatabase, rootQuery, type MigratedTestDatabase } from '../support/database';

jest.setTimeout(30_000);

let database: MigratedTestDatabase;
let db: Sequelize;
const minute = 60_000;
const now = Date.UTC(2027, 3, 13, 12);

beforeAll(async () => {
  database = await migratedTestDatabase();
  db = connect(database.url);
});
afterEach(() => database.empty());
afterAll(() => db.close());

async function view(childIds: readonly number[], at = now - 10 * minute): Promise<void> {
  await record(db, undefined, systemActor('test'), {
    action: 'seen',
    matter: 'this-morning',
    childIds,
    detail: { says: 'é "quoted"' },
    at,
  });
}

async function sealedRows(): Promise<number[]> {
  for (const childIds of [[1], [2, 1], []]) await view(childIds);
  await sealRecords(db, now);
  await view([3]);
  await sealRecords(db, now);
  const rows = await select<{ id: number }>(db, 'SELECT id FROM access_records ORDER BY id');
  return rows.map(({ id }) => id);
}

it('is not sealed before the first seal', async () => {
  await view([1]);
  expect(await verifySeals(db)).toBe('not-sealed-yet');
});

it('seals every row once, each seal joined to the one before', async () => {
  const ids = await sealedRows();
  const seals = await select<{ first_id: number; last_id: number; chain_hash: string }>(
    db,
    'SELECT first_id, last_id, chain_hash FROM access_seals ORDER BY id',
  );
  expect(seals.map((seal) => seal.last_id)).toEqual([ids[2], ids[3]]);
  expect(seals[1]?.first_id).toBe((ids[2] ?? 0) + 1);
  expect(seals[0]?.chain_hash).toMatch(/^[0-9a-f]{64}$/);
  expect(await verifySeals(db)).toBe('whole');
  expect(await verifySeals(db, 1)).toBe('whole');
  expect(await sealRecords(db, now)).toBeNull();
});

it('leaves young rows for later, so that none is sealed half-written', async () => {
  await view([1], now - 10 * minute);
  await view([2], now - 1000);
  const first = await sealRecords(db, now);
  await view([3], now);
  expect(await sealRecords(db, now)).toBeNull();
  const second = await sealRecords(db, now + 2 * minute);
  expect(second?.firstId).toBe((first?.lastId ?? 0) + 1);
  expect((second?.lastId ?? 0) - (second?.firstId ?? 0)).toBe(1);
  expect(await verifySeals(db)).toBe('whole');
});

it('lets one sealer work at a time', async () => {
  await view([1]);
  const sealed = await Promise.all([1, 2, 3].map(() => sealRecords(db, now)));
  expect(sealed.filter((seal) => seal !== null)).toHaveLength(1);
  expect(await verifySeals(db)).toBe('whole');
});

// Table and column stand in the case itself; the ids come from the database.
it.each([
  ['a changed name', "UPDATE access_records SET actor_name = 'nobody' WHERE id = ?"],
  ['a changed time', 'UPDATE access_records SET at = at + INTERVAL 1 SECOND WHERE id = ?'],
  ['a changed detail', "UPDATE access_records SET detail = '{}' WHERE id = ?"],
  ['another child', 'UPDATE access_record_children SET child_id = 9 WHERE access_record_id = ?'],
  ['a child taken out', 'DELETE FROM access_record_children WHERE access_record_id = ?'],
  ['a row taken out', 'DELETE FROM access_records WHERE id > ? AND detail IS NOT NULL LIMIT 1'],
  ['a seal taken out', 'DELETE FROM access_seals WHERE first_id <= ? ORDER BY id LIMIT 1'],
])('shows %s', async (_name, sql) => {
  const [id] = await sealedRows();
  const inSchema = sql.replace(/access_\w+/, (table) => `\`${database.name}\`.${table}`);
  await rootQuery(`SET STATEMENT foreign_key_checks = 0 FOR ${inSchema}`, [id]);
  expect(await verifySeals(db)).toBe('broken');
});

it('cannot be undone by the application’s own account', async () => {
  await sealedRows();
  await expect(db.query("UPDATE access_records SET actor_name = 'nobody'")).rejects.toThrow();
  await expect(db.query('DELETE FROM access_seals')).rejects.toThrow();
});
