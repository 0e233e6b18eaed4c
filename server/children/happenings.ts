import type { Sequelize } from 'sequelize';
import type { z } from 'zod';
import { can, isRole, type Right } from '../../shared/access/rights';
import type { happening } from '../../shared/contracts/children';
import type { StaffMember } from '../auth/current-user';
import { select } from '../database/connection';
import { withoutLinks } from './without-links';

export type Happening = z.infer<typeof happening>;

interface HappeningRow {
  at: Date;
  kind: string;
  says: string;
  by: string | null;
}

interface Source {
  /** Without it the reader does not see these rows. */
  readonly right: Right;
  /** Columns at, kind, says, by; rows of one child (:childId) and its household (:householdId). */
  readonly sql: string;
}

const staffName = (column: string): string =>
  `(SELECT full_name FROM staff WHERE staff.id = ${column})`;
const memberName = (column: string): string =>
  `(SELECT full_name FROM family_members WHERE family_members.id = ${column})`;
const minutes = (column: string): string => `TIMESTAMPDIFF(MINUTE, ${column})`;

const sources: readonly Source[] = [
  {
    right: 'orders.read',
    sql: `SELECT created_at AS at, 'order' AS kind,
        CONCAT('Order for ', mornings_planned, ' mornings, asked by ', ordered_by_name, '.') AS says,
        ${staffName('created_by_staff_id')} AS \`by\`
      FROM orders WHERE child_id = :childId
      UNION ALL
      SELECT signed_at, 'order', 'Order signed.', ${staffName('signed_by_staff_id')}
      FROM orders WHERE child_id = :childId AND signed_at IS NOT NULL
      UNION ALL
      SELECT reported_at, 'order', 'Reported to the health department.', ${staffName('reported_by_staff_id')}
      FROM orders WHERE child_id = :childId AND reported_at IS NOT NULL`,
  },
  {
    right: 'consents.read',
    sql: `SELECT given_at AS at, 'consent' AS kind,
        CONCAT('Consent by ', ${memberName('family_member_id')}, IF(how = 'telephone', ', by telephone', ', in person'),
          ', form ', form_version, '.') AS says,
        ${staffName('recorded_by_staff_id')} AS \`by\`
      FROM procedure_consents WHERE order_id IN (SELECT id FROM orders WHERE child_id = :childId)`,
  },
  {
    right: 'series.read',
    sql: `SELECT created_at AS at, 'series' AS kind,
        CONCAT('Series of ', mornings_planned, ' mornings planned.') AS says,
        ${staffName('created_by_staff_id')} AS \`by\`
      FROM series WHERE child_id = :childId
      UNION ALL
      SELECT closed_at, 'series', CONCAT('Series closed: ', COALESCE(close_reason, 'complete')), NULL
      FROM series WHERE child_id = :childId AND closed_at IS NOT NULL`,
  },
  {
    right: 'messages.read',
    sql: `SELECT COALESCE(sent_at, due_at) AS at, 'message' AS kind,
        CONCAT(IF(channel = 'sms', 'Text', 'E-mail'), ' to ', COALESCE(${memberName('family_member_id')}, 'the family'),
          CASE WHEN delivered_at IS NOT NULL THEN ', delivered: ' WHEN sent_at IS NOT NULL THEN ', sent: '
            WHEN state IN ('failed', 'given-up') THEN ', not sent: ' ELSE ', to be sent: ' END,
          COALESCE(subject, body)) AS says,
        NULL AS \`by\`
      FROM messages WHERE household_id = :householdId AND state <> 'withdrawn' AND kind NOT LIKE '%code%'
      UNION ALL
      SELECT received_at, 'answer', CONCAT('Text answer: ', body), ${memberName('family_member_id')}
      FROM replies WHERE household_id = :householdId`,
  },
  {
    right: 'mornings.read',
    sql: `SELECT checks.received_at AS at, 'answer' AS kind,
        CONCAT('Morning ', mornings.number, ', by ', checks.source, ': ',
          CASE checks.answer WHEN 'nothing' THEN 'nothing eaten or drunk' WHEN 'sip' THEN 'a sip'
            WHEN 'feed' THEN 'ate or drank' WHEN 'unsure' THEN 'not sure' WHEN 'not-coming' THEN 'not coming'
            WHEN 'ill' THEN 'ill' ELSE 'running late' END, '.') AS says,
        ${memberName('checks.family_member_id')} AS \`by\`
      FROM fasting_checks checks JOIN mornings ON mornings.id = checks.morning_id
      WHERE mornings.child_id = :childId
      UNION ALL
      SELECT arrived_at, 'arrival', CONCAT('Morning ', number, ': arrived.'), NULL
      FROM mornings WHERE child_id = :childId AND arrived_at IS NOT NULL
      UNION ALL
      SELECT checks.checked_at, 'door-check',
        CONCAT('Door check, morning ', mornings.number, ': ',
          CASE checks.verdict WHEN 'long-enough' THEN 'fasted long enough' WHEN 'not-long-enough'
            THEN 'not fasted long enough' ELSE 'fasting not certain' END,
          ', brought by ', checks.brought_by, IF(checks.is_well, '.', ', not well.')),
        ${staffName('checks.checked_by_staff_id')}
      FROM door_checks checks JOIN mornings ON mornings.id = checks.morning_id
      WHERE mornings.child_id = :childId
      UNION ALL
      SELECT COALESCE(collections.ended_at, collections.begun_at), 'collection',
        CONCAT('Morning ', mornings.number, ': ', CASE COALESCE(collections.outcome, 'begun')
          WHEN 'collected' THEN 'collected.' WHEN 'not-collected'
          THEN CONCAT('not collected, ', COALESCE(collections.not_collected_reason, 'no reason given'), '.')
          ELSE 'collection begun.' END),
        ${staffName('collections.begun_by_staff_id')}
      FROM collections JOIN mornings ON mornings.id = collections.morning_id
      WHERE mornings.child_id = :childId`,
  },
  {
    right: 'specimens.read',
    sql: `SELECT collected_at AS at, 'specimen' AS kind,
        CONCAT('Specimen ', number, ': ', TRIM(TRAILING '.0' FROM volume_ml), ' mL',
          IF(neutralised_at IS NULL, '.',
            CONCAT(', neutralised after ', ${minutes('collected_at, neutralised_at')}, ' minutes.'))) AS says,
        NULL AS \`by\`
      FROM specimens WHERE child_id = :childId
      UNION ALL
      SELECT received_at, 'specimen', CONCAT('Specimen ', number, ': received by the laboratory',
        COALESCE(CONCAT(', number ', laboratory_number), ''), '.'), NULL
      FROM specimens WHERE child_id = :childId AND received_at IS NOT NULL
      UNION ALL
      SELECT rejected_at, 'specimen', CONCAT('Specimen ', number, ': rejected, ', COALESCE(reject_reason, ''), '.'), NULL
      FROM specimens WHERE child_id = :childId AND rejected_at IS NOT NULL`,
  },
  {
    right: 'results.read',
    sql: `SELECT results.entered_at AS at, 'result' AS kind,
        CONCAT('Specimen ', specimens.number, ', ', results.test, ': ', REPLACE(results.value, '-', ' '), ' (',
          results.finality, IF(results.replaces_result_id IS NULL, '', ', corrected'), ').') AS says,
        ${staffName('results.entered_by_staff_id')} AS \`by\`
      FROM results JOIN specimens ON specimens.id = results.specimen_id
      WHERE results.child_id = :childId`,
  },
  {
    right: 'letters.read',
    sql: `SELECT signed_at AS at, 'letter' AS kind, 'Letter signed.' AS says, ${staffName('signed_by_staff_id')} AS \`by\`
      FROM letters WHERE child_id = :childId
      UNION ALL
      SELECT released_at, 'letter', 'Letter released to the family.', ${staffName('released_by_staff_id')}
      FROM letters WHERE child_id = :childId AND released_at IS NOT NULL
      UNION ALL
      SELECT recipients.first_opened_at, 'seen', 'Letter opened by the family.', ${memberName('recipients.family_member_id')}
      FROM letter_recipients recipients JOIN letters ON letters.id = recipients.letter_id
      WHERE letters.child_id = :childId AND recipients.first_opened_at IS NOT NULL`,
  },
  {
    right: 'calls.read',
    sql: `SELECT done_at AS at, 'call' AS kind,
        CONCAT('Call: ', REPLACE(COALESCE(outcome, 'done'), '-', ' '), '.') AS says,
        ${staffName('done_by_staff_id')} AS \`by\`
      FROM call_tasks
      WHERE done_at IS NOT NULL AND (child_id = :childId OR (child_id IS NULL AND household_id = :householdId))`,
  },
];

/** Everything that happened around a child in one column of time, newest first, as far as the reader's roles reach. */
export async function happeningsOf(
  db: Sequelize,
  staff: StaffMember,
  child: { readonly id: number; readonly householdId: number },
): Promise<Happening[]> {
  const roles = staff.roles.filter(isRole);
  const visible = sources.filter((source) => can(roles, source.right));
  const found = await Promise.all(
    visible.map(({ sql }) =>
      select<HappeningRow>(db, sql, { childId: child.id, householdId: child.householdId }),
    ),
  );
  return found
    .flat()
    .sort((left, right) => right.at.getTime() - left.at.getTime())
    .map(({ at, says, ...row }) => ({ ...row, says: withoutLinks(says), at: at.toISOString() }));
}
