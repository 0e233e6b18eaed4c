import { Router, type Request, type Response } from 'express';
import type { LiveEvent } from '../../shared/contracts/this-morning';
import { staffMemberOf } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { pollerOf, type Change } from './poller';

/** GET /live  server-sent events for signed-in staff: topics and ids of what changes, nothing about a child. */
export function liveRoutes(context: Context): Router {
  const router = Router();
  router.get('/live', (req, res) => stream(context, req, res));
  return router;
}

const heartbeatMs = 15_000;
const sessionCheckMs = 30_000;
const retryMs = 3_000;
/** A screen that does not read any more is let go; it connects again and fetches everything. */
const mostUnreadBytes = 64 * 1024;

async function stream(context: Context, req: Request, res: Response): Promise<void> {
  const { staff, actor } = staffMemberOf(req);
  const poller = pollerOf(context);
  const end = (): void => {
    unsubscribe();
    clearInterval(heartbeat);
    clearInterval(sessionCheck);
    if (!res.writableEnded) res.end();
  };
  const write = (text: string): void => {
    if (res.writableEnded || res.destroyed) return;
    res.write(text);
    if (res.writableLength > mostUnreadBytes) {
      end();
      res.destroy();
    }
  };
  const unsubscribe = poller.subscribe((changes) => write(changes.map(asEvent).join('')));
  const heartbeat = setInterval(() => write(': still here\n\n'), heartbeatMs);
  const sessionCheck = setInterval(() => {
    isStillSignedIn(context, staff.id, actor.sessionHash)
      .then((isSignedIn) => (isSignedIn ? undefined : end()))
      .catch((error: unknown) => context.log.warn({ err: error }, 'session cannot be checked'));
  }, sessionCheckMs);
  heartbeat.unref();
  sessionCheck.unref();
  res.on('close', end);

  res.writeHead(200, {
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-store, no-transform',
    'X-Accel-Buffering': 'no',
  });
  res.flushHeaders();
  // From here on nothing is missed: the screen fetches what it shows when it hears "ready".
  try {
    await poller.poll();
  } catch (error) {
    context.log.warn({ err: error }, 'changes cannot be read');
    end();
    return;
  }
  write(`retry: ${retryMs}\nevent: ready\ndata: {}\n\n`);
}

function asEvent({ id, topic, refId }: Change): string {
  const event: LiveEvent = { topic, refId };
  return `id: ${id}\ndata: ${JSON.stringify(event)}\n\n`;
}

/** Looks without touching: an open screen alone does not keep a session alive. Sessions run on real time. */
async function isStillSignedIn(
  context: Context,
  staffId: number,
  sessionHash: string | null,
): Promise<boolean> {
  const rows = await select<{ id: number }>(
    context.db,
    `SELECT staff.id FROM sessions JOIN staff ON staff.id = sessions.subject_id
     WHERE sessions.id_hash = :sessionHash AND sessions.side = 'clinic' AND staff.id = :staffId
       AND staff.is_active AND sessions.expires_at > :realNow`,
    { sessionHash, staffId, realNow: new Date() },
  );
  return rows.length === 1;
}
