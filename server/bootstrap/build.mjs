// Builds what is stale: the server by tsc, the two applications by Angular, and beside every text
// file of theirs its compressed forms. `node server/bootstrap/build.mjs [server|family|clinic ...]`
import { existsSync, rmSync } from 'node:fs';
import { relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { inRoot } from './folders.mjs';
import { installPackages } from './packages.mjs';
import { precompress } from './precompress.mjs';
import { runNode } from './run-program.mjs';
import { PlainFailure, say, seconds, step } from './say.mjs';
import { buildStamp, filesUnder } from './stale.mjs';

const isNoSpec = (file) => !file.endsWith('.spec.ts');
const settings = ['package-lock.json', 'tsconfig.json'];

/** Compiles server/ and shared/ to build/ when they changed. */
export async function buildServer() {
  const stamp = buildStamp({
    name: 'server',
    inputs: [...settings, 'tsconfig.server.json', 'server', 'shared'],
    accept: (file) => /\.(ts|json)$/.test(file) && isNoSpec(file),
    outputs: ['build/server'],
  });
  if (stamp.isCurrent()) return;
  await step('Compiling the server', async () => {
    if (!existsSync(inRoot('build/server'))) {
      rmSync(inRoot('build/server.tsbuildinfo'), { force: true });
    }
    await runNode(['node_modules/typescript/bin/tsc', '-p', 'tsconfig.server.json'], {
      title: 'The compiler',
    });
    removeOrphans();
    stamp.write();
  });
}

// tsc leaves the output of a source that was removed; a migration or a route must not live on so.
function removeOrphans() {
  for (const folder of ['build/server', 'build/shared']) {
    for (const file of filesUnder(folder, (path) => path.endsWith('.js'))) {
      const source = relative(inRoot('build'), file).replace(/\.js$/, '.ts');
      if (existsSync(inRoot(source))) continue;
      rmSync(file);
      rmSync(`${file}.map`, { force: true });
    }
  }
}

/** Builds one application ('family' or 'clinic') when it changed, and compresses what it serves. */
export async function buildApplication(name) {
  const stamp = buildStamp({
    name,
    inputs: [
      ...settings,
      'tsconfig.app.json',
      'angular.json',
      'ngsw-config.json',
      `src/${name}`,
      'src/common',
      'shared',
      'locales/ui',
    ],
    accept: isNoSpec,
    outputs: [`dist/${name}/en/index.html`],
  });
  if (stamp.isCurrent()) return;
  await step(`Building the ${name} application`, async () => {
    await runNode(['node_modules/@angular/cli/bin/ng.js', 'build', name], {
      title: `The build of the ${name} application`,
      // Joined chunks: 4 kB less for the first page of a family's phone, measured.
      env: {
        ...process.env,
        NG_CLI_ANALYTICS: 'false',
        NG_BUILD_OPTIMIZE_CHUNKS: '1',
        FORCE_COLOR: '0',
      },
    });
    await precompress(inRoot('dist', name));
    stamp.write();
  });
}

/** Everything. The server is compiled beside the applications, which are built one after the other. */
export async function buildAll() {
  const server = buildServer();
  const applications = buildApplication('family').then(() => buildApplication('clinic'));
  const results = await Promise.allSettled([server, applications]);
  const failed = results.find(({ status }) => status === 'rejected');
  if (failed) throw failed.reason;
}

async function main(names) {
  const startedAt = Date.now();
  await installPackages();
  if (names.length === 0) await buildAll();
  for (const name of names) {
    if (name === 'server') await buildServer();
    else if (name === 'family' || name === 'clinic') await buildApplication(name);
    else throw new PlainFailure(`There is no part named ${name}: server, family or clinic.`);
  }
  say(`  Everything is built (${seconds(Date.now() - startedAt)}).`);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  main(process.argv.slice(2)).catch((error) => {
    process.stderr.write(`${error instanceof PlainFailure ? error.message : error.stack}\n`);
    process.exitCode = 1;
  });
}
