import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

/**
 * True when the process lives. Where nothing reaps the dead, a zombie keeps its number, so the state
 * is read as well.
 */
export function processLives(pid) {
  if (existsSync('/proc/self/stat')) {
    try {
      const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
      return !/^[ZX]/.test(stat.slice(stat.lastIndexOf(')') + 2));
    } catch {
      return false;
    }
  }
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

/** The arguments of a running process joined by blanks, '' when they cannot be read. */
export function commandLineOf(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').replaceAll('\0', ' ').trim();
  } catch {
    return '';
  }
}

/**
 * The process that serves this data directory already, or undefined. Asked before a start, because a
 * second mariadbd waits some 30 seconds for file locks before it gives up.
 */
export function runningInstance(dataDirectory) {
  let pid;
  try {
    pid = Number.parseInt(readFileSync(join(dataDirectory, 'mariadbd.pid'), 'utf8'), 10);
  } catch {
    return undefined;
  }
  if (!Number.isInteger(pid) || !processLives(pid)) return undefined;
  return commandLineOf(pid).includes(`--datadir=${dataDirectory}`) ? pid : undefined;
}
