import { createTable, type MigrationMaker } from './migration';

const alter =
  (name: string, table: string, changes: readonly string[]): MigrationMaker =>
  () => ({ name, statements: [`ALTER TABLE ${table} ${changes.join(', ')}`] });

/** Who is on call, how each is reached, and the alerts with everything that became of them. */
export const alertTables: readonly MigrationMaker[] = [
  alter('0901-sites-have-an-on-call-list', 'sites', [
    'ADD COLUMN IF NOT EXISTS alert_wait_minutes SMALLINT UNSIGNED NOT NULL DEFAULT 10',
    'ADD COLUMN IF NOT EXISTS on_call_version INT UNSIGNED NOT NULL DEFAULT 1',
  ]),
  alter('0902-staff-are-alerted', 'staff', [
    'ADD COLUMN IF NOT EXISTS alerts_by_text BOOLEAN NOT NULL DEFAULT FALSE',
    'ADD COLUMN IF NOT EXISTS alerts_by_mail BOOLEAN NOT NULL DEFAULT TRUE',
    "ADD COLUMN IF NOT EXISTS alerts_language VARCHAR(20) NOT NULL DEFAULT 'en'",
  ]),
  createTable(
    '0903',
    'on_call_turns',
    `id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     site_id INT UNSIGNED NOT NULL,
     staff_id INT UNSIGNED NOT NULL,
     deputy_staff_id INT UNSIGNED NULL,
     weekdays JSON NOT NULL,
     from_time TIME NOT NULL,
     until_time TIME NOT NULL,
     from_on DATE NOT NULL,
     until_on DATE NULL,
     KEY on_call_turns_site (site_id, id),
     FOREIGN KEY (site_id) REFERENCES sites (id),
     FOREIGN KEY (staff_id) REFERENCES staff (id),
     FOREIGN KEY (deputy_staff_id) REFERENCES staff (id)`,
  ),
  createTable(
    '0904',
    'alerts',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     alert_key VARCHAR(190) NOT NULL COMMENT 'kind and cause: one alert a cause, for ever',
     kind VARCHAR(40) NOT NULL,
     site_id INT UNSIGNED NOT NULL,
     count INT UNSIGNED NOT NULL DEFAULT 1 COMMENT 'families or reports it is about',
     raised_at DATETIME(3) NOT NULL,
     useful_until DATETIME(3) NOT NULL,
     told_staff_id INT UNSIGNED NULL,
     passes_on_at DATETIME(3) NULL,
     taken_at DATETIME(3) NULL,
     taken_by_staff_id INT UNSIGNED NULL,
     ended_at DATETIME(3) NULL,
     UNIQUE KEY alerts_once (alert_key),
     KEY alerts_due (passes_on_at),
     KEY alerts_kind (site_id, kind, id),
     KEY alerts_ended (ended_at),
     FOREIGN KEY (site_id) REFERENCES sites (id)`,
  ),
  createTable(
    '0905',
    'alert_events',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     alert_id BIGINT UNSIGNED NOT NULL,
     event ENUM('told','not-taken','undelivered','passed-on','taken','nobody','over') NOT NULL,
     staff_id INT UNSIGNED NULL,
     at DATETIME(3) NOT NULL,
     KEY alert_events_alert (alert_id, id),
     FOREIGN KEY (alert_id) REFERENCES alerts (id)`,
    'append-only',
  ),
];
