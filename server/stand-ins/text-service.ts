import { randomBytes } from 'node:crypto';
import express from 'express';
import type { Express, RequestHandler, Response } from 'express';
import { messageSegments } from '../../shared/domain/message-segments';
import type { Fault, Faults } from './faults';
import type { StandInStore } from './store';
import { asMessage, asPage, textError, type TextAccount } from './text-wire';

export interface TextServiceParts {
  readonly account: TextAccount;
  readonly store: StandInStore;
  readonly faults: Faults;
  /** Business clock, epoch milliseconds. */
  readonly now: () => Promise<number>;
  /** Tells the clinic how the text fares. */
  readonly report: (id: string, fault: Fault | undefined) => void;
}

const telephone = /^\+[1-9]\d{6,14}$/;
const longestBody = 1600;

export const textId = (): string => `SM${randomBytes(16).toString('hex')}`;

/** The text service as its REST interface looks from outside: one account, texts only. */
export function textService(parts: TextServiceParts): Express {
  const { account, store } = parts;
  const app = express();
  app.disable('x-powered-by');
  const texts = '/2010-04-01/Accounts/:account';
  app.use(onlyAccount(account));
  app.post(`${texts}/Messages.json`, express.urlencoded({ extended: false }), sendText(parts));
  app.get(`${texts}/Messages.json`, (req, res) => {
    res.json(asPage(account, store.texts, req.query as Record<string, string | undefined>));
  });
  app.get(`${texts}/Messages/:id.json`, (req, res) => {
    const text = store.texts.find(({ id }) => id === req.params.id);
    if (text) res.json(asMessage(account, text));
    else refuse(res, 404, 20404, 'The requested resource was not found');
  });
  return app;
}

function onlyAccount({ sid, token }: TextAccount): RequestHandler {
  const expected = `Basic ${Buffer.from(`${sid}:${token}`).toString('base64')}`;
  return (req, res, next) => {
    if (req.headers.authorization === expected && req.path.includes(`/${sid}/`)) next();
    else refuse(res, 401, 20003, 'Authenticate');
  };
}

function sendText({ account, store, faults, now, report }: TextServiceParts): RequestHandler {
  return async (req, res) => {
    const form = (req.body ?? {}) as Record<string, string | undefined>;
    const { To: to = '', From: from = '', Body: body = '', StatusCallback: callback } = form;
    const fault = faults.next('sms', to);
    if (fault?.does === 'hold') return;
    if (fault?.does === 'delay') await new Promise((resolve) => setTimeout(resolve, fault.ms));
    if (fault?.does === 'refuse') {
      refuse(res, fault.status ?? 400, fault.code ?? 21211, 'Refused as told');
      return;
    }
    if (!telephone.test(to)) return refuse(res, 400, 21211, "Invalid 'To' Phone Number");
    if (from !== account.from) return refuse(res, 400, 21212, "Invalid 'From' Number");
    if (body === '') return refuse(res, 400, 21602, 'Message body is required');
    if (body.length > longestBody) return refuse(res, 400, 21617, 'The body is too long');
    if (store.optedOut.has(to))
      return refuse(res, 400, 21610, 'Attempt to send to unsubscribed recipient');
    const text = {
      id: textId(),
      direction: 'out' as const,
      phone: to,
      body,
      at: await now(),
      segments: messageSegments(body).segments,
      statusCallback: callback ?? null,
      status: 'queued',
      errorCode: null,
    };
    store.addText(text);
    report(text.id, fault);
    if (fault?.does === 'accept-then-hold') return;
    res.status(201).json(asMessage(account, text));
  };
}

function refuse(res: Response, status: number, code: number, message: string): void {
  res.status(status).json(textError(status, code, message));
}
