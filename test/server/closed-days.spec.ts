import { closedDays, holidaysBetween } from '../../server/sites/closed-days';
import { publicHolidays, regionsOf } from '../../server/sites/public-holidays';
import { change } from '../../server/database/connection';
import { addDays, weekdayOf } from '../../shared/domain/day';
import { insert } from '../support/insert';
import { startTestServer, type TestServer } from '../support/server';

/**
 * 5 U.S.C. 6103(a), legal public holidays of the United States, written out from memory of the statute; Juneteenth by
 * Public Law 117-17 of 17 June 2021. Under 6103(b) a holiday on a Saturday is kept on the Friday before; under
 * Executive Order 11582 one on a Sunday is kept on the Monday after.
 */
function federalHolidays(year: number): string[] {
  const nth = (month: number, weekday: number, count: number): string => {
    let on = `${year}-${String(month).padStart(2, '0')}-01`;
    while (weekdayOf(on) !== weekday) on = addDays(on, 1);
    return addDays(on, (count - 1) * 7);
  };
  const last = (month: number, weekday: number): string => {
    let on = addDays(`${year}-${String(month + 1).padStart(2, '0')}-01`, -1);
    while (weekdayOf(on) !== weekday) on = addDays(on, -1);
    return on;
  };
  const kept = (on: string): string => {
    if (weekdayOf(on) === 6) return addDays(on, -1);
    return weekdayOf(on) === 7 ? addDays(on, 1) : on;
  };
  const fixed = ['01-01', ...(year >= 2021 ? ['06-19'] : []), '07-04', '11-11', '12-25'];
  return [
    ...fixed.map((monthAndDay) => kept(`${year}-${monthAndDay}`)),
    nth(1, 1, 3), // Birthday of Martin Luther King, Jr.
    nth(2, 1, 3), // Washington's Birthday
    last(5, 1), // Memorial Day
    nth(9, 1, 1), // Labor Day
    nth(10, 1, 2), // Columbus Day
    nth(11, 4, 4), // Thanksgiving Day
  ].sort();
}

const us = { country: 'US', region: null };
const onWorkdays = (days: readonly { on: string }[]): string[] =>
  days.map(({ on }) => on).filter((on) => weekdayOf(on) <= 5);

describe('public holidays against published law', () => {
  it.each([2020, 2021, 2022, 2023, 2024, 2025, 2026, 2027, 2028, 2029, 2030, 2031, 2032, 2033])(
    'the United States in %s: exactly the days of 5 U.S.C. 6103',
    (year) => {
      // New Year of the year after may be kept on the last Friday of this one.
      const expected = [...federalHolidays(year), ...federalHolidays(year + 1)].filter((on) =>
        on.startsWith(String(year)),
      );
      const found = onWorkdays(holidaysBetween(us, `${year}-01-01`, `${year}-12-31`));
      expect(found).toEqual(expected);
    },
  );

  // Office of Personnel Management, federal holidays as published for these years (from memory).
  it.each([
    ['2026-07-03', 'Independence Day on a Saturday is kept on Friday'],
    ['2027-06-18', 'Juneteenth on a Saturday'],
    ['2027-07-05', 'Independence Day on a Sunday is kept on Monday'],
    ['2027-12-24', 'Christmas Day on a Saturday'],
    ['2027-12-31', 'New Year of 2028 on a Saturday falls into the year before'],
    ['2022-12-26', 'Christmas Day on a Sunday'],
    ['2023-01-02', 'New Year on a Sunday'],
  ])('%s: %s', (on) => {
    expect(holidaysBetween(us, on, on)).toHaveLength(1);
  });

  it('knows no Juneteenth before the law and no observances that close nothing', () => {
    expect(holidaysBetween(us, '2020-06-19', '2020-06-19')).toEqual([]);
    for (const on of ['2026-02-14', '2026-04-15', '2026-10-31', '2026-12-24'])
      expect(holidaysBetween(us, on, on)).toEqual([]);
  });

  it('goes by region, and by the country where the region is not known', () => {
    // Illinois, 205 ILCS 630/17: Lincoln's Birthday, 12 February.
    const lincoln = { country: 'US', region: 'IL' };
    expect(holidaysBetween(lincoln, '2027-02-12', '2027-02-12')).toHaveLength(1);
    expect(holidaysBetween(us, '2027-02-12', '2027-02-12')).toEqual([]);
    expect(publicHolidays('US', 'nowhere', 2026)).toEqual(publicHolidays('US', null, 2026));
    expect(regionsOf('US')['IL']).toBe('Illinois');
  });

  it('knows other countries and says nothing of one that does not exist', () => {
    // Scotland: Bank Holidays (Scotland) Act 2007, St Andrew's Day; South Africa: Public Holidays Act 36 of 1994,
    // section 2(1), a Sunday moves to Monday (9 August 2026 is a Sunday).
    const days = (country: string, region: string | null): string[] =>
      publicHolidays(country, region, 2026).map(({ on }) => on);
    expect(days('GB', 'SCT')).toContain('2026-11-30');
    expect(days('GB', 'ENG')).not.toContain('2026-11-30');
    expect(days('ZA', null)).toContain('2026-08-10');
    expect(publicHolidays('XX', null, 2026)).toEqual([]);
  });

  it('names them in the language of the staff where the name is known', () => {
    expect(publicHolidays('US', null, 2026, 'es').find(({ on }) => on === '2026-12-25')?.name).toBe(
      'Navidad',
    );
  });
});

describe('the days on which a site is closed', () => {
  let server: TestServer;
  let siteId: number;
  beforeAll(async () => {
    server = await startTestServer();
    siteId = await server.siteId();
  });
  afterAll(() => server.close());

  it('are its own closures and the holidays, without those on which it is open', async () => {
    const { db } = server.context;
    await insert(db, 'closures', { site_id: siteId, closed_on: '2026-12-28', reason: 'stock' });
    await insert(db, 'closures', { site_id: siteId, closed_on: '2026-12-25', reason: 'our own' });
    const span = () => closedDays(db, siteId, '2026-12-24', '2027-01-01');
    expect(await span()).toEqual([
      { on: '2026-12-25', reason: 'our own', kind: 'closure' },
      { on: '2026-12-28', reason: 'stock', kind: 'closure' },
      { on: '2027-01-01', reason: "New Year's Day", kind: 'holiday' },
    ]);
    await insert(db, 'open_holidays', { site_id: siteId, open_on: '2027-01-01' });
    await insert(db, 'open_holidays', { site_id: siteId, open_on: '2026-12-25' });
    // What the clinic closed itself stays closed, also on a holiday on which it would be open.
    expect((await span()).map(({ on }) => on)).toEqual(['2026-12-25', '2026-12-28']);
  });

  it('belong to that site alone, and follow its country', async () => {
    const { db } = server.context;
    await change(db, "UPDATE sites SET country = 'GB', region = 'SCT' WHERE id = :siteId", {
      siteId,
    });
    expect(await closedDays(db, siteId, '2026-07-03', '2026-07-03')).toEqual([]);
    expect(await closedDays(db, siteId, '2026-11-30', '2026-11-30')).toMatchObject([
      { kind: 'holiday' },
    ]);
    await expect(closedDays(db, 999_999, '2026-07-03', '2026-07-03')).rejects.toMatchObject({
      status: 404,
    });
  });
});
