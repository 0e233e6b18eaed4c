import { Router } from 'express';
import { familyReach } from '../auth/family-reach';
import type { Context } from '../context';
import { handleFamily } from '../http/handle';
import { limit } from '../http/limit';
import { feedFile, feedOf, openFeed, withdrawFeed } from './calendar-feed';

/**
 * GET  /calendar-feed              the address that this person's calendar follows
 * POST /calendar-feed              give one
 * POST /calendar-feed/withdrawal   take it back
 */
export function familyFeedRoutes(context: Context): Router {
  const router = Router();
  const household = familyReach('household');
  router.get(
    '/calendar-feed',
    household,
    handleFamily({}, ({ visitor }) => feedOf(context, visitor)),
  );
  router.post(
    '/calendar-feed',
    household,
    handleFamily({}, ({ actor, visitor }) => openFeed(context, actor, visitor)),
  );
  router.post(
    '/calendar-feed/withdrawal',
    household,
    handleFamily({}, ({ actor, visitor }) => withdrawFeed(context, actor, visitor)),
  );
  return router;
}

/**
 * GET /feeds/:token.ics   the mornings for a calendar that follows the address, until it is withdrawn
 */
export function feedRoutes(context: Context): Router {
  const router = Router();
  router.get('/:file', limit({ name: 'feeds', hits: 120, seconds: 60 }), async (req, res, next) => {
    const [, token] = /^([A-Za-z0-9_-]{22})\.ics$/.exec(String(req.params['file'])) ?? [];
    const file = token === undefined ? null : await feedFile(context, token, req.ip ?? null);
    if (file === null) {
      next();
      return;
    }
    res.set({
      ETag: file.etag,
      // Asked again each time, answered in a few bytes while nothing changed.
      'Cache-Control': 'private, no-cache',
      'Content-Disposition': 'inline; filename="visits.ics"',
      'X-Robots-Tag': 'noindex',
    });
    if (req.fresh) res.status(304).end();
    else res.type('text/calendar; charset=utf-8').send(file.content);
  });
  return router;
}
