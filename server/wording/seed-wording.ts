import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import { shippedWords, sourceHash } from './shipped-words';

export interface SeedWording {
  readonly language: string;
  /** Invented sign-offs of the demo clinic; a real clinic starts with nothing signed. */
  readonly signedBy?: { readonly staffId: number; readonly at: number };
  /** Epoch milliseconds. */
  readonly now: number;
}

/**
 * Puts in version 1 of every shipped text that the clinic does not have yet. Versions that exist are left alone, so that
 * it can run at every start and never overwrites what a clinic has changed or signed.
 * @returns how many texts were put in.
 */
export async function seedWording(
  db: Sequelize,
  { language, signedBy, now }: SeedWording,
  transaction?: Transaction,
): Promise<number> {
  const words = shippedWords(language);
  const english = language === 'en' ? words : shippedWords('en');
  const rows = Object.entries(words).map(([key, body]) => [
    key,
    language,
    1,
    body,
    sourceHash(english[key] ?? ''),
    signedBy?.staffId ?? null,
    signedBy ? new Date(signedBy.at) : null,
    new Date(now),
  ]);
  const [, touched] = await db.query(
    `INSERT IGNORE INTO wordings
       (message_key, language, version, body, source_hash, signed_by_staff_id, signed_at, created_at)
     VALUES ${rows.map(() => '(?)').join(', ')}`,
    { replacements: rows, transaction, type: QueryTypes.INSERT },
  );
  return touched;
}
