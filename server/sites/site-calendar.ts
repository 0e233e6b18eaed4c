import type { Sequelize } from 'sequelize';
import type { SetUp } from '../../shared/contracts/set-up';
import { addDays, weekdayOf, type Day } from '../../shared/domain/day';
import { select } from '../database/connection';
import type { ClinicWords } from '../wording/clinic-words';
import { closedDays, holidaysBetween, openHolidays } from './closed-days';
import { closuresOf, type Site } from './sites';

type SiteCalendar = Pick<SetUp, 'closures' | 'holidays' | 'stranded'>;

/** Closures from today on, the public holidays of the coming year, and mornings that are planned on closed days. */
export async function calendarOf(
  db: Sequelize,
  site: Site,
  today: Day,
  words: ClinicWords,
): Promise<SiteCalendar> {
  const until = addDays(today, 365);
  const [closures, open, planned] = await Promise.all([
    closuresOf(db, site.id, today),
    openHolidays(db, site.id, today, until),
    plannedMornings(db, site.id, today),
  ]);
  const mornings = (on: Day): number => planned.get(on) ?? 0;
  const spans: SiteCalendar['closures'] = [];
  for (const { on, reason } of closures) {
    const last = spans.at(-1);
    if (last?.reason === reason && addDays(last.until, 1) === on) {
      last.until = on;
      last.mornings += mornings(on);
    } else spans.push({ from: on, until: on, reason, mornings: mornings(on) });
  }
  return {
    closures: spans.map((span) => ({ ...span, reason: words.sentence(span.reason) })),
    holidays: holidaysBetween(site, today, until, words.language).map(({ on, name }) => ({
      on,
      name,
      isOpen: open.has(on),
      mornings: mornings(on),
    })),
    stranded: await strandedMornings(db, site, planned, words),
  };
}

/** How many children are expected, by day. */
async function plannedMornings(
  db: Sequelize,
  siteId: number,
  from: Day,
): Promise<ReadonlyMap<Day, number>> {
  const rows = await select<{ on: Day; count: number }>(
    db,
    `SELECT planned_on AS \`on\`, COUNT(*) AS count FROM mornings
     WHERE site_id = :siteId AND planned_on >= :from AND state = 'planned'
     GROUP BY planned_on ORDER BY planned_on`,
    { siteId, from },
  );
  return new Map(rows.map(({ on, count }) => [on, count]));
}

async function strandedMornings(
  db: Sequelize,
  site: Site,
  planned: ReadonlyMap<Day, number>,
  words: ClinicWords,
): Promise<SiteCalendar['stranded']> {
  const days = [...planned.keys()];
  const [first, last] = [days[0], days.at(-1)];
  if (first === undefined || last === undefined) return [];
  const closed = await closedDays(db, site.id, first, last, undefined, words.language);
  const byDay = new Map(closed.map((day) => [day.on, day]));
  return days.flatMap((on) => {
    const day = byDay.get(on);
    const weekday = weekdayOf(on);
    const says = day
      ? words.text(`clinic.stranded.${day.kind}`, { reason: words.sentence(day.reason) })
      : site.clinicWeekdays.includes(weekday)
        ? null
        : words.text('clinic.stranded.weekday', { weekday: words.weekday(weekday) });
    return says === null ? [] : [{ on, mornings: planned.get(on) ?? 0, says }];
  });
}
