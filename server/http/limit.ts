import { createHash } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import type { Sequelize } from 'sequelize';
import { contextOf } from './context-of';
import { select } from '../database/connection';
import { Problem } from './problem';

export interface Limit {
  /** Names what is counted; the same name shares its counts. */
  readonly name: string;
  readonly hits: number;
  readonly seconds: number;
}

/** Whose hits are counted together; the network address unless told. */
export type LimitedBy = (req: Request) => string;

export const tooMany = (seconds: number): Problem =>
  new Problem(429, 'too-many-tries', 'That was tried too often. Wait a little, then try again.', {
    retryAfterSeconds: seconds,
  });

// Addresses and e-mails are personal: the table keeps only their hash.
const keyOf = (limit: Limit, who: string): string =>
  `${limit.name}:${createHash('sha256').update(who).digest('hex').slice(0, 32)}`;

/**
 * Counts one hit, in the database so that several web processes count together. Real clock.
 * @returns seconds to wait when the limit is passed, else null.
 */
export async function countHit(
  db: Sequelize,
  limit: Limit,
  who: string,
  now = Date.now(),
): Promise<number | null> {
  const key = keyOf(limit, who);
  await db.query(
    `INSERT INTO rate_limits (limit_key, hits, resets_at) VALUES (:key, 1, :resetsAt)
     ON DUPLICATE KEY UPDATE hits = IF(resets_at <= :now, 1, hits + 1),
       resets_at = IF(resets_at <= :now, :resetsAt, resets_at)`,
    {
      replacements: { key, now: new Date(now), resetsAt: new Date(now + limit.seconds * 1000) },
    },
  );
  return secondsToWait(db, limit, who, now, limit.hits);
}

/** Looks without counting. @returns seconds to wait when the next hit would pass the limit, else null. */
export function isLimited(
  db: Sequelize,
  limit: Limit,
  who: string,
  now = Date.now(),
): Promise<number | null> {
  return secondsToWait(db, limit, who, now, limit.hits - 1);
}

async function secondsToWait(
  db: Sequelize,
  limit: Limit,
  who: string,
  now: number,
  allowed: number,
): Promise<number | null> {
  const [row] = await select<{ hits: number; resets_at: Date }>(
    db,
    'SELECT hits, resets_at FROM rate_limits WHERE limit_key = :key AND resets_at > :now',
    { key: keyOf(limit, who), now: new Date(now) },
  );
  if (!row || row.hits <= allowed) return null;
  return Math.max(1, Math.ceil((row.resets_at.getTime() - now) / 1000));
}

/** Forgets the count, for example after a good sign-in. */
export async function clearHits(db: Sequelize, limit: Limit, who: string): Promise<void> {
  await db.query('DELETE FROM rate_limits WHERE limit_key = :key', {
    replacements: { key: keyOf(limit, who) },
  });
}

/** Step of a ladder: 429 with Retry-After when one address asks too often. */
export function limit(rule: Limit, by: LimitedBy = (req) => req.ip ?? ''): RequestHandler {
  return async (req, _res, next) => {
    const seconds = await countHit(contextOf(req).db, rule, by(req));
    if (seconds !== null) throw tooMany(seconds);
    next();
  };
}
