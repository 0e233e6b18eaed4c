import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import { specimenStepRequest } from '../../shared/contracts/specimens';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { listSpecimens, stepSpecimen } from './specimens';

/**
 * GET  /specimens            specimens of open series with their clocks
 * POST /specimens/:id/steps  neutralised, labelled, handed over, received, rejected
 */
export function specimensRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/specimens',
    right('specimens.read'),
    handle({}, ({ actor, staff }) => listSpecimens(context, actor, staff)),
  );
  router.post(
    '/specimens/:id/steps',
    right('specimens.write'),
    handle(
      { params: z.object({ id: idInPath }), body: specimenStepRequest },
      ({ params, body, actor, staff }) => stepSpecimen(context, actor, staff, params.id, body),
    ),
  );
  return router;
}
