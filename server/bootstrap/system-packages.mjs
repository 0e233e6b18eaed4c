import { findMariadb, findProgram, mariadbPackages } from '../database/local-server/binaries.mjs';
import { runProgram } from './run-program.mjs';
import { PlainFailure, say, step } from './say.mjs';

/** The Chromium that prints letters: a path, or '' when none is installed. */
export function findChromium() {
  return findProgram('chromium') ?? findProgram('chromium-browser') ?? '';
}

/** The Chromium of the end-to-end tests: the shell without a window starts twice as fast. */
export function findTestBrowser() {
  return findProgram('chromium-headless-shell') ?? findChromium();
}

/**
 * Sees to it that the Debian packages are there. As root they are installed; otherwise one sentence
 * says how. `needs` is a list of 'mariadb' | 'chromium' | 'test-browser'.
 */
export async function installSystemPackages(needs) {
  const missing = missingFor(needs);
  if (missing.length === 0) return;
  const packages = missing.flatMap((need) => parts[need].packages);
  if (canInstall()) {
    await step(`Installing ${packages.join(', ')} with apt`, () => install(packages)).catch(
      (failure) => say(`  ${failure.message}`),
    );
  }
  for (const need of missingFor(needs)) {
    if (parts[need].essential) throw new PlainFailure(sentenceFor(need));
    say(`  Note: ${sentenceFor(need)}`);
  }
}

/** Fails at once when something essential is missing that cannot be installed from here. */
export function checkSystemPackages(needs) {
  if (canInstall()) return;
  const need = missingFor(needs).find((one) => parts[one].essential);
  if (need) throw new PlainFailure(sentenceFor(need));
}

function sentenceFor(need) {
  const { packages, without } = parts[need];
  return `${without} Install it as root with: apt-get install --no-install-recommends ${packages.join(' ')}`;
}

const parts = {
  mariadb: {
    packages: mariadbPackages,
    isThere: () => findMariadb() !== undefined,
    essential: true,
    without:
      'MariaDB is not installed (or set THREEDAWN_DATABASE_URL to use a database of your own).',
  },
  chromium: {
    packages: ['chromium'],
    isThere: () => findChromium() !== '',
    essential: false,
    without: 'Chromium is not installed: letters print from the page instead of a PDF file.',
  },
  'test-browser': {
    packages: ['chromium', 'chromium-headless-shell'],
    isThere: () => findProgram('chromium-headless-shell') !== undefined && findChromium() !== '',
    essential: true,
    without: 'Chromium and its shell for tests are not both installed.',
  },
};

function missingFor(needs) {
  return needs.filter((need) => !parts[need].isThere());
}

function canInstall() {
  return process.getuid?.() === 0 && findProgram('apt-get') !== undefined;
}

async function install(packages) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const apt = findProgram('apt-get');
  await runProgram(apt, ['update', '-qq'], { env, title: 'apt-get update' });
  const args = ['install', '-y', '-qq', '--no-install-recommends', ...packages];
  await runProgram(apt, args, { env, title: 'apt-get install' });
}
