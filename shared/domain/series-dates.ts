/**
 * All runs of consecutive mornings from a day on that fit clinic days, closures, the laboratory,
 * rooms and the children's fasting limits; for every day that is refused, why. Brothers and
 * sisters come on the same mornings in neighbouring places, the youngest first.
 */
import { byDay, obstacleAt } from './booked-places';
import { morningPlaces } from './morning-places';
import type { Place } from './places-of-morning';
import type {
  MorningOnDay,
  ProposedDay,
  Refusal,
  RefusalCode,
  Run,
  SeriesProposal,
  SeriesRequest,
} from './series-request';
import {
  addDays,
  dayOf,
  daysBetween,
  minutesOfTime,
  validateDay,
  weekdayOf,
  type Day,
  type Weekday,
} from './zone';

export type { BookedPlace, Turnover } from './booked-places';
export type { ChildPlace, SeriesChild } from './morning-places';
export type * from './series-request';

export function proposeRuns(request: SeriesRequest): SeriesProposal {
  const { from, weeks, count } = request;
  if (!Number.isInteger(count) || count < 1 || count > 5) {
    throw new RangeError('A series has 1 to 5 mornings.');
  }
  if (!(weeks > 0)) throw new RangeError('Look ahead for at least a week.');
  if (request.children.length === 0) throw new RangeError('Plan for at least one child.');
  const today = dayOf(request.now, request.zone);
  const span = weeks * 7;
  const look = morningsOf(request);
  const mornings = Array.from({ length: span + count - 1 }, (_, index) =>
    look(addDays(validateDay(from), index)),
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
export const morningOn = (request: SeriesRequest, on: Day): MorningOnDay => morningsOf(request)(on);

/** Looks at days one by one; what is booked and closed is sorted by day once for all of them. */
export function morningsOf(request: SeriesRequest): (on: Day) => MorningOnDay {
  const { children, turnover } = request;
  const today = dayOf(request.now, request.zone);
  const closures = byDay(request.closures);
  const laboratoryClosures = byDay(request.laboratory.closures ?? []);
  // Days that are over are refused whatever was booked on them.
  const booked = byDay(request.booked, today);
  const placesOn = placesByWeekday(request);

  return (on) => {
    const weekday = weekdayOf(on);
    const refused: Refusal[] = [];
    const refuse = (code: RefusalCode, params: Refusal['params'] = {}): void => {
      refused.push({ code, params });
    };
    const ahead = daysBetween(today, on);
    if (ahead < 0) refuse('past');
    else
      for (const [code, leadDays] of leadTimes(request))
        if (ahead < leadDays) refuse(code, { leadDays });
    const isHeld = request.heldDays?.includes(on) ?? false;
    if (isHeld) refuse('held-already');
    const isOnlyEarly = ahead >= 0 && !isHeld;

    const clinicDay = request.clinicDays.find((candidate) => candidate.weekday === weekday);
    if (!clinicDay) refuse('not-a-clinic-day', { weekday });
    for (const { reason, kind } of closures.get(on) ?? [])
      refuse(kind === 'holiday' ? 'public-holiday' : 'closed', { reason });
    const isReceived = request.laboratory.receivingWeekdays.includes(weekday);
    if (!isReceived) refuse('laboratory-does-not-receive', { weekday });
    for (const { reason } of laboratoryClosures.get(on) ?? [])
      refuse('laboratory-closed', { reason });
    const none = { on, placesLeft: 0, refused, morning: null };
    if (!clinicDay || !isOnlyEarly || !isReceived || closures.has(on)) return none;
    if (laboratoryClosures.has(on)) return none;

    const bookedHere = booked.get(on) ?? [];
    const { inHours, inTime } = placesOn(weekday);
    const obstacle = new Map(
      inHours.map((place) => [place, obstacleAt(place, bookedHere, turnover)]),
    );
    const isFree = (place: Place): boolean => obstacle.get(place) === null;
    const placesLeft = Math.max(
      Math.min(
        inTime.filter(isFree).length,
        (turnover?.limit ?? Number.POSITIVE_INFINITY) - bookedHere.length,
      ),
      0,
    );
    const cutOff = request.laboratory.cutOffTimes[weekday] ?? '';
    if (inHours.length > 0 && inTime.length === 0) {
      refuse('laboratory-cut-off', { cutOff });
    } else if (placesLeft < children.length) {
      refuse('no-places-left', { needed: children.length, left: placesLeft });
      const turning = inTime.filter((place) => obstacle.get(place) === 'turnover').length;
      if (turning > 0) refuse('turnover', { places: turning });
      if (inHours.some((place) => isFree(place) && !inTime.includes(place)))
        refuse('laboratory-cut-off', { cutOff });
    } else {
      const isTaken = (place: Place): boolean => !isFree(place);
      const found = morningPlaces({ ...request, on, places: inTime, isTaken });
      if (found.ok) {
        if (refused.length > 0) return { on, placesLeft, refused, morning: null };
        const { places, neighbouring } = found;
        return { on, placesLeft, refused, morning: { on, places, neighbouring } };
      }
      if (found.because === 'siblings-apart') refuse('siblings-apart', { left: placesLeft });
      else
        for (const { childId, minutes, longestMinutes } of found.fasts)
          refuse('fast-too-long', { childId, minutes, longestMinutes });
    }
    return { on, placesLeft, refused, morning: null };
  };
}

const leadTimes = (request: SeriesRequest): readonly (readonly [RefusalCode, number])[] => [
  ['too-soon', request.leadDays],
  ['ride-lead-time', request.rideLeadDays ?? 0],
  ['reporting-lead-time', request.reportingLeadDays ?? 0],
];

/** The places within the arrivals of a weekday, and those of them that still reach the laboratory. */
function placesByWeekday(request: SeriesRequest) {
  const { clinicDays, laboratory, usualWaitMinutes } = request;
  const known = new Map<Weekday, { readonly inHours: Place[]; readonly inTime: Place[] }>();
  return (weekday: Weekday) => {
    const before = known.get(weekday);
    if (before) return before;
    const day = clinicDays.find((candidate) => candidate.weekday === weekday);
    const inHours = request.places.filter(
      ({ arrivalTime }) => day && arrivalTime >= day.from && arrivalTime <= day.until,
    );
    const cutOff = laboratory.cutOffTimes[weekday];
    const inTime = inHours.filter(
      ({ arrivalTime }) =>
        cutOff === undefined ||
        minutesOfTime(arrivalTime) + usualWaitMinutes + (laboratory.minutesToLaboratory ?? 0) <=
          minutesOfTime(cutOff),
    );
    const found = { inHours, inTime };
    known.set(weekday, found);
    return found;
  };
}
