import * as z from 'zod';
import { id, instant, optionalText } from './common';

export const callOutcome = z.enum(['reached', 'not-reached', 'told', 'wrong-number', 'not-needed']);
export const callTask = z.object({
  id,
  reason: z.string(),
  /** Complete sentence; hidden ('A call about results') where the reader may not see results. */
  says: z.string(),
  childId: id.nullable(),
  childName: z.string().nullable(),
  familyMember: z
    .object({
      id,
      fullName: z.string(),
      relationship: z.string(),
      phone: z.string().nullable(),
      speaks: z.string(),
      needsInterpreter: z.boolean(),
    })
    .nullable(),
  script: z.array(z.string()),
  isForClinician: z.boolean(),
  urgentAt: instant,
  createdAt: instant,
  claimedBy: z.string().nullable(),
});
export type CallTask = z.infer<typeof callTask>;
export const callList = z.object({
  open: z.array(callTask),
  done: z.array(
    z.object({
      id,
      says: z.string(),
      childName: z.string().nullable(),
      outcome: z.string(),
      note: z.string().nullable(),
      doneAt: instant,
      doneBy: z.string(),
    }),
  ),
});
export type CallList = z.infer<typeof callList>;
export const callDoneRequest = z.object({
  outcome: callOutcome,
  /** Kept with every told result: name or number; never a child of the family. */
  interpreter: optionalText(160),
  note: optionalText(500),
});
export type CallDoneRequest = z.input<typeof callDoneRequest>;
