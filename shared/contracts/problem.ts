import * as z from 'zod';

/** RFC 9457 problem document. `code` is stable; `title` is a complete sentence for a person. */
export const problem = z.looseObject({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  detail: z.string().optional(),
  /** Number that a person can name on the telephone when the cause is unknown. */
  reference: z.string().optional(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});
export type ProblemDocument = z.infer<typeof problem>;
