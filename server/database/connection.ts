import * as mariadb from 'mariadb';
import { QueryTypes, Sequelize, Transaction } from 'sequelize';

type Replacements = Record<string, unknown>;

/**
 * Sequelize 6 deletes the `meta` property of a result, which the connector has made unconfigurable since 3.1
 * (mariadb-connector-nodejs issue 234). A copy of the rows carries it instead.
 */
const dialectModule = {
  ...mariadb,
  createConnection: async (config: mariadb.ConnectionConfig) => {
    const connection = await mariadb.createConnection(config);
    const query = connection.query.bind(connection);
    const withOwnMeta = async (...args: Parameters<typeof query>): Promise<unknown> => {
      const rows: unknown = await query(...args);
      if (
        Array.isArray(rows) &&
        Object.getOwnPropertyDescriptor(rows, 'meta')?.configurable === false
      ) {
        const copy: unknown[] & { meta?: unknown } = Array.from(rows as unknown[]);
        copy.meta = (rows as unknown as { meta: unknown }).meta;
        return copy;
      }
      return rows;
    };
    connection.query = withOwnMeta as typeof connection.query;
    return connection;
  },
};

export interface ConnectOptions {
  readonly poolSize?: number;
}

/** Opens a pool. Instants are UTC, DECIMAL comes as a string, ids as numbers; a number above 2^53 throws. */
export function connect(url: string, { poolSize = 20 }: ConnectOptions = {}): Sequelize {
  const address = new URL(url);
  return new Sequelize(
    address.pathname.slice(1),
    decodeURIComponent(address.username),
    decodeURIComponent(address.password),
    {
      dialect: 'mariadb',
      dialectModule,
      host: address.hostname,
      port: Number(address.port || 3306),
      logging: false,
      timezone: '+00:00',
      isolationLevel: Transaction.ISOLATION_LEVELS.READ_COMMITTED,
      pool: { max: poolSize, min: 0, acquire: 10_000, idle: 30_000 },
      define: { underscored: true, timestamps: false },
      dialectOptions: {
        supportBigNumbers: false,
        insertIdAsNumber: true,
        bigIntAsNumber: true,
        decimalAsNumber: false,
        checkNumberRange: true,
        // The connector's own second is too short while the machine is busy.
        connectTimeout: 10_000,
      },
    },
  );
}

/** Rows of a SELECT. Booleans come as 0 and 1, DATETIME as Date, DATE as 'YYYY-MM-DD', TIME as 'HH:mm:ss'. */
export function select<Row extends object>(
  db: Sequelize,
  sql: string,
  replacements: Replacements = {},
  transaction?: Transaction,
): Promise<Row[]> {
  return db.query<Row>(sql, { type: QueryTypes.SELECT, replacements, transaction });
}

/** Runs an UPDATE or DELETE and answers how many rows it touched. */
export async function change(
  db: Sequelize,
  sql: string,
  replacements: Replacements = {},
  transaction?: Transaction,
): Promise<number> {
  const [result] = await db.query(sql, { replacements, transaction });
  return (result as { affectedRows?: number }).affectedRows ?? 0;
}

const isDeadlock = (error: unknown): boolean =>
  error instanceof Error &&
  ['ER_LOCK_DEADLOCK', 'ER_LOCK_WAIT_TIMEOUT'].includes(
    (error as { parent?: { code?: string } }).parent?.code ?? '',
  );

/** Runs the work in one transaction; a deadlock repeats the whole work, at most three times. */
export async function inTransaction<Result>(
  db: Sequelize,
  work: (transaction: Transaction) => Promise<Result>,
): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await db.transaction(work);
    } catch (error) {
      if (!isDeadlock(error) || attempt === 3) throw error;
    }
  }
}
