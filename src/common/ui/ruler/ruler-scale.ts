import {
  addDays,
  instantOf,
  localTimeOf,
  millisecondsPerMinute,
  type Day,
  type Instant,
} from '../../../../shared/domain/zone';

/** One clock for every bar of a day: 20:00 of the evening before to 12:00, counted in elapsed minutes. */
export interface RulerScale {
  readonly startAt: Instant;
  /** 960 on most nights, an hour more or less when the clock changes. */
  readonly minutes: number;
  readonly hours: readonly { readonly minute: number; readonly says: string }[];
  /** Where the drawn sky turns to first light and to day. */
  readonly firstLight: number;
  readonly day: number;
}

const hour = 60;

export function rulerOf(on: Day, zone: string): RulerScale {
  const startAt = instantOf({ on: addDays(on, -1), time: '20:00', zone });
  const at = (time: string): number =>
    (instantOf({ on, time, zone }) - startAt) / millisecondsPerMinute;
  const minutes = at('12:00');
  const hours: { minute: number; says: string }[] = [];
  for (let minute = hour; minute < minutes - hour; minute += hour) {
    const says = localTimeOf(startAt + minute * millisecondsPerMinute, zone).slice(0, 2);
    if (Number(says) % 2 === 0) hours.push({ minute, says });
  }
  return { startAt, minutes, hours, firstLight: at('05:00'), day: at('06:30') };
}

/** Minutes from the ruler's beginning; what lies outside stands at its end. */
export function minuteOn({ startAt, minutes }: RulerScale, at: Instant): number {
  return Math.min(minutes, Math.max(0, (at - startAt) / millisecondsPerMinute));
}

export const isOnRuler = ({ startAt, minutes }: RulerScale, at: Instant): boolean =>
  at >= startAt && at <= startAt + minutes * millisecondsPerMinute;
