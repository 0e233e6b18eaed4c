import * as z from 'zod';

/** How a computed result was reached: the rule, what went into it, and a line that staff can read. */
export const explanation = z.object({
  rule: z.string(),
  inputs: z.record(z.string(), z.union([z.string(), z.number()]).nullable()),
  says: z.string().optional(),
});
