import express from 'express';
import type { Express, RequestHandler } from 'express';
import { z } from 'zod';
import { fault, type Faults } from './faults';
import type { StandInStore } from './store';

const faultsRequest = z.object({ faults: z.array(fault).max(100) });
const replyRequest = z.object({ phone: z.string().min(1).max(20), body: z.string().max(1600) });

export interface ControlParts {
  readonly store: StandInStore;
  readonly faults: Faults;
  readonly receiveFromPhone: (phone: string, body: string) => Promise<boolean>;
}

/**
 * GET  /state     texts, mails, numbers that opted out
 * GET  /faults    how often each thing went wrong
 * PUT  /faults    what goes wrong next
 * POST /replies   a text from a family's phone; says whether the clinic took it
 *
 * For rehearsal and tests, on loopback. A page of another origin cannot use it: the host must be loopback (a name that
 * was bound to this address is refused) and bodies are JSON, which a browser does not send across origins unasked.
 */
export function controlOf({ store, faults, receiveFromPhone }: ControlParts): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(onlyLoopback, express.json({ limit: '64kb' }));
  app.get('/state', (_req, res) => {
    res.json({ texts: store.texts, mails: store.mails, optedOut: [...store.optedOut] });
  });
  app.get('/faults', (_req, res) => {
    res.json({ done: Object.fromEntries(faults.done) });
  });
  app.put('/faults', (req, res) => {
    const parsed = faultsRequest.safeParse(req.body);
    if (!parsed.success) {
      res.status(422).json({ error: parsed.error.issues });
      return;
    }
    faults.set(parsed.data.faults);
    res.status(204).end();
  });
  app.post('/replies', async (req, res) => {
    const parsed = replyRequest.safeParse(req.body);
    if (!parsed.success) {
      res.status(422).json({ error: parsed.error.issues });
      return;
    }
    const isTaken = await receiveFromPhone(parsed.data.phone, parsed.data.body);
    res.json({ isTaken });
  });
  return app;
}

const onlyLoopback: RequestHandler = (req, res, next) => {
  if (/^(127\.0\.0\.1|localhost|\[::1\])(:\d+)?$/.test(req.headers.host ?? '')) next();
  else res.status(403).end();
};
