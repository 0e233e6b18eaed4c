/**
 * All runs of consecutive mornings from a day on that fit clinic days, closures, the laboratory,
 * rooms and the children's fasting limits; for every day that is refused, why. Brothers and
 * sisters come on the same mornings in neighbouring places, the youngest first.
 */
import { morningPlaces, type ChildPlace, type SeriesChild } from './morning-places';
import type { Place } from './places-of-morning';
import {
  addDays,
  dayOf,
  daysBetween,
  minutesOfTime,
  validateDay,
  weekdayOf,
  type Day,
  type Instant,
  type LocalTime,
  type Weekday,
} from './zone';

export type { ChildPlace, SeriesChild } from './morning-places';

export interface ClinicDay {
  readonly weekday: Weekday;
  /** First and last arrival, inclusive. */
  readonly from: LocalTime;
  readonly until: LocalTime;
}

export interface Closure {
  readonly on: Day;
  readonly reason: string;
}

export interface LaboratoryDays {
  readonly receivingWeekdays: readonly Weekday[];
  /** Last receipt of the day; a weekday without one has none. */
  readonly cutOffTimes: Readonly<Partial<Record<Weekday, LocalTime>>>;
  readonly closures?: readonly Closure[];
  /** From collection to receipt. */
  readonly minutesToLaboratory?: number;
}

export interface BookedPlace {
  readonly on: Day;
  readonly arrivalTime: LocalTime;
  /** Without a room every place at that time is taken. */
  readonly roomId?: number;
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
  readonly children: readonly SeriesChild[];
  readonly usualWaitMinutes: number;
  /** Days from today to the first morning at the least. */
  readonly leadDays: number;
  readonly now: Instant;
}

export type RefusalCode =
  | 'past'
  | 'too-soon'
  | 'not-a-clinic-day'
  | 'closed'
  | 'laboratory-does-not-receive'
  | 'laboratory-closed'
  | 'laboratory-cut-off'
  | 'no-places-left'
  | 'fast-too-long'
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

export function proposeRuns(request: SeriesRequest): SeriesProposal {
  const { from, weeks, count } = request;
  if (!Number.isInteger(count) || count < 1 || count > 5) {
    throw new RangeError('A series has 1 to 5 mornings.');
  }
  if (!(weeks > 0)) throw new RangeError('Look ahead for at least a week.');
  if (request.children.length === 0) throw new RangeError('Plan for at least one child.');
  const today = dayOf(request.now, request.zone);
  const span = weeks * 7;
  const mornings = Array.from({ length: span + count - 1 }, (_, index) =>
    morningOn(request, addDays(validateDay(from), index)),
  );
  const days: ProposedDay[] = [];
  const runs: Run[] = [];
  mornings.slice(0, span).forEach((first, index) => {
    const run = mornings.slice(index, index + count);
    const broken = run.find((later) => later.morning === null);
    const isPossible = first.morning !== null;
    const refused: readonly Refusal[] =
      !isPossible || !broken ? first.refused : [runWouldBreak(broken)];
    const { on, placesLeft } = first;
    const canStart = refused.length === 0;
    days.push({ on, weekday: weekdayOf(on), placesLeft, refused, canStart, isPossible });
    if (canStart) {
      const runDays = run.flatMap(({ morning }) => (morning ? [morning] : []));
      runs.push({ days: runDays, startsInDays: daysBetween(today, on) });
    }
  });
  return { days, runs };
}

function runWouldBreak(broken: MorningOnDay): Refusal {
  const code = broken.refused[0]?.code ?? 'no-places-left';
  return { code: 'run-would-break', params: { on: broken.on, because: code } };
}

/** One day as a morning for all the children: their places, or every reason against it. */
export function morningOn(request: SeriesRequest, on: Day): MorningOnDay {
  const weekday = weekdayOf(on);
  const refused: Refusal[] = [];
  const refuse = (code: RefusalCode, params: Refusal['params'] = {}): void => {
    refused.push({ code, params });
  };
  const ahead = daysBetween(dayOf(request.now, request.zone), on);
  if (ahead < 0) refuse('past');
  else if (ahead < request.leadDays) refuse('too-soon', { leadDays: request.leadDays });

  const clinicDay = request.clinicDays.find((candidate) => candidate.weekday === weekday);
  const closure = request.closures.find((candidate) => candidate.on === on);
  if (!clinicDay) refuse('not-a-clinic-day', { weekday });
  if (closure) refuse('closed', { reason: closure.reason });

  const { receivingWeekdays, closures = [] } = request.laboratory;
  const laboratoryClosure = closures.find((candidate) => candidate.on === on);
  if (!receivingWeekdays.includes(weekday)) refuse('laboratory-does-not-receive', { weekday });
  if (laboratoryClosure) refuse('laboratory-closed', { reason: laboratoryClosure.reason });
  if (!clinicDay || refused.length > 0) return { on, placesLeft: 0, refused, morning: null };

  const inHours = request.places.filter(
    ({ arrivalTime }) => arrivalTime >= clinicDay.from && arrivalTime <= clinicDay.until,
  );
  const inTime = inHours.filter((place) => reachesLaboratory(request, weekday, place));
  const taken = (place: Place): boolean =>
    request.booked.some(
      (booked) =>
        booked.on === on &&
        booked.arrivalTime === place.arrivalTime &&
        (booked.roomId ?? place.roomId) === place.roomId,
    );
  const placesLeft = inTime.filter((place) => !taken(place)).length;
  if (inHours.length > 0 && inTime.length === 0) {
    refuse('laboratory-cut-off', { cutOff: request.laboratory.cutOffTimes[weekday] ?? '' });
  } else if (placesLeft < request.children.length) {
    refuse('no-places-left', { needed: request.children.length, left: placesLeft });
  } else {
    const found = morningPlaces({ ...request, on, places: inTime, isTaken: taken });
    if (found.ok) {
      const { places, neighbouring } = found;
      return { on, placesLeft, refused, morning: { on, places, neighbouring } };
    }
    refuse('fast-too-long', { childId: found.childId });
  }
  return { on, placesLeft, refused, morning: null };
}

function reachesLaboratory(request: SeriesRequest, weekday: Weekday, place: Place): boolean {
  const cutOff = request.laboratory.cutOffTimes[weekday];
  if (cutOff === undefined) return true;
  const receivedAt =
    minutesOfTime(place.arrivalTime) +
    request.usualWaitMinutes +
    (request.laboratory.minutesToLaboratory ?? 0);
  return receivedAt <= minutesOfTime(cutOff);
}
