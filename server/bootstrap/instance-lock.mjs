import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { commandLineOf, processLives } from '../database/local-server/running-instance.mjs';
import { PlainFailure } from './say.mjs';

/**
 * Claims a data folder for this process; answers a function that gives it back. Fails in words when
 * another living Threedawn holds it; a lock whose holder died is taken over.
 */
export function claim(dataDirectory, origin) {
  mkdirSync(dataDirectory, { recursive: true, mode: 0o700 });
  const file = join(dataDirectory, 'running.json');
  const mine = { pid: process.pid, program: commandLineOf(process.pid), origin };
  for (let attempt = 1; ; attempt += 1) {
    try {
      writeFileSync(file, JSON.stringify(mine), { flag: 'wx', mode: 0o600 });
      return () => rmSync(file, { force: true });
    } catch (error) {
      if (error.code !== 'EEXIST' || attempt > 2) throw error;
      const holder = read(file);
      if (holder && isHeldBy(holder)) {
        throw new PlainFailure(
          `Threedawn already runs from this folder (process ${holder.pid}, ${holder.origin}). Stop it there with Ctrl-C, or with: kill ${holder.pid}`,
        );
      }
      rmSync(file, { force: true });
    }
  }
}

function read(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
}

// Process numbers come round again: the command line tells whether it is still the same program.
function isHeldBy({ pid, program }) {
  return processLives(pid) && (program === '' || commandLineOf(pid) === program);
}
