import { Router } from 'express';
import { alertParams, onCallQuery, saveOnCallRequest } from '../../shared/contracts/alerts';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { listAlerts, passAlertOn, takeAlert } from './alert-desk';
import { readOnCall, saveOnCall } from './on-call';

/**
 * GET  /alerts                what cannot wait, and who looks after it
 * POST /alerts/:id/take       I take it
 * POST /alerts/:id/pass-on    my deputy takes it, or the next one
 * GET  /on-call               who is on call at one site, by default the own one
 * PUT  /on-call/:id           the whole list of that site anew
 */
export function alertRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/alerts',
    right('alerts.take'),
    handle({}, ({ staff }) => listAlerts(context, staff)),
  );
  router.post(
    '/alerts/:id/take',
    right('alerts.take'),
    handle({ params: alertParams }, ({ params, actor, staff }) =>
      takeAlert(context, actor, staff, params.id),
    ),
  );
  router.post(
    '/alerts/:id/pass-on',
    right('alerts.take'),
    handle({ params: alertParams }, ({ params, actor, staff }) =>
      passAlertOn(context, actor, staff, params.id),
    ),
  );
  router.get(
    '/on-call',
    right('set-up.read'),
    handle({ query: onCallQuery }, ({ query, staff }) => readOnCall(context, staff, query.siteId)),
  );
  router.put(
    '/on-call/:id',
    right('set-up.write'),
    handle(
      { params: alertParams, body: saveOnCallRequest },
      async ({ params, body, actor, staff }) => {
        await saveOnCall(context, actor, params.id, body);
        return readOnCall(context, staff, params.id);
      },
    ),
  );
  return router;
}
