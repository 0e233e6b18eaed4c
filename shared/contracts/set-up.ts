import * as z from 'zod';
import {
  clockTime,
  day,
  id,
  idInPath,
  instant,
  languageId,
  optionalText,
  shortText,
  version,
} from './common';

const weekday = z.number().int().min(1).max(7);
const minutes = (max: number) => z.number().int().min(0).max(max);
const span = z.object({ from: clockTime, until: clockTime });

/** What a site is to families and to the planner; whoever runs the house fills it in. */
export const siteForm = z.object({
  name: shortText(120),
  /** What texts call it: neither a disease nor a test. */
  shortName: shortText(40),
  /** ISO 3166-1 alpha-2. */
  country: z.string().regex(/^[A-Z]{2}$/, 'Choose a country of the list.'),
  /** ISO 3166-2 without the country; null where the country's holidays suffice. */
  region: optionalText(10),
  /** IANA. */
  zone: shortText(60),
  address: shortText(200),
  door: shortText(60),
  doorDirections: shortText(300),
  phone: shortText(40),
  /** Null takes the number of the country. */
  emergencyNumber: optionalText(20),
  dawnPhone: span,
  dawnLanguages: z.array(languageId).min(1, 'Choose at least one language.').max(12),
  clinicWeekdays: z.array(weekday).min(1, 'Choose at least one day.').max(7),
  /** First and last arrival, inclusive. */
  arrivals: span,
  minutesPerChild: minutes(240),
  placesPerMorning: z.number().int().min(1).max(60),
  staffPairs: z.number().int().min(1).max(20),
  leadDays: z.number().int().min(0).max(30),
  rideLeadDays: z.number().int().min(0).max(30),
  reportingLeadDays: z.number().int().min(0).max(30),
  longestGapDays: z.number().int().min(1).max(60),
  usualWaitMinutes: minutes(240),
  aheadTextDays: z.number().int().min(0).max(14),
  aheadTextTime: clockTime,
  eveningTextTime: clockTime,
  morningQuestionMinutesBefore: minutes(300),
  nudgeMinutesBefore: minutes(300),
  callListMinutesBefore: minutes(300),
  textsWithoutConsent: z.boolean(),
});
export type SiteForm = z.output<typeof siteForm>;

export const saveSiteRequest = siteForm.extend({ version });
export type SaveSiteRequest = z.output<typeof saveSiteRequest>;
export const addSiteRequest = siteForm.extend({ submissionKey: z.uuid() });
export type AddSiteRequest = z.output<typeof addSiteRequest>;

/** Minutes of the clinic's own, or computed from what the ventilation moves. */
export const roomClosure = z.discriminatedUnion('by', [
  z.object({ by: z.literal('minutes'), minutes: minutes(480) }),
  z.object({
    by: z.literal('air'),
    airChangesPerHour: z.number().min(1, 'Between 1 and 60.').max(60, 'Between 1 and 60.'),
    clearedPercent: z.union([z.literal(99), z.literal(99.9)]),
  }),
]);
export type RoomClosure = z.output<typeof roomClosure>;
export const addRoomRequest = z.object({
  siteId: id,
  name: shortText(40),
  closure: roomClosure,
  submissionKey: z.uuid(),
});
export type AddRoomRequest = z.output<typeof addRoomRequest>;
export const saveRoomRequest = z.object({
  name: shortText(40),
  closure: roomClosure,
  isInUse: z.boolean(),
  version,
});
export type SaveRoomRequest = z.output<typeof saveRoomRequest>;

export const closeDaysRequest = z.object({
  siteId: id,
  from: day,
  until: day,
  reason: shortText(120),
});
export type CloseDaysRequest = z.output<typeof closeDaysRequest>;
export const openDaysRequest = z.object({ siteId: id, from: day, until: day });
export type OpenDaysRequest = z.output<typeof openDaysRequest>;
export const holidayRequest = z.object({ siteId: id, on: day, isOpen: z.boolean() });
export type HolidayRequest = z.output<typeof holidayRequest>;

export const setUpQuery = z.object({ siteId: idInPath.optional() });
export const placesQuery = z.object({ country: z.string().regex(/^[A-Z]{2}$/) });
/** What can be chosen for a site in a country. */
export const placesOfCountry = z.object({
  countries: z.array(z.string()),
  regions: z.array(z.object({ code: z.string(), name: z.string() })),
  /** Null where no rule pack knows it. */
  emergencyNumber: z.string().nullable(),
});
export type PlacesOfCountry = z.infer<typeof placesOfCountry>;

export const setUp = z.object({
  sites: z.array(z.object({ id, name: z.string() })),
  site: siteForm.extend({
    id,
    version,
    phone: z.string(),
    address: z.string(),
    door: z.string(),
    doorDirections: z.string(),
    region: z.string().nullable(),
    emergencyNumber: z.string(),
  }),
  rooms: z.array(
    z.object({
      id,
      name: z.string(),
      closureMinutes: z.number().int(),
      closure: roomClosure,
      isInUse: z.boolean(),
      version,
    }),
  ),
  /** The clinic's own, in spans of days that follow each other for one reason. */
  closures: z.array(
    z.object({ from: day, until: day, reason: z.string(), mornings: z.number().int() }),
  ),
  /** Public holidays of the coming year. */
  holidays: z.array(
    z.object({ on: day, name: z.string(), isOpen: z.boolean(), mornings: z.number().int() }),
  ),
  /** Days on which mornings are planned although the clinic is closed. */
  stranded: z.array(z.object({ on: day, mornings: z.number().int(), says: z.string() })),
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
