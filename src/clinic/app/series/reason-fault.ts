import type * as z from 'zod';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

/** What is wrong with a reason before it is sent; null when nothing is. */
export function reasonFault(schema: z.ZodType, reason: string): string | null {
  const checked = schema.safeParse(reason);
  return checked.success ? null : schemaSentence(checked.error.issues[0]?.message ?? '');
}
