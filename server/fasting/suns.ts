import type { NextMorning } from '../../shared/contracts/family-morning';
import type { Day } from '../../shared/domain/day';
import type { MorningPlan } from '../series/morning-plans';

type Sun = NextMorning['suns'][number];

export interface Suns {
  readonly days: readonly { readonly on: Day; readonly sun: Sun }[];
  /** Which of them is next, from 1; null when none is to come. */
  readonly number: number | null;
}

const isToCome = ({ state }: MorningPlan): boolean =>
  state === 'planned' || state === 'here' || state === 'collecting';

/** One sun a day of the household's series that are still going on, children together. */
export function sunsOf(mornings: readonly MorningPlan[]): Suns {
  const openSeries = new Set(mornings.filter(isToCome).map(({ seriesId }) => seriesId));
  const counted =
    openSeries.size === 0 ? mornings : mornings.filter(({ seriesId }) => openSeries.has(seriesId));
  const days = [...new Set(counted.map(({ on }) => on))].sort();
  const nextDay = days.find((on) => counted.some((plan) => plan.on === on && isToCome(plan)));
  return {
    days: days.map((on) => ({
      on,
      sun: sunOf(
        counted.filter((plan) => plan.on === on),
        on === nextDay,
      ),
    })),
    number: nextDay === undefined ? null : days.indexOf(nextDay) + 1,
  };
}

function sunOf(ofDay: readonly MorningPlan[], isNext: boolean): Sun {
  if (ofDay.some(isToCome)) return isNext ? 'next' : 'later';
  return ofDay.some(({ state }) => state === 'collected') ? 'done' : 'lost';
}

export const sunOfMorning = (plan: MorningPlan, next: MorningPlan | undefined): Sun => {
  if (plan.state === 'collected') return 'done';
  if (!isToCome(plan)) return 'lost';
  return plan.morningId === next?.morningId ? 'next' : 'later';
};

export const firstToCome = (
  mornings: readonly MorningPlan[],
  seriesId: number,
): MorningPlan | undefined =>
  mornings
    .filter((plan) => plan.seriesId === seriesId && isToCome(plan))
    .sort((a, b) => a.arrivalAt - b.arrivalAt)[0];
