import { randomUUID } from 'node:crypto';
import { UniqueConstraintError, type Transaction } from 'sequelize';
import type { Day, LocalTime } from '../../shared/domain/day';
import { instantOf } from '../../shared/domain/zone';
import type { Context } from '../context';
import { change } from '../database/connection';
import type { Problem } from '../http/problem';
import type { Site } from '../sites/sites';
import { placeTakenProblem } from './check-days';
import { Morning } from './series-model';

/** Where a morning lies. */
export interface MorningPlace {
  readonly on: Day;
  readonly arrivalTime: LocalTime;
  readonly roomId: number;
}

/** One child a place: the database takes this key once. */
export const placeKeyOf = (siteId: number, { on, arrivalTime, roomId }: MorningPlace): string =>
  `${siteId}:${on}:${arrivalTime}:${roomId}`;

const placeColumns = (site: Pick<Site, 'id' | 'zone'>, place: MorningPlace) => ({
  plannedOn: place.on,
  arrivalTime: place.arrivalTime,
  arrivalAt: new Date(instantOf({ on: place.on, time: place.arrivalTime, zone: site.zone })),
  roomId: place.roomId,
  placeKey: placeKeyOf(site.id, place),
});

export async function createMorning(
  { settings }: Context,
  transaction: Transaction,
  site: Pick<Site, 'id' | 'zone'>,
  morning: {
    readonly seriesId: number;
    readonly childId: number;
    readonly number: number;
    readonly place: MorningPlace;
    readonly escortFamilyMemberId: number | null;
    readonly nightCarerFamilyMemberId?: number | null;
  },
): Promise<number> {
  const { place, ...rest } = morning;
  const host = new URL(settings.origin).hostname;
  const { id } = await Morning.create(
    {
      ...rest,
      ...placeColumns(site, place),
      siteId: site.id,
      calendarUid: `${randomUUID()}@${host}`,
    },
    { transaction },
  );
  return id;
}

/** Another day, time or room. The calendar entry keeps its UID and is newer than the one that was sent. */
export async function moveMorning(
  { db }: Context,
  transaction: Transaction,
  site: Pick<Site, 'id' | 'zone'>,
  morningId: number,
  place: MorningPlace,
): Promise<void> {
  await change(
    db,
    `UPDATE mornings SET planned_on = :plannedOn, arrival_time = :arrivalTime, arrival_at = :arrivalAt,
       room_id = :roomId, place_key = :placeKey, expected_at = NULL,
       calendar_sequence = calendar_sequence + 1, version = version + 1
     WHERE id = :morningId`,
    { ...placeColumns(site, place), morningId },
    transaction,
  );
}

/** Higher than every number of a series: mornings step aside to it while their numbers are given anew. */
const aside = 100;

/** Frees places and numbers of mornings that are about to get others, so that two can change places. */
export async function stepAside(
  { db }: Context,
  transaction: Transaction,
  morningIds: readonly number[],
  { isPlaceToo }: { readonly isPlaceToo: boolean },
): Promise<void> {
  if (morningIds.length === 0) return;
  await change(
    db,
    `UPDATE mornings SET number = number + ${aside} ${isPlaceToo ? ', place_key = NULL' : ''}
     WHERE id IN (:morningIds) AND number < ${aside}`,
    { morningIds },
    transaction,
  );
}

export async function giveNumber(
  { db }: Context,
  transaction: Transaction,
  morningId: number,
  number: number,
): Promise<void> {
  await change(
    db,
    'UPDATE mornings SET number = :number WHERE id = :morningId',
    { morningId, number },
    transaction,
  );
}

/** Two people planned the same at the same moment: the database let one of them in. */
export function placeTaken(error: unknown): Problem | null {
  if (!(error instanceof UniqueConstraintError)) return null;
  return 'mornings_place' in error.fields ? placeTakenProblem() : null;
}
