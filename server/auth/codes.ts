import { createHmac, randomInt, timingSafeEqual } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { checkCodeRequest, sendCodeRequest } from '../../shared/contracts/family-session';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { raiseCall } from '../calls/calls';
import { internationalPhone } from '../children/contact-details';
import { countHit, tooMany } from '../http/limit';
import type { Limit } from '../http/limit';
import { Problem } from '../http/problem';
import { enqueue } from '../outbox/enqueue';
import { siteOf, sitesOf } from '../sites/sites';
import { wordingFor } from './clinic-for-family';
import { familyStanding } from './family-visitors';
import type { FamilyStanding } from './family-visitors';

/** NIST SP 800-63B-4, 3.1.3.2: a code sent out of band lives ten minutes at the most and works once. */
export const codeMinutes = 10;
/** After five wrong tries the code is worthless; the account is not locked. */
export const codeTries = 5;
const sendLimit: Limit = { name: 'codes', hits: 3, seconds: 900 };
/** Nobody's telephone rings all day because somebody else writes its number here. */
const dayLimit: Limit = { name: 'codes-day', hits: 12, seconds: 86_400 };

type Channel = 'sms' | 'mail';

/** Salted with the member and the moment, and keyed, so that a copy of the table alone gives no code away. */
function hashCode(
  { settings }: Context,
  memberId: number,
  createdAt: number,
  code: string,
): string {
  return createHmac('sha256', settings.sessionSecret)
    .update(`code:${memberId}:${createdAt}:${code}`)
    .digest('hex');
}

/** The written address as it is stored: E.164 or lower-case e-mail; null when it cannot be either. */
async function storedAddress(context: Context, written: string): Promise<string | null> {
  if (written.includes('@')) return written.trim().toLowerCase();
  const [site] = await sitesOf(context.db);
  return internationalPhone(written, site?.country ?? 'US');
}

/**
 * Whose address it is. A number on several records belongs to the guardian first, then to the newest record, so that
 * sending and checking mean the same person.
 */
async function memberOfAddress(context: Context, written: string): Promise<FamilyStanding | null> {
  const address = await storedAddress(context, written);
  if (address === null) return null;
  const [row] = await select<{ id: number }>(
    context.db,
    `SELECT m.id FROM family_members m JOIN child_family_members c ON c.family_member_id = m.id
     WHERE m.phone = :address OR m.email = :address
     GROUP BY m.id ORDER BY MAX(c.standing = 'guardian') DESC, m.id DESC LIMIT 1`,
    { address },
  );
  return row ? familyStanding(context.db, row.id) : null;
}

/** The person at the other end: whose address was written, else who is signed in. */
async function memberOf(
  context: Context,
  signedInId: number | null,
  written: string | null,
): Promise<FamilyStanding | null> {
  if (written !== null) return memberOfAddress(context, written);
  return signedInId === null ? null : familyStanding(context.db, signedInId);
}

/**
 * Sends a code of six digits through the outbox. Unknown addresses, helpers and languages without a signed text get the
 * same answer and no code. Real clock.
 * @throws Problem 429 'too-many-tries' after three codes in 15 minutes, for known and unknown addresses alike.
 */
export async function sendCode(
  context: Context,
  signedInId: number | null,
  { channel, address }: z.output<typeof sendCodeRequest>,
): Promise<void> {
  const { db } = context;
  if (address !== null) {
    const wait = await countHit(db, sendLimit, (await storedAddress(context, address)) ?? address);
    if (wait !== null) throw tooMany(wait);
  }
  const member = await memberOf(context, signedInId, address);
  const to = channel === 'sms' ? member?.phone : member?.email;
  if (!member || !to) return;
  const who = `member ${member.familyMemberId}`;
  const memberWait = (await countHit(db, sendLimit, who)) ?? (await countHit(db, dayLimit, who));
  if (memberWait !== null) {
    // Only who is signed in learns that the person, not the address, had three codes.
    if (address === null) throw tooMany(memberWait);
    return;
  }
  await inTransaction(context.db, (transaction) =>
    queueCode(context, transaction, member, channel, to),
  );
}

async function queueCode(
  context: Context,
  transaction: Transaction,
  member: FamilyStanding,
  channel: Channel,
  address: string,
): Promise<void> {
  const { db } = context;
  const wording = await wordingFor(context, member.language, transaction);
  const bodyKey = channel === 'sms' ? 'message.code.text' : 'message.code.mail';
  const keys = channel === 'sms' ? [bodyKey] : [bodyKey, 'message.code.subject'];
  if (!wording?.isSignedOff(keys)) {
    await callInstead(context, transaction, member);
    return;
  }
  const site = await siteOf(db, member.siteId, transaction);
  const code = String(randomInt(0, 1_000_000)).padStart(6, '0');
  const createdAt = Date.now();
  // An earlier code ends with the next one: only the newest works.
  await change(
    db,
    'UPDATE sign_in_codes SET used_at = :now WHERE family_member_id = :memberId AND used_at IS NULL',
    { now: new Date(createdAt), memberId: member.familyMemberId },
    transaction,
  );
  const [id] = await db.query(
    `INSERT INTO sign_in_codes (family_member_id, code_hash, expires_at, created_at)
     VALUES (:memberId, :codeHash, :expiresAt, :createdAt)`,
    {
      replacements: {
        memberId: member.familyMemberId,
        codeHash: hashCode(context, member.familyMemberId, createdAt, code),
        expiresAt: new Date(createdAt + codeMinutes * 60_000),
        createdAt: new Date(createdAt),
      },
      transaction,
      type: QueryTypes.INSERT,
    },
  );
  const params = { clinic: site.shortName, code, minutes: codeMinutes };
  const dueAt = context.clock.now();
  await enqueue(db, transaction, {
    dedupeKey: `code:${id}`,
    kind: 'code',
    channel,
    householdId: member.householdId,
    familyMemberId: member.familyMemberId,
    address,
    language: member.language,
    wordingVersions: wording.versions(keys),
    subject: channel === 'mail' ? wording.text('message.code.subject', params) : null,
    body: wording.text(bodyKey, params),
    callReason: null,
    dueAt,
    lastUsefulAt: dueAt + codeMinutes * 60_000,
    createdAt: dueAt,
  });
}

/** Without a signed text in the family's language a person calls with an interpreter; nothing is sent in another one. */
async function callInstead(
  { db, clock }: Context,
  transaction: Transaction,
  member: FamilyStanding,
): Promise<void> {
  const now = clock.now();
  await raiseCall(db, transaction, {
    reason: 'language-not-signed',
    openKey: `language-not-signed:${member.familyMemberId}:code`,
    householdId: member.householdId,
    familyMemberId: member.familyMemberId,
    isForClinician: false,
    urgentAt: now,
    now,
  });
}

interface CodeRow {
  id: number;
  code_hash: string;
  created_at: Date;
}

const wrongCode = (): Problem => {
  const message = 'This code is not right, or it is over. Look at it again, or ask for a new one.';
  return new Problem(422, 'code-wrong', message, { errors: [{ path: 'code', message }] });
};

/**
 * Checks a code: one use, ten minutes, five tries, each counted before it is judged.
 * @returns the family member whose code it was.
 * @throws Problem 422 'code-wrong' for everything else, whether the address is known or not.
 */
export async function checkCode(
  context: Context,
  signedInId: number | null,
  { code, address }: z.output<typeof checkCodeRequest>,
  now = Date.now(),
): Promise<FamilyStanding> {
  const member = await memberOf(context, signedInId, address);
  if (!member) throw wrongCode();
  const { db } = context;
  const isRight = await inTransaction(db, async (transaction) => {
    const [row] = await select<CodeRow>(
      db,
      `SELECT id, code_hash, created_at FROM sign_in_codes
       WHERE family_member_id = :memberId AND used_at IS NULL AND tries < :codeTries AND expires_at >= :now
       ORDER BY id DESC LIMIT 1 FOR UPDATE`,
      { memberId: member.familyMemberId, codeTries, now: new Date(now) },
      transaction,
    );
    if (!row) return false;
    const given = hashCode(context, member.familyMemberId, row.created_at.getTime(), code);
    const isSame = timingSafeEqual(Buffer.from(given), Buffer.from(row.code_hash));
    await change(
      db,
      `UPDATE sign_in_codes SET tries = tries + 1, used_at = IF(:isSame, :now, used_at) WHERE id = :id`,
      { isSame, now: new Date(now), id: row.id },
      transaction,
    );
    return isSame;
  });
  if (!isRight) throw wrongCode();
  return member;
}
