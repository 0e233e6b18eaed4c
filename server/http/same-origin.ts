import type { RequestHandler } from 'express';
import { Problem } from './problem';

const reading = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses a write that another site's page causes. Browsers name the relation in Sec-Fetch-Site, which no script can
 * set; an old one at least names the Origin. A request with neither is refused. Bodies are JSON alone, which a foreign
 * form cannot send.
 */
export function sameOrigin(origin: string): RequestHandler {
  return (req, _res, next) => {
    if (reading.has(req.method)) {
      next();
      return;
    }
    const site = req.get('Sec-Fetch-Site');
    const isOurs = site === undefined ? req.get('Origin') === origin : site === 'same-origin';
    if (!isOurs)
      throw new Problem(403, 'cross-origin', 'This can only be done from our own pages.');
    const hasBody = Number(req.get('Content-Length') ?? 0) > 0 || req.get('Transfer-Encoding');
    if (hasBody && !req.is('application/json'))
      throw new Problem(415, 'json-only', 'The request must be JSON.');
    next();
  };
}
