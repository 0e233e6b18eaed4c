import { Router } from 'express';
import { z } from 'zod';
import { idInPath } from '../../shared/contracts/common';
import {
  checkProfileRequest,
  discardDraftRequest,
  makeDraftRequest,
  saveProfileRequest,
  signVersionRequest,
} from '../../shared/contracts/protocols';
import { right } from '../auth/right';
import type { Context } from '../context';
import { handle } from '../http/handle';
import {
  checkProfile,
  discardProfile,
  draftProfile,
  listProfiles,
  openProfile,
  profileConsequences,
  saveProfile,
  signProfile,
} from './profile-desk';

const params = z.object({ id: idInPath });

/**
 * GET  /laboratory-profiles                    every version of the site
 * POST /laboratory-profiles                    a draft, from the version in force
 * POST /laboratory-profiles/check              beside the editor: problems, published values, an example; writes nothing
 * GET  /laboratory-profiles/:id                one version
 * PUT  /laboratory-profiles/:id                save a draft
 * POST /laboratory-profiles/:id/discard        discard a draft
 * GET  /laboratory-profiles/:id/consequences   what signing would change
 * POST /laboratory-profiles/:id/signature      sign
 */
export function profileRoutes(context: Context): Router {
  const router = Router();
  router.get(
    '/laboratory-profiles',
    right('protocols.read'),
    handle({}, ({ staff }) => listProfiles(context, staff)),
  );
  router.post(
    '/laboratory-profiles',
    right('protocols.write'),
    handle({ body: makeDraftRequest }, ({ body, actor, staff }) =>
      draftProfile(context, actor, staff, body.submissionKey),
    ),
  );
  router.post(
    '/laboratory-profiles/check',
    right('protocols.read'),
    handle({ body: checkProfileRequest }, ({ body, staff }) => checkProfile(context, staff, body)),
  );
  router.get(
    '/laboratory-profiles/:id',
    right('protocols.read'),
    handle({ params }, ({ params: { id }, staff }) => openProfile(context, staff, id)),
  );
  router.put(
    '/laboratory-profiles/:id',
    right('protocols.write'),
    handle({ params, body: saveProfileRequest }, ({ params: { id }, body, actor, staff }) =>
      saveProfile(context, actor, staff, { id, draftVersion: body.draftVersion }, body.values),
    ),
  );
  router.post(
    '/laboratory-profiles/:id/discard',
    right('protocols.write'),
    handle({ params, body: discardDraftRequest }, ({ params: { id }, body, actor, staff }) =>
      discardProfile(context, actor, staff, { id, ...body }),
    ),
  );
  router.get(
    '/laboratory-profiles/:id/consequences',
    right('protocols.read'),
    handle({ params }, ({ params: { id }, staff }) => profileConsequences(context, staff, id)),
  );
  router.post(
    '/laboratory-profiles/:id/signature',
    right('protocols.sign'),
    handle({ params, body: signVersionRequest }, ({ params: { id }, body, actor, staff }) =>
      signProfile(context, actor, staff, id, body),
    ),
  );
  return router;
}
