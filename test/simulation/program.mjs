// One program of the house as a process of its own: to be started, killed in the middle and started again.
import { spawn } from 'node:child_process';
import { createWriteStream } from 'node:fs';
import { join } from 'node:path';
import { inRoot, root } from '../../server/bootstrap/folders.mjs';
import { findProgram } from '../../server/database/local-server/binaries.mjs';

const readyWithinMs = 60_000;

export class Program {
  #child;
  #exited;

  constructor({ name, script, environment, logFolder }) {
    Object.assign(this, { name, script, environment });
    this.log = createWriteStream(join(logFolder, `${name}.log`), { flags: 'a' });
  }

  /** Settles when the program says that it is ready. */
  async start() {
    // The kernel ends it with this process, so that nothing is left behind a run that was cut off.
    const setpriv = findProgram('setpriv');
    const command = [
      ...(setpriv ? [setpriv, '--pdeathsig', 'TERM', '--'] : []),
      process.execPath,
      inRoot(this.script),
    ];
    const child = spawn(command[0], command.slice(1), {
      cwd: root,
      env: this.environment,
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    });
    child.stdout.pipe(this.log, { end: false });
    child.stderr.pipe(this.log, { end: false });
    this.#child = child;
    this.#exited = new Promise((settle) => child.once('exit', settle));
    let timer;
    await Promise.race([
      new Promise((settle) => child.on('message', (message) => message?.ready && settle())),
      this.#exited.then(() => {
        throw new Error(`The ${this.name} ended at its start.`);
      }),
      new Promise((_, fail) => {
        timer = setTimeout(() => fail(new Error(`The ${this.name} is not ready.`)), readyWithinMs);
      }),
    ]).finally(() => clearTimeout(timer));
  }

  /** Ends it as a crash would: nothing is finished, nothing is tidied. */
  async kill() {
    this.#child?.kill('SIGKILL');
    await this.#exited;
  }

  async stop() {
    this.#child?.kill('SIGTERM');
    const timer = setTimeout(() => this.#child?.kill('SIGKILL'), 10_000);
    await this.#exited;
    clearTimeout(timer);
  }
}
