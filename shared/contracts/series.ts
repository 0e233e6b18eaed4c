import * as z from 'zod';
import { clockTime, day, id, instant, shortText } from './common';

/** What a child usually eats in the evening and the night, as the family told it. */
export const usualNight = z.object({
  childId: id,
  lastMealTime: clockTime.nullable(),
  nightFeedTimes: z.array(clockTime).max(6),
});
export type UsualNightAnswer = z.infer<typeof usualNight>;

/** Brothers and sisters planned together; each with a signed order and consent. */
const orderIds = z.array(id).min(1).max(5);
const nights = z.array(usualNight).max(5).default([]);
const needsRide = z.boolean().default(false);

export const proposeSeriesRequest = z.object({
  orderIds,
  from: day,
  morningsPlanned: z.number().int().min(1).max(5),
  weeks: z.number().int().min(1).max(12).default(4),
  /** Asked when the mornings are planned; a child without one is as its record says. */
  nights,
  /** A ride has to be booked first. */
  needsRide,
  /** Places that do not lie side by side will do as well. */
  siblingsMayPart: z.boolean().default(false),
});
export type ProposeSeriesRequest = z.input<typeof proposeSeriesRequest>;

export const place = z.object({
  childId: id,
  arrivalTime: clockTime,
  roomId: id,
});
export const dayPlaces = z.object({ on: day, places: z.array(place) });
export type DayPlaces = z.infer<typeof dayPlaces>;
export const proposedRun = z.object({
  startsInDays: z.number().int(),
  days: z.array(dayPlaces),
  /** What changes within the run, for example a birthday that moves the longest fast. Complete sentences. */
  notes: z.array(z.string()),
});
export const proposedDay = z.object({
  on: day,
  placesLeft: z.number().int().min(0),
  placesInAll: z.number().int().min(0),
  /** Why no run can start on this day; empty when one can. Complete phrases. */
  refused: z.array(z.object({ code: z.string(), says: z.string() })),
  /** The day itself serves as a morning, even where no run can start on it. */
  isPossible: z.boolean(),
});
export type ProposedDay = z.infer<typeof proposedDay>;

/** Days and runs of one search. */
export const searched = z.object({ days: z.array(proposedDay), runs: z.array(proposedRun) });
export type Searched = z.infer<typeof searched>;

/** Whose hours, days and rooms a proposal rests on, as complete sentences. */
const restsOn = {
  protocolSays: z.string(),
  laboratorySays: z.string(),
  capacitySays: z.string(),
};

export const seriesProposal = searched.extend({
  children: z.array(
    z.object({
      orderId: id,
      childId: id,
      fullName: z.string(),
      callMe: z.string(),
      ageInWords: z.string(),
      usualNight: usualNight.omit({ childId: true }),
    }),
  ),
  ...restsOn,
});
export type SeriesProposal = z.infer<typeof seriesProposal>;
export type ProposedRun = z.infer<typeof proposedRun>;

export const planSeriesRequest = z.object({
  orderIds,
  days: z
    .array(z.object({ on: day, places: z.array(place).min(1).max(5) }))
    .min(1)
    .max(5),
  /** Who brings the children, by day; null where it is not known yet. */
  escorts: z.array(z.object({ on: day, familyMemberId: id })).max(5),
  nights,
  needsRide,
});
export type PlanSeriesRequest = z.input<typeof planSeriesRequest>;
export type PlanSeries = z.output<typeof planSeriesRequest>;

/** What goes out to the family now and later, as complete phrases with times. */
export const willHear = z.array(z.object({ at: instant, says: z.string() }));
export type WillHear = z.infer<typeof willHear>;
export const planSeriesAnswer = z.object({
  series: z.array(z.object({ id, childId: id })),
  familyWillHear: willHear,
});
export type PlanSeriesAnswer = z.infer<typeof planSeriesAnswer>;

export const previewSeriesAnswer = z.object({
  /** Fasting times of the first night, a line a child. */
  firstNight: z.array(
    z.object({
      childId: id,
      fullName: z.string(),
      nothingAfter: z.string(),
      /** Feeds of the usual night that cannot stay; null where none was told or all stay. */
      fallsAway: z.string().nullable(),
      arrive: z.string(),
      longestFast: z.string(),
      individualPlanNeeded: z.string().nullable(),
    }),
  ),
});
export type PreviewSeriesAnswer = z.infer<typeof previewSeriesAnswer>;

export const loseMorningRequest = z.object({ reason: shortText(200) });
export const closeSeriesRequest = z.object({ reason: shortText(300) });

/** A problem that carries what is left, so that the form can go on: codes 'place-taken' and 'day-refused'. */
export const withNextOffers = z.looseObject({ proposal: seriesProposal });

export const seriesRestsOn = z.object(restsOn);
