import { createTable, type MigrationMaker } from './migration';

const alter =
  (name: string, table: string, changes: readonly string[]): MigrationMaker =>
  () => ({ name, statements: [`ALTER TABLE ${table} ${changes.join(', ')}`] });

/** Mornings that are planned anew, what planning waits for, and what lies ready for a morning. */
export const replanChanges: readonly MigrationMaker[] = [
  // A number belongs to a specimen: a morning without one lets it go, and keeps it as what it would have been.
  alter('0601-mornings-give-numbers-back', 'mornings', [
    'ADD KEY IF NOT EXISTS mornings_series (series_id, planned_on)',
    `ADD COLUMN IF NOT EXISTS held_number TINYINT UNSIGNED
       GENERATED ALWAYS AS (IF(state IN ('lost', 'not-collected'), NULL, number)) VIRTUAL
       COMMENT 'the number while a specimen has it or will have it'`,
    'ADD UNIQUE KEY IF NOT EXISTS mornings_held_number (series_id, held_number)',
    'DROP KEY IF EXISTS mornings_number',
  ]),
  alter('0602-sites-plan-with-lead-times', 'sites', [
    `ADD COLUMN IF NOT EXISTS ride_lead_days TINYINT UNSIGNED NOT NULL DEFAULT 3
       COMMENT 'days from today to the first morning that needs a ride'`,
    `ADD COLUMN IF NOT EXISTS reporting_lead_days TINYINT UNSIGNED NOT NULL DEFAULT 0
       COMMENT 'days from today to the first morning while a report is due and not made; 0 asks for none'`,
    `ADD COLUMN IF NOT EXISTS longest_gap_days TINYINT UNSIGNED NOT NULL DEFAULT 7
       COMMENT 'between two mornings of one series'`,
  ]),
  alter('0603-series-know-their-rides', 'series', [
    'ADD COLUMN IF NOT EXISTS needs_ride BOOLEAN NOT NULL DEFAULT FALSE',
  ]),
  createTable(
    '0604',
    'replans',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     series_id BIGINT UNSIGNED NOT NULL,
     kind ENUM('next-possible-morning','new-run','close-with-fewer','move','pause') NOT NULL,
     reason VARCHAR(300) NOT NULL,
     mornings_before JSON NOT NULL,
     mornings_after JSON NOT NULL,
     chosen_by_staff_id INT UNSIGNED NOT NULL,
     chosen_at DATETIME(3) NOT NULL,
     KEY replans_series (series_id, chosen_at),
     FOREIGN KEY (series_id) REFERENCES series (id)`,
    'append-only',
  ),
  createTable(
    '0605',
    'supply_rules',
    `site_id INT UNSIGNED NOT NULL,
     item VARCHAR(40) NOT NULL,
     per_child TINYINT UNSIGNED NOT NULL,
     per_morning TINYINT UNSIGNED NOT NULL,
     children_per_spare TINYINT UNSIGNED NULL COMMENT 'one spare for so many children; null has none',
     under_months SMALLINT UNSIGNED NULL COMMENT 'only for children under this age',
     position TINYINT UNSIGNED NOT NULL,
     PRIMARY KEY (site_id, item),
     FOREIGN KEY (site_id) REFERENCES sites (id)`,
  ),
  createTable(
    '0606',
    'set_out_ticks',
    `site_id INT UNSIGNED NOT NULL,
     set_out_on DATE NOT NULL COMMENT 'the day of the morning',
     item VARCHAR(40) NOT NULL,
     is_ready BOOLEAN NOT NULL,
     note VARCHAR(200) NULL COMMENT 'what is missing',
     ticked_by_staff_id INT UNSIGNED NOT NULL,
     ticked_at DATETIME(3) NOT NULL,
     PRIMARY KEY (site_id, set_out_on, item),
     FOREIGN KEY (site_id) REFERENCES sites (id)`,
  ),
];
