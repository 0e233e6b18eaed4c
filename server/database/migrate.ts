import { SequelizeStorage, Umzug } from 'umzug';
import { connect, select } from './connection';
import { migrations } from './migrations';

export interface MigrateOptions {
  readonly migrateUrl: string;
  /** Address of the running application's account, which is granted what each table allows. */
  readonly appUrl: string;
}

/**
 * Brings the schema up to date, forward only, under a lock so that several processes may start at once.
 * @returns the names of the migrations that ran now.
 */
export async function runMigrations({ migrateUrl, appUrl }: MigrateOptions): Promise<string[]> {
  const db = connect(migrateUrl, { poolSize: 2 });
  const database = new URL(migrateUrl).pathname.slice(1);
  const appUser = decodeURIComponent(new URL(appUrl).username);
  const migrateUser = decodeURIComponent(new URL(migrateUrl).username);
  const target = { database, appUser: appUser === migrateUser ? null : appUser };
  try {
    return await db.transaction(async (transaction) => {
      await select(db, "SELECT GET_LOCK('threedawn-migrate', 60) AS got", {}, transaction);
      const umzug = new Umzug({
        context: db,
        storage: new SequelizeStorage({ sequelize: db, tableName: 'migrations' }),
        logger: undefined,
        migrations: migrations.map((make) => {
          const { name, statements } = make(target);
          return {
            name,
            up: async () => {
              for (const statement of statements) await db.query(statement);
            },
          };
        }),
      });
      const done = await umzug.up();
      // The application only looks whether its schema is up to date.
      if (target.appUser !== null)
        await db.query(
          `GRANT SELECT ON \`${database}\`.migrations TO '${target.appUser}'@'127.0.0.1'`,
        );
      await select(db, "SELECT RELEASE_LOCK('threedawn-migrate') AS freed", {}, transaction);
      return done.map((migration) => migration.name);
    });
  } finally {
    await db.close();
  }
}

async function main(): Promise<void> {
  const appUrl = process.env['THREEDAWN_DATABASE_URL'];
  const migrateUrl = process.env['THREEDAWN_DATABASE_MIGRATE_URL'] ?? appUrl;
  if (!appUrl || !migrateUrl) throw new Error('THREEDAWN_DATABASE_URL is not set');
  const done = await runMigrations({ migrateUrl, appUrl });
  process.stdout.write(`Schema: ${done.length} changes made\n`);
}

if (require.main === module)
  main().catch((error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  });
