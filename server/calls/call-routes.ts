import { Router } from 'express';
import { z } from 'zod';
import { callDoneRequest } from '../../shared/contracts/calls';
import { idInPath } from '../../shared/contracts/common';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { listCalls } from './call-list';
import { claimCall, endCall } from './do-call';

const params = z.object({ id: idInPath });

/**
 * GET  /calls               who has to be called, why and what to say
 * POST /calls/:id/claim     somebody is making the call
 * POST /calls/:id/outcome   how it went
 */
export function callRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/calls',
    right('calls.read'),
    handle({}, ({ actor, staff }) => listCalls(context, actor, staff)),
  );
  router.post(
    '/calls/:id/claim',
    right('calls.write'),
    handle({ params }, ({ params: { id }, actor, staff }) => claimCall(context, actor, staff, id)),
  );
  router.post(
    '/calls/:id/outcome',
    right('calls.write'),
    handle({ params, body: callDoneRequest }, ({ params: { id }, body, actor, staff }) =>
      endCall(context, actor, staff, id, body),
    ),
  );
  return router;
}
