import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { enterResultRequest } from '../../shared/contracts/specimens';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { enterResult, listResults, lookAgain } from './results';

/**
 * GET  /results                     open series with results or waiting for them, most dangerous first
 * POST /specimens/:id/results       enter a result from the laboratory's report
 * POST /results/:id/second-look     confirm a hand-entered final; by another person
 */
export function resultsRoutes(context: Context): Router {
  const router = Router();
  const params = z.object({ id: idInPath });
  router.get(
    '/results',
    right('results.read'),
    handle({}, ({ actor, staff }) => listResults(context, actor, staff)),
  );
  router.post(
    '/specimens/:id/results',
    right('results.write'),
    handle({ params, body: enterResultRequest }, ({ params: { id }, body, actor, staff }) =>
      enterResult(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/results/:id/second-look',
    right('results.second-look'),
    handle({ params }, ({ params: { id }, actor, staff }) => lookAgain(context, actor, staff, id)),
  );
  return router;
}
