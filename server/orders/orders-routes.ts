import { Router } from 'express';
import { z } from 'zod';
import { idInPath, version } from '../../shared/contracts/common';
import { addOrderRequest, procedureConsentRequest } from '../../shared/contracts/orders';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import { addConsent } from './consents';
import { addOrder, listOrders, noteReported, readOrder, signOrder } from './orders';

const orderInPath = z.object({ orderId: idInPath });
const listQuery = z.object({ childId: idInPath.optional() });
const signatureBody = z.object({ version: version.optional() });

/**
 * GET  /orders?childId=
 * GET  /orders/:orderId
 * POST /orders
 * POST /orders/:orderId/signature
 * POST /orders/:orderId/consent
 * POST /orders/:orderId/reported
 *
 * Every one that changes something answers with the order as it stands then.
 */
export function ordersRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/orders',
    right('orders.read'),
    handle({ query: listQuery }, ({ query, actor, staff }) =>
      listOrders(context, actor, staff, query.childId),
    ),
  );
  router.get(
    '/orders/:orderId',
    right('orders.read'),
    handle({ params: orderInPath }, ({ params, actor, staff }) =>
      readOrder(context, actor, staff, params.orderId),
    ),
  );
  router.post(
    '/orders',
    right('orders.write'),
    handle({ body: addOrderRequest }, async ({ body, actor, staff }) => {
      const orderId = await addOrder(context, actor, staff, body);
      return readOrder(context, actor, staff, orderId);
    }),
  );
  router.post(
    '/orders/:orderId/signature',
    right('orders.sign'),
    handle({ params: orderInPath, body: signatureBody }, async ({ params, body, actor, staff }) => {
      await signOrder(context, actor, staff, params.orderId, body.version);
      return readOrder(context, actor, staff, params.orderId);
    }),
  );
  router.post(
    '/orders/:orderId/consent',
    right('consents.write'),
    handle(
      { params: orderInPath, body: procedureConsentRequest },
      async ({ params, body, actor, staff }) => {
        await addConsent(context, actor, staff, params.orderId, body);
        return readOrder(context, actor, staff, params.orderId);
      },
    ),
  );
  router.post(
    '/orders/:orderId/reported',
    right('orders.write'),
    handle({ params: orderInPath }, async ({ params, actor, staff }) => {
      await noteReported(context, actor, staff, params.orderId);
      return readOrder(context, actor, staff, params.orderId);
    }),
  );
  return router;
}
