import type { Sequelize } from 'sequelize';
import { change } from './connection';

const changesKeptMs = 86_400_000;
const mostRowsAtOnce = 5000;

/**
 * Takes away changes that every open screen has heard of long ago. They carry the real time, which rehearsal does not
 * move.
 * @param realNow epoch milliseconds.
 * @returns how many went.
 */
export const pruneChanges = (db: Sequelize, realNow: number): Promise<number> =>
  change(db, 'DELETE FROM changes WHERE at < :before LIMIT :most', {
    before: new Date(realNow - changesKeptMs),
    most: mostRowsAtOnce,
  });
