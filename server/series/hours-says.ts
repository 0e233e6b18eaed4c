/** '13' or '12.5'; the unit stands in the sentence. */
export const hoursSays = (minutes: number): string => String(Math.round(minutes / 6) / 10);
