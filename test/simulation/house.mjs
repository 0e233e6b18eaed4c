// The house of a run: database in memory, stand-ins, web and one or two senders, each to be killed and
// started again. What limits the speed is set as a clinic sets it, by settings.
import { mkdirSync, mkdtempSync, rmSync, existsSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { inRoot } from '../../server/bootstrap/folders.mjs';
import { runNode } from '../../server/bootstrap/run-program.mjs';
import { secretsOf } from '../../server/bootstrap/secrets.mjs';
import {
  chosenSettings,
  programEnvironment,
  schema,
  withoutMigrateAccount,
} from '../../server/bootstrap/settings.mjs';
import { prepareSchema } from '../../server/database/local-server/accounts.mjs';
import { startLocalServer } from '../../server/database/local-server/local-server.mjs';
import { freePort } from '../../server/database/local-server/ports.mjs';
import { Program } from './program.mjs';

/** A provider that is quick and generous, and a sender that looks often: a year has to fit into an hour. */
const pace = {
  THREEDAWN_TEXTS_PER_SECOND: '100',
  THREEDAWN_MAILS_PER_SECOND: '100',
  THREEDAWN_PROVIDER_ANSWERS_WITHIN_SECONDS: '1',
  THREEDAWN_SENDER_CLAIM_SECONDS: '5',
  THREEDAWN_SENDER_LOOKS_EVERY_MS: '40',
  THREEDAWN_CALL_LIST_EVERY_MS: '200',
  THREEDAWN_STAND_IN_REPORT_PAUSE_MS: '10',
  // Each family comes from a network of its own, as in life, and has its own limits there.
  THREEDAWN_TRUSTED_PROXIES: '1',
  THREEDAWN_LOG_LEVEL: 'warn',
};

export async function openHouse() {
  const parent = existsSync('/dev/shm') ? '/dev/shm' : tmpdir();
  const folder = mkdtempSync(join(parent, 'threedawn-test-'));
  const dataDirectory = join(folder, 'data');
  const logFolder = join(dataDirectory, 'logs');
  mkdirSync(logFolder, { recursive: true });
  const startDatabase = (port) =>
    startLocalServer({ dataDirectory: join(folder, 'mariadb'), port, durable: false });
  let database = await startDatabase('any');
  const programs = [];
  const close = async () => {
    await Promise.all(programs.filter(({ name }) => name !== 'stand-ins').map((one) => one.stop()));
    await Promise.all(programs.filter(({ name }) => name === 'stand-ins').map((one) => one.stop()));
    await database.stop();
    rmSync(folder, { recursive: true, force: true });
  };
  try {
    const environment = await environmentOf({ dataDirectory, databasePort: database.port });
    const secrets = secretsOf(dataDirectory);
    const passwords = { app: secrets.databaseApp, migrate: secrets.databaseMigrate };
    await prepareSchema(database, schema, passwords);
    await runNode([inRoot('build/server/database/migrate.js')], { env: environment });
    await runNode([inRoot('test/simulation/furnish.mjs')], { env: environment });
    const program = async (name, script) => {
      const one = new Program({
        name,
        script: `build/server/${script}`,
        environment: withoutMigrateAccount(environment),
        logFolder,
      });
      await one.start();
      programs.push(one);
      return one;
    };
    await program('stand-ins', 'stand-ins/main.js');
    const web = await program('web', 'main.js');
    const sender = await program('sender', 'worker.js');
    let second;
    return {
      environment,
      origin: environment.THREEDAWN_ORIGIN,
      logFolder,
      receiptFile: join(dataDirectory, 'stand-ins.jsonl'),
      web,
      sender,
      /** Another sender beside the first one; ends by a kill when it is called again. */
      async toggleSecondSender() {
        if (second) {
          await second.kill();
          programs.splice(programs.indexOf(second), 1);
          second = undefined;
        } else second = await program('second-sender', 'worker.js');
      },
      async restartDatabase() {
        const { port } = database;
        await database.stop();
        database = await startDatabase(port);
      },
      close,
    };
  } catch (error) {
    await close();
    throw error;
  }
}

async function environmentOf({ dataDirectory, databasePort }) {
  const ports = {};
  for (const name of ['web', 'sms', 'mail', 'control']) ports[name] = await freePort();
  // What the person at the terminal set is for the house that is lived in, not for this one.
  const own = Object.entries(process.env).filter(([name]) => !/^(THREEDAWN_|TWILIO_)/.test(name));
  const given = { ...Object.fromEntries(own), NODE_ENV: 'test', ...pace };
  return programEnvironment({
    settings: chosenSettings(given),
    ports,
    secrets: secretsOf(dataDirectory),
    dataDirectory,
    chromium: '',
    databasePort,
    environment: given,
  });
}
