import { familyTables } from './family-tables';
import { houseTables } from './house-tables';
import type { MigrationMaker } from './migration';
import { seriesTables } from './series-tables';
import { submissionsTable } from './submissions-table';
import { tellingTables } from './telling-tables';

/** Every change of the schema in order. Append only: a landed migration is never edited. */
export const migrations: readonly MigrationMaker[] = [
  ...houseTables,
  ...familyTables,
  ...seriesTables,
  ...tellingTables,
  submissionsTable,
];
