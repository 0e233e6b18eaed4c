import {
  addDays,
  dayOf,
  isTime,
  localPartsOf,
  readings,
  type Instant,
} from '../../../../shared/domain/zone';

/** A clock time as a family says it in the morning, as the newest instant that is not still to come. */
export type DoorTime =
  | { readonly kind: 'once'; readonly at: Instant }
  /** The clock went back: a person says which of the two. */
  | { readonly kind: 'twice'; readonly earlier: Instant; readonly later: Instant }
  /** The clock went forward over this time. */
  | { readonly kind: 'never'; readonly earlier: Instant; readonly later: Instant };

/** Clocks on the wall and here differ a little. */
const slackMs = 60_000;

/** @returns null for anything that is not 'HH:mm'. */
export function doorTime(time: string, now: Instant, zone: string): DoorTime | null {
  if (!isTime(time)) return null;
  const today = dayOf(now, zone);
  for (const on of [today, addDays(today, -1)]) {
    const { kind, earlier, later } = readings({ on, time, zone });
    if (earlier > now + slackMs) continue;
    if (kind === 'once') return { kind, at: earlier };
    if (later > now + slackMs) return { kind: 'once', at: earlier };
    return { kind, earlier, later };
  }
  return null;
}

/** 'HH:mm' of an instant, for a time field. */
export const fieldTime = (at: string | null, zone: string): string =>
  at === null ? '' : localPartsOf(Date.parse(at), zone).time;
