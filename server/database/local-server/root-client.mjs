import { spawn } from 'node:child_process';
import { owner } from './options.mjs';

/**
 * Runs statements as the database root over the private socket. They travel by standard input, so
 * that no password shows in the list of processes. Answers the raw rows as text.
 */
export function runAsRoot({ client, socket }, statements, database = '') {
  return new Promise((resolve, reject) => {
    const child = spawn(
      client,
      [
        '--no-defaults',
        '--protocol=socket',
        `--socket=${socket}`,
        `--user=${owner()}`,
        '--default-character-set=utf8mb4',
        '--batch',
        '--skip-column-names',
        ...(database ? [database] : []),
      ],
      { stdio: ['pipe', 'pipe', 'pipe'] },
    );
    let rows = '';
    let words = '';
    child.stdout.on('data', (chunk) => (rows += chunk));
    child.stderr.on('data', (chunk) => (words += chunk));
    child.stdin.on('error', () => undefined);
    child.on('error', reject);
    child.on('close', (code) =>
      code === 0 ? resolve(rows) : reject(new Error(`The database refused: ${words.trim()}`)),
    );
    child.stdin.end(statements);
  });
}

/** A text as an SQL literal; the server runs without NO_BACKSLASH_ESCAPES. */
export function literal(text) {
  return `'${String(text).replaceAll('\\', '\\\\').replaceAll("'", "''")}'`;
}

/** A name as an SQL identifier. */
export function identifier(name) {
  return `\`${String(name).replaceAll('`', '``')}\``;
}
