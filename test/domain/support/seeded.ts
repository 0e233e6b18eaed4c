/** Numbers by chance that are the same in every run (mulberry32), so that a failure can be looked at again. */
export interface Seeded {
  /** A whole number from `from` to `to`, both inclusive. */
  whole(from: number, to: number): number;
  oneOf<Value>(values: readonly Value[]): Value;
}

export function seeded(seed: number): Seeded {
  let state = seed;
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  const whole = (from: number, to: number): number => from + Math.floor(next() * (to - from + 1));
  return {
    whole,
    oneOf<Value>(values: readonly Value[]): Value {
      const value = values[whole(0, values.length - 1)];
      if (value === undefined) throw new RangeError('Choose from at least one.');
      return value;
    },
  };
}
