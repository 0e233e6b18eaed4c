import { Router } from 'express';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { listWordings } from './wordings';

/**
 * GET /wordings   every text that leaves the clinic, by version and language
 */
export function wordingRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/wordings',
    right('wording.read'),
    handle({}, () => listWordings(context.db)),
  );
  return router;
}
