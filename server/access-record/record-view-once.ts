import { record, type AccessEntry, type Actor } from './record';
import type { Context } from '../context';
import { select } from '../database/connection';

/**
 * A sheet that stays open fetches itself again at every change. One row a session and minute says as much as one a
 * fetch, as long as it names the same children.
 */
export async function recordViewOnce(
  { db }: Context,
  actor: Actor,
  view: Omit<AccessEntry, 'action'>,
): Promise<void> {
  if (view.childIds.length === 0) return;
  const detail = {
    ...view.detail,
    children: [...view.childIds].sort((left, right) => left - right),
  };
  const minute = new Date(Math.floor(view.at / 60_000) * 60_000);
  const [already] = await select<{ id: number }>(
    db,
    `SELECT id FROM access_records
     WHERE at >= :minute AND at <= :at AND side = :side AND actor_id <=> :actorId AND session_hash <=> :sessionHash
       AND matter = :matter AND action = 'seen' AND detail = :detail LIMIT 1`,
    {
      minute,
      at: new Date(view.at),
      side: actor.side,
      actorId: actor.id,
      sessionHash: actor.sessionHash,
      matter: view.matter,
      detail: JSON.stringify(detail),
    },
  );
  if (already) return;
  await record(db, undefined, actor, { ...view, action: 'seen', detail });
}
