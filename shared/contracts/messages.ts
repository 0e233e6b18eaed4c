import * as z from 'zod';
import { id, instant } from './common';

export const messageState = z.enum([
  'queued',
  'sending',
  'sent',
  'delivered',
  'failed',
  'given-up',
  'withdrawn',
]);
export const messageItem = z.object({
  id,
  kind: z.string(),
  channel: z.enum(['sms', 'mail']),
  to: z.string(),
  address: z.string(),
  language: z.string(),
  subject: z.string().nullable(),
  body: z.string(),
  state: messageState,
  stateSays: z.string(),
  dueAt: instant,
  sentAt: instant.nullable(),
  deliveredAt: instant.nullable(),
  attempts: z.number().int(),
  segments: z.number().int().nullable(),
});
export type MessageItem = z.infer<typeof messageItem>;
export const messageList = z.object({
  messages: z.array(messageItem),
  health: z.object({
    waiting: z.number().int(),
    oldestDueAt: instant.nullable(),
    isStuck: z.boolean(),
    says: z.string(),
  }),
});
export type MessageList = z.infer<typeof messageList>;
export const wordingItem = z.object({
  id,
  messageKey: z.string(),
  language: z.string(),
  version: z.number().int(),
  body: z.string(),
  isSignedOff: z.boolean(),
  isStale: z.boolean(),
  signedBy: z.string().nullable(),
  signedAt: instant.nullable(),
  translator: z.string().nullable(),
  secondReader: z.string().nullable(),
});
export const wordingList = z.object({ wordings: z.array(wordingItem) });
export type WordingList = z.infer<typeof wordingList>;
