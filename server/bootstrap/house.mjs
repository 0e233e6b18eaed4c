// Opens the whole house: database, migrations, demo clinic, web, sender and stand-ins; and closes it.
import { mkdirSync, rmSync, writeFileSync, existsSync } from 'node:fs';
import { join } from 'node:path';
import { prepareSchema } from '../database/local-server/accounts.mjs';
import {
  LocalServerError,
  startLocalServer,
  startThrowawayServer,
} from '../database/local-server/local-server.mjs';
import { freePort, portIsFree } from '../database/local-server/ports.mjs';
import { ManagedProcess } from './child-process.mjs';
import { inRoot } from './folders.mjs';
import { runNode } from './run-program.mjs';
import { PlainFailure, say, step } from './say.mjs';
import { secretsOf } from './secrets.mjs';
import { chosenSettings, programEnvironment, schema, withoutMigrateAccount } from './settings.mjs';
import { findChromium } from './system-packages.mjs';

/**
 * Opens a house for tests on free ports with a database in memory. `environment` adds to the settings
 * of the programs. Close it with `close()`.
 */
export async function openThrowawayHouse({ environment = {}, quiet = true } = {}) {
  const [web, sms, mail, control] = await freePorts(4);
  const database = await startThrowawayServer();
  const dataDirectory = join(database.folder, 'data');
  mkdirSync(dataDirectory);
  // What the person at the terminal set is for the house that is lived in, not for this one.
  const own = Object.entries(process.env).filter(([name]) => !/^(THREEDAWN_|TWILIO_)/.test(name));
  try {
    return await openHouse({
      dataDirectory,
      database,
      ports: { web, sms, mail, control },
      environment: { ...Object.fromEntries(own), NODE_ENV: 'test', ...environment },
      quiet,
    });
  } catch (error) {
    await database.stop();
    throw error;
  }
}

async function freePorts(count) {
  const ports = new Set();
  while (ports.size < count) ports.add(await freePort());
  return ports;
}

/** Starts the private database of a data folder, on another free port when the usual one is taken. */
export async function openPrivateDatabase({ dataDirectory, settings }) {
  const directory = join(dataDirectory, 'mariadb');
  if (!existsSync(directory)) rmSync(seededFile(dataDirectory), { force: true });
  const start = (port) => startLocalServer({ dataDirectory: directory, port, durable: true });
  const port = settings.ports.database;
  try {
    return await start(port);
  } catch (error) {
    if (!(error instanceof LocalServerError)) throw error;
    if (error.code !== 'port-taken' || process.env.THREEDAWN_PRIVATE_DATABASE_PORT) {
      throw new PlainFailure(error.message);
    }
    say(`  Port ${port} is taken; the private database takes another one.`);
    return start('any');
  }
}

/** Fails in words when a port that the programs need is taken. */
export async function checkPorts(settings) {
  const { ports, standIns, smsProvider, ownMail, host } = settings;
  const wanted = [['THREEDAWN_PORT', ports.web, 'the web pages', host]];
  if (standIns && smsProvider === 'stand-in') {
    wanted.push(['THREEDAWN_SMS_STAND_IN_URL', ports.sms, 'the pretend phone company']);
  }
  if (standIns && !ownMail) wanted.push(['THREEDAWN_MAIL_URL', ports.mail, 'the pretend mailbox']);
  if (standIns) {
    wanted.push(['THREEDAWN_STAND_IN_CONTROL_PORT', ports.control, 'the pretend services']);
  }
  for (const [name, port, what, where] of wanted) {
    if (await portIsFree(port, where)) continue;
    throw new PlainFailure(
      `Port ${port} for ${what} is taken by another program. End that program, or choose another port with ${name}.`,
    );
  }
}

/**
 * Opens the house on a database that runs, or on the person's own (`database` undefined).
 *
 * Answers `{ origin, environment, dataDirectory, database, processes, close, fallen }`; `fallen`
 * settles with a message when the house cannot go on.
 */
export async function openHouse({
  dataDirectory,
  database,
  ports: givenPorts,
  environment: given = process.env,
  quiet = false,
}) {
  const settings = chosenSettings(given);
  const ports = { ...settings.ports, ...givenPorts };
  const secrets = secretsOf(dataDirectory);
  const environment = programEnvironment({
    settings,
    ports,
    secrets,
    dataDirectory,
    chromium: findChromium(),
    databasePort: database?.port,
    environment: given,
  });
  if (database) {
    const passwords = { app: secrets.databaseApp, migrate: secrets.databaseMigrate };
    await prepareSchema(database, schema, passwords);
  }
  await runTask(
    'Bringing the tables up to date',
    'build/server/database/migrate.js',
    environment,
    quiet,
  );
  if (settings.rehearsal === 'on') await seedOnce({ dataDirectory, environment, quiet });

  let giveUp;
  const fallen = new Promise((settle) => (giveUp = settle));
  const processes = startOrder(settings).map(
    ({ name, script }) =>
      new ManagedProcess({
        name,
        script: inRoot(script),
        environment: withoutMigrateAccount(environment),
        logFolder: join(dataDirectory, 'logs'),
        quiet,
        onGivenUp: giveUp,
      }),
  );
  let closing;
  const closeProcesses = async () => {
    // The stand-ins last: the sender may be in the middle of handing a message over.
    const [standIns, others] = [
      processes.filter(isStandIn),
      processes.filter((p) => !isStandIn(p)),
    ];
    await Promise.all(others.map((one) => one.stop()));
    await Promise.all(standIns.map((one) => one.stop()));
  };
  const close = () => (closing ??= closeProcesses().then(() => database?.stop()));
  void database?.exited.then(() => {
    if (!closing)
      giveUp('The private database ended unexpectedly; see mariadb/error.log in the data folder.');
  });
  try {
    for (const one of processes) {
      if (quiet) await one.start();
      else await step(`Starting the ${one.name}`, () => one.start());
    }
  } catch (error) {
    await closeProcesses();
    throw error;
  }
  return {
    origin: environment.THREEDAWN_ORIGIN,
    environment,
    dataDirectory,
    database,
    processes,
    close,
    fallen,
  };
}

const isStandIn = ({ name }) => name === 'stand-ins';

function startOrder({ standIns }) {
  return [
    ...(standIns ? [{ name: 'stand-ins', script: 'build/server/stand-ins/main.js' }] : []),
    { name: 'web', script: 'build/server/main.js' },
    { name: 'sender', script: 'build/server/worker.js' },
  ];
}

async function seedOnce({ dataDirectory, environment, quiet }) {
  const file = seededFile(dataDirectory);
  if (existsSync(file)) return;
  await runTask('Furnishing the demo clinic', 'build/server/database/seed.js', environment, quiet);
  writeFileSync(file, 'The demo clinic was put into the database of this folder.\n');
}

function seededFile(dataDirectory) {
  return join(dataDirectory, 'demo-clinic-furnished');
}

function runTask(title, script, environment, quiet) {
  const run = () =>
    runNode(['--enable-source-maps', inRoot(script)], { env: environment, title: `"${title}"` });
  return quiet ? run() : step(title, run);
}
