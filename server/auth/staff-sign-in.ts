import type { Request, RequestHandler } from 'express';
import { Passport } from 'passport';
import type { Authenticator } from 'passport';
import { Strategy } from 'passport-local';
import { clinicLanguages, isClinicLanguage } from '../../shared/languages/clinic-languages';
import type { Context } from '../context';
import { select } from '../database/connection';
import { clearHits, countHit, isLimited, tooMany } from '../http/limit';
import type { Limit } from '../http/limit';
import { Problem } from '../http/problem';
import { asError } from './as-error';
import type { StaffMember } from './current-user';
import { verifyPassword } from './passwords';
import { hashToken } from './token-hash';

const quarterHour = 900;
/** One address guessing at one account. */
const pairLimit: Limit = { name: 'sign-in-pair', hits: 5, seconds: quarterHour };
/** Many addresses guessing at one account. */
const accountLimit: Limit = { name: 'sign-in-account', hits: 50, seconds: quarterHour };
/** A pair that signed in well lately is not held up by the account's limit, so that nobody is locked out by others. */
const trustedPair: Limit = { name: 'sign-in-trusted', hits: 1, seconds: 30 * 86_400 };

interface StaffRow {
  id: number;
  full_name: string;
  roles: string | null;
  site_id: number | null;
}

/** The active staff member of an id with roles; the one installation's first site. Null when gone or ended. */
export async function activeStaff(db: Context['db'], staffId: number): Promise<StaffMember | null> {
  const [row] = await select<StaffRow>(
    db,
    `SELECT s.id, s.full_name,
       (SELECT GROUP_CONCAT(r.role ORDER BY r.role) FROM staff_roles r WHERE r.staff_id = s.id) AS roles,
       (SELECT MIN(id) FROM sites) AS site_id
     FROM staff s WHERE s.id = :staffId AND s.is_active`,
    { staffId },
  );
  if (!row) return null;
  return {
    id: row.id,
    fullName: row.full_name,
    roles: row.roles?.split(',') ?? [],
    siteId: row.site_id ?? 0,
    language: 'en',
  };
}

interface Account {
  id: number;
  password_hash: string | null;
}

async function checkPassword(
  context: Context,
  email: string,
  password: string,
): Promise<StaffMember | null> {
  const [account] = await select<Account>(
    context.db,
    'SELECT id, password_hash FROM staff WHERE email = :email AND is_active',
    { email: email.trim().toLowerCase() },
  );
  // An unknown e-mail costs the same work as a wrong password, so that the time tells nothing.
  const isRight = await verifyPassword(account?.password_hash ?? null, password);
  return isRight && account ? activeStaff(context.db, account.id) : null;
}

/** One authenticator an application: passport's own singleton would be shared by every application of a process. */
export function staffAuthenticator(context: Context): Authenticator {
  const passport = new Passport() as unknown as Authenticator;
  passport.use(
    new Strategy({ usernameField: 'email', passwordField: 'password' }, (email, password, done) => {
      checkPassword(context, email, password).then(
        (staff) => done(null, staff ?? false),
        (error: unknown) => done(error),
      );
    }),
  );
  passport.serializeUser((user, done) => done(null, (user as StaffMember).id));
  passport.deserializeUser((id: number, done) => {
    activeStaff(context.db, id).then(
      (staff) => done(null, staff ?? false),
      (error: unknown) => done(error),
    );
  });
  return passport;
}

/** Puts on the request in which language the clinic's screen speaks: its pages say so with every request. */
export const knowClinicLanguage: RequestHandler = (req, _res, next) => {
  const wanted = req.acceptsLanguages(...clinicLanguages);
  req.clinicLanguage = wanted !== false && isClinicLanguage(wanted) ? wanted : 'en';
  next();
};

/** Puts the staff member of the session on the request. */
export const knowStaff: RequestHandler = (req, _res, next) => {
  const staff = req.user as StaffMember | undefined;
  if (staff)
    req.staffMember = {
      staff: { ...staff, language: req.clinicLanguage ?? staff.language },
      actor: {
        side: 'clinic',
        id: staff.id,
        name: staff.fullName,
        sessionHash: hashToken(req.sessionID),
        address: req.ip ?? null,
      },
    };
  next();
};

function authenticate(passport: Authenticator, req: Request): Promise<StaffMember | null> {
  return new Promise((resolve, reject) => {
    const step = passport.authenticate('local', (error: unknown, user: unknown) => {
      if (error) reject(asError(error));
      else resolve((user as StaffMember | false | undefined) || null);
    }) as RequestHandler;
    void step(req, req.res!, (error?: unknown) => reject(asError(error)));
  });
}

/**
 * Signs in with e-mail and password and renews the session's id.
 * @throws Problem 401 'sign-in-failed' with one answer for everything wrong; 429 after five tries in 15 minutes.
 */
export async function signInStaff(
  context: Context,
  passport: Authenticator,
  req: Request,
  email: string,
): Promise<StaffMember> {
  const { db } = context;
  const pair = `${email} ${req.ip ?? ''}`;
  const pairWait = await countHit(db, pairLimit, pair);
  if (pairWait !== null) throw tooMany(pairWait);
  const isTrusted = (await isLimited(db, trustedPair, pair)) !== null;
  const accountWait = isTrusted ? null : await isLimited(db, accountLimit, email);
  if (accountWait !== null) throw tooMany(accountWait);

  const staff = await authenticate(passport, req);
  if (!staff) {
    if (!isTrusted) await countHit(db, accountLimit, email);
    throw new Problem(401, 'sign-in-failed', 'The e-mail or the password is not right.');
  }
  await clearHits(db, pairLimit, pair);
  await clearHits(db, trustedPair, pair);
  await countHit(db, trustedPair, pair);
  await new Promise<void>((resolve, reject) => {
    req.logIn(staff, (error: unknown) => (error ? reject(asError(error)) : resolve()));
  });
  return staff;
}
