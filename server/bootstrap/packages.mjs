import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { inRoot } from './folders.mjs';
import { runNode, runProgram } from './run-program.mjs';
import { PlainFailure, step } from './say.mjs';

/** Fails with one sentence when this Node.js is older than package.json asks for. */
export function checkNodeVersion(version = process.versions.node) {
  const wanted = JSON.parse(readFileSync(inRoot('package.json'), 'utf8')).engines.node.slice(2);
  const [major, minor] = version.split('.').map(Number);
  const [wantedMajor, wantedMinor] = wanted.split('.').map(Number);
  if (major > wantedMajor || (major === wantedMajor && minor >= wantedMinor)) return;
  throw new PlainFailure(`Threedawn needs Node.js ${wanted} or newer; this is ${version}.`);
}

/** Installs the npm packages of the lock file when they are missing or others. */
export async function installPackages() {
  if (packagesAreCurrent()) return;
  await step('Installing npm packages', async () => {
    const npm = npmProgram();
    // The build needs what production would leave out.
    const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
    await (npm
      ? runNode([npm, ...args], { title: 'npm ci' })
      : runProgram('npm', args, { title: 'npm ci' }));
    writeFileSync(stampFile(), lockHash());
  });
}

/** True when node_modules holds what package-lock.json says. */
export function packagesAreCurrent() {
  const hash = lockHash();
  if (existsSync(stampFile()) && readFileSync(stampFile(), 'utf8') === hash) return true;
  if (!existsSync(installedListFile()) || !installedMatchesLock()) return false;
  writeFileSync(stampFile(), hash);
  return true;
}

const stampFile = () => inRoot('node_modules', '.threedawn-packages');
const installedListFile = () => inRoot('node_modules', '.package-lock.json');

function lockHash() {
  return createHash('sha256')
    .update(readFileSync(inRoot('package-lock.json')))
    .digest('hex');
}

// Somebody ran `npm install` by hand: npm's own list of what it placed is compared.
// Optional packages are for other machines and may be absent.
function installedMatchesLock() {
  const { packages: wanted } = JSON.parse(readFileSync(inRoot('package-lock.json'), 'utf8'));
  const { packages: placed } = JSON.parse(readFileSync(installedListFile(), 'utf8'));
  return Object.entries(wanted).every(
    ([path, { version, optional, devOptional }]) =>
      path === '' || placed[path]?.version === version || optional || devOptional,
  );
}

// npm started this script, or it lies beside node; PATH is the last resort.
function npmProgram() {
  const candidates = [
    process.env.npm_execpath,
    join(dirname(dirname(process.execPath)), 'lib/node_modules/npm/bin/npm-cli.js'),
  ];
  return candidates.find((path) => path?.endsWith('npm-cli.js') && existsSync(path));
}
