import type { NextMorning } from '../../../../shared/contracts/family-morning';

export type Sky = NextMorning['skies'][number]['sky'];

/**
 * The entry that holds at `now`: the last one whose instant has come; the first one before any has, so that there is
 * always something to say.
 * @param entries in any order
 * @param now epoch milliseconds
 */
export function holdingAt<T extends { from: string }>(
  entries: readonly T[],
  now: number,
): T | null {
  let holding: T | null = null;
  let first: T | null = null;
  for (const entry of entries) {
    const from = Date.parse(entry.from);
    if (first === null || from < Date.parse(first.from)) first = entry;
    if (from <= now && (holding === null || from >= Date.parse(holding.from))) holding = entry;
  }
  return holding ?? first;
}

export function skyOf(skies: NextMorning['skies'], now: number): Sky | null {
  return holdingAt(skies, now)?.sky ?? null;
}
