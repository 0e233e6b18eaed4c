import * as z from 'zod';
import { instant } from './common';

export const rehearsalState = z.object({
  now: instant,
  offsetMinutes: z.number(),
  /** Moments worth going to: 'The evening before, 18:00', 'Morning question, 05:00'. */
  moments: z.array(z.object({ says: z.string(), at: instant })),
  phones: z.array(
    z.object({
      phone: z.string(),
      name: z.string(),
      relationship: z.string(),
      children: z.array(z.string()),
      texts: z.array(
        z.object({
          id: z.string(),
          direction: z.enum(['in', 'out']),
          at: instant,
          body: z.string(),
          status: z.string(),
        }),
      ),
    }),
  ),
  mailboxes: z.array(
    z.object({
      email: z.string(),
      name: z.string(),
      mails: z.array(
        z.object({
          id: z.string(),
          at: instant,
          subject: z.string(),
          body: z.string(),
          attachments: z.array(
            z.object({ name: z.string(), type: z.string(), content: z.string() }),
          ),
        }),
      ),
    }),
  ),
});
export type RehearsalState = z.infer<typeof rehearsalState>;
/** The clock moves forward only; days that have begun are not unlived. */
export const moveClockRequest = z.union([
  z.object({
    minutes: z
      .number()
      .int()
      .min(1)
      .max(60 * 24 * 120),
  }),
  z.object({ to: instant }),
]);
export type MoveClockRequest = z.infer<typeof moveClockRequest>;
export const rehearsalReplyRequest = z.object({
  phone: z.string(),
  body: z.string().min(1).max(640),
});
export type RehearsalReplyRequest = z.infer<typeof rehearsalReplyRequest>;
