import { spawn, type ChildProcess } from 'node:child_process';
import { join } from 'node:path';

export interface Program {
  readonly process: ChildProcess;
  /** All that it wrote to its error output. */
  readonly complaints: () => string;
  /** The exit code, or the signal that ended it. */
  readonly ended: Promise<number | string>;
  /** Ends it at once, as a crash would. */
  kill(): Promise<void>;
}

const root = join(__dirname, '..', '..');

/** Runs a program of the server as a process of its own and waits until it says that it is ready. */
export async function startProgram(
  script: string,
  environment: Readonly<Record<string, string>>,
): Promise<Program> {
  const hook = join(root, 'test', 'support', 'compile-on-require.cjs');
  const own = Object.entries(process.env).filter(([name]) => !/^(THREEDAWN_|TWILIO_)/.test(name));
  const child = spawn(process.execPath, ['-r', hook, join(root, script)], {
    env: { ...Object.fromEntries(own), ...environment },
    stdio: ['ignore', 'ignore', 'pipe', 'ipc'],
  });
  let complaints = '';
  child.stderr?.on('data', (chunk: Buffer) => (complaints += chunk.toString()));
  const ended = new Promise<number | string>((resolve) =>
    child.once('exit', (code, signal) => resolve(code ?? signal ?? 'unknown')),
  );
  const ready = new Promise<void>((resolve) => child.once('message', () => resolve()));
  await Promise.race([
    ready,
    ended.then((code) => {
      throw new Error(`${script} ended with ${code}: ${complaints}`);
    }),
  ]);
  return {
    process: child,
    complaints: () => complaints,
    ended,
    kill: async () => {
      child.kill('SIGKILL');
      await ended;
    },
  };
}
