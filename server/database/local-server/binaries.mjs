// Finds the programs of a MariaDB installation without asking PATH alone: /usr/sbin is not on the
// PATH of an ordinary Debian user, and mariadbd lives there.
import { accessSync, constants } from 'node:fs';
import { join } from 'node:path';

const folders = [
  '/usr/sbin',
  '/usr/bin',
  '/usr/local/sbin',
  '/usr/local/bin',
  '/usr/local/mysql/bin',
  '/usr/local/mariadb/bin',
];

/** The absolute path of a program, or undefined when no folder has it. */
export function findProgram(name) {
  const onPath = (process.env.PATH ?? '').split(':').filter((folder) => folder.startsWith('/'));
  for (const folder of new Set([...folders, ...onPath])) {
    const path = join(folder, name);
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {
      // Not here: the next folder.
    }
  }
  return undefined;
}

/** Debian packages that are enough for a private instance; they start no service of their own. */
export const mariadbPackages = ['mariadb-server-core', 'mariadb-client-core'];

/** All three programs of a private instance as absolute paths, or undefined when one is missing. */
export function findMariadb() {
  const server = findProgram('mariadbd');
  const initialiser = findProgram('mariadb-install-db');
  const client = findProgram('mariadb');
  return server && initialiser && client ? { server, initialiser, client } : undefined;
}
