import { createTable, type MigrationMaker } from './migration';

/** What families told in their own words before a night, word for word; one row for each child it is about. */
export const sayItBackTables: readonly MigrationMaker[] = [
  createTable(
    '1001',
    'say_backs',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     series_id BIGINT UNSIGNED NOT NULL,
     morning_id BIGINT UNSIGNED NOT NULL,
     family_member_id BIGINT UNSIGNED NOT NULL,
     submission_key VARCHAR(64) NOT NULL,
     question VARCHAR(20) NOT NULL,
     choice VARCHAR(20) NOT NULL,
     is_right BOOLEAN NOT NULL,
     said JSON NOT NULL COMMENT 'question, answer and explanation word for word, with wording keys and versions',
     language VARCHAR(20) NOT NULL,
     device_at DATETIME(3) NOT NULL,
     received_at DATETIME(3) NOT NULL,
     UNIQUE KEY say_backs_submission (submission_key, morning_id),
     KEY say_backs_series (series_id, question),
     KEY say_backs_morning (morning_id, received_at),
     FOREIGN KEY (morning_id) REFERENCES mornings (id)`,
    'append-only',
  ),
];
