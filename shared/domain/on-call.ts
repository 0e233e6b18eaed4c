/** Who looks after what cannot wait, by the site's own clock. */
import { addDays, weekdayOf, type Day, type LocalTime, type Weekday } from './day';

/** One line of the on-call list. */
export interface OnCallTurn {
  readonly staffId: number;
  /** Follows when the first one does not take an alert. */
  readonly deputyId: number | null;
  /** Days on which the turn begins. */
  readonly weekdays: readonly Weekday[];
  readonly from: LocalTime;
  /** Not included. Not after `from`: it ends on the next day; the same: it lasts a whole day. */
  readonly until: LocalTime;
  /** First and last day on which it may begin; without a last one it goes on. */
  readonly fromOn: Day;
  readonly untilOn: Day | null;
}

export interface LocalMoment {
  readonly on: Day;
  readonly time: LocalTime;
}

const beginsOn = (turn: OnCallTurn, day: Day): boolean =>
  turn.weekdays.includes(weekdayOf(day)) &&
  day >= turn.fromOn &&
  (turn.untilOn === null || day <= turn.untilOn);

/** Whether this is somebody's turn. */
export function isOnCall(turn: OnCallTurn, { on, time }: LocalMoment): boolean {
  const { from, until } = turn;
  if (from < until) return beginsOn(turn, on) && time >= from && time < until;
  return (beginsOn(turn, on) && time >= from) || (beginsOn(turn, addDays(on, -1)) && time < until);
}

/**
 * Whom to tell, in order, each once: those whose turn it is with their deputies, in the order of the list; then those of
 * these days whose turn it is not, because a tired person is better than nobody.
 */
export function onCallChain(turns: readonly OnCallTurn[], moment: LocalMoment): number[] {
  const now = turns.filter((turn) => isOnCall(turn, moment));
  const others = turns.filter(
    (turn) => turn.fromOn <= moment.on && (turn.untilOn === null || turn.untilOn >= moment.on),
  );
  const people = [...now, ...others].flatMap(({ staffId, deputyId }) =>
    deputyId === null ? [staffId] : [staffId, deputyId],
  );
  return [...new Set(people)];
}
