import * as z from 'zod';
import { clockTime, day, id, idInPath, instant, optionalText, version } from './common';

/** What reaches a person who is not looking at a screen. */
export const alertKinds = [
  'texts-stuck',
  'mails-stuck',
  'critical-result',
  'overdue-result',
  'not-answered',
] as const;
export const alertKind = z.enum(alertKinds);
export type AlertKind = z.infer<typeof alertKind>;

export const staffAlert = z.object({
  id,
  kind: alertKind,
  /** Complete sentence; names no child. */
  says: z.string(),
  siteName: z.string(),
  zone: z.string(),
  /** The screen on which something can be done. */
  opens: z.enum(['calls', 'results', 'messages']),
  raisedAt: instant,
  /** Who was told last; null when nobody could be. */
  told: z.string().nullable(),
  /** When the next one is told; null once it was taken or everybody has been told. */
  passesOnAt: instant.nullable(),
  takenBy: z.string().nullable(),
  takenAt: instant.nullable(),
  isMine: z.boolean(),
  endedAt: instant.nullable(),
  /** Sentences, the oldest first. */
  happened: z.array(z.object({ at: instant, says: z.string() })),
});
export type StaffAlert = z.infer<typeof staffAlert>;
/** Open ones first, the oldest first; then what was taken or came to an end in the last day. */
export const alertList = z.object({ alerts: z.array(staffAlert) });
export type AlertList = z.infer<typeof alertList>;
export const alertParams = z.object({ id: idInPath });

const weekday = z.number().int().min(1).max(7);
export const onCallTurn = z.object({
  staffId: id,
  deputyId: id.nullable(),
  weekdays: z.array(weekday).min(1, 'Choose at least one day.').max(7),
  from: clockTime,
  /** Not after `from`: on the next day. */
  until: clockTime,
  fromOn: day,
  untilOn: day.nullable(),
});
export const onCallReach = z.object({
  staffId: id,
  phone: optionalText(40),
  byText: z.boolean(),
  byMail: z.boolean(),
  language: z.enum(['en', 'es']),
});
export const saveOnCallRequest = z.object({
  waitMinutes: z.number().int().min(2).max(120),
  turns: z.array(onCallTurn).max(40),
  reach: z.array(onCallReach).max(200),
  version,
});
export type SaveOnCallRequest = z.output<typeof saveOnCallRequest>;

export const onCallQuery = z.object({ siteId: idInPath.optional() });
export const onCallList = z.object({
  sites: z.array(z.object({ id, name: z.string() })),
  site: z.object({ id, name: z.string(), zone: z.string() }),
  /** Minutes after which an alert that nobody took goes to the next one. */
  waitMinutes: z.number().int(),
  version,
  turns: z.array(onCallTurn),
  staff: z.array(
    z.object({
      id,
      fullName: z.string(),
      email: z.string(),
      phone: z.string().nullable(),
      byText: z.boolean(),
      byMail: z.boolean(),
      language: z.enum(['en', 'es']),
    }),
  ),
  /** Whom an alert would reach now, in order. */
  now: z.array(z.string()),
  /** Whether nobody is on the list, so that the lead clinicians are told instead. */
  isEmpty: z.boolean(),
});
export type OnCallList = z.infer<typeof onCallList>;
