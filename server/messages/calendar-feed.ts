import { createHash, createHmac, randomBytes } from 'node:crypto';
import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import type { CalendarFeed } from '../../shared/contracts/calendar-feed';
import { record, type Actor } from '../access-record/record';
import { recordViewOnce } from '../access-record/record-view-once';
import { hashToken } from '../auth/token-hash';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { calendarEntriesOf } from '../fasting/family-calendar';
import { wordsFrom } from '../fasting/family-words';
import { householdOf } from '../fasting/household-night';
import { calendarDownload, emptyCalendar } from '../outbox/calendar-file';
import { siteOf } from '../sites/sites';
import { canSpeak, loadWording } from '../wording/render';

/** 22 characters of base64url carry 132 bits: this address lives until it is withdrawn. */
const tokenLength = 22;

export interface FeedOwner {
  readonly familyMemberId: number;
  readonly householdId: number;
}

interface FeedRow {
  id: number;
  family_member_id: number;
  household_id: number;
  full_name: string;
  reads_language: string;
  site_id: number;
}

const tokenOf = ({ settings }: Context, feedId: number): string =>
  createHmac('sha256', settings.linkSecret)
    .update(`feed:${feedId}`)
    .digest('base64url')
    .slice(0, tokenLength);

const urlOf = (context: Context, feedId: number): string =>
  `${context.settings.origin}/feeds/${tokenOf(context, feedId)}.ics`;

async function openFeedOf(
  db: Sequelize,
  familyMemberId: number,
  transaction?: Transaction,
): Promise<number | null> {
  const [row] = await select<{ id: number }>(
    db,
    'SELECT id FROM calendar_feeds WHERE family_member_id = :familyMemberId AND withdrawn_at IS NULL',
    { familyMemberId },
    transaction,
  );
  return row?.id ?? null;
}

/** The address that this person's calendar follows; null when there is none. */
export async function feedOf(
  context: Context,
  { familyMemberId }: FeedOwner,
): Promise<CalendarFeed> {
  const feedId = await openFeedOf(context.db, familyMemberId);
  return { url: feedId === null ? null : urlOf(context, feedId) };
}

/** Gives this person an address to follow; who has one keeps it. */
export async function openFeed(
  context: Context,
  actor: Actor,
  owner: FeedOwner,
): Promise<CalendarFeed> {
  const { db, clock } = context;
  const { familyMemberId, householdId } = owner;
  return inTransaction(db, async (transaction) => {
    await select(
      db,
      'SELECT id FROM family_members WHERE id = :familyMemberId FOR UPDATE',
      { familyMemberId },
      transaction,
    );
    const known = await openFeedOf(db, familyMemberId, transaction);
    if (known !== null) return { url: urlOf(context, known) };
    const [feedId] = await db.query(
      `INSERT INTO calendar_feeds (token_hash, family_member_id, household_id, created_at)
       VALUES (:tokenHash, :familyMemberId, :householdId, :now)`,
      {
        replacements: {
          // The token follows from the id, so that the address can be shown again without being kept.
          tokenHash: hashToken(randomBytes(32).toString('hex')),
          familyMemberId,
          householdId,
          now: new Date(clock.now()),
        },
        transaction,
        type: QueryTypes.INSERT,
      },
    );
    await change(
      db,
      'UPDATE calendar_feeds SET token_hash = :tokenHash WHERE id = :feedId',
      { tokenHash: hashToken(tokenOf(context, feedId)), feedId },
      transaction,
    );
    await noted(context, actor, transaction, owner, 'opened');
    return { url: urlOf(context, feedId) };
  });
}

/** The address shows nothing from now on; a new one is another address. */
export async function withdrawFeed(
  context: Context,
  actor: Actor,
  owner: FeedOwner,
): Promise<CalendarFeed> {
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    const closed = await change(
      db,
      `UPDATE calendar_feeds SET withdrawn_at = :now
       WHERE family_member_id = :familyMemberId AND withdrawn_at IS NULL`,
      { familyMemberId: owner.familyMemberId, now: new Date(clock.now()) },
      transaction,
    );
    if (closed > 0) await noted(context, actor, transaction, owner, 'withdrawn');
  });
  return { url: null };
}

async function noted(
  { db, clock }: Context,
  actor: Actor,
  transaction: Transaction,
  { familyMemberId, householdId }: FeedOwner,
  what: 'opened' | 'withdrawn',
): Promise<void> {
  const children = await select<{ id: number }>(
    db,
    'SELECT id FROM children WHERE household_id = :householdId',
    { householdId },
    transaction,
  );
  await record(db, transaction, actor, {
    action: 'changed',
    matter: 'calendar-feed',
    childIds: children.map(({ id }) => id),
    detail: { familyMemberId, what },
    at: clock.now(),
  });
}

export interface FeedFile {
  readonly content: string;
  /** Changes with what the calendar shows, not with the time of asking. */
  readonly etag: string;
}

/**
 * What an address shows: the mornings that its owner may know of, in neutral words. Null for an address that was never
 * given or was withdrawn. Where the words are not signed off the calendar is empty: nothing goes out unsigned.
 */
export async function feedFile(
  context: Context,
  token: string,
  from: string | null,
): Promise<FeedFile | null> {
  const { db, clock, settings } = context;
  const now = clock.now();
  const [row] = await select<FeedRow>(
    db,
    `SELECT feed.id, feed.family_member_id, feed.household_id, member.full_name, member.reads_language,
       households.site_id
     FROM calendar_feeds feed JOIN family_members member ON member.id = feed.family_member_id
     JOIN households ON households.id = feed.household_id
     WHERE feed.token_hash = :tokenHash AND feed.withdrawn_at IS NULL`,
    { tokenHash: hashToken(token) },
  );
  if (!row) return null;
  const reader = { householdId: row.household_id, familyMemberId: row.family_member_id };
  const household = await householdOf(db, reader, now);
  const site = await siteOf(db, row.site_id);
  const wording = canSpeak(row.reads_language) ? await loadWording(db, row.reads_language) : null;
  const words = wording && wordsFrom(wording, site.zone);
  const entries = words ? calendarEntriesOf(household, words, settings.origin) : [];
  const isSigned = words !== null && words.wording.isSignedOff(Object.keys(words.used()));
  const shown = isSigned ? entries : [];
  await recordViewOnce(
    context,
    {
      ...{ side: 'family', id: row.family_member_id, name: row.full_name, sessionHash: null },
      address: from,
    },
    {
      matter: 'calendar-feed',
      childIds: [...new Set(household.mornings.map(({ childId }) => childId))],
      at: now,
    },
  );
  const hash = createHash('sha256').update(JSON.stringify(shown)).digest('base64url').slice(0, 22);
  const content =
    shown.length > 0 ? calendarDownload({ entries: shown, stampAt: now }) : emptyCalendar();
  return { content, etag: `"${hash}"` };
}
