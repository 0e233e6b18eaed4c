import { randomBytes } from 'node:crypto';
import type { CookieOptions, Request, Response } from 'express';
import type { Sequelize, Transaction } from 'sequelize';
import type { Settings } from '../config/settings';
import { select } from '../database/connection';
import { familyCookie } from './sessions';
import { hashToken } from './token-hash';

const cookieName = 'threedawn_phone';
const day = 86_400_000;
/** A series with its results lasts longer, but a code opens everything again. */
const rememberedDays = 30;

export interface RememberedPhone {
  readonly familyMemberId: number;
  readonly tokenHash: string;
}

const cookieOptions = (settings: Pick<Settings, 'mode'>): CookieOptions => ({
  path: familyCookie.path,
  httpOnly: true,
  sameSite: 'lax',
  secure: settings.mode === 'production',
});

function tokenOf(req: Request): string | null {
  const found = (req.get('Cookie') ?? '')
    .split(';')
    .map((pair) => pair.trim())
    .find((pair) => pair.startsWith(`${cookieName}=`))
    ?.slice(cookieName.length + 1);
  return found !== undefined && /^[A-Za-z0-9_-]{43}$/.test(found) ? found : null;
}

/** The phone of this request, while it is remembered; null for every other one. Real clock. */
export async function rememberedPhoneOf(
  db: Sequelize,
  req: Request,
  transaction?: Transaction,
): Promise<RememberedPhone | null> {
  const token = tokenOf(req);
  if (token === null) return null;
  const tokenHash = hashToken(token);
  const [row] = await select<{ family_member_id: number }>(
    db,
    `SELECT family_member_id FROM remembered_phones
     WHERE token_hash = :tokenHash AND ended_at IS NULL AND expires_at > :now`,
    { tokenHash, now: new Date() },
    transaction,
  );
  return row ? { familyMemberId: row.family_member_id, tokenHash } : null;
}

/** Remembers the phone for 30 days; an earlier memory of the same phone ends. */
export async function rememberPhone(
  db: Sequelize,
  settings: Pick<Settings, 'mode'>,
  req: Request,
  res: Response,
  familyMemberId: number,
): Promise<void> {
  const earlier = await rememberedPhoneOf(db, req);
  if (earlier) await endMemory(db, earlier);
  const token = randomBytes(32).toString('base64url');
  const now = Date.now();
  await db.query(
    `INSERT INTO remembered_phones (token_hash, family_member_id, created_at, seen_at, expires_at)
     VALUES (:tokenHash, :familyMemberId, :now, :now, :expiresAt)`,
    {
      replacements: {
        tokenHash: hashToken(token),
        familyMemberId,
        now: new Date(now),
        expiresAt: new Date(now + rememberedDays * day),
      },
    },
  );
  res.cookie(cookieName, token, { ...cookieOptions(settings), maxAge: rememberedDays * day });
}

/** "Forget this phone": its memory ends and its cookie goes. Other phones of the family member stay. */
export async function forgetPhone(
  db: Sequelize,
  settings: Pick<Settings, 'mode'>,
  req: Request,
  res: Response,
): Promise<void> {
  const here = await rememberedPhoneOf(db, req);
  if (here) await endMemory(db, here);
  res.clearCookie(cookieName, cookieOptions(settings));
}

async function endMemory(db: Sequelize, { tokenHash }: RememberedPhone): Promise<void> {
  await db.query(
    'UPDATE remembered_phones SET ended_at = :now WHERE token_hash = :tokenHash AND ended_at IS NULL',
    { replacements: { now: new Date(), tokenHash } },
  );
}
