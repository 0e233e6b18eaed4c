import * as z from 'zod';
import { day, optionalText } from './common';
import { supplyItems } from '../domain/supplies';

export const supplyItem = z.enum(supplyItems);
const small = z.number().int().min(0).max(50);

export const supplyRule = z.object({
  item: supplyItem,
  perChild: small,
  perMorning: small,
  childrenPerSpare: z.number().int().min(1).max(50).nullable(),
  underMonths: z.number().int().min(1).max(240).nullable(),
});
export const supplyListRequest = z.object({ rules: z.array(supplyRule).max(supplyItems.length) });
export type SupplyListRequest = z.input<typeof supplyListRequest>;
export const supplyList = z.object({
  rules: z.array(supplyRule.extend({ says: z.string() })),
  /** The published starting values, for a clinic that has no list of its own yet. */
  startingRules: z.array(supplyRule.extend({ says: z.string() })),
});
export type SupplyList = z.infer<typeof supplyList>;

export const setOut = z.object({
  on: day,
  /** Arrival time and name of each child of that morning. */
  children: z.array(
    z.object({ arrivalTime: z.string(), callMe: z.string(), ageInWords: z.string() }),
  ),
  hasList: z.boolean(),
  lines: z.array(
    z.object({
      item: supplyItem,
      says: z.string(),
      count: z.number().int(),
      ofWhichSpare: z.number().int(),
      /** null while nobody has looked. */
      isReady: z.boolean().nullable(),
      note: z.string().nullable(),
      tickedBy: z.string().nullable(),
    }),
  ),
});
export type SetOut = z.infer<typeof setOut>;

/** One thing is missing, or everything else is ready. */
export const setOutTickRequest = z.object({
  /** Empty: every line that nobody has looked at yet. */
  items: z.array(supplyItem).max(supplyItems.length),
  isReady: z.boolean(),
  note: optionalText(200),
});
export type SetOutTickRequest = z.input<typeof setOutTickRequest>;
