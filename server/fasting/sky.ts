import type { NextMorning } from '../../shared/contracts/family-morning';
import { addDays, instantOf, localPartsOf, type Day, type Instant } from '../../shared/domain/zone';

type Sky = NextMorning['skies'][number]['sky'];

/** The sky by the clinic's clock, the same all year: the page goes dark when families go to bed, not when the sun sets. */
const turns: readonly { readonly time: string; readonly sky: Sky }[] = [
  { time: '05:00', sky: 'first-light' },
  { time: '07:00', sky: 'morning' },
  { time: '18:00', sky: 'evening' },
  { time: '21:00', sky: 'night' },
];

/** The turns of the sky from noon of the day before until the evening of the morning's day. */
export function skiesOf(on: Day, zone: string): NextMorning['skies'] {
  const dayBefore = addDays(on, -1);
  return [dayBefore, on].flatMap((day) =>
    turns.map(({ time, sky }) => ({
      from: new Date(instantOf({ on: day, time, zone })).toISOString(),
      sky,
    })),
  );
}

export function skyAt(at: Instant, zone: string): Sky {
  const { hour } = localPartsOf(at, zone);
  const turned = turns.filter(({ time }) => Number(time.slice(0, 2)) <= hour).at(-1);
  return turned?.sky ?? 'night';
}

/** Parts of the night path. */
export function partAt(at: Instant, on: Day, zone: string): 'evening' | 'night' | 'morning' {
  if (at >= instantOf({ on, time: '05:00', zone })) return 'morning';
  return at >= instantOf({ on: addDays(on, -1), time: '21:00', zone }) ? 'night' : 'evening';
}
