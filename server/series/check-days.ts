import type { DayPlaces } from '../../shared/contracts/series';
import { obstacleAt } from '../../shared/domain/booked-places';
import { morningOn } from '../../shared/domain/series-dates';
import { Problem, type FieldError } from '../http/problem';
import type { ClinicWords } from '../wording/clinic-words';
import { refusalSays } from './refusal-says';
import { seriesChild, type Search, type SearchedChild } from './search';

/**
 * Looks at every chosen place again, as the clinic stands now and with the child's age on that very day.
 * @throws Problem 409 'place-taken' or 'day-refused', with the path of each place and why
 */
export function refuseDays(
  words: ClinicWords,
  { request, protocol }: Search,
  days: readonly DayPlaces[],
  children: readonly SearchedChild[],
): void {
  const callMe = new Map(children.map((child) => [child.childId, child.callMe]));
  const taken: FieldError[] = [];
  const refused: FieldError[] = [];
  days.forEach((day, dayIndex) => {
    const seen = new Set<string>();
    const booked = request.booked.filter(({ on }) => on === day.on);
    day.places.forEach((chosen, placeIndex) => {
      const path = `days.${dayIndex}.places.${placeIndex}`;
      const child = children.find(({ childId }) => childId === chosen.childId);
      const place = request.places.find(
        (one) => one.arrivalTime === chosen.arrivalTime && one.roomId === chosen.roomId,
      );
      if (!child || !place) {
        refused.push({ path, message: words.sentence('The clinic has no such place.') });
        return;
      }
      const key = `${place.arrivalTime}:${place.roomId}`;
      if (seen.has(key))
        refused.push({ path, message: words.sentence('Two children cannot have the same place.') });
      seen.add(key);
      const alone = {
        ...request,
        places: [place],
        booked: [],
        heldDays: [],
        children: [seriesChild(child, day.on, day.on, protocol)],
      };
      refused.push(
        ...morningOn(alone, day.on).refused.map((refusal) => ({
          path,
          message: words.text('clinic.refusal.complete', {
            says: refusalSays(words, refusal, callMe),
          }),
        })),
      );
      const isOver = booked.length + day.places.length > (request.turnover?.limit ?? Infinity);
      if (isOver || obstacleAt(place, booked, request.turnover) !== null)
        taken.push({ path, message: 'This place is taken.' });
    });
  });
  if (refused.length > 0)
    throw new Problem(409, 'day-refused', 'These mornings cannot be planned as chosen.', {
      detail: [...new Set(refused.map(({ message }) => message))].join(' '),
      errors: refused,
    });
  if (taken.length > 0) throw placeTakenProblem(taken);
}

export const placeTakenProblem = (errors: readonly FieldError[] = []): Problem =>
  new Problem(
    409,
    'place-taken',
    'Somebody took one of these places a moment ago. Nothing was planned; choose among the places that are left.',
    { errors },
  );
