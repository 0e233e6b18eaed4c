// `npm run check`: what a change must pass before it is handed on, in about a minute: format, lint, types,
// words, and every test that needs no whole house.
import { inRoot } from '../server/bootstrap/folders.mjs';
import { checkNodeVersion, installPackages } from '../server/bootstrap/packages.mjs';
import { say, seconds } from '../server/bootstrap/say.mjs';
import { jest } from './support/counted.mjs';
import { format, lint, Tally, typeChecks, words } from './support/steps.mjs';

const startedAt = Date.now();
const tally = new Tally();

checkNodeVersion();
await installPackages();
await tally.step('Format', format);
await tally.step('Lint', lint);
for (const [title, check] of typeChecks) await tally.step(title, check);
await tally.step('Translations are whole', words);
await tally.step('Domain, house rules and applications', () =>
  jest({ projects: ['domain', 'house', 'web'] }),
);
await tally.step('Server, the specs beside their files', () =>
  jest({ projects: ['server'], paths: [inRoot('server')] }),
);
say(`\nAll of it took ${seconds(Date.now() - startedAt)}.`);
tally.close();
