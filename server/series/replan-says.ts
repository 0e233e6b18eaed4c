import type { ReplanKind, ReplanOutcome } from '../../shared/contracts/replan';
import { withoutSpecimen } from '../../shared/domain/replan';
import type { ClinicWords } from '../wording/clinic-words';
import type { RewrittenSeries } from './rewrite-series';

/** What a change means, as complete sentences. */
export function consequencesOf(
  words: ClinicWords,
  kind: ReplanKind,
  all: readonly RewrittenSeries[],
  longestGapDays: number,
): string[] {
  return all.flatMap(({ series, after }) => {
    const child = series.callMe;
    const taken = series.mornings
      .filter(({ state }) => state === 'collected')
      .map(({ number }) => String(number));
    const says = [
      words.text('clinic.replan.keeps', {
        count: taken.length,
        numbers: words.list(taken),
        child,
      }),
    ];
    if (kind === 'close-with-fewer')
      return [
        ...says,
        words.text('clinic.replan.closes', {
          child,
          collected: series.plannedCount - withoutSpecimen(series),
          planned: series.plannedCount,
        }),
      ];
    if (!after.isConsecutive)
      says.push(
        words.text(after.isBeyondGap ? 'clinic.replan.beyond-gap' : 'clinic.replan.apart', {
          child,
          days: after.longestGapDays,
          longest: longestGapDays,
        }),
      );
    if (after.stillMissing > 0)
      says.push(words.text('clinic.replan.still-missing', { child, count: after.stillMissing }));
    return says;
  });
}

/** Each series before and after. */
export const childrenAfter = (all: readonly RewrittenSeries[]): ReplanOutcome['children'] =>
  all.map(({ series, after, placeOn }) => ({
    seriesId: series.seriesId,
    childId: series.childId,
    fullName: series.fullName,
    after: after.mornings.map((morning) => morningAfter(morning, placeOn)),
  }));

type MorningAfter = ReplanOutcome['children'][number]['after'][number];

function morningAfter(
  { number, on, state, change, was }: RewrittenSeries['after']['mornings'][number],
  placeOn: RewrittenSeries['placeOn'],
): MorningAfter {
  const isOpen = was === null || was.state === 'planned';
  const arrivalTime = (isOpen ? placeOn.get(on)?.arrivalTime : null) ?? was?.arrivalTime ?? '';
  const isSamePlace = was !== null && was.on === on && was.arrivalTime === arrivalTime;
  const told = (change === 'kept' || change === 'renumbered') && !isSamePlace ? 'moved' : change;
  return {
    number,
    on,
    arrivalTime,
    state: !isOpen ? was.morningState : state === 'lost' ? 'lost' : 'planned',
    change: told,
    was:
      was && told !== 'kept' && told !== 'given-up'
        ? { number: was.number, on: was.on, arrivalTime: was.arrivalTime }
        : null,
  };
}
