import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import type { Context } from '../context';
import { asError } from './as-error';
import { SessionStore } from './session-store';
import type { SessionLimits } from './session-store';

/** What a family's session knows; the clinic's is kept by passport. */
export interface FamilySessionData {
  readonly familyMemberId: number;
  readonly isRemembered: boolean;
  /** Real clock, epoch milliseconds; null when no code was entered. */
  readonly freshUntil: number | null;
}

declare module 'express-session' {
  interface SessionData {
    passport?: { user?: number };
    family?: FamilySessionData;
  }
}

const hour = 3600;

/** NIST SP 800-63B-4 allows an hour without activity; a shared workstation gets half of it. */
export const clinicLimits: SessionLimits = { idleSeconds: hour / 2, absoluteSeconds: 12 * hour };

/** A night lasts longer than any idle limit: the evening's page must still answer at dawn. Letters need a fresh code. */
export const familyLimits: SessionLimits = { idleSeconds: 12 * hour, absoluteSeconds: 12 * hour };

export const clinicCookie = { name: 'threedawn_clinic', path: '/api/clinic' } as const;
export const familyCookie = { name: 'threedawn_family', path: '/api/family' } as const;

/**
 * The two sides have a cookie each, kept apart by their paths, so that one browser can be both. The prefix __Host-
 * would be refused by browsers because it demands the path '/'.
 */
function sessions(
  context: Context,
  cookie: typeof clinicCookie | typeof familyCookie,
  store: SessionStore,
): RequestHandler {
  const { settings } = context;
  return session({
    name: cookie.name,
    secret: settings.sessionSecret,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: false,
    proxy: settings.trustedProxies > 0,
    cookie: {
      path: cookie.path,
      httpOnly: true,
      sameSite: 'lax',
      secure: settings.mode === 'production',
    },
  });
}

export const clinicSessions = (context: Context): RequestHandler =>
  sessions(context, clinicCookie, new SessionStore(context.db, 'clinic', clinicLimits));

export const familySessions = (context: Context): RequestHandler =>
  sessions(context, familyCookie, new SessionStore(context.db, 'family', familyLimits));

/** A new id for what follows: an id that was known before the sign-in is worth nothing after it. */
export function renewSession(req: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    req.session.regenerate((error: unknown) => (error ? reject(asError(error)) : resolve()));
  });
}

export function saveSession(req: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    req.session.save((error: unknown) => (error ? reject(asError(error)) : resolve()));
  });
}

/** Destroys the row; the cookie that remains opens nothing. */
export function endSession(req: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    req.session.destroy((error: unknown) => (error ? reject(asError(error)) : resolve()));
  });
}
