import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { inviteFamilyMember } from './invite';
import { listMessages } from './message-list';

const params = z.object({ id: idInPath });
const query = z.object({ childId: idInPath.nullable().default(null) });

/**
 * GET  /messages                         what has gone out, what waits, and whether anything is stuck
 * POST /family-members/:id/invitations   invite an adult of a child
 */
export function messageRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/messages',
    right('messages.read'),
    handle({ query }, ({ query: { childId }, actor, staff }) =>
      listMessages(context, actor, staff, { childId }),
    ),
  );
  router.post(
    '/family-members/:id/invitations',
    right('children.write'),
    handle({ params }, ({ params: { id }, actor, staff }) =>
      inviteFamilyMember(context, actor, staff, id),
    ),
  );
  return router;
}
