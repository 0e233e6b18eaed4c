import type { DayPlaces } from '../../../../shared/contracts/series';

/** The same children at the same places on the same days, whatever search found it. */
export const isSameRun = (
  left: { readonly days: readonly DayPlaces[] },
  right: { readonly days: readonly DayPlaces[] },
): boolean => keyOf(left.days) === keyOf(right.days);

const keyOf = (days: readonly DayPlaces[]): string =>
  days
    .map(({ on, places }) =>
      [
        on,
        ...places.map((place) => `${place.childId} ${place.arrivalTime} ${place.roomId}`),
      ].join(),
    )
    .join(';');
