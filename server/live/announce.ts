import type { Sequelize, Transaction } from 'sequelize';

/** What may change under an open screen. */
export type Topic =
  | 'mornings'
  | 'calls'
  | 'children'
  | 'specimens'
  | 'results'
  | 'letters'
  | 'messages'
  | 'alerts'
  | 'clock';

/**
 * Notes a change in the transaction that makes it. Open screens hear the topic and the id and fetch again; nothing about
 * a child travels with it.
 */
export async function announce(
  db: Sequelize,
  transaction: Transaction | undefined,
  topic: Topic,
  refId: number | null = null,
): Promise<void> {
  await db.query('INSERT INTO changes (topic, ref_id) VALUES (:topic, :refId)', {
    replacements: { topic, refId },
    transaction,
  });
}
