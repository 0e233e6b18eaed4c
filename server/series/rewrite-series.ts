import type { Transaction } from 'sequelize';
import type { ReplanChange } from '../../shared/contracts/replan';
import type { Day } from '../../shared/domain/day';
import { afterChange, type AfterMorning, type AfterSeries } from '../../shared/domain/replan';
import type { Context } from '../context';
import { change } from '../database/connection';
import {
  createMorning,
  giveNumber,
  moveMorning,
  placeKeyOf,
  stepAside,
  type MorningPlace,
} from './morning-rows';
import { wantedDays } from './replan-check';
import type { Search } from './search';
import type { ReplanSeries, StandingRow } from './series-to-replan';

/** What a change made of one series. */
export interface RewrittenSeries {
  readonly series: ReplanSeries;
  readonly after: AfterSeries<StandingRow>;
  /** Where each planned morning lies now. */
  readonly placeOn: ReadonlyMap<Day, MorningPlace>;
  /** Mornings with another day, time or room, and new ones. */
  readonly invitedIds: readonly number[];
  readonly lostIds: readonly number[];
}

export interface Rewriting {
  readonly asked: ReplanChange;
  readonly search: Search;
  readonly reason: string;
}

/** Frees the places of all the children first, so that brothers and sisters can change places. */
export async function freePlaces(
  context: Context,
  transaction: Transaction,
  series: readonly ReplanSeries[],
): Promise<void> {
  const planned = series.flatMap(({ mornings }) =>
    mornings.filter(({ state }) => state === 'planned').map(({ morningId }) => morningId),
  );
  await stepAside(context, transaction, planned, { isPlaceToo: true });
}

/** Writes one series as it is after the change; its planned mornings have stepped aside before. */
export async function rewriteSeries(
  context: Context,
  transaction: Transaction,
  series: ReplanSeries,
  { asked, search, reason }: Rewriting,
): Promise<RewrittenSeries> {
  const chosen = new Map(
    asked.days.flatMap(({ on, places }) =>
      places
        .filter(({ childId }) => childId === series.childId)
        .map(({ arrivalTime, roomId }) => [on, { on, arrivalTime, roomId }] as const),
    ),
  );
  const after = afterChange(series, wantedDays(series, asked), search.longestGapDays);
  const placeOn = new Map<Day, MorningPlace>();
  const invitedIds: number[] = [];
  const lostIds: number[] = [];
  for (const morning of after.mornings) {
    const { was, on, number } = morning;
    if (was && was.state !== 'planned') continue;
    const place = chosen.get(on) ?? was;
    if (was && (morning.change === 'given-up' || isNightOver(morning))) {
      await lose(context, transaction, was, reason);
      lostIds.push(was.morningId);
      if (morning.change === 'given-up') continue;
    }
    if (!place) continue;
    placeOn.set(on, place);
    if (!was || isNightOver(morning)) {
      invitedIds.push(
        await createMorning(context, transaction, search.site, {
          seriesId: series.seriesId,
          childId: series.childId,
          number,
          place: { on, arrivalTime: place.arrivalTime, roomId: place.roomId },
          escortFamilyMemberId: was?.escortFamilyMemberId ?? null,
          nightCarerFamilyMemberId: was?.nightCarerFamilyMemberId ?? null,
        }),
      );
      continue;
    }
    await giveNumber(context, transaction, was.morningId, number);
    if (isElsewhere(was, place)) {
      await moveMorning(context, transaction, search.site, was.morningId, { ...place, on });
      invitedIds.push(was.morningId);
    } else {
      await takePlaceBack(context, transaction, search.site.id, was);
    }
  }
  return { series, after, placeOn, invitedIds, lostIds };
}

const isElsewhere = (was: StandingRow, place: MorningPlace): boolean =>
  was.on !== place.on || was.arrivalTime !== place.arrivalTime || was.roomId !== place.roomId;

/** What the family answered for one night must not count for another: such a morning is given up and made anew. */
const isNightOver = ({ was, on }: AfterMorning<StandingRow>): boolean =>
  was !== null && was.isAnswered && was.on !== on;

async function lose(
  { db }: Context,
  transaction: Transaction,
  { morningId, number }: StandingRow,
  reason: string,
): Promise<void> {
  await change(
    db,
    `UPDATE mornings SET state = 'lost', number = :number, place_key = NULL, lost_reason = :reason,
       calendar_sequence = calendar_sequence + 1, version = version + 1
     WHERE id = :morningId`,
    { morningId, number, reason: reason.slice(0, 200) },
    transaction,
  );
}

async function takePlaceBack(
  { db }: Context,
  transaction: Transaction,
  siteId: number,
  was: StandingRow,
): Promise<void> {
  await change(
    db,
    'UPDATE mornings SET place_key = :placeKey WHERE id = :morningId',
    { morningId: was.morningId, placeKey: placeKeyOf(siteId, was) },
    transaction,
  );
}
