import { createTable, type MigrationMaker } from './migration';

const alter =
  (name: string, table: string, ...changes: readonly string[]): MigrationMaker =>
  () => ({ name, statements: [`ALTER TABLE ${table} ${changes.join(', ')}`] });

/** Times and limits of messages, consents by number and purpose with their history, attempts, feeds, questions back. */
export const messageChanges: readonly MigrationMaker[] = [
  alter(
    '0801-times-of-messages',
    'sites',
    'ADD COLUMN IF NOT EXISTS ahead_text_days TINYINT UNSIGNED NOT NULL DEFAULT 3',
    "ADD COLUMN IF NOT EXISTS ahead_text_time TIME NOT NULL DEFAULT '10:00:00'",
    'ADD COLUMN IF NOT EXISTS nudge_minutes_before SMALLINT UNSIGNED NOT NULL DEFAULT 75',
    'ADD COLUMN IF NOT EXISTS texts_without_consent BOOLEAN NOT NULL DEFAULT FALSE',
  ),
  alter(
    '0802-end-of-messages',
    'messages',
    'ADD COLUMN IF NOT EXISTS ended_at DATETIME(3) NULL',
    'ADD COLUMN IF NOT EXISTS is_without_consent BOOLEAN NOT NULL DEFAULT FALSE',
    'ADD KEY IF NOT EXISTS messages_ended (ended_at)',
    'ADD KEY IF NOT EXISTS messages_address (address, sent_at)',
  ),
  createTable(
    '0803',
    'message_attempts',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     message_id BIGINT UNSIGNED NOT NULL,
     provider_id VARCHAR(190) NOT NULL,
     taken_at DATETIME(3) NOT NULL,
     UNIQUE KEY message_attempts_provider (provider_id, message_id),
     KEY message_attempts_message (message_id)`,
    'append-only',
  ),
  alter(
    '0804-consents-by-number',
    'contact_consents',
    `ADD COLUMN IF NOT EXISTS address VARCHAR(254) NULL COMMENT 'the number or address it was given for'`,
    'ADD COLUMN IF NOT EXISTS covers_letters BOOLEAN NOT NULL DEFAULT TRUE',
  ),
  createTable(
    '0805',
    'contact_consent_events',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     family_member_id BIGINT UNSIGNED NOT NULL,
     channel ENUM('sms','mail') NOT NULL,
     address VARCHAR(254) NOT NULL,
     purpose ENUM('visits','letters','early-morning') NOT NULL,
     event ENUM('given','withdrawn') NOT NULL,
     how VARCHAR(60) NOT NULL,
     wording_version VARCHAR(40) NOT NULL,
     language VARCHAR(20) NOT NULL,
     recorded_by_staff_id INT UNSIGNED NULL,
     at DATETIME(3) NOT NULL,
     KEY contact_consent_events_member (family_member_id, at),
     FOREIGN KEY (family_member_id) REFERENCES family_members (id)`,
    'append-only',
  ),
  createTable(
    '0806',
    'calendar_feeds',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     token_hash CHAR(64) NOT NULL,
     family_member_id BIGINT UNSIGNED NOT NULL,
     household_id BIGINT UNSIGNED NOT NULL,
     created_at DATETIME(3) NOT NULL,
     withdrawn_at DATETIME(3) NULL,
     UNIQUE KEY calendar_feeds_token (token_hash),
     KEY calendar_feeds_member (family_member_id),
     FOREIGN KEY (family_member_id) REFERENCES family_members (id)`,
  ),
  createTable(
    '0807',
    'reply_questions',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     family_member_id BIGINT UNSIGNED NOT NULL,
     morning_on DATE NOT NULL,
     morning_ids JSON NOT NULL COMMENT 'in the order of the digits that were offered',
     asked_at DATETIME(3) NOT NULL,
     answered_at DATETIME(3) NULL,
     UNIQUE KEY reply_questions_once (family_member_id, morning_on),
     FOREIGN KEY (family_member_id) REFERENCES family_members (id)`,
  ),
  // Done calls stay for ever; planning a night and following letters ask for those of one morning or person.
  alter(
    '0808-calls-are-found',
    'call_tasks',
    'ADD KEY IF NOT EXISTS call_tasks_morning (morning_id, reason)',
    'ADD KEY IF NOT EXISTS call_tasks_member (family_member_id, series_id)',
    'ADD KEY IF NOT EXISTS call_tasks_household (household_id)',
  ),
];
