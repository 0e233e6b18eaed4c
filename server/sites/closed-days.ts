import type { Sequelize, Transaction } from 'sequelize';
import { addDays, type Day } from '../../shared/domain/day';
import { select } from '../database/connection';
import { publicHolidays } from './public-holidays';
import { siteOf } from './sites';

export interface ClosedDay {
  readonly on: Day;
  readonly reason: string;
  /** What the clinic entered itself, or a public holiday of the site's country and region. */
  readonly kind: 'closure' | 'holiday';
}

/**
 * Every day of the span, both ends included, on which the site is closed: its own closures and the public holidays,
 * without those on which it says "we are open". A day that is both is the clinic's own closure. In order.
 * @param language in which holidays are named
 */
export async function closedDays(
  db: Sequelize,
  siteId: number,
  from: Day,
  until: Day,
  transaction?: Transaction,
  language = 'en',
): Promise<ClosedDay[]> {
  const site = await siteOf(db, siteId, transaction);
  const closures = await select<{ on: Day; reason: string }>(
    db,
    `SELECT closed_on AS \`on\`, reason FROM closures
     WHERE site_id = :siteId AND closed_on BETWEEN :from AND :until ORDER BY closed_on`,
    { siteId, from, until },
    transaction,
  );
  const open = await openHolidays(db, siteId, from, until, transaction);
  const byDay = new Map<Day, ClosedDay>();
  for (const { on, name } of holidaysBetween(site, from, until, language))
    if (!open.has(on)) byDay.set(on, { on, reason: name, kind: 'holiday' });
  for (const { on, reason } of closures) byDay.set(on, { on, reason, kind: 'closure' });
  return [...byDay.values()].sort((left, right) => (left.on < right.on ? -1 : 1));
}

/** Public holidays of the span, whether the clinic is open on them or not. */
export function holidaysBetween(
  { country, region }: { readonly country: string; readonly region: string | null },
  from: Day,
  until: Day,
  language = 'en',
): { readonly on: Day; readonly name: string }[] {
  const found = new Map<Day, string>();
  // A holiday of the year before or after may reach into this one: a substitute day, or a long feast.
  const [first, last] = [
    Number(addDays(from, -7).slice(0, 4)),
    Number(addDays(until, 7).slice(0, 4)),
  ];
  for (let year = first; year <= last; year += 1)
    for (const { on, name } of publicHolidays(country, region, year, language))
      if (on >= from && on <= until && !found.has(on)) found.set(on, name);
  return [...found]
    .map(([on, name]) => ({ on, name }))
    .sort((left, right) => (left.on < right.on ? -1 : 1));
}

/** Holidays on which the clinic works all the same. */
export async function openHolidays(
  db: Sequelize,
  siteId: number,
  from: Day,
  until: Day,
  transaction?: Transaction,
): Promise<ReadonlySet<Day>> {
  const rows = await select<{ on: Day }>(
    db,
    'SELECT open_on AS `on` FROM open_holidays WHERE site_id = :siteId AND open_on BETWEEN :from AND :until',
    { siteId, from, until },
    transaction,
  );
  return new Set(rows.map(({ on }) => on));
}
