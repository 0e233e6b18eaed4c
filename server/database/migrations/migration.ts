/** What the running application may do with a table. MariaDB has no partial revoke, so rights are given table by table. */
export type TableAccess = 'ordinary' | 'append-only';

export interface Migration {
  readonly name: string;
  readonly statements: readonly string[];
}

export interface MigrationTarget {
  readonly database: string;
  /** The account of the running application, or null when it is the migrating account itself. */
  readonly appUser: string | null;
}

export type MigrationMaker = (target: MigrationTarget) => Migration;

const rights: Record<TableAccess, string> = {
  ordinary: 'SELECT, INSERT, UPDATE, DELETE',
  'append-only': 'SELECT, INSERT',
};

/**
 * One table and the rights to it. Both statements can run again: MariaDB's data definition does not roll back, so a
 * migration that was cut off half-way is simply repeated.
 */
export function createTable(
  number: string,
  table: string,
  columns: string,
  access: TableAccess = 'ordinary',
): MigrationMaker {
  return ({ database, appUser }) => ({
    name: `${number}-create-${table.replaceAll('_', '-')}`,
    statements: [
      `CREATE TABLE IF NOT EXISTS \`${table}\` (${columns}) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_520_ci`,
      ...(appUser === null
        ? []
        : [`GRANT ${rights[access]} ON \`${database}\`.\`${table}\` TO '${appUser}'@'127.0.0.1'`]),
    ],
  });
}
