import { randomBytes } from 'node:crypto';
import * as mariadb from 'mariadb';
import { runMigrations } from '../../server/database/migrate';

export interface TestDatabase {
  /** Address for the application's account: no rights but those that migrations grant. */
  readonly url: string;
  /** Address for the account that may change tables. */
  readonly migrateUrl: string;
  readonly name: string;
  drop(): Promise<void>;
}

export interface MigratedTestDatabase extends TestDatabase {
  /** Empties every table, also the append-only ones; rows that migrations put in come back. */
  empty(): Promise<void>;
}

const migrateRights =
  'SELECT, INSERT, UPDATE, DELETE, CREATE, ALTER, DROP, INDEX, REFERENCES, CREATE VIEW, SHOW VIEW, TRIGGER, DELETE HISTORY';

function fromRun(name: string): string {
  const value = process.env[`THREEDAWN_TEST_DATABASE_${name}`];
  if (!value) throw new Error('No test database runs: this spec belongs to the "server" project');
  return value;
}

function urlFor(role: 'APP' | 'MIGRATE', database: string): string {
  const account = `${fromRun(`${role}_USER`)}:${fromRun(`${role}_PASSWORD`)}`;
  return `mysql://${account}@127.0.0.1:${fromRun('PORT')}/${database}`;
}

/** Asks the database as its root, over the private socket: for what no account of the product may do. */
export async function rootQuery<Rows = unknown>(sql: string, values?: unknown): Promise<Rows> {
  return asRoot((connection) => connection.query<Rows>(sql, values));
}

async function asRoot<Result>(
  work: (connection: mariadb.Connection) => Promise<Result>,
): Promise<Result> {
  const connection = await mariadb.createConnection({
    socketPath: fromRun('SOCKET'),
    user: fromRun('ROOT_USER'),
    timezone: 'Z',
  });
  try {
    return await work(connection);
  } finally {
    await connection.end();
  }
}

async function createSchema(name: string): Promise<void> {
  await asRoot(async (connection) => {
    await connection.query(
      `CREATE DATABASE \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_520_ci`,
    );
    const account = `'${fromRun('MIGRATE_USER')}'@'127.0.0.1'`;
    const pattern = name.replaceAll('_', '\\_');
    await connection.query(
      `GRANT ${migrateRights} ON \`${pattern}\`.* TO ${account} WITH GRANT OPTION`,
    );
  });
}

/** A fresh, empty schema of its own. Drop it when done. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const worker = process.env['JEST_WORKER_ID'] ?? '0';
  const name = `threedawn_test_${worker}_${randomBytes(4).toString('hex')}`;
  await createSchema(name);
  return handle(name);
}

/**
 * The migrated schema of this worker, emptied. The migrations run once a worker; later spec files find
 * the tables ready.
 */
export async function migratedTestDatabase(): Promise<MigratedTestDatabase> {
  const name = `threedawn_test_${process.env['JEST_WORKER_ID'] ?? '0'}`;
  const database = handle(name);
  const found = await rootQuery<unknown[]>(
    'SELECT 1 FROM information_schema.tables WHERE table_schema = ? AND table_name = ?',
    [`${name}_base`, 'ready'],
  );
  if (found.length === 0) await makeMigrated(database);
  await empty(name);
  return { ...database, empty: () => empty(name) };
}

async function makeMigrated({ name, url, migrateUrl }: TestDatabase): Promise<void> {
  await rootQuery(`DROP DATABASE IF EXISTS \`${name}\``);
  await createSchema(name);
  await runMigrations({ migrateUrl, appUrl: url });
  // What the migrations themselves put in is kept beside the schema, so that emptying can bring it back.
  await asRoot(async (connection) => {
    await connection.query(`CREATE OR REPLACE DATABASE \`${name}_base\``);
    for (const table of await tablesOf(connection, name)) {
      const rows = await connection.query<unknown[]>(
        `SELECT 1 FROM \`${name}\`.\`${table}\` LIMIT 1`,
      );
      if (rows.length > 0)
        await connection.query(
          `CREATE TABLE \`${name}_base\`.\`${table}\` AS SELECT * FROM \`${name}\`.\`${table}\``,
        );
    }
    await connection.query(`CREATE TABLE \`${name}_base\`.\`ready\` (id INT)`);
  });
}

async function empty(name: string): Promise<void> {
  await asRoot(async (connection) => {
    const kept = new Set(await tablesOf(connection, `${name}_base`));
    await connection.query('SET foreign_key_checks = 0');
    // DELETE is faster than TRUNCATE for small tables, and keeps counting ids upwards.
    for (const table of await tablesOf(connection, name)) {
      await connection.query(`DELETE FROM \`${name}\`.\`${table}\``);
      if (kept.has(table))
        await connection.query(
          `INSERT INTO \`${name}\`.\`${table}\` SELECT * FROM \`${name}_base\`.\`${table}\``,
        );
    }
  });
}

async function tablesOf(connection: mariadb.Connection, schema: string): Promise<string[]> {
  const rows = await connection.query<{ name: string }[]>(
    "SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ? AND table_type <> 'VIEW'",
    [schema],
  );
  return rows.map((row) => row.name);
}

function handle(name: string): TestDatabase {
  return {
    name,
    url: urlFor('APP', name),
    migrateUrl: urlFor('MIGRATE', name),
    drop: async () => {
      await rootQuery(`DROP DATABASE IF EXISTS \`${name}\``);
      await rootQuery(`DROP DATABASE IF EXISTS \`${name}_base\``);
    },
  };
}
