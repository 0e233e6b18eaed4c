import type { ReplanChange } from '../../shared/contracts/replan';
import { addDays, type Day } from '../../shared/domain/day';
import { missingOf, plannedDays, withoutSpecimen } from '../../shared/domain/replan';
import { invalid } from '../http/problem';
import type { ReplanSeries, StandingRow } from './series-to-replan';

const isMoved = ({ state, morningId }: StandingRow, { movedMorningIds }: ReplanChange): boolean =>
  state === 'planned' && movedMorningIds.includes(morningId);

/** The days on which a child's mornings are to lie, by what was chosen. */
export function wantedDays(one: ReplanSeries, asked: ReplanChange): Day[] {
  const own = asked.days
    .filter(({ places }) => places.some(({ childId }) => childId === one.childId))
    .map(({ on }) => on);
  if (asked.kind === 'close-with-fewer') return [];
  if (asked.kind === 'new-run') return own;
  if (asked.kind === 'next-possible-morning') return [...plannedDays(one), ...own];
  const staying = one.mornings.filter((row) => row.state === 'planned' && !isMoved(row, asked));
  return [...staying.map(({ on }) => on), ...own];
}

/**
 * What a change must be, whoever sent it: days that follow each other in a run, as many places for each child as it
 * needs, and no second visit on a day.
 * @throws Problem 422 with the path
 */
export function refuseWrongChange(asked: ReplanChange, series: readonly ReplanSeries[]): void {
  const { kind, days } = asked;
  if (kind === 'close-with-fewer') {
    if (days.length > 0) throw wrong('days', 'A series that is closed gets no new mornings.');
    return;
  }
  if (days.length === 0) throw wrong('days', 'Choose at least one morning.');
  const inOrder = days.map(({ on }) => on).sort();
  if (new Set(inOrder).size < days.length) throw wrong('days', 'Choose each day once.');
  const isRun = inOrder.every(
    (on, index) => index === 0 || addDays(inOrder[index - 1] ?? '', 1) === on,
  );
  if (kind === 'new-run' && !isRun)
    throw wrong('days', 'The mornings of a series follow each other day by day.');
  for (const one of series) refuseWrongPlaces(asked, one);
}

function refuseWrongPlaces(asked: ReplanChange, one: ReplanSeries): void {
  const own = asked.days.flatMap(({ places }) =>
    places.filter(({ childId }) => childId === one.childId),
  );
  const count = placesNeeded(one, asked);
  if (own.length !== count)
    throw wrong('days', `${one.callMe} needs ${count} places in this change.`);
  const comes = new Set(
    one.mornings
      .filter((row) => row.state !== 'lost' && !(row.state === 'planned' && isLeaving(row, asked)))
      .map(({ on }) => on),
  );
  asked.days.forEach(({ on, places }, index) => {
    if (comes.has(on) && places.some(({ childId }) => childId === one.childId))
      throw wrong(`days.${index}.on`, 'The child comes on this day already.');
  });
}

const isLeaving = (row: StandingRow, asked: ReplanChange): boolean =>
  asked.kind === 'new-run' || (asked.kind === 'move' && isMoved(row, asked));

function placesNeeded(one: ReplanSeries, asked: ReplanChange): number {
  if (asked.kind === 'next-possible-morning') return missingOf(one) > 0 ? 1 : 0;
  if (asked.kind === 'new-run') return withoutSpecimen(one);
  return one.mornings.filter((row) => isMoved(row, asked)).length;
}

const wrong = (path: string, message: string): Error => invalid([{ path, message }]);
