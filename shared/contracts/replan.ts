import * as z from 'zod';
import { clockTime, day, id, morningState, shortText, version } from './common';
import { dayPlaces, searched, seriesRestsOn, willHear } from './series';

export const replanKind = z.enum(['next-possible-morning', 'new-run', 'close-with-fewer', 'move']);
export type ReplanKind = z.infer<typeof replanKind>;

/** The series of one child, or of brothers and sisters of one household. */
const seriesIds = z.array(id).min(1).max(5);

export const replanProposalRequest = z.object({
  seriesIds,
  weeks: z.number().int().min(1).max(12).default(4),
  /** Planned mornings that are to lie elsewhere; without any nothing is offered for moving. */
  movedMorningIds: z.array(id).max(25).default([]),
  siblingsMayPart: z.boolean().default(false),
});
export type ReplanProposalRequest = z.input<typeof replanProposalRequest>;

export const standingMorning = z.object({
  morningId: id,
  number: z.number().int(),
  on: day,
  arrivalTime: clockTime,
  state: morningState,
  lostReason: z.string().nullable(),
});
export type StandingMorning = z.infer<typeof standingMorning>;

export const replanProposal = z.object({
  children: z.array(
    z.object({
      seriesId: id,
      childId: id,
      fullName: z.string(),
      ageInWords: z.string(),
      version,
      morningsPlanned: z.number().int(),
      /** Specimens that were taken; they stay whatever is chosen. */
      collected: z.number().int(),
      /** Mornings of the order that nobody has planned. */
      missing: z.number().int(),
      mornings: z.array(standingMorning),
    }),
  ),
  /** Three offers, each with the first days that fit; without days it cannot be had, and `whyNot` says why. */
  offers: z.array(
    z.object({
      kind: replanKind,
      isPossible: z.boolean(),
      whyNot: z.string().nullable(),
      days: z.array(dayPlaces),
      /** All days and runs to choose from instead. */
      search: searched,
    }),
  ),
  /** False for who may look and prepare, while a clinician chooses. */
  mayChoose: z.boolean(),
  ...seriesRestsOn.shape,
});
export type ReplanProposal = z.infer<typeof replanProposal>;

const change = {
  kind: replanKind,
  seriesIds,
  /** New places; empty when closing. */
  days: z.array(dayPlaces).max(5),
  movedMorningIds: z.array(id).max(25).default([]),
};
export const replanPreviewRequest = z.object(change);
export type ReplanPreviewRequest = z.input<typeof replanPreviewRequest>;
export type ReplanChange = z.output<typeof replanPreviewRequest>;
export const replanRequest = z.object({
  ...change,
  reason: shortText(300),
  /** As the choice was made from; somebody else's change in between is refused. */
  versions: z.array(z.object({ seriesId: id, version })).max(5),
});
export type ReplanRequest = z.input<typeof replanRequest>;

export const replanOutcome = z.object({
  children: z.array(
    z.object({
      seriesId: id,
      childId: id,
      fullName: z.string(),
      /** In order of days. */
      after: z.array(
        z.object({
          number: z.number().int(),
          on: day,
          arrivalTime: clockTime,
          state: morningState,
          change: z.enum(['kept', 'moved', 'renumbered', 'new', 'given-up']),
          /** How it stood before; null for a new one and for one that stays. */
          was: z.object({ number: z.number().int(), on: day, arrivalTime: clockTime }).nullable(),
        }),
      ),
    }),
  ),
  /** Complete sentences. */
  consequences: z.array(z.string()),
  familyWillHear: willHear,
  /** What waited for the family and no longer goes out. */
  familyWillNotHear: willHear,
});
export type ReplanOutcome = z.infer<typeof replanOutcome>;

export const pauseMorningRequest = z.object({ reason: shortText(200) });
export const pauseMorningAnswer = z.object({
  /** When the family is asked again, as a complete phrase. */
  askedAgainSays: z.string(),
});
export type PauseMorningAnswer = z.infer<typeof pauseMorningAnswer>;

/** A problem that carries what is left: codes 'place-taken' and 'day-refused'. */
export const withNextReplan = z.looseObject({ replan: replanProposal });
