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
  kindSays: z.string(),
  /** A child of the family, to open its record. */
  childId: id.nullable(),
  familyMemberId: id.nullable(),
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
  /** Parts that a text is paid for; null for an e-mail. */
  segments: z.number().int().nullable(),
  /** When it was given up or reported as lost. */
  failedAt: instant.nullable(),
  /** It has failed and may still be sent. */
  mayRetry: z.boolean(),
});
export type MessageItem = z.infer<typeof messageItem>;
export const messageShows = ['all', 'waiting', 'sent', 'failed'] as const;
export interface MessagesQuery {
  readonly childId: number | null;
  readonly show: (typeof messageShows)[number];
  readonly channel: 'sms' | 'mail' | null;
}
export const outboxState = z.object({
  waiting: z.number().int(),
  oldestDueAt: instant.nullable(),
  isStuck: z.boolean(),
  failures: z.number().int(),
  says: z.string(),
});
export type OutboxState = z.infer<typeof outboxState>;
export const messageList = z.object({
  messages: z.array(messageItem),
  /** How many there are; the latest are shown. */
  total: z.number().int(),
  health: outboxState,
});
export type MessageList = z.infer<typeof messageList>;
export const wordingItem = z.object({
  id,
  messageKey: z.string(),
  language: z.string(),
  version: z.number().int(),
  body: z.string(),
  /** Grade for English, INFLESZ for Spanish; null where no published formula fits or there is nothing to score. */
  readingEase: z.number().nullable(),
  isSignedOff: z.boolean(),
  isStale: z.boolean(),
  signedBy: z.string().nullable(),
  signedAt: instant.nullable(),
  translator: z.string().nullable(),
  secondReader: z.string().nullable(),
});
export const wordingList = z.object({ wordings: z.array(wordingItem) });
export type WordingList = z.infer<typeof wordingList>;
