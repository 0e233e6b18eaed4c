// Gathers the words of both applications into locales/ui/family.xlf and clinic.xlf, from which
// translations are made. With --check nothing is written: it fails when the gathered words differ.
import { mkdtempSync, readFileSync, rmSync, writeFileSync, existsSync } from 'node:fs';
import { join, relative } from 'node:path';
import { inRoot, root } from './folders.mjs';
import { runNode } from './run-program.mjs';
import { PlainFailure, say } from './say.mjs';

const applications = ['family', 'clinic'];

/** What one application says, as XLIFF 2 without places: a moved line is no change of words. */
async function wordsOf(application) {
  // The builder takes only folders of the workspace.
  const folder = mkdtempSync(inRoot('.words-'));
  try {
    await runNode(
      [
        'node_modules/@angular/cli/bin/ng.js',
        'extract-i18n',
        application,
        `--output-path=${relative(root, folder)}`,
        '--progress=false',
      ],
      {
        title: `Gathering the words of the ${application} application`,
        env: { ...process.env, NG_CLI_ANALYTICS: 'false' },
      },
    );
    return withoutPlaces(readFileSync(join(folder, `${application}.xlf`), 'utf8'));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function withoutPlaces(xliff) {
  return xliff
    .replace(/^\s*<note category="location">.*<\/note>\n/gm, '')
    .replace(/^\s*<notes>\s*<\/notes>\n/gm, '');
}

async function main(checkOnly) {
  const changed = [];
  for (const application of applications) {
    const file = inRoot('locales', 'ui', `${application}.xlf`);
    const words = await wordsOf(application);
    if (existsSync(file) && readFileSync(file, 'utf8') === words) continue;
    changed.push(relative(root, file));
    if (!checkOnly) writeFileSync(file, words);
  }
  if (changed.length === 0) return say('The gathered words are up to date.');
  if (!checkOnly) return say(`Written: ${changed.join(', ')}`);
  throw new PlainFailure(
    `${changed.join(' and ')} ${changed.length === 1 ? 'is' : 'are'} not what the applications say. Run: npm run extract-words`,
  );
}

main(process.argv.includes('--check')).catch((error) => {
  process.stderr.write(`${error instanceof PlainFailure ? error.message : error.stack}\n`);
  process.exitCode = 1;
});
