import { createTable, type MigrationMaker } from './migration';

/** Plans that a clinician composed for one child, what a family told about its usual nights, and what the door hears. */
export const individualPlanTables: readonly MigrationMaker[] = [
  createTable(
    '0501',
    'individual_plans',
    `id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
     child_id BIGINT UNSIGNED NOT NULL,
     version INT UNSIGNED NOT NULL,
     series_id BIGINT UNSIGNED NULL COMMENT 'null: by the days',
     effective_from DATE NULL,
     effective_until DATE NULL,
     body JSON NOT NULL,
     signed_by_staff_id INT UNSIGNED NOT NULL,
     signed_at DATETIME(3) NOT NULL,
     ended_at DATETIME(3) NULL,
     ended_by_staff_id INT UNSIGNED NULL,
     end_reason VARCHAR(200) NULL,
     UNIQUE KEY individual_plans_version (child_id, version),
     FOREIGN KEY (child_id) REFERENCES children (id),
     FOREIGN KEY (series_id) REFERENCES series (id)`,
  ),
  () => ({
    name: '0502-add-usual-nights',
    statements: [
      'ALTER TABLE children ADD COLUMN IF NOT EXISTS usual_last_meal_time TIME NULL AFTER cautions',
      `ALTER TABLE children ADD COLUMN IF NOT EXISTS night_feed_times JSON NULL
         COMMENT 'local times, HH:mm' AFTER usual_last_meal_time`,
    ],
  }),
  () => ({
    name: '0503-tell-water-from-meals-at-the-door',
    statements: [
      'ALTER TABLE door_checks ADD COLUMN IF NOT EXISTS food_item VARCHAR(20) NULL AFTER last_food_at',
      'ALTER TABLE door_checks ADD COLUMN IF NOT EXISTS drink_item VARCHAR(20) NULL AFTER last_drink_at',
      'ALTER TABLE door_checks ADD COLUMN IF NOT EXISTS blood_glucose_mg_dl SMALLINT UNSIGNED NULL AFTER is_well',
      'ALTER TABLE door_checks ADD COLUMN IF NOT EXISTS explanation JSON NULL AFTER verdict',
      'ALTER TABLE fasting_checks ADD COLUMN IF NOT EXISTS explanation JSON NULL AFTER verdict',
      'ALTER TABLE collections ADD COLUMN IF NOT EXISTS ceiling_reason VARCHAR(300) NULL AFTER begun_by_staff_id',
    ],
  }),
];
