import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Where routers are mounted; a failed request has left its router when it is logged. */
const mountedAt = /^\/(api\/(clinic|family)|hooks|feeds)(?=\/)/;

/** The route's pattern, never the address: tokens, ids and search words stay out of the log. */
function routeOf(req: IncomingMessage): string {
  const { originalUrl = '', route } = req as { originalUrl?: string; route?: { path?: unknown } };
  const mount = mountedAt.exec(originalUrl)?.[0] ?? '';
  return typeof route?.path === 'string' ? `${mount}${route.path}` : `${mount}/...`;
}

/** One line an answer under the API: method, route, status, milliseconds. Files are not logged. */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: () => randomUUID(),
    wrapSerializers: false,
    serializers: {
      req: (req: { id: unknown; method: string }) => ({ id: req.id, method: req.method }),
      res: (res: ServerResponse) => ({ status: res.statusCode }),
    },
    customProps: (req, res) => (res.writableEnded ? { route: routeOf(req) } : {}),
    customLogLevel: (_req, res, error) =>
      error || res.statusCode >= 500 ? 'error' : res.statusCode >= 400 ? 'info' : 'debug',
    customErrorMessage: () => 'request failed',
    customSuccessMessage: () => 'request',
  }) as RequestHandler;
}
