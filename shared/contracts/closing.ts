import * as z from 'zod';
import { clockTime, day, id, instant, optionalText } from './common';

/** Why a morning does not take place; at most six, so that they can be read at four in the morning. */
export const closeReason = z.enum(['snow', 'courier', 'laboratory', 'ventilation', 'other']);
export type CloseReason = z.infer<typeof closeReason>;

export const closedDayInPath = z.object({ on: day });

export const closeMorningRequest = z
  .object({ reason: closeReason, says: optionalText(120) })
  .refine(({ reason, says }) => reason !== 'other' || says !== null, {
    path: ['says'],
    message: 'Say why in a few words.',
  });
export type CloseMorningRequest = z.infer<typeof closeMorningRequest>;

/** 'text' reaches everybody who must hear; 'call' nobody; 'text-and-call' some. */
export const howTold = z.enum(['text', 'text-and-call', 'call']);
export type HowTold = z.infer<typeof howTold>;

/** A morning as it is before and after it was closed. */
export const closing = z.object({
  on: day,
  isToday: z.boolean(),
  siteName: z.string(),
  zone: z.string(),
  closed: z
    .object({ at: instant, by: z.string(), reason: closeReason, reasonSays: z.string() })
    .nullable(),
  /** Families whose mornings are lost by closing, or were; in order of arrival. */
  families: z.array(
    z.object({
      householdId: id,
      children: z.array(z.object({ morningId: id, fullName: z.string(), arrivalTime: clockTime })),
      /** Null once it is closed. */
      how: howTold.nullable(),
      /** When the text goes out, where it waits for the end of the quiet hours. */
      textAt: instant.nullable(),
      says: z.string(),
      isClosed: z.boolean(),
    }),
  ),
  /** Who is on the way, here or done: nothing is changed, a person speaks with them. */
  apart: z.array(
    z.object({
      morningId: id,
      childId: id,
      fullName: z.string(),
      arrivalTime: clockTime,
      says: z.string(),
      isOnTheWay: z.boolean(),
    }),
  ),
  /** The text in the language of this screen; null when nobody gets one. */
  textSays: z.string().nullable(),
});
export type Closing = z.infer<typeof closing>;
