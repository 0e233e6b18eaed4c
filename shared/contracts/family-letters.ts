import * as z from 'zod';
import { id, instant } from './common';

export const familyLetterList = z.object({
  letters: z.array(
    z.object({
      id,
      title: z.string(),
      dateSays: z.string(),
      releasedAt: instant,
      isNew: z.boolean(),
    }),
  ),
  /** 'The last answer comes by Friday, 12 February.' for a series that is still waiting. */
  waiting: z.array(z.object({ title: z.string(), says: z.string() })),
});
export type FamilyLetterList = z.infer<typeof familyLetterList>;

export const familyLetter = z.object({
  id,
  title: z.string(),
  clinicName: z.string(),
  dateSays: z.string(),
  paragraphs: z.array(
    z.object({
      key: z.string(),
      heading: z.string().nullable(),
      text: z.string(),
      /** 'calm' marks the sentence that a negative does not rule the disease out. */
      tone: z.enum(['do', 'plain', 'calm', 'danger', 'soft']),
    }),
  ),
  openedSays: z.string(),
});
export type FamilyLetter = z.infer<typeof familyLetter>;
