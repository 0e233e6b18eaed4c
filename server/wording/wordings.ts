import type { Sequelize } from 'sequelize';
import type { WordingList } from '../../shared/contracts/messages';
import { plainWords, readingEase } from '../../shared/domain/reading-ease';
import { select } from '../database/connection';
import { currentWordings } from './current-wording';
import { sourceHash } from './shipped-words';

interface ListedRow {
  id: number;
  message_key: string;
  language: string;
  version: number;
  body: string;
  source_hash: string;
  translator: string | null;
  second_reader: string | null;
  signed_by: string | null;
  signed_at: Date | null;
}

/** Every version of every text, newest first, with the state of its sign-off. */
export async function listWordings(db: Sequelize): Promise<WordingList> {
  const rows = await select<ListedRow>(
    db,
    `SELECT wordings.*, staff.full_name AS signed_by FROM wordings
     LEFT JOIN staff ON staff.id = wordings.signed_by_staff_id
     ORDER BY message_key, language, version DESC`,
  );
  const english = await currentWordings(db, 'en');
  return {
    wordings: rows.map((row) => {
      const source = english.get(row.message_key)?.body ?? '';
      const isStale = row.language !== 'en' && row.source_hash !== sourceHash(source);
      return {
        id: row.id,
        messageKey: row.message_key,
        language: row.language,
        version: row.version,
        body: row.body,
        readingEase: readingEase(row.language, plainWords(row.body)),
        isSignedOff: row.signed_at !== null && !isStale,
        isStale,
        signedBy: row.signed_by,
        signedAt: row.signed_at?.toISOString() ?? null,
        translator: row.translator,
        secondReader: row.second_reader,
      };
    }),
  };
}
