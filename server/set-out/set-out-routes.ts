import { Router } from 'express';
import { z } from 'zod';
import { day } from '../../shared/contracts/common';
import { setOutTickRequest, supplyListRequest } from '../../shared/contracts/supplies';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { readSetOut, tickSetOut } from './set-out';
import { readSupplyList, writeSupplyList } from './supply-list';

const dayInPath = z.object({ on: day });
const dayInQuery = z.object({ on: day.optional() });

/**
 * GET /set-out
 * POST /set-out/:on/ticks
 * GET /supply-list
 * PUT /supply-list
 */
export function setOutRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/set-out',
    right('mornings.run'),
    handle({ query: dayInQuery }, ({ query, actor, staff }) =>
      readSetOut(context, actor, staff, query.on),
    ),
  );
  router.post(
    '/set-out/:on/ticks',
    right('mornings.run'),
    handle({ params: dayInPath, body: setOutTickRequest }, ({ params, body, actor, staff }) =>
      tickSetOut(context, actor, staff, params.on, body),
    ),
  );
  router.get(
    '/supply-list',
    right('mornings.run'),
    handle({}, ({ staff }) => readSupplyList(context, staff)),
  );
  router.put(
    '/supply-list',
    right('mornings.run'),
    handle({ body: supplyListRequest }, ({ body, actor, staff }) =>
      writeSupplyList(context, actor, staff, body),
    ),
  );
  return router;
}
