import type { MigrationMaker } from './migration';

/** A version is a draft until it is signed: who changed it last, and a number that shows that somebody else did. */
const drafts =
  (name: string, table: string): MigrationMaker =>
  () => ({
    name,
    statements: [
      `ALTER TABLE ${table}
         ADD COLUMN IF NOT EXISTS draft_version INT UNSIGNED NOT NULL DEFAULT 1,
         ADD COLUMN IF NOT EXISTS changed_by_staff_id INT UNSIGNED NULL,
         ADD COLUMN IF NOT EXISTS changed_at DATETIME(3) NULL`,
    ],
  });

export const protocolChanges: readonly MigrationMaker[] = [
  drafts('0411-drafts-of-fasting-protocols', 'fasting_protocols'),
  drafts('0412-drafts-of-laboratory-profiles', 'laboratory_profiles'),
];
