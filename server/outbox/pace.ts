/** Lets at most so many begin in a second, evenly spaced; what comes faster waits. */
export interface Pace {
  turn(): Promise<void>;
}

export function pace(perSecond: number): Pace {
  const gapMs = 1000 / perSecond;
  let nextAt = 0;
  return {
    async turn() {
      const now = performance.now();
      const at = Math.max(now, nextAt);
      nextAt = at + gapMs;
      if (at > now) await new Promise((resolve) => setTimeout(resolve, at - now));
    },
  };
}
