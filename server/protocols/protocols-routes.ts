import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import {
  checkProtocolRequest,
  discardDraftRequest,
  makeDraftRequest,
  saveProtocolRequest,
  signVersionRequest,
} from '../../shared/contracts/protocols';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import {
  checkProtocol,
  discardProtocol,
  draftProtocol,
  listProtocols,
  openProtocol,
  saveProtocol,
} from './protocol-desk';
import { protocolConsequences, signProtocol } from './sign-protocol';

const params = z.object({ id: idInPath });

/**
 * GET  /fasting-protocols                    every version of the site
 * POST /fasting-protocols                    a draft, from the version in force
 * POST /fasting-protocols/check              beside the editor: problems, published values, preview; writes nothing
 * GET  /fasting-protocols/:id                one version
 * PUT  /fasting-protocols/:id                save a draft
 * POST /fasting-protocols/:id/discard        discard a draft
 * GET  /fasting-protocols/:id/consequences   what signing would change
 * POST /fasting-protocols/:id/signature      sign
 */
export function protocolRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/fasting-protocols',
    right('protocols.read'),
    handle({}, ({ staff }) => listProtocols(context, staff)),
  );
  router.post(
    '/fasting-protocols',
    right('protocols.write'),
    handle({ body: makeDraftRequest }, ({ body, actor, staff }) =>
      draftProtocol(context, actor, staff, body.submissionKey),
    ),
  );
  router.post(
    '/fasting-protocols/check',
    right('protocols.read'),
    handle({ body: checkProtocolRequest }, ({ body, staff }) =>
      checkProtocol(context, staff, body),
    ),
  );
  router.get(
    '/fasting-protocols/:id',
    right('protocols.read'),
    handle({ params }, ({ params: { id }, staff }) => openProtocol(context, staff, id)),
  );
  router.put(
    '/fasting-protocols/:id',
    right('protocols.write'),
    handle({ params, body: saveProtocolRequest }, ({ params: { id }, body, actor, staff }) =>
      saveProtocol(context, actor, staff, { id, draftVersion: body.draftVersion }, body.values),
    ),
  );
  router.post(
    '/fasting-protocols/:id/discard',
    right('protocols.write'),
    handle({ params, body: discardDraftRequest }, ({ params: { id }, body, actor, staff }) =>
      discardProtocol(context, actor, staff, { id, ...body }),
    ),
  );
  router.get(
    '/fasting-protocols/:id/consequences',
    right('protocols.read'),
    handle({ params }, ({ params: { id }, staff }) => protocolConsequences(context, staff, id)),
  );
  router.post(
    '/fasting-protocols/:id/signature',
    right('protocols.sign'),
    handle({ params, body: signVersionRequest }, ({ params: { id }, body, actor, staff }) =>
      signProtocol(context, actor, staff, id, body),
    ),
  );
  return router;
}
