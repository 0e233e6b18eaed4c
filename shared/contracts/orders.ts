import * as z from 'zod';
import { day, id, instant, languageId, optionalText, shortText, version } from './common';

export const orderDetails = z.object({
  weightKg: z.number().min(0.5, 'Between 0.5 and 120 kg.').max(120, 'Between 0.5 and 120 kg.'),
  sourceCase: z.enum(['known', 'not-known']),
  sourceSusceptibility: z.enum(['susceptible', 'resistant', 'not-known']),
  medicines: optionalText(300),
  medicinesSince: day.nullable().default(null),
  hasBleedingHistory: z.boolean(),
  hasNoseOrAirwayTrouble: z.boolean(),
  hasRecentSurgery: z.boolean(),
  hasInfectiousContactAtHome: z.boolean(),
  note: optionalText(500),
});

/** The stop card: any "yes" is not bookable, the physician is telephoned. */
export const stopCard = z.object({
  hasSuspectedMeningitis: z.boolean(),
  hasSuspectedMiliaryDisease: z.boolean(),
  hasBreathingDistress: z.boolean(),
  isDrowsy: z.boolean(),
  /** Then sputum is offered first. */
  canBringUpSputum: z.boolean(),
});

export const addOrderRequest = z.object({
  childId: id,
  orderedByName: shortText(160),
  answerTo: shortText(200),
  reason: shortText(500),
  morningsPlanned: z.number().int().min(1).max(5),
  intendsToTreat: z.boolean(),
  details: orderDetails,
  stopCard,
  submissionKey: z.uuid(),
});
export type AddOrderRequest = z.input<typeof addOrderRequest>;

export const procedureConsentRequest = z
  .object({
    familyMemberId: id,
    legalBasis: shortText(120),
    how: z.enum(['in-person', 'telephone']),
    witness: optionalText(160),
    interpreter: optionalText(160),
    language: languageId,
    formVersion: shortText(40),
    comfortPlan: shortText(500),
    hasParentInRoom: z.boolean(),
    givenAt: instant,
  })
  .refine((consent) => consent.how === 'in-person' || consent.witness !== null, {
    path: ['witness'],
    message: 'A consent by telephone needs a witness.',
  });
export type ProcedureConsentRequest = z.input<typeof procedureConsentRequest>;

export const order = z.object({
  id,
  version,
  childId: id,
  childName: z.string(),
  orderedByName: z.string(),
  answerTo: z.string(),
  reason: z.string(),
  morningsPlanned: z.number().int(),
  intendsToTreat: z.boolean(),
  details: z.object({ ...orderDetails.shape, stopCard }),
  createdAt: instant,
  signedAt: instant.nullable(),
  signedBy: z.string().nullable(),
  consent: z
    .object({
      givenBy: z.string(),
      how: z.enum(['in-person', 'telephone']),
      language: z.string(),
      formVersion: z.string(),
      interpreter: z.string().nullable(),
      givenAt: instant,
    })
    .nullable(),
  reportingDueOn: day.nullable(),
  reportedAt: instant.nullable(),
  seriesId: id.nullable(),
  /** What still stands between this order and a series, as complete sentences. */
  stillNeeded: z.array(z.string()),
});
export type Order = z.infer<typeof order>;
export const orderList = z.object({ orders: z.array(order) });
export type OrderList = z.infer<typeof orderList>;
