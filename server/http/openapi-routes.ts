import { Router } from 'express';
import { handle } from './handle';
import { mountedRoutes } from './ladders';
import type { MountedRouter } from './ladders';
import { describeApi } from './openapi';

/** GET /openapi.json   the description of the interface, for signed-in staff (their cookie has this path) */
export function openApiRoutes(routers: readonly MountedRouter[]): Router {
  const router = Router();
  let described: object | null = null;
  router.get(
    '/openapi.json',
    handle({}, () => Promise.resolve((described ??= describeApi(mountedRoutes(routers))))),
  );
  return router;
}
