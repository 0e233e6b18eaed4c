import * as z from 'zod';
import { day, id, instant } from './common';

export const setUp = z.object({
  site: z.object({
    id,
    name: z.string(),
    shortName: z.string(),
    zone: z.string(),
    address: z.string(),
    door: z.string(),
    phone: z.string(),
    emergencyNumber: z.string(),
    dawnPhone: z.object({ from: z.string(), until: z.string() }),
    clinicWeekdays: z.array(z.number().int()),
    arrivals: z.object({ from: z.string(), until: z.string() }),
    placesPerMorning: z.number().int(),
    eveningTextTime: z.string(),
    morningQuestionMinutesBefore: z.number().int(),
    callListMinutesBefore: z.number().int(),
  }),
  rooms: z.array(z.object({ id, name: z.string(), closureMinutes: z.number().int() })),
  closures: z.array(z.object({ on: day, reason: z.string() })),
  protocols: z.array(
    z.object({
      id,
      version: z.number().int(),
      title: z.string(),
      effectiveOn: day,
      hasStartingValues: z.boolean(),
      signedBy: z.string().nullable(),
      signedAt: instant.nullable(),
      bands: z.array(
        z.object({
          age: z.string(),
          leastHours: z.number().nullable(),
          longestHours: z.number().nullable(),
        }),
      ),
    }),
  ),
  laboratoryProfiles: z.array(
    z.object({
      id,
      version: z.number().int(),
      name: z.string(),
      effectiveOn: day,
      signedBy: z.string().nullable(),
      signedAt: instant.nullable(),
      lines: z.array(z.object({ says: z.string(), value: z.string() })),
    }),
  ),
});
export type SetUp = z.infer<typeof setUp>;

export const accessRecordList = z.object({
  rows: z.array(
    z.object({
      id,
      at: instant,
      side: z.enum(['clinic', 'family', 'system']),
      actor: z.string(),
      action: z.enum(['seen', 'changed']),
      matter: z.string(),
      children: z.array(z.object({ id, fullName: z.string() })),
      address: z.string().nullable(),
      detail: z.record(z.string(), z.unknown()),
    }),
  ),
  /** Whether the sealed chain was found whole when this was read. */
  chain: z.enum(['whole', 'broken', 'not-sealed-yet']),
});
export type AccessRecordList = z.infer<typeof accessRecordList>;
