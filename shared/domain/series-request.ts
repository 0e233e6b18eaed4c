/** What a search for mornings is asked with, and what it answers. */
import type { BookedPlace, Turnover } from './booked-places';
import type { Day, Instant, LocalTime, Weekday } from './day';
import type { ChildPlace, SeriesChild } from './morning-places';
import type { Place } from './places-of-morning';

export interface ClinicDay {
  readonly weekday: Weekday;
  /** First and last arrival, inclusive. */
  readonly from: LocalTime;
  readonly until: LocalTime;
}

export interface Closure {
  readonly on: Day;
  readonly reason: string;
  /** The clinic's own closure when absent. */
  readonly kind?: 'closure' | 'holiday';
}

export interface LaboratoryDays {
  readonly receivingWeekdays: readonly Weekday[];
  /** Last receipt of the day; a weekday without one has none. */
  readonly cutOffTimes: Readonly<Partial<Record<Weekday, LocalTime>>>;
  readonly closures?: readonly Closure[];
  /** From collection to receipt. */
  readonly minutesToLaboratory?: number;
}

export interface SeriesRequest {
  readonly zone: string;
  readonly from: Day;
  readonly weeks: number;
  /** Consecutive mornings in a run, 1 to 5. */
  readonly count: number;
  readonly clinicDays: readonly ClinicDay[];
  readonly closures: readonly Closure[];
  readonly laboratory: LaboratoryDays;
  /** The places of one morning. */
  readonly places: readonly Place[];
  readonly booked: readonly BookedPlace[];
  /** Without it a booking takes its own place and nothing beside it. */
  readonly turnover?: Turnover;
  readonly children: readonly SeriesChild[];
  readonly siblingsMayPart?: boolean;
  /** Days on which one of the children comes anyway. */
  readonly heldDays?: readonly Day[];
  readonly usualWaitMinutes: number;
  /** Days from today to the first morning at the least, to prepare the family. */
  readonly leadDays: number;
  /** The same for a ride that must be booked; absent where none is. */
  readonly rideLeadDays?: number;
  /** The same for a report that must have been made before; absent where none is due. */
  readonly reportingLeadDays?: number;
  readonly now: Instant;
}

export type RefusalCode =
  | 'past'
  | 'too-soon'
  | 'ride-lead-time'
  | 'reporting-lead-time'
  | 'not-a-clinic-day'
  | 'closed'
  | 'public-holiday'
  | 'laboratory-does-not-receive'
  | 'laboratory-closed'
  | 'laboratory-cut-off'
  | 'no-places-left'
  | 'turnover'
  | 'siblings-apart'
  | 'fast-too-long'
  | 'held-already'
  | 'run-would-break';

export interface Refusal {
  readonly code: RefusalCode;
  readonly params: Readonly<Record<string, string | number>>;
}

export interface ProposedDay {
  readonly on: Day;
  readonly weekday: Weekday;
  readonly placesLeft: number;
  /** Why no run starts here; empty when one does. */
  readonly refused: readonly Refusal[];
  readonly canStart: boolean;
  /** The day itself serves as a morning, even where no run can start on it. */
  readonly isPossible: boolean;
}

export interface RunDay {
  readonly on: Day;
  readonly places: readonly ChildPlace[];
  /** False when no neighbouring places were left. */
  readonly neighbouring: boolean;
}

export interface Run {
  readonly days: readonly RunDay[];
  readonly startsInDays: number;
}

export interface SeriesProposal {
  readonly days: readonly ProposedDay[];
  readonly runs: readonly Run[];
}

export interface MorningOnDay {
  readonly on: Day;
  readonly placesLeft: number;
  readonly refused: readonly Refusal[];
  /** Null when refused. */
  readonly morning: RunDay | null;
}
