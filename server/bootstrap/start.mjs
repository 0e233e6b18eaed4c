// `npm start`: from a bare machine to the whole chain at work. Plain JavaScript without dependencies,
// because nothing is installed yet when it begins.
import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { buildApplication, buildServer } from './build.mjs';
import { inRoot } from './folders.mjs';
import { checkPorts, openHouse, openPrivateDatabase } from './house.mjs';
import { claim } from './instance-lock.mjs';
import { checkNodeVersion, installPackages } from './packages.mjs';
import { PlainFailure, say, seconds, step } from './say.mjs';
import { chosenSettings } from './settings.mjs';
import { checkSystemPackages, installSystemPackages } from './system-packages.mjs';

const startedAt = Date.now();
let release = () => {};
let database;
let house;
let ending;

/** Ends everything in order, once; a second wish to stop does not wait. */
function end(exitCode, words) {
  if (ending) process.exit(exitCode || 1);
  if (words) say(words);
  ending = (async () => {
    const timeBefore = Date.now();
    await (house ? house.close() : database?.stop());
    release();
    if (house)
      say(
        `  Stopped in ${seconds(Date.now() - timeBefore)}. Your data stays in ${house.dataDirectory}`,
      );
    process.exit(exitCode);
  })();
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, () => end(0, '\n  Stopping ...'));
}
// npm that is killed outright cannot pass a signal on: its disappearance is the signal. Between npm
// and this process stands a shell, which outlives npm.
if (process.env.npm_lifecycle_event) {
  const before = starters();
  setInterval(() => starters() !== before && end(0), 1000).unref();
}

function starters() {
  const parent = process.ppid;
  try {
    const stat = readFileSync(`/proc/${parent}/stat`, 'utf8');
    return `${parent} ${stat.slice(stat.lastIndexOf(')') + 4).split(' ', 1)[0]}`;
  } catch {
    return `${parent}`;
  }
}

async function start() {
  checkNodeVersion();
  const settings = chosenSettings();
  const dataDirectory = resolve(process.env.THREEDAWN_DATA_DIR || inRoot('.data'));
  const origin = process.env.THREEDAWN_ORIGIN || `http://localhost:${settings.ports.web}`;
  release = claim(dataDirectory, origin);
  await checkPorts(settings);
  say('Threedawn is getting ready.');

  const needs = [...(settings.ownDatabase ? [] : ['mariadb']), 'chromium'];
  checkSystemPackages(needs);
  await together(installPackages(), installSystemPackages(needs));

  const applications = buildApplication('family').then(() => buildApplication('clinic'));
  const ground = together(buildServer(), openDatabase({ dataDirectory, settings }));
  await together(ground, applications);

  const opened = await openHouse({ dataDirectory, database });
  // A wish to stop may have come while the programs were starting.
  if (ending) {
    await opened.close();
    return;
  }
  house = opened;
  greet(house, Date.now() - startedAt);
  end(1, `  ${await house.fallen}`);
}

async function openDatabase({ dataDirectory, settings }) {
  if (settings.ownDatabase) return;
  await step('Starting the private database', async () => {
    database = await openPrivateDatabase({ dataDirectory, settings });
  });
}

/** Waits for all of them, then fails with the first failure: nothing is left half done unseen. */
async function together(...works) {
  const results = await Promise.allSettled(works);
  const failed = results.find(({ status }) => status === 'rejected');
  if (failed) throw failed.reason;
}

function greet({ origin, environment, dataDirectory: folder }, tookMs) {
  say();
  say(`Threedawn is ready after ${seconds(tookMs)}.`);
  say(`  Clinic    ${origin}/clinic/en/`);
  say(`  Families  ${origin}/en/`);
  const { signIns = [], links = [] } = demoSignIns(folder);
  if (environment.THREEDAWN_REHEARSAL === 'on') {
    say(
      `  Rehearsal ${origin}/clinic/en/rehearsal  (phones, mailboxes and a clock that can be moved)`,
    );
  }
  if (signIns.length > 0) say('\nDemo sign-ins (invented people):');
  for (const { who, name, password } of signIns) say(`  ${who.padEnd(24)} ${name}  ${password}`);
  for (const { who, url } of links) say(`  ${who.padEnd(24)} ${url}`);
  say(`\nLogs are in ${join(folder, 'logs')}. Ctrl-C stops everything; the data stays.`);
}

function demoSignIns(folder) {
  const file = join(folder, 'demo-sign-ins.json');
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : {};
}

start().catch((error) => {
  // Whoever stops the start stops its steps as well; their complaints are no news.
  if (ending) return;
  process.stderr.write(`\n${error instanceof PlainFailure ? error.message : error.stack}\n`);
  end(error.exitCode ?? 1);
});
