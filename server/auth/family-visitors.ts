import type { Request, RequestHandler } from 'express';
import type { Context } from '../context';
import { select } from '../database/connection';
import type { FamilyVisitor } from './current-user';
import { rememberedPhoneOf } from './remembered-phones';
import { hashToken } from './token-hash';

export interface FamilyStanding {
  readonly familyMemberId: number;
  readonly householdId: number;
  readonly siteId: number;
  readonly fullName: string;
  readonly language: string;
  readonly phone: string | null;
  readonly email: string | null;
  readonly standing: 'guardian' | 'helper';
  readonly seesResults: boolean;
}

interface StandingRow {
  id: number;
  household_id: number;
  site_id: number;
  full_name: string;
  reads_language: string;
  phone: string | null;
  email: string | null;
  is_guardian: number | null;
  sees_results: number | null;
}

/** A family member with the highest standing towards any child; null when unknown or no longer anybody's. */
export async function familyStanding(
  db: Context['db'],
  familyMemberId: number,
): Promise<FamilyStanding | null> {
  const [row] = await select<StandingRow>(
    db,
    `SELECT m.id, m.household_id, h.site_id, m.full_name, m.reads_language, m.phone, m.email,
       MAX(c.standing = 'guardian') AS is_guardian, MAX(c.standing = 'guardian' AND c.sees_results) AS sees_results
     FROM family_members m
     JOIN households h ON h.id = m.household_id
     JOIN child_family_members c ON c.family_member_id = m.id
     WHERE m.id = :familyMemberId
     GROUP BY m.id`,
    { familyMemberId },
  );
  if (!row) return null;
  return {
    familyMemberId: row.id,
    householdId: row.household_id,
    siteId: row.site_id,
    fullName: row.full_name,
    language: row.reads_language,
    phone: row.phone,
    email: row.email,
    standing: Number(row.is_guardian) === 1 ? 'guardian' : 'helper',
    seesResults: Number(row.sees_results) === 1,
  };
}

/** A helper never gets beyond the instructions and the morning question, whatever code was entered. */
export function reachOf(
  standing: FamilyStanding['standing'],
  freshUntil: number | null,
  now = Date.now(),
): FamilyVisitor['reach'] {
  return standing === 'guardian' && freshUntil !== null && now < freshUntil ? 'fresh' : 'household';
}

interface Entry {
  readonly familyMemberId: number;
  readonly freshUntil: number | null;
  readonly hash: string;
}

/** By the session, or by the phone that was asked to be remembered. */
async function entryOf(context: Context, req: Request): Promise<Entry | null> {
  const open = req.session.family;
  if (open) return { ...open, hash: hashToken(req.sessionID) };
  const phone = await rememberedPhoneOf(context.db, req);
  return phone && { familyMemberId: phone.familyMemberId, freshUntil: null, hash: phone.tokenHash };
}

/** Puts the family member of the session or the remembered phone on the request. */
export function knowFamily(context: Context): RequestHandler {
  return async (req, _res, next) => {
    const entry = await entryOf(context, req);
    const standing = entry && (await familyStanding(context.db, entry.familyMemberId));
    if (entry && standing)
      req.familyVisitor = {
        visitor: {
          familyMemberId: standing.familyMemberId,
          householdId: standing.householdId,
          fullName: standing.fullName,
          language: standing.language,
          reach: reachOf(standing.standing, entry.freshUntil),
        },
        actor: {
          side: 'family',
          id: standing.familyMemberId,
          name: standing.fullName,
          sessionHash: entry.hash,
          address: req.ip ?? null,
        },
      };
    next();
  };
}
