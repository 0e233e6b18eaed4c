import { z } from 'zod';

/**
 * What a pretended service does wrong:
 * - refuse: says no, with a code (21211 or 550 by default);
 * - delay: answers after `ms`;
 * - hold: takes nothing and never answers;
 * - accept-then-hold: takes the message and never answers;
 * - double-reports: every delivery report twice, the last one first;
 * - late-reports: delivery reports only after `ms`;
 * - no-reports: no delivery report at all;
 * - report-failure: takes it and reports later that it did not arrive, with a code (30003 by default).
 */
export const fault = z.object({
  channel: z.enum(['sms', 'mail']),
  does: z.enum([
    'refuse',
    'delay',
    'hold',
    'accept-then-hold',
    'double-reports',
    'late-reports',
    'no-reports',
    'report-failure',
  ]),
  /** Only for this number or address. */
  to: z.string().optional(),
  code: z.number().int().optional(),
  /** HTTP status of a refusal. */
  status: z.number().int().min(400).max(599).optional(),
  ms: z.number().int().min(0).max(60_000).optional(),
  times: z.number().int().min(1).max(1000).default(1),
});
export type Fault = z.infer<typeof fault>;

export class Faults {
  private waiting: Fault[] = [];
  /** How often each thing was done wrong, by channel and name. */
  readonly done = new Map<string, number>();

  set(faults: readonly Fault[]): void {
    this.waiting = faults.map((one) => ({ ...one }));
  }

  /** The next fault for this message, counted down. */
  next(channel: Fault['channel'], to: string): Fault | undefined {
    const found = this.waiting.find(
      (one) => one.channel === channel && one.times > 0 && (one.to === undefined || one.to === to),
    );
    if (!found) return undefined;
    found.times -= 1;
    const name = `${channel} ${found.does}`;
    this.done.set(name, (this.done.get(name) ?? 0) + 1);
    return found;
  }
}
