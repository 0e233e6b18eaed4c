import type {
  CloseDaysRequest,
  HolidayRequest,
  OpenDaysRequest,
} from '../../shared/contracts/set-up';
import { addDays, compareDays, daysBetween, type Day } from '../../shared/domain/day';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid, Problem } from '../http/problem';
import { holidaysBetween } from './closed-days';
import { siteOf, type Site } from './sites';

const longestSpanDays = 62;

/** The clinic closes on every day of a span. Mornings planned on them stay until somebody closes them. */
export async function closeDays(
  context: Context,
  actor: Actor,
  { siteId, from, until, reason }: CloseDaysRequest,
): Promise<void> {
  const { db, clock } = context;
  const site = await siteOf(db, siteId);
  refuseSpan(context, site, from, until);
  await inTransaction(db, async (transaction) => {
    for (let on = from; compareDays(on, until) <= 0; on = addDays(on, 1))
      await db.query(
        `INSERT INTO closures (site_id, closed_on, reason) VALUES (:siteId, :on, :reason)
         ON DUPLICATE KEY UPDATE reason = :reason`,
        { replacements: { siteId, on, reason }, transaction },
      );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'days-closed',
      childIds: [],
      detail: { siteId, from, until, reason },
      at: clock.now(),
    });
  });
}

/**
 * Takes back closures. A day whose families were told that there is no visit stays closed.
 * @throws Problem 409 'families-told'
 */
export async function openDays(
  context: Context,
  actor: Actor,
  { siteId, from, until }: OpenDaysRequest,
): Promise<void> {
  const { db, clock } = context;
  const site = await siteOf(db, siteId);
  refuseSpan(context, site, from, until);
  await inTransaction(db, async (transaction) => {
    const span = { siteId, from, until };
    const [told] = await select<{ id: number }>(
      db,
      'SELECT id FROM closed_mornings WHERE site_id = :siteId AND closed_on BETWEEN :from AND :until LIMIT 1',
      span,
      transaction,
    );
    if (told)
      throw new Problem(
        409,
        'families-told',
        'Families were told that there is no visit on this day. It stays closed.',
      );
    const opened = await change(
      db,
      'DELETE FROM closures WHERE site_id = :siteId AND closed_on BETWEEN :from AND :until',
      span,
      transaction,
    );
    if (opened === 0) return;
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'days-opened',
      childIds: [],
      detail: span,
      at: clock.now(),
    });
  });
}

/** Whether the clinic works on a public holiday. */
export async function setHoliday(
  context: Context,
  actor: Actor,
  { siteId, on, isOpen }: HolidayRequest,
): Promise<void> {
  const { db, clock } = context;
  const site = await siteOf(db, siteId);
  refuseSpan(context, site, on, on);
  if (holidaysBetween(site, on, on).length === 0)
    throw invalid([{ path: 'on', message: 'This day is no public holiday here.' }]);
  await inTransaction(db, async (transaction) => {
    const touched = isOpen
      ? await change(
          db,
          'INSERT IGNORE INTO open_holidays (site_id, open_on) VALUES (:siteId, :on)',
          { siteId, on },
          transaction,
        )
      : await change(
          db,
          'DELETE FROM open_holidays WHERE site_id = :siteId AND open_on = :on',
          { siteId, on },
          transaction,
        );
    if (touched === 0) return;
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'holiday',
      childIds: [],
      detail: { siteId, on, isOpen },
      at: clock.now(),
    });
  });
}

function refuseSpan({ clock }: Context, { zone }: Site, from: Day, until: Day): void {
  const length = daysBetween(from, until);
  if (length < 0) throw invalid([{ path: 'until', message: 'This ends before it begins.' }]);
  if (length >= longestSpanDays)
    throw invalid([{ path: 'until', message: 'At most 62 days at once.' }]);
  if (compareDays(from, dayOf(clock.now(), zone)) < 0)
    throw invalid([{ path: 'from', message: 'This day is past.' }]);
}
