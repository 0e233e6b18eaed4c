import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';
import { sourceHash } from './shipped-words';

/** The version of a text that is in use. */
export interface CurrentWording {
  readonly key: string;
  readonly version: number;
  readonly body: string;
  readonly isSignedOff: boolean;
}

interface WordingRow {
  message_key: string;
  language: string;
  version: number;
  body: string;
  source_hash: string;
  signed_at: Date | null;
}

/**
 * Of each text the newest version that is signed off and fits the English text in use; without one the newest draft.
 * A translation written from another English text is stale and counts as unsigned.
 */
export async function currentWordings(
  db: Sequelize,
  language: string,
  transaction?: Transaction,
): Promise<Map<string, CurrentWording>> {
  const rows = await select<WordingRow>(
    db,
    `SELECT message_key, language, version, body, source_hash, signed_at FROM wordings
     WHERE language IN (:language, 'en') ORDER BY version`,
    { language },
    transaction,
  );
  const english = chosen(
    rows.filter((row) => row.language === 'en'),
    () => true,
  );
  if (language === 'en') return english;
  return chosen(
    rows.filter((row) => row.language === language),
    (row) => row.source_hash === sourceHash(english.get(row.message_key)?.body ?? ''),
  );
}

function chosen(
  rows: readonly WordingRow[],
  fitsSource: (row: WordingRow) => boolean,
): Map<string, CurrentWording> {
  const byKey = new Map<string, CurrentWording>();
  for (const row of rows) {
    const isSignedOff = row.signed_at !== null && fitsSource(row);
    if (!isSignedOff && byKey.get(row.message_key)?.isSignedOff) continue;
    byKey.set(row.message_key, {
      key: row.message_key,
      version: row.version,
      body: row.body,
      isSignedOff,
    });
  }
  return byKey;
}
