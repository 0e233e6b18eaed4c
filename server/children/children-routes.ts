import { Router } from 'express';
import { z } from 'zod';
import {
  addChildRequest,
  addFamilyMemberRequest,
  changeChildRequest,
} from '../../shared/contracts/children';
import { idInPath } from '../../shared/contracts/common';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { listChildren } from './child-list';
import { readChild } from './child-record';
import { addChild, changeChild } from './children';
import { addFamilyMember } from './family-members';

const childInPath = z.object({ childId: idInPath });
const searchQuery = z.object({ search: z.string().trim().max(160).default('') });

/**
 * GET  /children?search=
 * GET  /children/:childId
 * POST /children
 * PUT  /children/:childId
 * POST /children/:childId/family-members
 *
 * Every one that changes something answers with the child's record as it stands then.
 */
export function childrenRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/children',
    right('children.read'),
    handle({ query: searchQuery }, ({ query, actor, staff }) =>
      listChildren(context, actor, staff, query.search),
    ),
  );
  router.get(
    '/children/:childId',
    right('children.read'),
    handle({ params: childInPath }, ({ params, actor, staff }) =>
      readChild(context, actor, staff, params.childId),
    ),
  );
  router.post(
    '/children',
    right('children.write'),
    handle({ body: addChildRequest }, async ({ body, actor, staff }) => {
      const childId = await addChild(context, actor, staff, body);
      return readChild(context, actor, staff, childId);
    }),
  );
  router.put(
    '/children/:childId',
    right('children.write'),
    handle(
      { params: childInPath, body: changeChildRequest },
      async ({ params, body, actor, staff }) => {
        await changeChild(context, actor, staff, params.childId, body);
        return readChild(context, actor, staff, params.childId);
      },
    ),
  );
  router.post(
    '/children/:childId/family-members',
    right('contacts.write'),
    handle(
      { params: childInPath, body: addFamilyMemberRequest },
      async ({ params, body, actor, staff }) => {
        await addFamilyMember(context, actor, staff, params.childId, body);
        return readChild(context, actor, staff, params.childId);
      },
    ),
  );
  return router;
}
