import type { Right } from '../../shared/access/rights';

export interface HappeningSource {
  /** Without it the reader does not see these rows. */
  readonly right: Right;
  /** Columns at, kind, facts, by; rows of one child (:childId) and its household (:householdId). */
  readonly sql: string;
}

const staffName = (column: string): string =>
  `(SELECT full_name FROM staff WHERE staff.id = ${column})`;
const memberName = (column: string): string =>
  `(SELECT full_name FROM family_members WHERE family_members.id = ${column})`;

/** Facts of a sentence 'clinic.happening.<key>'; without parameters by default. */
const facts = (key: string, parameters = ''): string =>
  `JSON_OBJECT('key', '${key}'${parameters === '' ? '' : `, ${parameters}`})`;

export const happeningSources: readonly HappeningSource[] = [
  {
    right: 'orders.read',
    sql: `SELECT created_at AS at, 'order' AS kind,
        ${facts('order', `'mornings', mornings_planned, 'orderedBy', ordered_by_name`)} AS facts,
        ${staffName('created_by_staff_id')} AS \`by\`
      FROM orders WHERE child_id = :childId
      UNION ALL
      SELECT signed_at, 'order', ${facts('order-signed')}, ${staffName('signed_by_staff_id')}
      FROM orders WHERE child_id = :childId AND signed_at IS NOT NULL
      UNION ALL
      SELECT reported_at, 'order', ${facts('order-reported')}, ${staffName('reported_by_staff_id')}
      FROM orders WHERE child_id = :childId AND reported_at IS NOT NULL`,
  },
  {
    right: 'orders.read',
    sql: `SELECT signed_at AS at, 'order' AS kind, ${facts('own-plan', `'version', version`)} AS facts,
        ${staffName('signed_by_staff_id')} AS \`by\`
      FROM individual_plans WHERE child_id = :childId
      UNION ALL
      SELECT ended_at, 'order', ${facts('own-plan-ended', `'version', version, 'reason', end_reason`)},
        ${staffName('ended_by_staff_id')}
      FROM individual_plans WHERE child_id = :childId AND ended_at IS NOT NULL`,
  },
  {
    right: 'consents.read',
    sql: `SELECT given_at AS at, 'consent' AS kind,
        ${facts('consent', `'who', ${memberName('family_member_id')}, 'how', how, 'form', form_version`)} AS facts,
        ${staffName('recorded_by_staff_id')} AS \`by\`
      FROM procedure_consents WHERE order_id IN (SELECT id FROM orders WHERE child_id = :childId)`,
  },
  {
    right: 'series.read',
    sql: `SELECT created_at AS at, 'series' AS kind, ${facts('series', `'mornings', mornings_planned`)} AS facts,
        ${staffName('created_by_staff_id')} AS \`by\`
      FROM series WHERE child_id = :childId
      UNION ALL
      SELECT closed_at, 'series', ${facts('series-closed', `'reason', COALESCE(close_reason, 'complete')`)}, NULL
      FROM series WHERE child_id = :childId AND closed_at IS NOT NULL`,
  },
  {
    right: 'messages.read',
    sql: `SELECT COALESCE(sent_at, due_at) AS at, 'message' AS kind,
        ${facts(
          'message',
          `'channel', channel, 'who', COALESCE(${memberName('family_member_id')}, 'family'),
          'state', CASE WHEN delivered_at IS NOT NULL THEN 'delivered' WHEN sent_at IS NOT NULL THEN 'sent'
            WHEN state IN ('failed', 'given-up') THEN 'failed' ELSE 'waiting' END,
          'text', COALESCE(subject, body)`,
        )} AS facts,
        NULL AS \`by\`
      FROM messages WHERE household_id = :householdId AND state <> 'withdrawn' AND kind NOT LIKE '%code%'
      UNION ALL
      SELECT received_at, 'answer', ${facts('text-answer', `'text', body`)}, ${memberName('family_member_id')}
      FROM replies WHERE household_id = :householdId`,
  },
  {
    right: 'mornings.read',
    sql: `SELECT checks.received_at AS at, 'answer' AS kind,
        ${facts(
          'answer',
          `'number', mornings.number, 'source', checks.source, 'answer', REPLACE(checks.answer, '-', '')`,
        )} AS facts,
        ${memberName('checks.family_member_id')} AS \`by\`
      FROM fasting_checks checks JOIN mornings ON mornings.id = checks.morning_id
      WHERE mornings.child_id = :childId
      UNION ALL
      SELECT said.received_at, 'answer',
        ${facts('said-back', `'question', said.question, 'isRight', IF(said.is_right, 'yes', 'no')`)},
        ${memberName('said.family_member_id')}
      FROM say_backs said JOIN mornings ON mornings.id = said.morning_id
      WHERE mornings.child_id = :childId
      UNION ALL
      SELECT arrived_at, 'arrival', ${facts('arrived', `'number', number`)}, NULL
      FROM mornings WHERE child_id = :childId AND arrived_at IS NOT NULL
      UNION ALL
      SELECT checks.checked_at, 'door-check',
        ${facts(
          'door-check',
          `'number', mornings.number, 'broughtBy', checks.brought_by,
          'verdict', CASE checks.verdict WHEN 'long-enough' THEN 'long' WHEN 'not-long-enough' THEN 'short' ELSE 'open' END,
          'isWell', IF(checks.is_well, 'yes', 'no')`,
        )},
        ${staffName('checks.checked_by_staff_id')}
      FROM door_checks checks JOIN mornings ON mornings.id = checks.morning_id
      WHERE mornings.child_id = :childId
      UNION ALL
      SELECT COALESCE(collections.ended_at, collections.begun_at), 'collection',
        JSON_OBJECT('key', COALESCE(collections.outcome, 'begun'), 'number', mornings.number,
          'reason', COALESCE(collections.not_collected_reason, 'none')),
        ${staffName('collections.begun_by_staff_id')}
      FROM collections JOIN mornings ON mornings.id = collections.morning_id
      WHERE mornings.child_id = :childId`,
  },
  {
    right: 'specimens.read',
    sql: `SELECT collected_at AS at, 'specimen' AS kind,
        JSON_OBJECT('key', IF(neutralised_at IS NULL, 'specimen', 'specimen-neutralised'), 'number', number,
          'volume', TRIM(TRAILING '.0' FROM volume_ml),
          'minutes', COALESCE(TIMESTAMPDIFF(MINUTE, collected_at, neutralised_at), 0)) AS facts,
        NULL AS \`by\`
      FROM specimens WHERE child_id = :childId
      UNION ALL
      SELECT received_at, 'specimen',
        ${facts('received', `'number', number, 'laboratoryNumber', COALESCE(laboratory_number, 'none')`)}, NULL
      FROM specimens WHERE child_id = :childId AND received_at IS NOT NULL
      UNION ALL
      SELECT rejected_at, 'specimen', ${facts('rejected', `'number', number, 'reason', COALESCE(reject_reason, 'none')`)},
        NULL
      FROM specimens WHERE child_id = :childId AND rejected_at IS NOT NULL`,
  },
  {
    right: 'results.read',
    sql: `SELECT results.entered_at AS at, 'result' AS kind,
        ${facts(
          'result',
          `'number', specimens.number, 'test', results.test, 'value', results.value, 'finality', results.finality,
          'isCorrected', IF(results.replaces_result_id IS NULL, 'no', 'yes')`,
        )} AS facts,
        ${staffName('results.entered_by_staff_id')} AS \`by\`
      FROM results JOIN specimens ON specimens.id = results.specimen_id
      WHERE results.child_id = :childId`,
  },
  {
    right: 'letters.read',
    sql: `SELECT signed_at AS at, 'letter' AS kind, ${facts('letter-signed')} AS facts,
        ${staffName('signed_by_staff_id')} AS \`by\`
      FROM letters WHERE child_id = :childId
      UNION ALL
      SELECT released_at, 'letter', ${facts('letter-released')}, ${staffName('released_by_staff_id')}
      FROM letters WHERE child_id = :childId AND released_at IS NOT NULL
      UNION ALL
      SELECT recipients.first_opened_at, 'seen', ${facts('letter-opened')}, ${memberName('recipients.family_member_id')}
      FROM letter_recipients recipients JOIN letters ON letters.id = recipients.letter_id
      WHERE letters.child_id = :childId AND recipients.first_opened_at IS NOT NULL`,
  },
  {
    right: 'calls.read',
    sql: `SELECT done_at AS at, 'call' AS kind, ${facts('call', `'outcome', COALESCE(outcome, 'done')`)} AS facts,
        ${staffName('done_by_staff_id')} AS \`by\`
      FROM call_tasks
      WHERE done_at IS NOT NULL AND (child_id = :childId OR (child_id IS NULL AND household_id = :householdId))`,
  },
];
