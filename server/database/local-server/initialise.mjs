import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { mkdir, rename, rm } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { initialiserArguments } from './options.mjs';

/** True when the directory holds a complete instance. */
export function isInitialised(dataDirectory) {
  return existsSync(join(dataDirectory, 'mysql'));
}

/**
 * Makes an empty instance. It is made beside its place and moved there when it is whole, so that one
 * that was cut off never looks ready.
 */
export async function initialise({ dataDirectory, durable, initialiser }) {
  const halfMade = `${dataDirectory}.tmp`;
  await rm(halfMade, { recursive: true, force: true });
  await mkdir(dirname(dataDirectory), { recursive: true });
  await mkdir(halfMade, { mode: 0o700 });
  await run(initialiser, initialiserArguments({ dataDirectory: halfMade, durable }));
  await rm(dataDirectory, { recursive: true, force: true });
  await rename(halfMade, dataDirectory);
}

function run(program, args) {
  return new Promise((resolve, reject) => {
    // It is a shell script with children of its own: as a group they can be ended together.
    const child = spawn(program, args, { stdio: ['ignore', 'pipe', 'pipe'], detached: true });
    const endAll = () => process.kill(-child.pid, 'SIGTERM');
    process.once('exit', endAll);
    let words = '';
    const keep = (chunk) => {
      words = (words + chunk).slice(-4000);
    };
    child.stdout.on('data', keep);
    child.stderr.on('data', keep);
    child.on('error', reject);
    child.on('close', (code) => {
      process.removeListener('exit', endAll);
      if (code === 0) resolve();
      else reject(new Error(`The database could not be initialised (exit ${code}):\n${words}`));
    });
  });
}
