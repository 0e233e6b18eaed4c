import { Router } from 'express';
import { z } from 'zod';
import {
  acceptStaffInvitationRequest,
  addStaffRequest,
  changeRolesRequest,
} from '../../shared/contracts/clinic-session';
import { idInPath } from '../../shared/contracts/common';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle, handleOpen } from '../http/handle';
import { limit } from '../http/limit';
import { addStaff, changeRoles, deactivateStaff, listStaff } from './people';
import { acceptStaffInvitation } from './staff-invitations';

const onePerson = z.object({ staffId: idInPath });

/**
 * GET  /people                         everybody with an account
 * POST /people                         add somebody; the invitation goes by e-mail
 * PUT  /people/:staffId/roles          the roles somebody holds from now on
 * POST /people/:staffId/deactivate     end an account and its sessions
 * POST /staff-invitations/accept       choose the first password with a one-use link; nobody is signed in yet
 */
export function peopleRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/people',
    right('people.read'),
    handle({}, () => listStaff(context)),
  );
  router.post(
    '/people',
    right('people.write'),
    handle({ body: addStaffRequest }, ({ body, actor, staff }) =>
      addStaff(context, actor, staff, body),
    ),
  );
  router.put(
    '/people/:staffId/roles',
    right('people.write'),
    handle({ params: onePerson, body: changeRolesRequest }, ({ params, body, actor }) =>
      changeRoles(context, actor, params.staffId, body),
    ),
  );
  router.post(
    '/people/:staffId/deactivate',
    right('people.write'),
    handle({ params: onePerson }, ({ params, actor }) =>
      deactivateStaff(context, actor, params.staffId),
    ),
  );
  router.post(
    '/staff-invitations/accept',
    limit({ name: 'staff-invitation', hits: 20, seconds: 900 }),
    handleOpen({ body: acceptStaffInvitationRequest }, async ({ body }) => {
      await acceptStaffInvitation(context, body);
      return { done: true };
    }),
  );
  return router;
}
