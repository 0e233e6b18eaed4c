import express, { Router } from 'express';
import { z } from 'zod';
import type { Context } from '../context';
import { Problem } from '../http/problem';
import { takeReply } from '../messages/replies';
import { keepDeliveryReport } from '../outbox/delivery-reports';
import { fromTextService } from './provider-signature';

const textId = z.string().regex(/^(SM|MM)[0-9a-fA-F]{32}$/);

const statusReport = z.object({
  MessageSid: textId,
  MessageStatus: z.string().regex(/^[a-z_]{1,30}$/),
  ErrorCode: z
    .string()
    .regex(/^\d{0,10}$/)
    .optional(),
});

const incomingText = z.object({
  MessageSid: textId,
  From: z.string().min(1).max(20),
  Body: z.string().max(1600).default(''),
  NumMedia: z
    .string()
    .regex(/^\d{1,2}$/)
    .default('0'),
});

/**
 * POST /sms/status   delivery report: form, signature
 * POST /sms/reply    text from a family: form, signature
 *
 * Mounted under /hooks, outside the guard for writes from our own pages. Both are recorded once, however often they come.
 */
export function smsHooks(context: Context): Router {
  const router = Router();
  const form = express.urlencoded({ extended: false, limit: '20kb' });
  const genuine = fromTextService(context.settings);

  router.post('/sms/status', form, genuine, async (req, res) => {
    const report = read(statusReport, req.body);
    await keepDeliveryReport(context.db, {
      providerId: report.MessageSid,
      status: report.MessageStatus,
      errorCode:
        report.ErrorCode === undefined || report.ErrorCode === '' ? null : report.ErrorCode,
      receivedAt: context.clock.now(),
    });
    res.status(204).end();
  });

  router.post('/sms/reply', form, genuine, async (req, res) => {
    const text = read(incomingText, req.body);
    await takeReply(context, {
      providerId: text.MessageSid,
      from: text.From,
      body: text.Body,
      pictures: Number(text.NumMedia),
      receivedAt: context.clock.now(),
    });
    // Whatever we answer goes through the outbox, never through the answer to this request.
    res.type('text/xml').send('<?xml version="1.0" encoding="UTF-8"?><Response></Response>');
  });

  return router;
}

function read<Output>(schema: z.ZodType<Output>, body: unknown): Output {
  const parsed = schema.safeParse(body);
  if (!parsed.success)
    throw new Problem(400, 'not-a-report', 'This is no report of the text service.');
  return parsed.data;
}
