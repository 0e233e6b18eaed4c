import { Store } from 'express-session';
import type { SessionData } from 'express-session';
import type { Sequelize, Transaction } from 'sequelize';
import { select } from '../database/connection';
import { hashToken } from './token-hash';

export type Side = 'clinic' | 'family';

export interface SessionLimits {
  readonly idleSeconds: number;
  readonly absoluteSeconds: number;
}

/** Whose session it is, so that all sessions of a person can be ended. */
export function subjectOf(side: Side, data: SessionData): number | null {
  return (side === 'clinic' ? data.passport?.user : data.family?.familyMemberId) ?? null;
}

type Done = (error?: unknown) => void;

/**
 * Sessions in MariaDB, by the hash of their id. The row alone decides how long a session lives: idle and absolute.
 * It is touched at most once a minute, and never by what a screen fetches by itself, so that an open list does not keep
 * a forgotten workstation signed in. Real clock.
 */
export class SessionStore extends Store {
  constructor(
    private readonly db: Sequelize,
    private readonly side: Side,
    private readonly limits: SessionLimits,
  ) {
    super();
  }

  override get(id: string, done: (error: unknown, session?: SessionData | null) => void): void {
    select<{ data: SessionData | string }>(
      this.db,
      'SELECT data FROM sessions WHERE id_hash = :idHash AND side = :side AND expires_at > :now',
      { idHash: hashToken(id), side: this.side, now: new Date() },
    ).then(
      ([row]) => {
        if (!row) done(null, null);
        else
          done(
            null,
            typeof row.data === 'string' ? (JSON.parse(row.data) as SessionData) : row.data,
          );
      },
      (error: unknown) => done(error),
    );
  }

  override set(id: string, data: SessionData, done: Done = () => undefined): void {
    const now = Date.now();
    this.db
      .query(
        `INSERT INTO sessions (id_hash, side, subject_id, data, created_at, seen_at, expires_at)
         VALUES (:idHash, :side, :subjectId, :data, :now, :now, :idleEnd)
         ON DUPLICATE KEY UPDATE subject_id = VALUES(subject_id), data = VALUES(data), seen_at = VALUES(seen_at),
           expires_at = LEAST(VALUES(expires_at), created_at + INTERVAL :absoluteSeconds SECOND)`,
        {
          replacements: {
            idHash: hashToken(id),
            side: this.side,
            subjectId: subjectOf(this.side, data),
            data: JSON.stringify(data),
            ...this.times(now),
          },
        },
      )
      .then(() => done(), done);
  }

  override touch(id: string, data: SessionData, done: Done = () => undefined): void {
    if (isBackground(data)) {
      done();
      return;
    }
    const now = Date.now();
    this.db
      .query(
        `UPDATE sessions SET seen_at = :now,
           expires_at = LEAST(:idleEnd, created_at + INTERVAL :absoluteSeconds SECOND)
         WHERE id_hash = :idHash AND expires_at > :now AND seen_at <= :aMinuteAgo`,
        {
          replacements: {
            idHash: hashToken(id),
            aMinuteAgo: new Date(now - 60_000),
            ...this.times(now),
          },
        },
      )
      .then(() => done(), done);
  }

  override destroy(id: string, done: Done = () => undefined): void {
    this.db
      .query('DELETE FROM sessions WHERE id_hash = :idHash', {
        replacements: { idHash: hashToken(id) },
      })
      .then(() => done(), done);
  }

  private times(now: number): Record<string, unknown> {
    const { idleSeconds, absoluteSeconds } = this.limits;
    return {
      now: new Date(now),
      idleEnd: new Date(now + Math.min(idleSeconds, absoluteSeconds) * 1000),
      absoluteSeconds,
    };
  }
}

/** express-session keeps the request on the session object; live streams and automatic fetches say what they are. */
function isBackground(data: SessionData): boolean {
  const headers = (data as { req?: { headers?: Record<string, string | string[] | undefined> } })
    .req?.headers;
  return (
    headers?.['threedawn-background'] !== undefined ||
    [headers?.['accept']].flat().some((accept) => accept?.includes('text/event-stream'))
  );
}

/** When the session of this hash ends if nothing happens any more, epoch milliseconds; null when there is none. */
export async function sessionEnd(
  db: Sequelize,
  sessionHash: string,
  limits: SessionLimits,
): Promise<number | null> {
  const [row] = await select<{ created_at: Date }>(
    db,
    'SELECT created_at FROM sessions WHERE id_hash = :sessionHash',
    { sessionHash },
  );
  if (!row) return null;
  return Math.min(
    Date.now() + limits.idleSeconds * 1000,
    row.created_at.getTime() + limits.absoluteSeconds * 1000,
  );
}

/** Ends every session of a person at once. */
export async function endSessionsOf(
  db: Sequelize,
  side: Side,
  subjectId: number,
  transaction?: Transaction,
): Promise<void> {
  await db.query('DELETE FROM sessions WHERE side = :side AND subject_id = :subjectId', {
    replacements: { side, subjectId },
    transaction,
  });
}
