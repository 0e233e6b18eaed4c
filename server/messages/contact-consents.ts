import type { Sequelize, Transaction } from 'sequelize';
import { change, select } from '../database/connection';

export type ConsentChannel = 'sms' | 'mail';
export type ConsentPurpose = 'visits' | 'letters' | 'early-morning';

/** How a yes or a no came: who, when, how, by which words, for which number. */
export interface ConsentSaid {
  readonly familyMemberId: number;
  readonly channel: ConsentChannel;
  /** E.164 number or e-mail address. */
  readonly address: string;
  /** For example 'asked by staff', 'by text'. */
  readonly how: string;
  /** The sentence that was read out, with its version. */
  readonly wordingVersion: string;
  readonly language: string;
  /** Null when the family said it without staff. */
  readonly staffId: number | null;
  /** Epoch milliseconds of the business clock. */
  readonly at: number;
}

/** Keeps one line of the history; lines are never changed. */
async function keepEvents(
  db: Sequelize,
  transaction: Transaction,
  said: ConsentSaid,
  event: 'given' | 'withdrawn',
  purposes: readonly ConsentPurpose[],
): Promise<void> {
  const { familyMemberId, channel, address, how, wordingVersion, language, staffId } = said;
  for (const purpose of purposes)
    await change(
      db,
      `INSERT INTO contact_consent_events (family_member_id, channel, address, purpose, event, how, wording_version,
         language, recorded_by_staff_id, at)
       VALUES (:familyMemberId, :channel, :address, :purpose, :event, :how, :wordingVersion, :language, :staffId, :at)`,
      {
        ...{ familyMemberId, channel, address, how, wordingVersion, language, staffId },
        purpose,
        event,
        at: new Date(said.at),
      },
      transaction,
    );
}

interface StandingRow {
  id: number;
  covers_early_morning: 0 | 1;
  covers_letters: 0 | 1;
}

/** The purposes that this person agrees to at this number now. */
export async function agreedPurposes(
  db: Sequelize,
  transaction: Transaction | undefined,
  { familyMemberId, channel, address }: Pick<ConsentSaid, 'familyMemberId' | 'channel' | 'address'>,
): Promise<Set<ConsentPurpose>> {
  const rows = await select<StandingRow>(
    db,
    `SELECT id, covers_early_morning, covers_letters FROM contact_consents
     WHERE family_member_id = :familyMemberId AND channel = :channel AND withdrawn_at IS NULL
       AND (address IS NULL OR address = :address)`,
    { familyMemberId, channel, address },
    transaction,
  );
  const purposes = new Set<ConsentPurpose>();
  if (rows.length > 0) purposes.add('visits');
  if (rows.some((row) => row.covers_letters === 1)) purposes.add('letters');
  if (rows.some((row) => row.covers_early_morning === 1)) purposes.add('early-morning');
  return purposes;
}

/** Whether the last word about messages on visits to this number was a no. */
async function hasSaidNo(
  db: Sequelize,
  transaction: Transaction,
  { familyMemberId, channel, address }: ConsentSaid,
): Promise<boolean> {
  const [last] = await select<{ event: 'given' | 'withdrawn' }>(
    db,
    `SELECT event FROM contact_consent_events WHERE family_member_id = :familyMemberId AND channel = :channel
       AND address = :address AND purpose = 'visits' ORDER BY id DESC LIMIT 1`,
    { familyMemberId, channel, address },
    transaction,
  );
  return last?.event === 'withdrawn';
}

/**
 * Makes what a person agrees to at a number what is said now, and keeps each yes and no in the history. Letters and the
 * early morning need a yes to messages about visits.
 * @returns whether anything changed.
 */
export async function setConsents(
  db: Sequelize,
  transaction: Transaction,
  said: ConsentSaid,
  wanted: ReadonlySet<ConsentPurpose>,
): Promise<boolean> {
  const before = await agreedPurposes(db, transaction, said);
  const given = [...wanted].filter((purpose) => !before.has(purpose));
  const withdrawn = [...before].filter((purpose) => !wanted.has(purpose));
  // Who never said yes and now says no is heard too: where a site may text without a consent, only a no ends that.
  const isFirstNo =
    !wanted.has('visits') && !before.has('visits') && !(await hasSaidNo(db, transaction, said));
  if (isFirstNo) withdrawn.push('visits');
  if (given.length === 0 && withdrawn.length === 0) return false;
  await keepEvents(db, transaction, said, 'given', given);
  await keepEvents(db, transaction, said, 'withdrawn', withdrawn);
  const { familyMemberId, channel, address } = said;
  await change(
    db,
    `UPDATE contact_consents SET withdrawn_at = :at WHERE family_member_id = :familyMemberId AND channel = :channel
       AND withdrawn_at IS NULL AND (address IS NULL OR address = :address)`,
    { familyMemberId, channel, address, at: new Date(said.at) },
    transaction,
  );
  if (wanted.has('visits'))
    await change(
      db,
      `INSERT INTO contact_consents (family_member_id, channel, address, covers_early_morning, covers_letters, how,
         wording_version, given_at, recorded_by_staff_id)
       VALUES (:familyMemberId, :channel, :address, :early, :letters, :how, :wordingVersion, :at, :staffId)`,
      {
        ...{ familyMemberId, channel, address },
        early: wanted.has('early-morning'),
        letters: wanted.has('letters'),
        how: said.how,
        wordingVersion: said.wordingVersion,
        at: new Date(said.at),
        staffId: said.staffId,
      },
      transaction,
    );
  return true;
}

export interface ConsentEvent {
  readonly channel: ConsentChannel;
  readonly address: string;
  readonly purpose: ConsentPurpose;
  readonly event: 'given' | 'withdrawn';
  readonly how: string;
  readonly wordingVersion: string;
  readonly language: string;
  readonly recordedBy: string | null;
  readonly at: Date;
}

/** Everything this person has said about being written to, the latest first. */
export function consentHistory(db: Sequelize, familyMemberId: number): Promise<ConsentEvent[]> {
  return select<ConsentEvent>(
    db,
    `SELECT event.channel, event.address, event.purpose, event.event, event.how,
       event.wording_version AS wordingVersion, event.language, staff.full_name AS recordedBy, event.at
     FROM contact_consent_events event LEFT JOIN staff ON staff.id = event.recorded_by_staff_id
     WHERE event.family_member_id = :familyMemberId ORDER BY event.at DESC, event.id DESC LIMIT 200`,
    { familyMemberId },
  );
}
