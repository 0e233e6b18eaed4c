import type { AlertList, StaffAlert } from '../../shared/contracts/alerts';
import { alertOverdue } from '../../server/alerts/overdue-alerts';
import { raiseUnansweredCalls } from '../../server/calls/unanswered-calls';
import { change, select } from '../../server/database/connection';
import { rootQuery } from '../support/database';
import { insert } from '../support/insert';
import { addClinic, addHousehold, at, maryamAndYusuf, morningDay } from '../support/mornings';
import { addOnCallPerson, addTurn } from '../support/on-call';
import { startTestServer, type Agent, type TestServer } from '../support/server';

jest.setTimeout(60_000);

let server: TestServer;
let siteId: number;
let nurse: Agent;

beforeAll(async () => {
  server = await startTestServer();
  siteId = await server.siteId();
  server.setNow(at('05:00'));
  nurse = await server.signInStaff('nurse-coordinator');
});
afterAll(() => server.close());
beforeEach(async () => {
  server.setNow(at('05:00'));
  await change(server.context.db, 'DELETE FROM on_call_turns');
});

const newest = async (): Promise<number> => {
  const [row] = await select<{ id: number }>(server.context.db, 'SELECT MAX(id) AS id FROM alerts');
  return row?.id ?? 0;
};
const shown = async (agent: Agent, id: number): Promise<StaffAlert | undefined> =>
  ((await agent.get('/api/clinic/alerts').expect(200)).body as AlertList).alerts.find(
    (one) => one.id === id,
  );
const countOf = async (sql: string): Promise<number> => {
  const [row] = await select<{ rows: number }>(
    server.context.db,
    `SELECT COUNT(*) AS \`rows\` FROM ${sql}`,
  );
  return row?.rows ?? 0;
};

test('one alert a morning for families who do not answer, with no name on it', async () => {
  const clinic = await addClinic(server.context, siteId);
  await addHousehold(server.context, clinic, maryamAndYusuf);
  const mail = await addOnCallPerson(server.context.db, {
    name: 'Nadia Night',
    phone: null,
    byMail: true,
    language: 'es',
  });
  await addTurn(server.context.db, siteId, mail);
  server.setNow(at('06:05'));
  expect(await raiseUnansweredCalls(server.context)).toBe(1);
  const id = await newest();
  expect(await shown(nurse, id)).toMatchObject({
    kind: 'not-answered',
    opens: 'calls',
    says: 'One family had not answered at the set hour.',
  });
  await change(server.context.db, 'UPDATE call_tasks SET open_key = NULL, done_at = NOW()');
  await change(server.context.db, 'UPDATE children SET call_me = call_me');
  await raiseUnansweredCalls(server.context);
  expect(await countOf(`alerts WHERE kind = 'not-answered'`)).toBe(1);
  const [message] = await select<{ body: string; household_id: number | null; staff_id: number }>(
    server.context.db,
    `SELECT * FROM messages WHERE dedupe_key LIKE 'alert:${id}:%'`,
  );
  expect(message).toMatchObject({ household_id: null, staff_id: mail });
  expect(message?.body).toMatch(/^Harbor Clinic: 1 familia no ha contestado\. Abra Llamadas\./);
  expect(message?.body).not.toMatch(/Maryam|Yusuf|Cali|Nuur/);
});

describe('results', () => {
  let specimenId: number;

  beforeAll(async () => {
    const { db } = server.context;
    const [child] = await select<{ child_id: number; series_id: number; id: number }>(
      db,
      `SELECT * FROM mornings WHERE planned_on = '${morningDay}' ORDER BY id LIMIT 1`,
    );
    specimenId = await insert(db, 'specimens', {
      series_id: child?.series_id,
      morning_id: child?.id,
      child_id: child?.child_id,
      number: 1,
      volume_ml: 6,
      collected_at: new Date(at('06:30')),
      neutralised_at: new Date(at('06:40')),
      label: 'LAB-1',
      handed_over_at: new Date(at('07:30')),
      received_at: new Date(at('08:30')),
      laboratory_number: 'N-1',
    });
  });

  const enter = (value: string, test = 'smear') =>
    nurse.post(`/api/clinic/specimens/${specimenId}/results`).send({
      test,
      value,
      finality: 'preliminary',
      reportedOn: morningDay,
    });

  test('a critical one alerts with its call; what harms nobody does not', async () => {
    server.setNow(at('15:00'));
    const before = await newest();
    await enter('negative').expect(200);
    expect(await newest()).toBe(before);
    const calls = await countOf('call_tasks');
    await enter('positive').expect(200);
    expect(await countOf('call_tasks')).toBeGreaterThan(calls);
    expect(await shown(nurse, await newest())).toMatchObject({ kind: 'critical-result' });
    expect(
      await countOf(
        `alerts WHERE kind = 'critical-result' AND raised_at = '${sqlTime(at('15:00'))}'`,
      ),
    ).toBe(1);
  });

  test('a critical one whose alert cannot be kept is not kept either', async () => {
    server.setNow(at('15:10'));
    const results = await countOf('results');
    const calls = await countOf('call_tasks');
    await rootQuery(
      `RENAME TABLE ${server.database.name}.alert_events TO ${server.database.name}.away`,
    );
    try {
      await enter('trace', 'amplification').expect(500);
    } finally {
      await rootQuery(
        `RENAME TABLE ${server.database.name}.away TO ${server.database.name}.alert_events`,
      );
    }
    expect([await countOf('results'), await countOf('call_tasks')]).toEqual([results, calls]);
  });

  test('a final report that is late: one alert, by day', async () => {
    server.setNow(at('06:00', '2027-07-20'));
    const before = await newest();
    await alertOverdue(server.context);
    expect(await newest()).toBe(before);
    server.setNow(at('09:00', '2027-07-20'));
    await alertOverdue(server.context);
    await alertOverdue(server.context);
    expect(await shown(nurse, await newest())).toMatchObject({
      kind: 'overdue-result',
      says: 'One final report of the laboratory is overdue.',
    });
    expect(await countOf(`alerts WHERE kind = 'overdue-result'`)).toBe(1);
  });
});

const sqlTime = (instant: number): string =>
  new Date(instant).toISOString().slice(0, 23).replace('T', ' ');
