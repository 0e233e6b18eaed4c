import { createTable, type MigrationMaker } from './migration';

const alter =
  (name: string, table: string, changes: readonly string[]): MigrationMaker =>
  () => ({ name, statements: [`ALTER TABLE ${table} ${changes.join(', ')}`] });

/** What the clinic sets up itself: sites and rooms that are changed on a screen, holidays, closed mornings. */
export const siteChanges: readonly MigrationMaker[] = [
  alter('0701-sites-are-changed-on-a-screen', 'sites', [
    `ADD COLUMN IF NOT EXISTS dawn_languages JSON NOT NULL DEFAULT '["en"]'
       COMMENT 'languages spoken by who answers at dawn'`,
    'ADD COLUMN IF NOT EXISTS version INT UNSIGNED NOT NULL DEFAULT 1',
  ]),
  alter('0702-rooms-close-by-their-air', 'rooms', [
    `ADD COLUMN IF NOT EXISTS air_changes_per_hour DECIMAL(4,1) NULL
       COMMENT 'null where the closure was given in minutes'`,
    'ADD COLUMN IF NOT EXISTS cleared_percent DECIMAL(3,1) NULL',
    'ADD COLUMN IF NOT EXISTS is_in_use BOOLEAN NOT NULL DEFAULT TRUE',
    'ADD COLUMN IF NOT EXISTS version INT UNSIGNED NOT NULL DEFAULT 1',
  ]),
  createTable(
    '0703',
    'open_holidays',
    `site_id INT UNSIGNED NOT NULL,
     open_on DATE NOT NULL,
     PRIMARY KEY (site_id, open_on),
     FOREIGN KEY (site_id) REFERENCES sites (id)`,
  ),
  createTable(
    '0704',
    'closed_mornings',
    `id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     site_id INT UNSIGNED NOT NULL,
     closed_on DATE NOT NULL,
     reason ENUM('snow','courier','laboratory','ventilation','other') NOT NULL,
     says VARCHAR(120) NULL,
     closed_at DATETIME(3) NOT NULL,
     closed_by_staff_id INT UNSIGNED NOT NULL,
     UNIQUE KEY closed_mornings_day (site_id, closed_on),
     FOREIGN KEY (site_id) REFERENCES sites (id)`,
  ),
];
