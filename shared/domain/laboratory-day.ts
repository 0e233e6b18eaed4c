/** The laboratory's last receipt of one day, as an instant. */
import type { LaboratoryProfile } from './specimen-clocks';
import { instantOf, weekdayOf, type Day, type Instant } from './zone';

/** Null when the laboratory does not receive on that weekday, or has no last receipt. */
export function laboratoryCutOffAt(request: {
  readonly profile: Pick<LaboratoryProfile, 'receivingWeekdays' | 'cutOffTimes'>;
  readonly on: Day;
  readonly zone: string;
}): Instant | null {
  const { profile, on, zone } = request;
  const weekday = weekdayOf(on);
  const time = profile.cutOffTimes[weekday];
  if (!time || !profile.receivingWeekdays.includes(weekday)) return null;
  return instantOf({ on, time, zone });
}
