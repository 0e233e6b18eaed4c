/**
 * How long a room stays closed after a child, from what its ventilation moves. Pure; the clinic chooses
 * between minutes of its own and this computation.
 */

/** How much of what floats in the air must be gone, in percent. */
export const clearedPercents = [99, 99.9] as const;
export type ClearedPercent = (typeof clearedPercents)[number];

/** Air changes an hour that a room of a clinic can have; less is no ventilation, more is a wrong unit. */
export const airChangesRange = { from: 1, until: 60 } as const;

export interface RoomAir {
  readonly airChangesPerHour: number;
  readonly clearedPercent: ClearedPercent;
}

/**
 * Whole minutes until so much is gone: ln(1 / what is left) / air changes an hour x 60, to the nearest minute as the
 * table prints it. It takes the air to mix fully and nobody to be left coughing in the room; where it does not mix, the
 * clinic enters its own, longer minutes.
 * Source: CDC, Guidelines for Environmental Infection Control in Health-Care Facilities (2003), appendix B, table B.1.
 * @throws RangeError outside `airChangesRange`
 */
export function closureMinutesOf({ airChangesPerHour, clearedPercent }: RoomAir): number {
  const { from, until } = airChangesRange;
  if (!(airChangesPerHour >= from && airChangesPerHour <= until))
    throw new RangeError(`Air changes an hour lie between ${from} and ${until}.`);
  const left = (100 - clearedPercent) / 100;
  return Math.round((-Math.log(left) / airChangesPerHour) * 60);
}
