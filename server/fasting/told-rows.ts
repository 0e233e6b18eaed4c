import type { Sequelize, Transaction } from 'sequelize';
import type { FastingAnswer, OutcomeKind } from '../../shared/contracts/family-morning';
import type { Instant } from '../../shared/domain/day';
import type { Explanation } from '../../shared/domain/explanation';
import { select } from '../database/connection';

/** What was asked, chosen and told, word for word: stays readable whatever becomes of the wording. */
export interface Said {
  /** The instant that counts for "newest": the device's time where it can be true, else the server's. */
  readonly toldAt: string;
  readonly question: { readonly key: string; readonly says: string } | null;
  readonly answer: { readonly key: string; readonly says: string };
  readonly toldUs: string;
  readonly outcome: {
    readonly kind: OutcomeKind;
    readonly heading: string;
    readonly lines: readonly string[];
  };
  /** Wording keys of all of it, with the version of each. */
  readonly wording: Readonly<Record<string, number>>;
}

export type ToldKind = FastingAnswer | 'not-coming' | 'ill' | 'late';

export interface ToldRow {
  readonly id: number;
  readonly morning_id: number;
  readonly submission_key: string;
  readonly answer: ToldKind;
  readonly last_intake_at: Date | null;
  readonly said: Said;
  readonly device_at: Date | null;
  readonly received_at: Date;
}

export const toldAtOf = (row: Pick<ToldRow, 'said' | 'received_at'>): Instant =>
  Date.parse(row.said.toldAt) || row.received_at.getTime();

/** Everything that was told about these mornings, by when it was told. */
export async function toldRows(
  db: Sequelize,
  morningIds: readonly number[],
  transaction?: Transaction,
): Promise<ToldRow[]> {
  if (morningIds.length === 0) return [];
  const rows = await select<ToldRow>(
    db,
    `SELECT id, morning_id, submission_key, answer, last_intake_at, said, device_at, received_at
     FROM fasting_checks WHERE morning_id IN (:morningIds) ORDER BY id`,
    { morningIds },
    transaction,
  );
  return rows.sort((left, right) => toldAtOf(left) - toldAtOf(right) || left.id - right.id);
}

export const isAboutFood = (answer: ToldKind): answer is FastingAnswer =>
  answer === 'nothing' || answer === 'sip' || answer === 'feed' || answer === 'unsure';

/**
 * The instant that decides which of two answers is the newer. A phone may send hours after the tap, so its own time
 * counts; a clock that runs ahead, or shows a time before the question could be seen, does not.
 */
export function countedInstant(
  deviceAt: Instant | null,
  receivedAt: Instant,
  notBefore: Instant,
): Instant {
  if (deviceAt === null || deviceAt < notBefore || deviceAt > receivedAt) return receivedAt;
  return deviceAt;
}

export interface NewToldRow {
  readonly morningId: number;
  readonly familyMemberId: number | null;
  readonly source: 'web' | 'text' | 'call';
  readonly submissionKey: string;
  readonly answer: ToldKind;
  readonly lastIntakeAt: Instant | null;
  readonly verdict: string | null;
  readonly outcome: string;
  readonly explanation?: Explanation | null;
  readonly said: Said;
  readonly language: string;
  readonly deviceAt: Instant | null;
  readonly receivedAt: Instant;
}

export async function keepToldRow(
  db: Sequelize,
  transaction: Transaction,
  row: NewToldRow,
): Promise<void> {
  await db.query(
    `INSERT INTO fasting_checks (morning_id, family_member_id, source, submission_key, answer, last_intake_at, verdict,
       explanation, outcome, said, language, device_at, received_at)
     VALUES (:morningId, :familyMemberId, :source, :submissionKey, :answer, :lastIntakeAt, :verdict, :explanation, :outcome, :said,
       :language, :deviceAt, :receivedAt)`,
    {
      replacements: {
        ...row,
        lastIntakeAt: row.lastIntakeAt === null ? null : new Date(row.lastIntakeAt),
        explanation: row.explanation ? JSON.stringify(row.explanation) : null,
        said: JSON.stringify(row.said),
        deviceAt: row.deviceAt === null ? null : new Date(row.deviceAt),
        receivedAt: new Date(row.receivedAt),
      },
      transaction,
    },
  );
}
