import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { select } from '../../server/database/connection';
import { refuseDemo, writeDemoSignIns } from '../../server/database/seed';
import { seedDemo } from '../../server/database/seeds/demo';
import { demoPassword } from '../../server/database/seeds/demo-clinic';
import { daysAround } from '../../server/database/seeds/demo-days';
import { insertFirstSite } from '../../server/sites/first-site';
import { inTransaction } from '../../server/database/connection';
import { passwordFault } from '../../server/auth/passwords';
import { SettingsError } from '../../server/config/settings';
import { morningPlansOf } from '../../server/series/morning-plans';
import { childList, childRecord } from '../../shared/contracts/children';
import { addDays } from '../../shared/domain/day';
import { startTestServer, type TestServer } from '../support/server';

let server: TestServer;

jest.setTimeout(60_000);

beforeAll(async () => {
  server = await startTestServer();
});
afterEach(async () => {
  server.setNow(null);
  await server.database.empty();
});
afterAll(() => server.close());

const count = async (table: string, where = '1 = 1'): Promise<number> => {
  const [row] = await select<{ n: number }>(
    server.context.db,
    `SELECT COUNT(*) AS n FROM ${table} WHERE ${where}`,
  );
  return row?.n ?? 0;
};

describe('the demo clinic', () => {
  it('is refused in production', () => {
    expect(() => refuseDemo({ mode: 'production' })).toThrow(SettingsError);
  });

  // A Monday to a Saturday, afternoon in Chicago, and a Monday late in the evening.
  it.each([
    ['2027-04-12T20:00:00Z', '2027-04-13'],
    ['2027-04-13T20:00:00Z', '2027-04-14'],
    ['2027-04-14T20:00:00Z', '2027-04-15'],
    ['2027-04-15T20:00:00Z', '2027-04-16'],
    ['2027-04-16T20:00:00Z', '2027-04-19'],
    ['2027-04-17T20:00:00Z', '2027-04-19'],
    ['2027-04-13T03:30:00Z', '2027-04-14'],
    ['2028-02-28T20:00:00Z', '2028-02-29'],
  ])('furnished at %s has five children coming on %s', async (now, on) => {
    const { context } = server;
    server.setNow(Date.parse(now));
    expect(await seedDemo(context)).toBe(true);
    const [site] = await select<{ id: number }>(context.db, 'SELECT id FROM sites');
    const plans = await morningPlansOf(context.db, { siteId: site?.id ?? 0, on });
    expect(plans.map(({ fullName, arrivalTime, state }) => [fullName, arrivalTime, state])).toEqual(
      [
        ['Noor Rahimi', '06:00', 'planned'],
        ['Sami Rahimi', '06:20', 'planned'],
        ['Idris Haddad', '07:20', 'planned'],
        ['Min Thura', '07:40', 'planned'],
        ['Yonas Gebre', '08:40', 'planned'],
      ],
    );
    expect(plans.every(({ plan }) => plan.kind === 'standard')).toBe(true);
    const minThura = plans.find(({ fullName }) => fullName === 'Min Thura');
    expect(minThura?.number).toBeGreaterThanOrEqual(2);
    expect(await count('specimens', `series_id = ${minThura?.seriesId}`)).toBe(
      (minThura?.number ?? 0) - 1,
    );
    expect(await count('messages', `morning_on = '${on}' AND kind = 'evening'`)).toBeGreaterThan(0);
    expect(await count('call_tasks', "reason = 'evening-too-late'")).toBe(0);
    expect(await count('messages', "kind = 'invitation'")).toBeGreaterThan(0);
    expect(await count('messages', "kind = 'calendar'")).toBeGreaterThan(0);
  });

  it('has one child to plan, one order to sign, cultures that run and one series all final', async () => {
    server.setNow(Date.parse('2027-04-13T20:00:00Z'));
    await seedDemo(server.context);
    expect(await count('children')).toBe(9);
    expect(await count('orders', 'signed_at IS NULL')).toBe(1);
    expect(
      await count(
        'orders',
        'signed_at IS NOT NULL AND id NOT IN (SELECT order_id FROM series) AND id IN (SELECT order_id FROM procedure_consents)',
      ),
    ).toBe(1);
    expect(await count('series', "state = 'awaiting-results'")).toBe(2);
    expect(await count('results', "value = 'no-growth-yet' AND finality = 'preliminary'")).toBe(3);
    expect(await count('results', "value = 'negative-final' AND second_look_at IS NOT NULL")).toBe(
      3,
    );
  });

  it('opens every record for every role that may, results only for those who may see them', async () => {
    server.setNow(Date.parse('2027-04-13T20:00:00Z'));
    await seedDemo(server.context);
    const [clinician, desk] = [
      await server.signInStaff('clinician'),
      await server.signInStaff('front-desk'),
    ];
    const { body } = await clinician.get('/api/clinic/children').expect(200);
    const next = Object.fromEntries(
      childList.parse(body).children.map((child) => [child.fullName, child.next]),
    );
    expect(next).toMatchObject({
      'Noor Rahimi': 'Morning 1 of 3 tomorrow, 06:00.',
      'Min Thura': 'Morning 2 of 3 tomorrow, 07:40.',
      'Camila Duarte': 'Mornings to be planned.',
      'Widlin Joseph': 'The order waits for a signature.',
      'Trần Gia Linh': 'Specimens with the laboratory.',
    });
    const linh = childList
      .parse(body)
      .children.find(({ recordNumber }) => recordNumber === 'A-1009');
    const path = `/api/clinic/children/${linh?.id}`;
    const kinds = (answer: { body: unknown }): Set<string> =>
      new Set(childRecord.parse(answer.body).happenings.map(({ kind }) => kind));
    const all = kinds(await clinician.get(path).expect(200));
    for (const kind of [
      'order',
      'consent',
      'series',
      'door-check',
      'collection',
      'specimen',
      'result',
    ])
      expect(all).toContain(kind);
    const seen = kinds(await desk.get(path).expect(200));
    for (const kind of ['result', 'specimen', 'letter', 'order']) expect(seen).not.toContain(kind);
  });

  it('is furnished once: a second run changes nothing', async () => {
    server.setNow(Date.parse('2027-04-13T20:00:00Z'));
    await seedDemo(server.context);
    const before = [await count('children'), await count('messages'), await count('mornings')];
    server.setNow(Date.parse('2027-04-14T20:00:00Z'));
    expect(await seedDemo(server.context)).toBe(false);
    expect([await count('children'), await count('messages'), await count('mornings')]).toEqual(
      before,
    );
  });

  it('says who can sign in, and they can', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'threedawn-'));
    try {
      writeDemoSignIns({ dataDir: folder, origin: 'http://localhost:4300' });
      const { signIns } = JSON.parse(readFileSync(join(folder, 'demo-sign-ins.json'), 'utf8')) as {
        signIns: { name: string; password: string }[];
      };
      expect(signIns).toHaveLength(7);
      await seedDemo(server.context);
      for (const { name: email, password } of signIns) {
        expect(passwordFault(password, { email, fullName: '' })).toBeNull();
        await server.visitor().post('/api/clinic/session').send({ email, password }).expect(200);
      }
      expect([...demoPassword].length).toBeGreaterThanOrEqual(15);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});

it.each([
  ['2027-04-12', 1, ['2027-04-12', '2027-04-13', '2027-04-14'], 1],
  ['2027-04-12', 2, ['2027-04-09', '2027-04-12', '2027-04-13'], 2],
  ['2027-04-12', 3, ['2027-04-12', '2027-04-13', '2027-04-14'], 1],
  ['2027-04-15', 1, ['2027-04-14', '2027-04-15', '2027-04-16'], 2],
  ['2027-04-16', 1, ['2027-04-14', '2027-04-15', '2027-04-16'], 3],
])('days around %s with number %i', (coming, wanted, days, number) => {
  expect(daysAround(coming, wanted, addDays(coming, -1))).toEqual({ days, number });
});

it('gives a real clinic a first site with nothing signed', async () => {
  const { db } = server.context;
  const clinic = { name: 'Quay Clinic', zone: 'America/Chicago', phone: '+13125550142' };
  await inTransaction(db, (transaction) => insertFirstSite(db, transaction, clinic));
  expect(await count('fasting_protocols', 'signed_at IS NULL')).toBe(1);
  expect(await count('rooms')).toBe(1);
  expect(await count('staff')).toBe(0);
});
