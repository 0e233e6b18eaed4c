import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';

/** A message to a person, as it waits in the outbox. Every message goes this way; none is sent from a request. */
export interface OutgoingMessage {
  /** Makes doubles impossible: the same key is queued once, for ever. */
  readonly dedupeKey: string;
  readonly kind: string;
  readonly channel: 'sms' | 'mail';
  readonly householdId: number | null;
  readonly familyMemberId: number | null;
  readonly staffId?: number | null;
  /** E.164 number or e-mail address. */
  readonly address: string;
  readonly language: string;
  /** Wording keys and the version of each that was rendered. */
  readonly wordingVersions: Readonly<Record<string, number>>;
  readonly subject?: string | null;
  readonly body: string;
  readonly calendar?: {
    readonly method: 'REQUEST' | 'CANCEL' | 'PUBLISH';
    readonly content: string;
  } | null;
  /** Reason of the call task when the message is given up; null when nobody needs to call. */
  readonly callReason: string | null;
  /** Goes within the limits for care texts, because no consent is recorded for this number. */
  readonly isWithoutConsent?: boolean;
  /** The morning the message is about, 'YYYY-MM-DD'. */
  readonly morningOn?: string | null;
  /** Epoch milliseconds, business clock. */
  readonly dueAt: number;
  /** After this instant the message is not sent any more; a text about last night never goes out this morning. */
  readonly lastUsefulAt: number;
  readonly createdAt: number;
  /** Due now and before everything that waits: for whoever has to know that nothing goes out. */
  readonly goesFirst?: boolean;
}

/** The sender takes by this time; further back than anything that is still of use was due. */
const goesFirstByMs = 24 * 3_600_000;

/**
 * Queues the message in the transaction of its cause.
 * @returns true when it is new, false when a message with this key was queued before.
 */
export async function enqueue(
  db: Sequelize,
  transaction: Transaction,
  message: OutgoingMessage,
): Promise<boolean> {
  const [, touched] = await db.query(
    `INSERT IGNORE INTO messages (dedupe_key, kind, channel, household_id, family_member_id, staff_id, address, language,
       wording_versions, subject, body, calendar, calendar_method, call_reason, morning_on, due_at, last_useful_at,
       next_try_at, created_at, is_without_consent)
     VALUES (:dedupeKey, :kind, :channel, :householdId, :familyMemberId, :staffId, :address, :language, :wordingVersions,
       :subject, :body, :calendar, :calendarMethod, :callReason, :morningOn, :dueAt, :lastUsefulAt, :nextTryAt, :createdAt,
       :isWithoutConsent)`,
    {
      replacements: {
        ...message,
        staffId: message.staffId ?? null,
        subject: message.subject ?? null,
        wordingVersions: JSON.stringify(message.wordingVersions),
        calendar: message.calendar?.content ?? null,
        calendarMethod: message.calendar?.method ?? null,
        morningOn: message.morningOn ?? null,
        isWithoutConsent: message.isWithoutConsent ?? false,
        dueAt: new Date(message.dueAt),
        nextTryAt: new Date(message.dueAt - (message.goesFirst ? goesFirstByMs : 0)),
        lastUsefulAt: new Date(message.lastUsefulAt),
        createdAt: new Date(message.createdAt),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  return touched === 1;
}
