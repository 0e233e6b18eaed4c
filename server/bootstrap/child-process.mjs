import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { findProgram } from '../database/local-server/binaries.mjs';
import { root } from './folders.mjs';
import { PlainFailure, say } from './say.mjs';

const readyWithinMs = 60_000;
const stopWithinMs = 10_000;
const largestLogBytes = 10 * 1024 * 1024;
// A process that lived this long and then fell is not one that cannot start.
const steadyAfterMs = 60_000;
const backOffMs = [1000, 2000, 5000, 10_000, 30_000, 60_000];
/** The exit code of a program that refuses its settings: starting it again would not help. */
const refusesItsSettings = 2;

/**
 * One of the long-running programs: started, awaited until it says that it is ready, started again
 * when it falls, ended.
 *
 * `onGivenUp(message)` is called when it refuses its settings after it had been ready.
 */
export class ManagedProcess {
  #child;
  #stopping = false;
  #falls = 0;
  #restart;
  #startedAt = 0;

  constructor({ name, script, environment, logFolder, quiet = false, onGivenUp = () => {} }) {
    Object.assign(this, { name, script, environment, quiet, onGivenUp });
    mkdirSync(logFolder, { recursive: true });
    this.logFile = join(logFolder, `${name}.log`);
    putAside(this.logFile);
    this.log = createWriteStream(this.logFile, { flags: 'a' });
  }

  get pid() {
    return this.#child?.pid;
  }

  /** Starts the program; settles when it is ready, fails in words when it is not. */
  async start() {
    const child = this.#spawn();
    await new Promise((resolve, reject) => {
      const timer = setTimeout(
        () => reject(this.#failure(`was not ready after ${readyWithinMs / 1000} s`)),
        readyWithinMs,
      );
      const settle = (act) => {
        clearTimeout(timer);
        act();
      };
      child.on('message', (message) => message?.ready && settle(resolve));
      child.once('error', (error) => settle(() => reject(this.#failure(error.message))));
      child.once('exit', (code, signal) =>
        settle(() => reject(this.#failure(`ended at its start (${signal ?? `exit ${code}`})`))),
      );
    });
    child.once('exit', (code, signal) => this.#fell(code, signal));
    // It may have fallen between its word and this line.
    if (child.exitCode !== null || child.signalCode !== null) {
      child.removeAllListeners('exit');
      this.#fell(child.exitCode, child.signalCode);
    }
  }

  /** Asks the program to end, and ends it when it does not. */
  async stop() {
    this.#stopping = true;
    clearTimeout(this.#restart);
    const child = this.#child;
    if (child?.pid && child.exitCode === null && child.signalCode === null) {
      const ended = new Promise((settle) => child.once('exit', settle));
      child.kill('SIGTERM');
      const timer = setTimeout(() => child.kill('SIGKILL'), stopWithinMs);
      await ended;
      clearTimeout(timer);
    }
    await new Promise((settle) => this.log.end(settle));
  }

  #spawn() {
    this.#startedAt = Date.now();
    const setpriv = findProgram('setpriv');
    // The kernel ends the program when this process dies, even by SIGKILL. A group of its own keeps
    // Ctrl-C for this process, which decides about the order of stopping.
    const command = setpriv
      ? [setpriv, '--pdeathsig', 'TERM', '--', process.execPath]
      : [process.execPath];
    const child = spawn(command[0], [...command.slice(1), '--enable-source-maps', this.script], {
      cwd: root,
      env: this.environment,
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
      detached: true,
    });
    eachLine(child.stdout, (line) => {
      this.#keep(line);
      if (!this.quiet && isSerious(line)) this.#show(worded(line));
    });
    eachLine(child.stderr, (line) => {
      this.#keep(line);
      if (!this.quiet) this.#show(line);
    });
    this.#child = child;
    return child;
  }

  #fell(code, signal) {
    if (this.#stopping) return;
    const how = signal ?? `exit ${code}`;
    if (code === refusesItsSettings) {
      this.onGivenUp(`The ${this.name} refuses its settings (${how}); see ${this.logFile}`);
      return;
    }
    if (Date.now() - this.#startedAt > steadyAfterMs) this.#falls = 0;
    const waitMs = backOffMs[Math.min(this.#falls, backOffMs.length - 1)];
    this.#falls += 1;
    say(`  The ${this.name} ended unexpectedly (${how}). It starts again in ${waitMs / 1000} s.`);
    this.#restart = setTimeout(() => void this.#startAgain(), waitMs);
  }

  async #startAgain() {
    try {
      await this.start();
      say(`  The ${this.name} runs again.`);
    } catch (failure) {
      if (this.#stopping) return;
      say(`  ${failure.message}`);
      const child = this.#child;
      if (child.exitCode === null && child.signalCode === null) child.kill('SIGKILL');
      this.#fell(child.exitCode, child.signalCode ?? 'SIGKILL');
    }
  }

  #keep(line) {
    if (!this.log.writableEnded) this.log.write(`${line}\n`);
  }

  #show(line) {
    process.stderr.write(`[${this.name}] ${line}\n`);
  }

  #failure(what) {
    return new PlainFailure(`The ${this.name} ${what}; see ${this.logFile}`);
  }
}

function eachLine(stream, use) {
  let rest = '';
  stream.setEncoding('utf8');
  stream.on('data', (chunk) => {
    const lines = (rest + chunk).split('\n');
    rest = lines.pop();
    lines.forEach(use);
  });
  stream.on('end', () => rest && use(rest));
}

// Lines of the programs are JSON with a level: 50 and above are errors.
function isSerious(line) {
  const level = /^\{"level":(\d+)/.exec(line);
  return level !== null && Number(level[1]) >= 50;
}

function worded(line) {
  try {
    const { msg, err } = JSON.parse(line);
    return ['error:', msg, err?.message].filter(Boolean).join(' ');
  } catch {
    return line;
  }
}

function putAside(file) {
  try {
    if (statSync(file).size > largestLogBytes) renameSync(file, `${file}.1`);
  } catch {
    // There is no log yet.
  }
}
