import type { Express, Request } from 'express';
import type { Context } from '../context';

/** Keeps the context with the application, for the few steps of a ladder that are made without one. */
export function keepContext(app: Express, context: Context): void {
  app.locals['context'] = context;
}

export function contextOf(req: Request): Context {
  return req.app.locals['context'] as Context;
}
