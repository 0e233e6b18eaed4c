import { Router } from 'express';
import { moveClockRequest, rehearsalReplyRequest } from '../../shared/contracts/rehearsal';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { moveThrough } from './move-through';
import { rehearsalState, replyFromPhone } from './rehearsal';
import { standInClient } from './stand-in-client';

/**
 * GET  /rehearsal           signed in, right to rehearse
 * POST /rehearsal/clock     signed in, right to rehearse, body
 * POST /rehearsal/replies   signed in, right to rehearse, body
 *
 * Mounted in rehearsal only; a real clinic has no such routes.
 */
export function rehearsalRoutes(context: Context): Router {
  const router = Router();
  if (!context.settings.rehearsal) return router;
  const standIns = standInClient(context.settings.standInControlUrl);

  router.get(
    '/rehearsal',
    right('rehearsal.use'),
    handle({}, ({ actor, staff }) => rehearsalState(context, actor, staff, standIns)),
  );
  router.post(
    '/rehearsal/clock',
    right('rehearsal.use'),
    handle({ body: moveClockRequest }, ({ body }) => moveThrough(context, body)),
  );
  router.post(
    '/rehearsal/replies',
    right('rehearsal.use'),
    handle({ body: rehearsalReplyRequest }, ({ body }) => replyFromPhone(context, standIns, body)),
  );
  return router;
}
