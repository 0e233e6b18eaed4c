import { Router } from 'express';
import { z } from 'zod';
import { day, idInPath } from '../../shared/contracts/common';
import {
  arriveRequest,
  beginCollectionRequest,
  doorCheckRequest,
  endCollectionRequest,
  feedRequest,
} from '../../shared/contracts/this-morning';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { noteArrival, noteFeeding } from './arrivals';
import { beginCollection } from './begin-collection';
import { checkAtTheDoor } from './door-check';
import { endCollection } from './end-collection';
import { thisMorning } from './this-morning';

const params = z.object({ id: idInPath });

/**
 * GET  /this-morning?on=            the sheet of a day, today when none is named
 * POST /mornings/:id/arrival        the child is at the door
 * POST /mornings/:id/door-checks    what the nurse hears at the door
 * POST /mornings/:id/collection     begin in a room
 * PUT  /mornings/:id/collection     collected, or not and why
 * POST /mornings/:id/feeding        fed, or gone home
 */
export function collectionsRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/this-morning',
    right('mornings.read'),
    handle({ query: z.object({ on: day.optional() }) }, ({ query, actor, staff }) =>
      thisMorning(context, actor, staff, query.on),
    ),
  );
  router.post(
    '/mornings/:id/arrival',
    right('arrivals.write'),
    handle({ params, body: arriveRequest }, ({ params: { id }, body, actor, staff }) =>
      noteArrival(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/mornings/:id/door-checks',
    right('door-check.write'),
    handle({ params, body: doorCheckRequest }, ({ params: { id }, body, actor, staff }) =>
      checkAtTheDoor(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/mornings/:id/collection',
    right('collections.write'),
    handle({ params, body: beginCollectionRequest }, ({ params: { id }, body, actor, staff }) =>
      beginCollection(context, actor, staff, id, body),
    ),
  );
  router.put(
    '/mornings/:id/collection',
    right('collections.write'),
    handle({ params, body: endCollectionRequest }, ({ params: { id }, body, actor, staff }) =>
      endCollection(context, actor, staff, id, body),
    ),
  );
  router.post(
    '/mornings/:id/feeding',
    right('mornings.run'),
    handle({ params, body: feedRequest }, ({ params: { id }, body, actor, staff }) =>
      noteFeeding(context, actor, staff, id, body),
    ),
  );
  return router;
}
