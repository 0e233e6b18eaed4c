import { spawn } from 'node:child_process';
import { root } from './folders.mjs';
import { PlainFailure } from './say.mjs';

const keptCharacters = 12_000;

/**
 * Runs a program to its end and answers its output. When it fails, the failure carries the end of
 * what it said. `show` passes the output on as it comes.
 */
export function runProgram(program, args, { cwd = root, env = process.env, title, show } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd, env, stdio: ['ignore', 'pipe', 'pipe'] });
    const stop = () => child.kill('SIGTERM');
    process.once('exit', stop);
    let words = '';
    const keep = (chunk) => {
      words = (words + chunk).slice(-keptCharacters);
      if (show) process.stdout.write(chunk);
    };
    child.stdout.on('data', keep);
    child.stderr.on('data', keep);
    child.on('error', (error) => {
      process.removeListener('exit', stop);
      reject(new PlainFailure(`${title ?? program} could not be started: ${error.message}`));
    });
    child.on('close', (code, signal) => {
      process.removeListener('exit', stop);
      if (code === 0) return resolve(words);
      const failure = new PlainFailure(
        `${title ?? program} failed (${signal ?? `exit ${code}`}).\n${show ? '' : words.trimEnd()}`.trimEnd(),
      );
      failure.output = words;
      return reject(failure);
    });
  });
}

/** Runs a JavaScript program with the Node.js that runs this one. */
export function runNode(args, options) {
  return runProgram(process.execPath, args, options);
}
