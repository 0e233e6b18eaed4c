import { alertTables } from './alert-tables';
import { familyTables } from './family-tables';
import { houseTables } from './house-tables';
import { messageChanges } from './message-changes';
import { individualPlanTables } from './individual-plan-tables';
import type { MigrationMaker } from './migration';
import { replanChanges } from './replan-changes';
import { protocolChanges } from './protocol-changes';
import { sayItBackTables } from './say-it-back-tables';
import { seriesTables } from './series-tables';
import { siteChanges } from './site-changes';
import { submissionsTable } from './submissions-table';
import { tellingTables } from './telling-tables';

/** Every change of the schema in order. Append only: a landed migration is never edited. */
export const migrations: readonly MigrationMaker[] = [
  ...houseTables,
  ...familyTables,
  ...seriesTables,
  ...tellingTables,
  submissionsTable,
  ...siteChanges,
  ...messageChanges,
  ...individualPlanTables,
  ...replanChanges,
  ...protocolChanges,
  ...alertTables,
  ...sayItBackTables,
];
