import { UniqueConstraintError, type Sequelize, type Transaction } from 'sequelize';
import { change, inTransaction, select } from '../database/connection';

export interface Submission {
  /** What is added, for example 'child'. */
  readonly matter: string;
  /** Made by the form when it opens and sent with every try. */
  readonly key: string;
  /** Business time, epoch milliseconds. */
  readonly at: number;
}

/**
 * Adds something once for each key. A repeat, also one that arrives while the first is still at work, answers with the
 * id that the first one made.
 */
export async function addOnce(
  db: Sequelize,
  { matter, key, at }: Submission,
  add: (transaction: Transaction) => Promise<number>,
): Promise<{ readonly id: number; readonly isRepeat: boolean }> {
  const replacements = { matter, key, at: new Date(at) };
  const knownId = async (): Promise<number | null> => {
    const [row] = await select<{ ref_id: number | null }>(
      db,
      'SELECT ref_id FROM submissions WHERE matter = :matter AND submission_key = :key',
      replacements,
    );
    return row?.ref_id ?? null;
  };
  const before = await knownId();
  if (before !== null) return { id: before, isRepeat: true };
  try {
    return await inTransaction(db, async (transaction) => {
      // First of all, so that a second try waits here until the first is through.
      await db.query(
        'INSERT INTO submissions (matter, submission_key, created_at) VALUES (:matter, :key, :at)',
        { replacements, transaction },
      );
      const id = await add(transaction);
      await change(
        db,
        'UPDATE submissions SET ref_id = :id WHERE matter = :matter AND submission_key = :key',
        { ...replacements, id },
        transaction,
      );
      return { id, isRepeat: false };
    });
  } catch (error) {
    const meanwhile = error instanceof UniqueConstraintError ? await knownId() : null;
    if (meanwhile === null) throw error;
    return { id: meanwhile, isRepeat: true };
  }
}
