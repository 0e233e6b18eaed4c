import { Router } from 'express';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { readSetUp } from './set-up';

/** GET /set-up */
export function setUpRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/set-up',
    right('set-up.read'),
    handle({}, ({ staff }) => readSetUp(context, staff)),
  );
  return router;
}
