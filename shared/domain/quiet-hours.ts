import { addDays, instantOf, localPartsOf, type Day, type Instant } from './zone';

/**
 * Texts rest from 21:00 to 8:00 of the recipient's clock (47 CFR 64.1200(c)(1) for solicitations;
 * kept for every text). A separate yes opens the hours before 8, never those after 21:00.
 */
const quietFromHour = 21;
const quietUntilHour = 8;

export function isQuiet(at: Instant, zone: string, agreesToEarly: boolean): boolean {
  const { hour } = localPartsOf(at, zone);
  if (hour >= quietFromHour) return true;
  return hour < quietUntilHour && !agreesToEarly;
}

/** This instant, or the first after the quiet hours. */
export function afterQuietHours(at: Instant, zone: string, agreesToEarly = false): Instant {
  if (!isQuiet(at, zone, agreesToEarly)) return at;
  const { hour, on } = localPartsOf(at, zone);
  const day = hour >= quietFromHour ? addDays(on, 1) : on;
  if (hour >= quietFromHour && agreesToEarly) return instantOf({ on: day, time: '00:00', zone });
  return instantOf({ on: day, time: `0${quietUntilHour}:00`, zone });
}

/** When the quiet hours of this day begin. */
export const quietFrom = (on: Day, zone: string): Instant =>
  instantOf({ on, time: `${quietFromHour}:00`, zone });
