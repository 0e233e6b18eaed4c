// `npm test`: everything, from a bare machine. It goes on after a failure, and its last line says how
// many passed and how many failed. `node test/run.mjs e2e|screens|simulate|bench` runs one part.
import { existsSync } from 'node:fs';
import { buildApplication, buildServer } from '../server/bootstrap/build.mjs';
import { inRoot } from '../server/bootstrap/folders.mjs';
import { checkNodeVersion, installPackages } from '../server/bootstrap/packages.mjs';
import { runNode } from '../server/bootstrap/run-program.mjs';
import { say, seconds } from '../server/bootstrap/say.mjs';
import {
  checkSystemPackages,
  installSystemPackages,
} from '../server/bootstrap/system-packages.mjs';
import { jest, playwright } from './support/counted.mjs';
import { servedSizes } from './support/served-sizes.mjs';
import { format, lint, Tally, typeChecks, words } from './support/steps.mjs';

const [part, ...args] = process.argv.slice(2);
const startedAt = Date.now();
const tally = new Tally();
process.on('SIGINT', () => process.exit(130));
process.on('SIGTERM', () => process.exit(143));

const builds = [
  ['The server is compiled', buildServer],
  ['The family application is built', () => buildApplication('family')],
  ['The clinic application is built', () => buildApplication('clinic')],
];

async function everything() {
  await tally.step('Format', format);
  await tally.step('Lint', lint);
  for (const [title, check] of typeChecks) await tally.step(title, check);
  await tally.step('Words are gathered', () =>
    runNode(['server/bootstrap/extract-words.mjs', '--check'], { show: true }),
  );
  await tally.step('Translations are whole', words);
  // The process's own zone must never matter: the domain is checked on both sides of the world.
  for (const zone of ['America/Chicago', 'Asia/Tokyo']) {
    await tally.step(`Domain, with the machine in ${zone}`, () =>
      jest({ projects: ['domain'], environment: { TZ: zone } }),
    );
  }
  await tally.step('House rules', () => jest({ projects: ['house'] }));
  await tally.step('Server', () => jest({ projects: ['server'] }));
  await tally.step('Applications', () => jest({ projects: ['web'] }));
  for (const [title, build] of builds) await tally.step(title, build);
  await tally.step('Simulation, some days', someDays);
  await tally.step('Sizes as served', servedSizes);
  await tally.step('End to end', () =>
    playwright({ configuration: 'test/e2e/playwright.config.ts' }),
  );
}

/** A few families for some days, with faults; `npm run simulate` runs more. Loaded late: it needs packages. */
async function someDays() {
  const { simulate, smallRun } = await import('./simulation/simulate.mjs');
  const { passed, failed, table } = await simulate(smallRun);
  say(table);
  return { passed, failed };
}

/** Parts that are run by name only. */
const parts = {
  e2e: browserPart('End to end', 'test/e2e/playwright.config.ts'),
  screens: browserPart('Screens', 'test/screens/playwright.config.ts'),
  simulate: programPart('Simulation', 'test/simulation/simulate.mjs'),
  bench: programPart('Bench', 'test/bench/bench.mjs'),
};

function browserPart(title, configuration) {
  return {
    file: configuration,
    run: async () => {
      for (const [name, build] of builds) await tally.step(name, build);
      await tally.step(title, () => playwright({ configuration, args }));
    },
  };
}

function programPart(title, file) {
  return {
    file,
    run: async () => {
      await tally.step('The server is compiled', buildServer);
      await tally.step(title, () => runNode([file, ...args], { show: true }).then(() => undefined));
    },
  };
}

async function main() {
  const chosen = part === undefined ? { run: everything } : parts[part];
  if (!chosen || (chosen.file && !existsSync(inRoot(chosen.file)))) {
    const known = Object.keys(parts).filter((name) => existsSync(inRoot(parts[name].file)));
    say(`There is no part named "${part}". Parts: ${known.join(', ')}`);
    process.exitCode = 1;
    return;
  }
  const ready = await tally.step('What is needed is installed', async () => {
    checkNodeVersion();
    checkSystemPackages(['mariadb', 'test-browser']);
    const installed = await Promise.allSettled([
      installPackages(),
      installSystemPackages(['mariadb', 'test-browser']),
    ]);
    const failure = installed.find(({ status }) => status === 'rejected');
    if (failure) throw failure.reason;
  });
  if (ready) await chosen.run();
  say(`\nAll of it took ${seconds(Date.now() - startedAt)}.`);
  tally.close();
}

main().catch((error) => {
  say(error.stack);
  tally.failed += 1;
  tally.close();
});
