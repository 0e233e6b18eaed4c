// Steps of a test run: each is counted, none ends the run.
import { runNode } from '../../server/bootstrap/run-program.mjs';
import { say, seconds } from '../../server/bootstrap/say.mjs';

/** Counts what passed and what failed over a whole run. */
export class Tally {
  passed = 0;
  failed = 0;
  failures = [];

  /**
   * Runs a step, which counts as one. When it answers `{ passed, failed }`, those are counted instead.
   */
  async step(title, work) {
    say(`\n== ${title}`);
    const startedAt = Date.now();
    let counts;
    try {
      const answer = await work();
      counts = typeof answer?.passed === 'number' ? answer : { passed: 1, failed: 0 };
    } catch (error) {
      say(error.message);
      counts = { passed: 0, failed: 1 };
    }
    this.passed += counts.passed;
    this.failed += counts.failed;
    if (counts.failed > 0) this.failures.push(title);
    const took = seconds(Date.now() - startedAt);
    say(`== ${title}: ${counts.passed} passed, ${counts.failed} failed (${took})`);
    return counts.failed === 0;
  }

  /** Says what failed and ends with the closing line, which is the last of the run. */
  close() {
    for (const title of this.failures) say(`Failed: ${title}`);
    process.exitCode = this.failed === 0 ? 0 : 1;
    say(`${this.passed} passed, ${this.failed} failed`);
  }
}

/** Runs a tool of node_modules, showing what it says. */
export function tool(path, args, { environment = {}, title } = {}) {
  return runNode([`node_modules/${path}`, ...args], {
    env: { ...process.env, ...environment },
    show: true,
    title: title ?? path,
  });
}

export const format = () =>
  tool('prettier/bin/prettier.cjs', ['--check', '--log-level=warn', '.'], { title: 'Prettier' });

export const lint = () =>
  tool('eslint/bin/eslint.js', ['--max-warnings=0', '.'], { title: 'ESLint' });

/** Type checks: the server, server and tests together, templates included for the applications, their specs. */
export const typeChecks = [
  ['Types of the server', () => typeScript('tsconfig.server.json', '--incremental', 'false')],
  ['Types of the tests', () => typeScript('tsconfig.test.json')],
  ['Types of the specs of the applications', () => typeScript('tsconfig.spec.json')],
  [
    'Types of the applications and their templates',
    () =>
      tool('@angular/compiler-cli/bundles/src/bin/ngc.js', ['-p', 'tsconfig.app.json', '--noEmit']),
  ],
];

const typeScript = (project, ...more) =>
  tool('typescript/bin/tsc', ['-p', project, '--noEmit', ...more]);

export const words = () => runNode(['server/bootstrap/check-words.mjs'], { show: true });
