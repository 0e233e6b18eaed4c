import { identifier, literal, runAsRoot } from './root-client.mjs';

// With skip-name-resolve a connection over loopback comes from this address, never from 'localhost'.
const host = '127.0.0.1';

export const accountNames = { app: 'threedawn_app', migrate: 'threedawn_migrate' };

const migrateRights = [
  'SELECT',
  'INSERT',
  'UPDATE',
  'DELETE',
  'CREATE',
  'ALTER',
  'DROP',
  'INDEX',
  'REFERENCES',
  'CREATE VIEW',
  'SHOW VIEW',
  'TRIGGER',
  'DELETE HISTORY',
].join(', ');

/** Makes both accounts, or gives them new passwords. */
export function accountStatements(passwords) {
  return Object.entries(accountNames)
    .map(([key, name]) => {
      const account = `${literal(name)}@${literal(host)}`;
      const password = literal(passwords[key]);
      return (
        `CREATE USER IF NOT EXISTS ${account} IDENTIFIED BY ${password};\n` +
        `ALTER USER ${account} IDENTIFIED BY ${password};`
      );
    })
    .join('\n');
}

/**
 * Makes a schema and lets the migrations work in it. The application's own account gets nothing here:
 * each migration grants what its table needs, because a grant on the whole schema could not be taken
 * back for the append-only tables.
 */
export function schemaStatements(schema) {
  const pattern = identifier(schema.replaceAll('_', '\\_'));
  return [
    `CREATE DATABASE IF NOT EXISTS ${identifier(schema)} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_520_ci;`,
    `GRANT ${migrateRights} ON ${pattern}.* TO ${literal(accountNames.migrate)}@${literal(host)} WITH GRANT OPTION;`,
  ].join('\n');
}

/** Accounts and schema in one visit. `passwords` is `{ app, migrate }`. */
export function prepareSchema(connection, schema, passwords) {
  return runAsRoot(connection, `${accountStatements(passwords)}\n${schemaStatements(schema)}\n`);
}

/** The address that the application or the migrations use. */
export function databaseUrl({ account, password, port, schema }) {
  return `mysql://${account}:${encodeURIComponent(password)}@${host}:${port}/${schema}`;
}
