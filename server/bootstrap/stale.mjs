import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { inRoot, root } from './folders.mjs';

/** All files under a folder of the checkout (or the file itself), as sorted absolute paths. */
export function filesUnder(path, accept = () => true) {
  const start = inRoot(path);
  if (!existsSync(start)) return [];
  if (statSync(start).isFile()) return [start];
  return readdirSync(start, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath ?? entry.path, entry.name))
    .filter(accept)
    .sort();
}

/** One hash over names and contents: a touched file that did not change is not a change. */
export function hashOf(files) {
  const hash = createHash('sha256').update(process.version);
  for (const file of files) {
    hash.update(`\0${relative(root, file)}\0`).update(readFileSync(file));
  }
  return hash.digest('hex');
}

/**
 * Remembers from which inputs something was built.
 *
 * `inputs` are paths in the checkout, `outputs` must exist for the thing to count as built.
 */
export function buildStamp({ name, inputs, accept, outputs }) {
  const file = inRoot('build', 'stamps', name);
  const hash = hashOf(inputs.flatMap((input) => filesUnder(input, accept)));
  return {
    isCurrent: () =>
      outputs.every((output) => existsSync(inRoot(output))) &&
      existsSync(file) &&
      readFileSync(file, 'utf8') === hash,
    write: () => {
      mkdirSync(dirname(file), { recursive: true });
      writeFileSync(file, hash);
    },
  };
}
