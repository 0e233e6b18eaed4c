import { z } from 'zod';
import { Problem } from '../http/problem';

const state = z.object({
  texts: z.array(
    z.object({
      id: z.string(),
      direction: z.enum(['in', 'out']),
      phone: z.string(),
      body: z.string(),
      at: z.number(),
      status: z.string(),
    }),
  ),
  mails: z.array(
    z.object({
      id: z.string(),
      messageId: z.string(),
      to: z.string(),
      subject: z.string(),
      body: z.string(),
      at: z.number(),
      attachments: z.array(z.object({ name: z.string(), type: z.string(), content: z.string() })),
    }),
  ),
});
export type StandInState = z.infer<typeof state>;

/** The stand-ins run in another process; the web process asks them over their control address. */
export interface StandInClient {
  /** @throws Problem 503 when they do not answer. */
  state(): Promise<StandInState>;
  /** A text from a family's phone. @returns whether the clinic took it. */
  reply(phone: string, body: string): Promise<boolean>;
}

export function standInClient(controlUrl: string): StandInClient {
  async function ask(path: string, init: RequestInit = {}): Promise<unknown> {
    try {
      const answer = await fetch(`${controlUrl}${path}`, {
        ...init,
        headers: { 'Content-Type': 'application/json' },
        signal: AbortSignal.timeout(15_000),
      });
      if (answer.ok) return await answer.json();
    } catch {
      // Told below: not reachable and an unexpected answer are the same to the person who rehearses.
    }
    throw new Problem(
      503,
      'stand-ins-away',
      'The pretended phones and mailboxes do not answer. Are the stand-ins running?',
    );
  }
  return {
    state: async () => state.parse(await ask('/state')),
    reply: async (phone, body) => {
      const answer = await ask('/replies', {
        method: 'POST',
        body: JSON.stringify({ phone, body }),
      });
      return z.object({ isTaken: z.boolean() }).parse(answer).isTaken;
    },
  };
}
