// Moves the business clock by the rehearsal's own route and looks into the outbox for where to stop: from
// due moment to due moment, never by the minute.
import { DateTime } from 'luxon';
import { createConnection } from 'mariadb';

const patienceMs = 90_000;
const looksEveryMs = 15;
const heardWithinMs = 8_000;
/** What is due may wait this long while the clock goes on: a queue in life is not emptied in no time. */
const slackMs = 4 * 60_000;

export class BusinessClock {
  #offset = 0;
  #connection;

  constructor({ databaseUrl, staff }) {
    Object.assign(this, { databaseUrl, staff });
  }

  now() {
    return Date.now() + this.#offset;
  }

  /** Goes to an instant that is still to come; what is past is no move. */
  async goTo(instant) {
    if (instant <= this.now() + 1) return;
    try {
      await this.staff.post('/api/clinic/rehearsal/clock', { to: new Date(instant).toISOString() });
    } catch (error) {
      // Repeated after the web had fallen: the clock has moved already.
      if (error.code !== 'clock-moves-forward') throw error;
    }
    const session = await this.staff.get('/api/clinic/session');
    this.#offset = Date.parse(session.now) - Date.now();
  }

  /** When the next message falls due that is not due yet, epoch milliseconds; null when there is none. */
  async nextDueAt() {
    const [row] = await this.#ask(
      "SELECT MIN(next_try_at) AS at FROM messages WHERE state = 'queued' AND next_try_at > :now",
      { now: new Date(this.now()) },
    );
    return row.at === null ? null : row.at.getTime();
  }

  /** Waits until what is due by now has gone out, or is younger than the slack. @returns milliseconds waited. */
  async settled({ to = Infinity } = {}) {
    const begun = performance.now();
    for (;;) {
      const [row] = await this.#ask(
        `SELECT MIN(IF(state = 'queued', next_try_at, :now)) AS oldest, SUM(state = 'sending') AS sending
         FROM messages WHERE state = 'sending' OR state = 'queued' AND next_try_at <= :now`,
        { now: new Date(this.now()) },
      );
      const isFree =
        row.oldest === null || (Number(row.sending) === 0 && to - row.oldest < slackMs);
      if (isFree) return performance.now() - begun;
      if (performance.now() - begun > patienceMs)
        throw new Error('What is due does not go out: is there no sender?');
      await new Promise((resolve) => setTimeout(resolve, looksEveryMs));
    }
  }

  /** Waits until the clinic has heard that these texts of the provider reached nobody; reports can be lost. */
  async hasHeard(providerIds) {
    const giveUpAt = performance.now() + heardWithinMs;
    while (performance.now() < giveUpAt) {
      const [row] = await this.#ask(
        "SELECT COUNT(*) AS left_over FROM messages WHERE state = 'sent' AND provider_id IN (:ids)",
        { ids: providerIds },
      );
      if (Number(row.left_over) === 0) return;
      await new Promise((resolve) => setTimeout(resolve, looksEveryMs));
    }
  }

  rows(sql) {
    return this.#ask(sql);
  }

  async close() {
    await this.#connection?.end().catch(() => undefined);
  }

  /** Reading only. The database may be starting again: asked until it answers. */
  async #ask(sql, values = {}) {
    const giveUpAt = performance.now() + patienceMs;
    for (;;) {
      try {
        this.#connection ??= await connect(this.databaseUrl);
        return await this.#connection.query({ sql, namedPlaceholders: true }, values);
      } catch (error) {
        this.#connection?.destroy();
        this.#connection = undefined;
        if (performance.now() > giveUpAt) throw error;
        await new Promise((resolve) => setTimeout(resolve, 50));
      }
    }
  }
}

async function connect(databaseUrl) {
  const { hostname: host, port, username: user, password, pathname } = new URL(databaseUrl);
  const connection = await createConnection({
    host,
    port: Number(port),
    user,
    password: decodeURIComponent(password),
    database: pathname.slice(1),
    timezone: '+00:00',
    bigIntAsNumber: true,
    connectTimeout: 2_000,
  });
  // A database that is restarted ends the connection while nothing is asked: the next question opens another.
  connection.on('error', () => undefined);
  return connection;
}

/** A day and a minute of that day in a zone as epoch milliseconds. */
export function instantAt(on, minute, zone) {
  return DateTime.fromISO(on, { zone })
    .set({ hour: Math.floor(minute / 60), minute: minute % 60 })
    .toMillis();
}

export const minuteOf = (time) => Number(time.slice(0, 2)) * 60 + Number(time.slice(3, 5));
export const dayAfter = (on, days) => DateTime.fromISO(on).plus({ days }).toISODate();
export const weekdayOf = (on) => DateTime.fromISO(on).weekday;
