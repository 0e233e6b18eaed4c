import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import {
  endIndividualPlanRequest,
  previewIndividualPlanRequest,
  signIndividualPlanRequest,
} from '../../shared/contracts/individual-plans';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { endIndividualPlan, readIndividualPlans, signIndividualPlan } from './individual-plans';
import { previewIndividualPlan } from './preview-plan';

const childInPath = z.object({ childId: idInPath });
const planInPath = z.object({ planId: idInPath });

/**
 * GET  /children/:childId/individual-plans          a child's own plans, the newest first
 * POST /children/:childId/individual-plans/preview  what the family would read; nothing is kept
 * POST /children/:childId/individual-plans          composed and signed by a clinician
 * POST /individual-plans/:planId/end                it no longer holds
 */
export function individualPlansRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/children/:childId/individual-plans',
    right('orders.read'),
    handle({ params: childInPath }, ({ params, actor, staff }) =>
      readIndividualPlans(context, actor, staff, params.childId),
    ),
  );
  router.post(
    '/children/:childId/individual-plans/preview',
    right('individual-plans.sign'),
    handle(
      { params: childInPath, body: previewIndividualPlanRequest },
      ({ params, body, actor, staff }) =>
        previewIndividualPlan(context, actor, staff, params.childId, body),
    ),
  );
  router.post(
    '/children/:childId/individual-plans',
    right('individual-plans.sign'),
    handle(
      { params: childInPath, body: signIndividualPlanRequest },
      async ({ params, body, actor, staff }) => {
        await signIndividualPlan(context, actor, staff, params.childId, body);
        return readIndividualPlans(context, actor, staff, params.childId);
      },
    ),
  );
  router.post(
    '/individual-plans/:planId/end',
    right('individual-plans.sign'),
    handle(
      { params: planInPath, body: endIndividualPlanRequest },
      async ({ params, body, actor, staff }) => {
        const childId = await endIndividualPlan(context, actor, staff, params.planId, body.reason);
        return readIndividualPlans(context, actor, staff, childId);
      },
    ),
  );
  return router;
}
