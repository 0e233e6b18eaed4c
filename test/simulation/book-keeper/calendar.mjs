// Days, clocks and zones of the book-keeper, by the platform's own calendar.

export const minute = 60_000;
export const hour = 60 * minute;

const formats = new Map();

/** The clock on the wall: '2027-03-09', hour and minute of that day. */
export function wallClock(instant, zone) {
  if (!formats.has(zone))
    formats.set(
      zone,
      new Intl.DateTimeFormat('en-CA', {
        timeZone: zone,
        hourCycle: 'h23',
        year: 'numeric',
        month: '2-digit',
        day: '2-digit',
        hour: '2-digit',
        minute: '2-digit',
      }),
    );
  const parts = Object.fromEntries(
    formats
      .get(zone)
      .formatToParts(instant)
      .map(({ type, value }) => [type, value]),
  );
  return {
    on: `${parts.year}-${parts.month}-${parts.day}`,
    hour: Number(parts.hour),
    minute: Number(parts.minute),
  };
}

/** The instant of a local time; on the night when a clock changes the earlier of two readings. */
export function instantOf(on, time, zone) {
  const asUtc = Date.parse(`${on}T${time}:00Z`);
  // No zone is further than 14 hours from UTC: look for the offset that gives this clock back.
  for (const guess of [asUtc - 14 * hour, asUtc, asUtc + 14 * hour]) {
    const { on: day, hour: h, minute: m } = wallClock(guess, zone);
    const shown = Date.parse(`${day}T00:00:00Z`) + h * hour + m * minute;
    const instant = asUtc - (shown - guess);
    const back = wallClock(instant, zone);
    if (back.on === on && back.hour * 60 + back.minute === minutesOf(time)) return instant;
  }
  throw new RangeError(`${time} does not exist on ${on} in ${zone}`);
}

const minutesOf = (time) => Number(time.slice(0, 2)) * 60 + Number(time.slice(3, 5));

export function dayBefore(on) {
  return new Date(Date.parse(`${on}T12:00:00Z`) - 24 * hour).toISOString().slice(0, 10);
}

/** Whole months from birth to a day. */
export function monthsOld(bornOn, on) {
  const [bornYear, bornMonth, bornDay] = bornOn.split('-').map(Number);
  const [year, month, day] = on.split('-').map(Number);
  return (year - bornYear) * 12 + (month - bornMonth) - (day < bornDay ? 1 : 0);
}
