import { DateTime } from 'luxon';

/** '06:22' in the clinic's zone. */
export const clinicClock = (at: number, zone: string): string =>
  DateTime.fromMillis(at, { zone }).toFormat('HH:mm');

/** 'Tuesday, April 6' of a calendar day. */
export const clinicDay = (day: string): string =>
  DateTime.fromISO(day, { zone: 'utc' }).setLocale('en-US').toFormat('cccc, LLLL d');

/** 'Tue Apr 6, 06:22' in the clinic's zone. */
export const clinicMoment = (at: number, zone: string): string =>
  DateTime.fromMillis(at, { zone }).setLocale('en-US').toFormat('ccc LLL d, HH:mm');

export interface SpecimenFacts {
  readonly zone: string;
  readonly now: number;
  readonly neutralisedAt: number | null;
  readonly neutraliseBy: number;
  readonly mustBeNeutralised: boolean;
  readonly handedOverAt: number | null;
  readonly receivedAt: number | null;
  readonly receiptBy: number;
  readonly rejectedAt: number | null;
  readonly rejectReason: string | null;
  readonly label: string | null;
  readonly finalExpectedOn: string | null;
  readonly isOverdue: boolean;
  readonly isFinal: boolean;
}

const minutesBetween = (from: number, to: number): number => Math.round((to - from) / 60_000);

function leftOrLate(by: number, now: number): string {
  const minutes = minutesBetween(now, by);
  return minutes >= 0 ? `${minutes} minutes left` : `${-minutes} minutes late`;
}

/** What stands next for a specimen, as one complete phrase with the minutes in words. */
export function specimenSays(facts: SpecimenFacts): string {
  const { zone, now } = facts;
  if (facts.rejectedAt !== null)
    return `Rejected by the laboratory: ${facts.rejectReason ?? 'no reason given'}. It gives no answer.`;
  if (facts.receivedAt !== null) {
    if (facts.isFinal) return 'Final.';
    if (facts.finalExpectedOn === null) return 'At the laboratory.';
    return facts.isOverdue
      ? `Overdue: the final answer was expected by ${clinicDay(facts.finalExpectedOn)}. Ask the laboratory.`
      : `At the laboratory. Final answer expected by ${clinicDay(facts.finalExpectedOn)}.`;
  }
  if (facts.mustBeNeutralised && facts.neutralisedAt === null)
    return `Neutralise by ${clinicClock(facts.neutraliseBy, zone)}, ${leftOrLate(facts.neutraliseBy, now)}.`;
  if (facts.label === null) return 'Not labelled yet. No hand-over without its label.';
  const receipt = `laboratory by ${clinicClock(facts.receiptBy, zone)}, ${leftOrLate(facts.receiptBy, now)}`;
  return facts.handedOverAt === null
    ? `Waiting for the courier; ${receipt}.`
    : `On its way; ${receipt}.`;
}
