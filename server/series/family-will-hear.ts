import type { Sequelize, Transaction } from 'sequelize';
import type { WillHear } from '../../shared/contracts/series';
import { withoutLinks } from '../children/without-links';
import { select } from '../database/connection';
import type { ClinicWords } from '../wording/clinic-words';

/** What waits in the outbox for a household, in order of time. */
export async function familyWillHear(
  db: Sequelize,
  transaction: Transaction,
  words: ClinicWords,
  householdId: number,
  now: number,
): Promise<WillHear> {
  const waiting = await waitingFor(db, transaction, words, householdId, now);
  return waiting.map(({ at, says }) => ({ at, says }));
}

/** The same, each with the key under which it waits. */
export async function waitingFor(
  db: Sequelize,
  transaction: Transaction,
  words: ClinicWords,
  householdId: number,
  now: number,
): Promise<(WillHear[number] & { readonly key: string })[]> {
  const rows = await select<{
    key: string;
    dueAt: Date;
    channel: 'sms' | 'mail';
    name: string | null;
    subject: string | null;
    body: string;
  }>(
    db,
    `SELECT messages.dedupe_key AS \`key\`, messages.due_at AS dueAt, messages.channel, member.full_name AS name,
       messages.subject, messages.body
     FROM messages LEFT JOIN family_members member ON member.id = messages.family_member_id
     WHERE messages.household_id = :householdId AND messages.state = 'queued' AND messages.last_useful_at > :now
     ORDER BY messages.due_at, messages.id`,
    { householdId, now: new Date(now) },
    transaction,
  );
  return rows.map((row) => ({
    key: row.key,
    at: row.dueAt.toISOString(),
    says: words.text('clinic.hear', {
      channel: row.channel,
      who: row.name ?? words.text('clinic.the-family'),
      text: row.subject ?? withoutLinks(row.body),
    }),
  }));
}
