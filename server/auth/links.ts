import { createHmac, randomBytes } from 'node:crypto';
import type { Sequelize, Transaction } from 'sequelize';
import type { Settings } from '../config/settings';
import { select } from '../database/connection';
import { hashToken } from './token-hash';

type LinkSettings = Pick<Settings, 'origin' | 'linkSecret'>;

export interface IssuedLink {
  readonly token: string;
  readonly url: string;
}

/** NIST SP 800-63A: an enrolment code sent to an address on file lives 72 hours. Later a code signs the family in. */
const invitationHours = 72;

/** 16 characters of base64url carry 96 bits; each one is paid for in a text message. Five tries lock a link. */
const tokenLength = 16;

const hour = 3_600_000;

/**
 * A one-use invitation for a family member; earlier unused ones end. The expiry is a matter of security and follows
 * the real clock.
 */
export async function issueInvitation(
  db: Sequelize,
  transaction: Transaction,
  settings: LinkSettings,
  { familyMemberId, householdId }: { familyMemberId: number; householdId: number },
): Promise<IssuedLink> {
  const now = Date.now();
  const token = randomBytes(32).toString('base64url').slice(0, tokenLength);
  await db.query(
    `UPDATE family_links SET expires_at = :now
     WHERE kind = 'invitation' AND family_member_id = :familyMemberId AND used_at IS NULL AND expires_at > :now`,
    { replacements: { now: new Date(now), familyMemberId }, transaction },
  );
  await db.query(
    `INSERT INTO family_links (kind, token_hash, family_member_id, household_id, expires_at, created_at)
     VALUES ('invitation', :tokenHash, :familyMemberId, :householdId, :expiresAt, :now)`,
    {
      replacements: {
        tokenHash: hashToken(token),
        familyMemberId,
        householdId,
        expiresAt: new Date(now + invitationHours * hour),
        now: new Date(now),
      },
      transaction,
    },
  );
  return { token, url: `${settings.origin}/i/${token}` };
}

/**
 * Tonight's household link of a family member: the same member and morning always give the same link, so that a night
 * planned again does not spoil a link that was sent. `expiresAt` is business time, two hours after the last arrival.
 */
export async function issueHouseholdLink(
  db: Sequelize,
  transaction: Transaction,
  settings: LinkSettings,
  link: { familyMemberId: number; householdId: number; morningOn: string; expiresAt: number },
): Promise<IssuedLink> {
  const token = createHmac('sha256', settings.linkSecret)
    .update(`${link.familyMemberId}:${link.morningOn}`)
    .digest('base64url')
    .slice(0, tokenLength);
  await db.query(
    `INSERT INTO family_links (kind, token_hash, family_member_id, household_id, morning_on, expires_at, created_at)
     VALUES ('household', :tokenHash, :familyMemberId, :householdId, :morningOn, :expiresAt, :now)
     ON DUPLICATE KEY UPDATE expires_at = :expiresAt`,
    {
      replacements: {
        ...link,
        tokenHash: hashToken(token),
        expiresAt: new Date(link.expiresAt),
        now: new Date(),
      },
      transaction,
    },
  );
  return { token, url: `${settings.origin}/m/${token}` };
}

export interface FamilyLink {
  readonly id: number;
  readonly kind: 'invitation' | 'household';
  readonly familyMemberId: number;
  readonly householdId: number;
  readonly siteId: number;
  readonly language: string;
  readonly morningOn: string | null;
  readonly expiresAt: number;
  readonly usedAt: number | null;
  readonly tries: number;
}

interface LinkRow {
  id: number;
  kind: 'invitation' | 'household';
  family_member_id: number;
  household_id: number;
  site_id: number;
  reads_language: string;
  morning_on: string | null;
  expires_at: Date;
  used_at: Date | null;
  tries: number;
}

/** The link of a token, whatever its state; null when there is none. Looking changes nothing. */
export async function linkOf(
  db: Sequelize,
  token: string,
  transaction?: Transaction,
): Promise<FamilyLink | null> {
  const [row] = await select<LinkRow>(
    db,
    `SELECT l.id, l.kind, l.family_member_id, l.household_id, h.site_id, m.reads_language, l.morning_on, l.expires_at,
       l.used_at, l.tries
     FROM family_links l
     JOIN family_members m ON m.id = l.family_member_id
     JOIN households h ON h.id = l.household_id
     WHERE l.token_hash = :tokenHash${transaction ? ' FOR UPDATE' : ''}`,
    { tokenHash: hashToken(token) },
    transaction,
  );
  if (!row) return null;
  return {
    id: row.id,
    kind: row.kind,
    familyMemberId: row.family_member_id,
    householdId: row.household_id,
    siteId: row.site_id,
    language: row.reads_language,
    morningOn: row.morning_on,
    expiresAt: row.expires_at.getTime(),
    usedAt: row.used_at?.getTime() ?? null,
    tries: row.tries,
  };
}

export type LinkState = 'open' | 'expired' | 'used' | 'locked';

/** Wrong birth dates after which a link locks and a person calls. */
export const linkTries = 5;

/** A household link ends by the business clock (its morning is over), an invitation by the real one. */
export function stateOf(
  link: FamilyLink,
  { businessNow, realNow }: { businessNow: number; realNow: number },
): LinkState {
  if (link.usedAt !== null) return 'used';
  if (link.tries >= linkTries) return 'locked';
  const now = link.kind === 'household' ? businessNow : realNow;
  return now >= link.expiresAt ? 'expired' : 'open';
}
