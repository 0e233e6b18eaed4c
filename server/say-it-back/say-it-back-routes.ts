import { Router } from 'express';
import { sayBackAnswerRequest } from '../../shared/contracts/say-it-back';
import { familyReach } from '../auth/family-reach';
import type { Context } from '../context';
import { handleFamily } from '../http/handle';
import { recordSayBack } from './record-say-back';
import { sayItBackOf } from './say-it-back';

/**
 * GET  /say-it-back   three questions about the next night, as ready words
 * POST /say-it-back   one answer; explains it and tells what is asked then
 */
export function sayItBackRoutes(context: Context): Router {
  const router = Router();
  const household = familyReach('household');
  router.get(
    '/say-it-back',
    household,
    handleFamily({}, ({ actor, visitor }) => sayItBackOf(context, actor, visitor)),
  );
  router.post(
    '/say-it-back',
    household,
    handleFamily({ body: sayBackAnswerRequest }, ({ body, actor, visitor }) =>
      recordSayBack(context, actor, visitor, { ...body, deviceAt: Date.parse(body.deviceAt) }),
    ),
  );
  return router;
}
