import { Router } from 'express';
import type { Request, Response } from 'express';
import {
  checkCodeRequest,
  describeLinkRequest,
  openLinkRequest,
  sendCodeRequest,
} from '../../shared/contracts/family-session';
import type { FamilySession } from '../../shared/contracts/family-session';
import { record } from '../access-record/record';
import type { Context } from '../context';
import { handleFamily, handleOpen } from '../http/handle';
import { limit } from '../http/limit';
import { invalid } from '../http/problem';
import { checkCode, sendCode } from './codes';
import { describeFamilySession } from './describe-family-session';
import type { OpenFamilySession } from './describe-family-session';
import { familyReach } from './family-reach';
import { describeLink, openLink } from './open-link';
import { forgetPhone, rememberedPhoneOf, rememberPhone } from './remembered-phones';
import { endSession, familyCookie, renewSession, saveSession } from './sessions';

const quarterHour = 900;
/** How long letters and contact changes stay open after a code. */
const freshMs = 15 * 60_000;
/** Known and unknown addresses take the same time to answer. */
const codeAnswerMs = 150;

/**
 * POST   /links/describe             what a link is for; uses nothing up
 * POST   /links/open                 the second step: a birth date, or the remembered phone
 * GET    /session                    who is here and how far it reaches
 * DELETE /session                    sign out (also POST /session/sign-out)
 * POST   /session/close-letters      back from a fresh code to the instructions
 * POST   /phone/forget               forget this phone (also POST /session/forget)
 * POST   /codes                      send a code
 * POST   /codes/check                sign in, or open the letters, with a code
 */
export function familySessionRoutes(context: Context): Router {
  const router = Router();

  router.post(
    '/links/describe',
    limit({ name: 'link-describe', hits: 60, seconds: 60 }),
    handleOpen({ body: describeLinkRequest }, ({ body, req }) =>
      describeLink(context, req, body.token),
    ),
  );
  router.post(
    '/links/open',
    limit({ name: 'link-open', hits: 30, seconds: quarterHour }),
    handleOpen({ body: openLinkRequest }, async ({ body, req, res }) => {
      const familyMemberId = await openLink(context, req, body);
      return begin(context, req, res, {
        familyMemberId,
        isRemembered: body.isRemembered,
        freshUntil: null,
      });
    }),
  );
  router.get(
    '/session',
    familyReach('household'),
    handleFamily({}, async ({ req, visitor }) =>
      describeFamilySession(context, await openedBy(context, req, visitor.familyMemberId)),
    ),
  );
  const signOut = handleOpen({}, async ({ req, res }) => {
    await endSession(req);
    res.clearCookie(familyCookie.name, { path: familyCookie.path });
  });
  router.delete('/session', signOut);
  router.post('/session/sign-out', signOut);
  router.post(
    '/session/close-letters',
    familyReach('household'),
    handleFamily({}, async ({ req, visitor }) => {
      const { family } = req.session;
      if (family) {
        req.session.family = { ...family, freshUntil: null };
        await saveSession(req);
      }
      return describeFamilySession(context, await openedBy(context, req, visitor.familyMemberId));
    }),
  );
  const forget = handleOpen({}, ({ req, res }) => forgetThisPhone(context, req, res));
  router.post('/phone/forget', forget);
  router.post('/session/forget', forget);
  router.post(
    '/codes',
    limit({ name: 'codes-address', hits: 10, seconds: quarterHour }),
    handleOpen({ body: sendCodeRequest }, async ({ body, req }) => {
      const signedInId = req.familyVisitor?.visitor.familyMemberId ?? null;
      if (signedInId === null && body.address === null)
        throw invalid([
          { path: 'address', message: 'Give a telephone number or an e-mail address.' },
        ]);
      await Promise.all([
        sendCode(context, signedInId, body),
        new Promise((resolve) => setTimeout(resolve, codeAnswerMs)),
      ]);
      return { done: true };
    }),
  );
  router.post(
    '/codes/check',
    limit({ name: 'codes-check', hits: 30, seconds: quarterHour }),
    handleOpen({ body: checkCodeRequest }, async ({ body, req, res }) => {
      const visitor = req.familyVisitor?.visitor ?? null;
      const member = await checkCode(context, visitor?.familyMemberId ?? null, body);
      const phone = await rememberedPhoneOf(context.db, req);
      return begin(context, req, res, {
        familyMemberId: member.familyMemberId,
        isRemembered: body.isRemembered || phone?.familyMemberId === member.familyMemberId,
        freshUntil: member.standing === 'guardian' ? Date.now() + freshMs : null,
      });
    }),
  );
  return router;
}

/** A new session under a new id, and the phone's memory when the family asked for it. */
async function begin(
  context: Context,
  req: Request,
  res: Response,
  session: OpenFamilySession,
): Promise<FamilySession> {
  await renewSession(req);
  req.session.family = session;
  await saveSession(req);
  if (session.isRemembered)
    await rememberPhone(context.db, context.settings, req, res, session.familyMemberId);
  return describeFamilySession(context, session);
}

/** The session's own facts; a remembered phone without a session reaches the household. */
async function openedBy(
  context: Context,
  req: Request,
  familyMemberId: number,
): Promise<OpenFamilySession> {
  const phone = await rememberedPhoneOf(context.db, req);
  const isRemembered = phone?.familyMemberId === familyMemberId;
  const { family } = req.session;
  return { familyMemberId, freshUntil: family?.freshUntil ?? null, isRemembered };
}

/** The phone's memory and this session end, and the browser is told to drop what it keeps. */
async function forgetThisPhone(context: Context, req: Request, res: Response): Promise<object> {
  const known = req.familyVisitor;
  await forgetPhone(context.db, context.settings, req, res);
  await endSession(req);
  if (known)
    await record(context.db, undefined, known.actor, {
      action: 'changed',
      matter: 'forget-phone',
      childIds: [],
      at: context.clock.now(),
    });
  res.clearCookie(familyCookie.name, { path: familyCookie.path });
  // Not "cookies": a browser may be the clinic's as well, and its session is another person's business.
  res.set('Clear-Site-Data', '"cache", "storage"');
  return { done: true };
}
