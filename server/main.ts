import { createServer } from 'node:http';
import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { builtLanguages } from '../shared/languages/languages';
import { buildApp } from './app';
import { readSettings, SettingsError } from './config/settings';
import type { Settings } from './config/settings';
import type { Context } from './context';
import { durabilityFaults, missingMigrations } from './database/fitness';
import { openContext } from './open-context';
import type { OpenedContext } from './open-context';
import { seedWording } from './wording/seed-wording';

/** Why the web process does not start, in words for the person at the terminal. */
export class NotFit extends Error {}

/** Open live streams get this long to end by themselves. */
const graceMs = 3_000;

/** @throws NotFit when this process or its database must not serve a clinic. */
export async function checkFitness(
  { settings, db }: Pick<Context, 'settings' | 'db'>,
  userId = process.getuid?.(),
): Promise<void> {
  const isProduction = settings.mode === 'production';
  // As root the browser that prints letters would run without its sandbox.
  if (isProduction && userId === 0)
    throw new NotFit(
      'In production Threedawn does not run as root. Start it as a user of its own.',
    );
  const missing = await missingMigrations(db);
  if (missing.length > 0)
    throw new NotFit(
      `The database is ${missing.length} changes behind (the first is ${missing[0]}). Run node build/server/database/migrate.js first.`,
    );
  if (!isProduction) return;
  const faults = await durabilityFaults(db);
  if (faults.length > 0)
    throw new NotFit(`The database could lose what it has confirmed: ${faults.join('; ')}.`);
}

export function listen(server: Server, { host, port }: Settings): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) =>
      reject(
        error.code === 'EADDRINUSE'
          ? new NotFit(
              `Port ${port} is taken by another program. End that program, or choose another port with THREEDAWN_PORT.`,
            )
          : error.code === 'EACCES'
            ? new NotFit(`Port ${port} may not be used by this user. Choose one above 1023.`)
            : error,
      ),
    );
    server.listen(port, host, () => resolve((server.address() as AddressInfo).port));
  });
}

function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), graceMs).unref();
  });
}

/** New texts of this version wait as unsigned drafts; what the clinic wrote or signed stays. */
async function addShippedWords({ db, clock }: Context): Promise<void> {
  for (const { id } of builtLanguages) await seedWording(db, { language: id, now: clock.now() });
}

async function start(context: OpenedContext): Promise<() => Promise<void>> {
  await checkFitness(context);
  await addShippedWords(context);
  const server = createServer(buildApp(context));
  const port = await listen(server, context.settings);
  context.log.info({ host: context.settings.host, port }, 'listening');
  return async () => {
    await close(server);
    await context.close();
  };
}

async function main(): Promise<void> {
  const context = await openContext(readSettings(process.env), 'web');
  let stop: () => Promise<void>;
  try {
    stop = await start(context);
  } catch (error) {
    await context.close();
    throw error;
  }
  let isStopping = false;
  const end = (): void => {
    if (isStopping) return;
    isStopping = true;
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        context.log.error({ err: error }, 'stopped badly');
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', end);
  process.on('SIGINT', end);
  process.on('disconnect', end);
  process.send?.({ ready: true });
}

/** What the person at the terminal reads, and whether another try could help (1) or not (2). */
function saysOf(error: unknown): { readonly says: string; readonly exitCode: 1 | 2 } {
  if (error instanceof NotFit || error instanceof SettingsError)
    return { says: error.message, exitCode: 2 };
  if (!(error instanceof Error)) return { says: String(error), exitCode: 1 };
  const isUnreachable = error.name.startsWith('SequelizeConnection');
  return {
    says: isUnreachable
      ? `The database of THREEDAWN_DATABASE_URL cannot be used: ${error.message}`
      : (error.stack ?? error.message),
    exitCode: 1,
  };
}

if (require.main === module)
  main().catch((error: unknown) => {
    const { says, exitCode } = saysOf(error);
    process.stderr.write(`${says}\n`);
    process.exit(exitCode);
  });
