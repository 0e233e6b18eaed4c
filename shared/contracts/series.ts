import * as z from 'zod';
import { clockTime, day, id, instant, shortText } from './common';

export const proposeSeriesRequest = z.object({
  /** Brothers and sisters planned together; each with a signed order and consent. */
  orderIds: z.array(id).min(1).max(5),
  from: day,
  morningsPlanned: z.number().int().min(1).max(5),
});
export type ProposeSeriesRequest = z.infer<typeof proposeSeriesRequest>;

export const place = z.object({
  childId: id,
  arrivalTime: clockTime,
  roomId: id,
});
export const proposedRun = z.object({
  startsInDays: z.number().int(),
  days: z.array(z.object({ on: day, places: z.array(place) })),
});
export const seriesProposal = z.object({
  children: z.array(
    z.object({ orderId: id, childId: id, fullName: z.string(), ageInWords: z.string() }),
  ),
  days: z.array(
    z.object({
      on: day,
      placesLeft: z.number().int().min(0),
      placesInAll: z.number().int().min(0),
      /** Why no morning can be planned on this day; empty when it can. Complete phrases. */
      refused: z.array(z.object({ code: z.string(), says: z.string() })),
    }),
  ),
  runs: z.array(proposedRun),
  /** Whose hours and days these are. */
  protocolSays: z.string(),
  laboratorySays: z.string(),
});
export type SeriesProposal = z.infer<typeof seriesProposal>;
export type ProposedRun = z.infer<typeof proposedRun>;

export const planSeriesRequest = z.object({
  orderIds: z.array(id).min(1).max(5),
  days: z
    .array(z.object({ on: day, places: z.array(place).min(1).max(5) }))
    .min(1)
    .max(5),
  /** Who brings the children, by day; null where it is not known yet. */
  escorts: z.array(z.object({ on: day, familyMemberId: id })).max(5),
});
export type PlanSeriesRequest = z.infer<typeof planSeriesRequest>;
export const planSeriesAnswer = z.object({
  series: z.array(z.object({ id, childId: id })),
  /** What goes out to the family now and later, as complete phrases with times. */
  familyWillHear: z.array(z.object({ at: instant, says: z.string() })),
});
export type PlanSeriesAnswer = z.infer<typeof planSeriesAnswer>;

export const previewSeriesAnswer = z.object({
  /** Fasting times of the first night, a line a child. */
  firstNight: z.array(
    z.object({
      childId: id,
      fullName: z.string(),
      nothingAfter: z.string(),
      arrive: z.string(),
      longestFast: z.string(),
      individualPlanNeeded: z.string().nullable(),
    }),
  ),
});
export type PreviewSeriesAnswer = z.infer<typeof previewSeriesAnswer>;

export const loseMorningRequest = z.object({ reason: shortText(200) });
export const closeSeriesRequest = z.object({ reason: shortText(300) });
