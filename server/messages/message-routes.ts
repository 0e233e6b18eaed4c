import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { messageShows } from '../../shared/contracts/messages';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { inviteFamilyMember } from './invite';
import { listMessages, outboxState } from './message-list';
import { retryMessage } from './retry-message';

const params = z.object({ id: idInPath });
const query = z.object({
  childId: idInPath.nullable().default(null),
  show: z.enum(messageShows).default('all'),
  channel: z.enum(['sms', 'mail']).nullable().default(null),
});

/**
 * GET  /messages                         what has gone out, what waits, and whether anything is stuck
 * POST /messages/:id/retries             send a failed one again
 * GET  /outbox                           whether messages go out at all
 * POST /family-members/:id/invitations   invite an adult of a child
 */
export function messageRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/messages',
    right('messages.read'),
    handle({ query }, ({ query: wanted, actor, staff }) =>
      listMessages(context, actor, staff, wanted),
    ),
  );
  router.post(
    '/messages/:id/retries',
    right('calls.write'),
    handle({ params }, async ({ params: { id }, actor, staff }) => {
      await retryMessage(context, actor, staff, id);
      return outboxState(context, staff);
    }),
  );
  router.get(
    '/outbox',
    right('messages.read'),
    handle({}, ({ staff }) => outboxState(context, staff)),
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
