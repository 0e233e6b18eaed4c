import { minutesInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';

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

function leftOrLate(words: ClinicWords, by: number, now: number): string {
  const minutes = minutesBetween(now, by);
  return words.text(minutes >= 0 ? 'clinic.specimen.left' : 'clinic.specimen.late', {
    minutes: minutesInWords(words, Math.abs(minutes)),
  });
}

/** What stands next for a specimen, as one complete phrase with the minutes in words. */
export function specimenSays(words: ClinicWords, facts: SpecimenFacts): string {
  const { zone, now } = facts;
  const until = (by: number) => ({ at: words.clock(by, zone), left: leftOrLate(words, by, now) });
  if (facts.rejectedAt !== null)
    return words.text('clinic.specimen.rejected', {
      reason: facts.rejectReason ?? words.text('clinic.no-reason'),
    });
  if (facts.receivedAt !== null) {
    if (facts.isFinal) return words.text('clinic.specimen.final');
    if (facts.finalExpectedOn === null) return words.text('clinic.specimen.at-laboratory');
    return words.text(facts.isOverdue ? 'clinic.specimen.overdue' : 'clinic.specimen.expected', {
      day: words.day(facts.finalExpectedOn),
    });
  }
  if (facts.mustBeNeutralised && facts.neutralisedAt === null)
    return words.text('clinic.specimen.neutralise', until(facts.neutraliseBy));
  if (facts.label === null) return words.text('clinic.specimen.not-labelled');
  return words.text(
    facts.handedOverAt === null ? 'clinic.specimen.waiting' : 'clinic.specimen.on-its-way',
    until(facts.receiptBy),
  );
}
