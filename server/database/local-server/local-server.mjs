// A private MariaDB on loopback with its own data directory: durable for `npm start`, fast for tests.
// It never touches a database that the machine runs otherwise: own socket, own port, no defaults.
import { spawn } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm, stat } from 'node:fs/promises';
import { existsSync } from 'node:fs';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { findMariadb, findProgram, mariadbPackages } from './binaries.mjs';
import { initialise, isInitialised } from './initialise.mjs';
import { serverArguments, socketOf } from './options.mjs';
import { freePort, portIsFree } from './ports.mjs';
import { processLives, runningInstance } from './running-instance.mjs';

/** A failure whose message is meant for the person at the terminal. */
export class LocalServerError extends Error {
  constructor(code, message) {
    super(message);
    this.name = 'LocalServerError';
    this.code = code;
  }
}

const patienceMs = 30_000;

/**
 * Starts the instance of a data directory, making it first when there is none.
 *
 * `port` is a number, or 'any' for a free one. Answers `{ port, socket, pid, client, exited, stop }`:
 * `exited` settles when the process ends, however it ends; `stop()` ends it cleanly.
 * Throws a LocalServerError with code 'not-installed', 'runs-already', 'port-taken' or 'did-not-start'.
 */
export async function startLocalServer({ dataDirectory, port, durable, progress = () => {} }) {
  const programs = findMariadb();
  if (!programs) {
    throw new LocalServerError(
      'not-installed',
      `MariaDB is not installed. Install it with: apt-get install --no-install-recommends ${mariadbPackages.join(' ')}`,
    );
  }
  const directory = resolve(dataDirectory);
  const other = runningInstance(directory);
  if (other) {
    throw new LocalServerError(
      'runs-already',
      `A database already runs on ${directory} (process ${other}). Stop the Threedawn that started it, or end that process.`,
    );
  }
  if (!isInitialised(directory)) {
    progress('making an empty database');
    await initialise({
      dataDirectory: directory,
      durable,
      initialiser: programs.initialiser,
    });
  }
  // Between choosing a free port and binding it another process may take it: once more, then give up.
  for (let attempt = 1; ; attempt += 1) {
    const chosen = port === 'any' ? await freePort() : port;
    if (port !== 'any' && !(await portIsFree(chosen))) throw portTaken(chosen);
    try {
      return await launch({ programs, directory, port: chosen, durable });
    } catch (error) {
      if (error.code !== 'port-taken' || port !== 'any' || attempt > 1) throw error;
    }
  }
}

/** A fast instance in memory for tests; `stop()` also removes its directory. */
export async function startThrowawayServer({ progress } = {}) {
  const parent = existsSync('/dev/shm') ? '/dev/shm' : tmpdir();
  await removeLeftOvers(parent);
  const folder = await mkdtemp(join(parent, throwawayPrefix));
  try {
    const server = await startLocalServer({
      dataDirectory: join(folder, 'mariadb'),
      port: 'any',
      durable: false,
      progress,
    });
    const stop = async () => {
      await server.stop();
      await rm(folder, { recursive: true, force: true });
    };
    return { ...server, folder, stop };
  } catch (error) {
    await rm(folder, { recursive: true, force: true });
    throw error;
  }
}

const throwawayPrefix = 'threedawn-test-';
const anHourMs = 3_600_000;

// A test run that was killed leaves its directory in memory, though its server ended with it.
async function removeLeftOvers(parent) {
  for (const name of await readdir(parent)) {
    if (!name.startsWith(throwawayPrefix)) continue;
    const folder = join(parent, name);
    const age = Date.now() - ((await stat(folder).catch(() => undefined))?.mtimeMs ?? Date.now());
    if (age < anHourMs || runningInstance(join(folder, 'mariadb'))) continue;
    await rm(folder, { recursive: true, force: true });
  }
}

async function launch({ programs, directory, port, durable }) {
  const socket = socketOf(directory);
  await rm(socket, { force: true });
  const args = serverArguments({ dataDirectory: directory, port, durable });
  // The kernel ends the database when this process dies, even by SIGKILL; mariadbd then shuts down
  // as it does when asked.
  const setpriv = findProgram('setpriv');
  const child = setpriv
    ? spawn(setpriv, ['--pdeathsig', 'TERM', '--', programs.server, ...args], spawnOptions)
    : spawn(programs.server, args, spawnOptions);
  const exited = new Promise((settle) => {
    child.on('error', () => settle({ code: -1 }));
    child.on('exit', (code, signal) => settle({ code, signal }));
  });
  let ended = false;
  void exited.then(() => (ended = true));
  const deadline = Date.now() + patienceMs;
  // Its own socket is asked, never the port: a port may be answered by somebody else's server.
  while (!(await answers(socket))) {
    if (ended) throw await startFailure(directory, port);
    if (Date.now() > deadline) {
      child.kill('SIGKILL');
      throw await startFailure(directory, port);
    }
    await new Promise((proceed) => setTimeout(proceed, 25));
  }
  return {
    port,
    socket,
    pid: child.pid,
    client: programs.client,
    exited,
    stop: () => stopServer(child, exited, socket),
  };
}

// A process group of its own: Ctrl-C reaches only the process that decides about the order of stopping.
const spawnOptions = { stdio: 'ignore', detached: true };

async function stopServer(child, exited, socket) {
  if (processLives(child.pid)) child.kill('SIGTERM');
  const timer = setTimeout(() => child.kill('SIGKILL'), patienceMs);
  await exited;
  clearTimeout(timer);
  await rm(socket, { force: true });
}

/** A server that is ready greets whoever connects; the first byte is enough to know. */
function answers(path) {
  return new Promise((settle) => {
    const probe = connect({ path });
    const done = (answer) => {
      probe.destroy();
      settle(answer);
    };
    probe.setTimeout(1000, () => done(false));
    probe.once('data', () => done(true));
    probe.once('error', () => done(false));
    probe.once('end', () => done(false));
  });
}

function portTaken(port) {
  return new LocalServerError(
    'port-taken',
    `Port ${port} on 127.0.0.1, meant for the private database, is taken by another program.`,
  );
}

async function startFailure(directory, port) {
  const log = await readFile(join(directory, 'error.log'), 'utf8').catch(() => '');
  const last = log.trim().split('\n').slice(-12).join('\n');
  if (/Can't start server: Bind on TCP|Got error: 98/.test(last)) return portTaken(port);
  return new LocalServerError(
    'did-not-start',
    `The private database did not start. The end of ${join(directory, 'error.log')}:\n${last}`,
  );
}
