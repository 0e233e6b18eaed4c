import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { setContactConsentsRequest } from '../../shared/contracts/contact-consents';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { consentsOf, recordConsents } from './consent-desk';

const params = z.object({ id: idInPath });

/**
 * GET  /family-members/:id/consents   what this adult agreed to, and everything said before
 * POST /family-members/:id/consents   what was said when asked
 */
export function consentRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/family-members/:id/consents',
    right('contacts.read'),
    handle({ params }, ({ params: { id }, actor, staff }) => consentsOf(context, actor, staff, id)),
  );
  router.post(
    '/family-members/:id/consents',
    right('contacts.write'),
    handle({ params, body: setContactConsentsRequest }, ({ params: { id }, body, actor, staff }) =>
      recordConsents(context, actor, staff, id, body),
    ),
  );
  return router;
}
