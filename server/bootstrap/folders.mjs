import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. Every program is started from here, wherever the person stands. */
export const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

export function inRoot(...parts) {
  return join(root, ...parts);
}
