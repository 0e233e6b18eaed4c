// Runs Jest and Playwright and reads from their own reports how many tests passed and failed.
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { tool } from './steps.mjs';

/** A report that was not written means that the run did not begin: one failure. */
async function counted(run, read) {
  const folder = mkdtempSync(join(tmpdir(), 'threedawn-report-'));
  const report = join(folder, 'report.json');
  try {
    const failure = await run(report).then(
      () => undefined,
      (error) => error,
    );
    const counts = read(JSON.parse(readFileSync(report, 'utf8')));
    // A run that failed without a failed test, by a teardown for example, is a failure too.
    if (failure && counts.failed === 0) counts.failed = 1;
    return counts;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Runs Jest on some projects. Skipped tests and files that cannot be loaded count as failed. */
export function jest({ projects, paths = [], environment = {} }) {
  return counted(
    (report) =>
      tool(
        'jest/bin/jest.js',
        [
          ...paths,
          '--json',
          `--outputFile=${report}`,
          '--silent=false',
          '--selectProjects',
          ...projects,
        ],
        { environment, title: 'Jest' },
      ),
    (result) => ({
      passed: result.numPassedTests,
      failed:
        result.numFailedTests +
        result.numPendingTests +
        result.numTodoTests +
        result.numRuntimeErrorTestSuites,
    }),
  );
}

/** Runs Playwright with one configuration. Skipped and unsteady tests count as failed. */
export function playwright({ configuration, args = [], environment = {} }) {
  return counted(
    (report) =>
      tool(
        '@playwright/test/cli.js',
        ['test', `--config=${configuration}`, '--reporter=list,json', ...args],
        {
          environment: { ...environment, PLAYWRIGHT_JSON_OUTPUT_NAME: report },
          title: 'Playwright',
        },
      ),
    ({ stats, errors }) => ({
      passed: stats.expected,
      failed: stats.unexpected + stats.skipped + stats.flaky + errors.length,
    }),
  );
}
