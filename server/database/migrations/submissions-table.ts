import { createTable } from './migration';

/** Keys that forms send with what they add, so that a repeated submit answers like the first and adds nothing. */
export const submissionsTable = createTable(
  '0401',
  'submissions',
  `matter VARCHAR(40) NOT NULL,
   submission_key CHAR(36) NOT NULL,
   ref_id BIGINT UNSIGNED NULL,
   created_at DATETIME(3) NOT NULL,
   PRIMARY KEY (matter, submission_key)`,
);
