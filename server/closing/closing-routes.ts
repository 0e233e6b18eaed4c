import { Router } from 'express';
import { closedDayInPath, closeMorningRequest } from '../../shared/contracts/closing';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { closeMorning } from './close-morning';
import { showClosing } from './show-closing';

/**
 * GET  /closings/:on  what closing this day would do, or has done
 * POST /closings/:on  closes every planned morning of the day; a repeat changes nothing
 */
export function closingRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/closings/:on',
    right('mornings.close'),
    handle({ params: closedDayInPath }, ({ params, actor, staff }) =>
      showClosing(context, actor, staff, params.on),
    ),
  );
  router.post(
    '/closings/:on',
    right('mornings.close'),
    handle(
      { params: closedDayInPath, body: closeMorningRequest },
      ({ params, body, actor, staff }) => closeMorning(context, actor, staff, params.on, body),
    ),
  );
  return router;
}
