import { Router } from 'express';
import { signInRequest } from '../../shared/contracts/clinic-session';
import type { ClinicSession } from '../../shared/contracts/clinic-session';
import { isRole, rightsOf } from '../../shared/access/rights';
import { record } from '../access-record/record';
import type { Actor } from '../access-record/record';
import type { Context } from '../context';
import { select } from '../database/connection';
import { handle, handleOpen } from '../http/handle';
import { limit } from '../http/limit';
import type { StaffMember } from './current-user';
import { clinicCookie, clinicLimits, endSession, saveSession } from './sessions';
import { sessionEnd } from './session-store';
import { signInStaff, staffAuthenticator } from './staff-sign-in';
import { hashToken } from './token-hash';

/**
 * POST   /session   sign in with e-mail and password
 * GET    /session   who is signed in
 * DELETE /session   sign out; the session's row is gone
 */
export function clinicSessionRoutes(context: Context): Router {
  const router = Router();
  const passport = staffAuthenticator(context);
  const often = limit({ name: 'sign-in-address', hits: 60, seconds: 900 });

  router.post(
    '/session',
    often,
    handleOpen({ body: signInRequest }, async ({ body, req }) => {
      req.body = body;
      const staff = await signInStaff(context, passport, req, body.email);
      await saveSession(req);
      const sessionHash = hashToken(req.sessionID);
      const actor: Actor = {
        side: 'clinic',
        id: staff.id,
        name: staff.fullName,
        sessionHash,
        address: req.ip ?? null,
      };
      await record(context.db, undefined, actor, {
        action: 'changed',
        matter: 'sign-in',
        childIds: [],
        at: context.clock.now(),
      });
      return describeClinicSession(context, staff, sessionHash);
    }),
  );
  router.get(
    '/session',
    handle({}, ({ staff, actor }) =>
      describeClinicSession(context, staff, actor.sessionHash ?? ''),
    ),
  );
  router.delete(
    '/session',
    handleOpen({}, async ({ req, res }) => {
      await endSession(req);
      res.clearCookie(clinicCookie.name, { path: clinicCookie.path });
    }),
  );
  return router;
}

interface SiteRow {
  id: number;
  name: string;
  short_name: string;
  zone: string;
}

async function describeClinicSession(
  { db, clock, settings }: Context,
  staff: StaffMember,
  sessionHash: string,
): Promise<ClinicSession> {
  const [site] = await select<SiteRow>(
    db,
    'SELECT id, name, short_name, zone FROM sites WHERE id = :id',
    { id: staff.siteId },
  );
  const [person] = await select<{ credentials: string | null }>(
    db,
    'SELECT credentials FROM staff WHERE id = :id',
    { id: staff.id },
  );
  const roles = staff.roles.filter(isRole);
  const endsAt =
    (await sessionEnd(db, sessionHash, clinicLimits)) ??
    Date.now() + clinicLimits.idleSeconds * 1000;
  return {
    staff: {
      id: staff.id,
      fullName: staff.fullName,
      credentials: person?.credentials ?? null,
      roles: [...staff.roles],
      rights: rightsOf(roles),
    },
    site: {
      id: site?.id ?? staff.siteId,
      name: site?.name ?? '',
      shortName: site?.short_name ?? '',
      zone: site?.zone ?? 'UTC',
    },
    now: new Date(clock.now()).toISOString(),
    endsAt: new Date(endsAt).toISOString(),
    hasRehearsal: settings.rehearsal,
  };
}
