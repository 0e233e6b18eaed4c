import {
  addDays,
  compareDays,
  minutesOfTime,
  weekdayOf,
  type Day,
} from '../../../shared/domain/day';
import { localPartsOf } from '../../../shared/domain/zone';
import { demoZone } from './demo-clinic';

const isWeekday = (day: Day): boolean => weekdayOf(day) <= 5;

/** The next morning for which this evening's text can still go out. */
export function comingMorning(now: number, eveningTextTime: string): Day {
  const { on, time } = localPartsOf(now, demoZone);
  let day = addDays(on, 1);
  if (minutesOfTime(time) > minutesOfTime(eveningTextTime) - 15) day = addDays(day, 1);
  while (!isWeekday(day)) day = addDays(day, 1);
  return day;
}

/** The last day whose mornings are over. */
export function lastMorningOver(now: number): Day {
  const { on, hour } = localPartsOf(now, demoZone);
  return hour >= 12 ? on : addDays(on, -1);
}

/**
 * Three mornings of which the coming one has this number. Runs that the weekend would cut are moved so that they lie in
 * one week. Mornings before the coming one are over already, also when that leaves a gap.
 */
export function daysAround(
  coming: Day,
  wantedNumber: number,
  lastOver: Day,
): { days: Day[]; number: number } {
  const weekday = weekdayOf(coming);
  const least = Math.max(1, 3 - (5 - weekday));
  const most = Math.min(3, weekday);
  const number =
    wantedNumber === 2
      ? Math.max(2, Math.min(3, least))
      : Math.min(Math.max(wantedNumber, least), most);
  const days: Day[] = [coming];
  while (days.length < number) {
    let before = clinicDayNear(days[0] ?? coming, -1);
    while (isBefore(lastOver, before)) before = clinicDayNear(before, -1);
    days.unshift(before);
  }
  while (days.length < 3) days.push(clinicDayNear(days.at(-1) ?? coming, 1));
  return { days, number };
}

function clinicDayNear(from: Day, step: 1 | -1): Day {
  let day = addDays(from, step);
  while (!isWeekday(day)) day = addDays(day, step);
  return day;
}

/** Tuesday to Thursday of a week that ends at least so many days before today. */
export function pastRun(today: Day, daysAgo: number): Day[] {
  let last = addDays(today, -daysAgo);
  while (weekdayOf(last) !== 4) last = addDays(last, -1);
  return [addDays(last, -2), addDays(last, -1), last];
}

export const isBefore = (left: Day, right: Day): boolean => compareDays(left, right) < 0;
