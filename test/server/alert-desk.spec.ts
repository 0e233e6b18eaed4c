import { randomUUID } from 'node:crypto';
import type { AlertList, StaffAlert } from '../../shared/contracts/alerts';
import { passOnAlerts } from '../../server/alerts/pass-on-alerts';
import { raiseAlert } from '../../server/alerts/raise-alert';
import { change, inTransaction, select } from '../../server/database/connection';
import { at } from '../support/mornings';
import { addOnCallPerson, addTurn } from '../support/on-call';
import { startTestServer, type Agent, type TestServer } from '../support/server';

jest.setTimeout(60_000);

let server: TestServer;
let siteId: number;
let nurse: Agent;
let other: Agent;
let nurseId: number;

beforeAll(async () => {
  server = await startTestServer();
  siteId = await server.siteId();
  server.setNow(at('05:00'));
  nurse = await server.signInStaff('nurse-coordinator');
  other = await server.signInStaff('nurse-coordinator');
  const [first] = await select<{ id: number }>(
    server.context.db,
    'SELECT MIN(id) AS id FROM staff',
  );
  nurseId = first?.id ?? 0;
});
afterAll(() => server.close());
beforeEach(async () => {
  server.setNow(at('05:00'));
  await change(server.context.db, 'DELETE FROM on_call_turns');
});

/** @returns the id of the new alert. */
const raise = async (): Promise<number> => {
  await inTransaction(server.context.db, (transaction) =>
    raiseAlert(server.context, transaction, {
      kind: 'critical-result',
      siteId,
      cause: randomUUID(),
      usefulUntil: at('23:00'),
    }),
  );
  return newest();
};
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
const messagesOf = (id: number, state: string): Promise<number> =>
  countOf(`messages WHERE dedupe_key LIKE 'alert:${id}:%' AND state = '${state}'`);

test('is not for everybody', async () => {
  await server.visitor().get('/api/clinic/alerts').expect(401);
  const reviewer = await server.signInStaff('language-reviewer');
  await reviewer.get('/api/clinic/alerts').expect(403);
  await reviewer.post('/api/clinic/alerts/1/take').expect(403);
  await reviewer.get('/api/clinic/on-call').expect(403);
  await nurse.put(`/api/clinic/on-call/${siteId}`).send({}).expect(403);
  await nurse.post('/api/clinic/alerts/999999/take').expect(404);
  await nurse.post('/api/clinic/alerts/x/pass-on').expect(422);
});

test('two take it at once: one has it, the other reads that', async () => {
  await addTurn(server.context.db, siteId, nurseId);
  const id = await raise();
  expect(await messagesOf(id, 'queued')).toBe(1);
  const answers = await Promise.all(
    [nurse, other].map((agent) => agent.post(`/api/clinic/alerts/${id}/take`)),
  );
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const refused = answers.find(({ status }) => status === 409);
  expect(refused?.body).toMatchObject({ code: 'already-taken' });
  expect(await messagesOf(id, 'queued')).toBe(0);
  server.setNow(at('05:30'));
  expect(await passOnAlerts(server.context)).toBe(0);
  expect(await countOf(`alert_events WHERE alert_id = ${id} AND event = 'taken'`)).toBe(1);
});

test('a repeat by who has it changes nothing; passing on what another has is refused', async () => {
  const id = await raise();
  await nurse.post(`/api/clinic/alerts/${id}/take`).expect(200);
  await nurse.post(`/api/clinic/alerts/${id}/take`).expect(200);
  await other.post(`/api/clinic/alerts/${id}/pass-on`).expect(409);
  expect(await shown(nurse, id)).toMatchObject({ isMine: true, passesOnAt: null });
  expect(await shown(other, id)).toMatchObject({ isMine: false });
  expect(await countOf(`alert_events WHERE alert_id = ${id} AND event = 'taken'`)).toBe(1);
});

test('passed on, the own deputy is told at once, and both are kept', async () => {
  const { db } = server.context;
  const between = await addOnCallPerson(db, { name: 'Bo Between', phone: null, byMail: true });
  const deputy = await addOnCallPerson(db, { name: 'Dee Deputy', phone: null, byMail: true });
  await addTurn(db, siteId, between);
  await addTurn(db, siteId, nurseId, deputy);
  const id = await raise();
  await nurse.post(`/api/clinic/alerts/${id}/take`).expect(200);
  await nurse.post(`/api/clinic/alerts/${id}/pass-on`).expect(200);
  const alert = await shown(nurse, id);
  expect(alert).toMatchObject({ told: 'Dee Deputy', takenBy: null });
  expect(alert?.happened.map(({ says }) => says)).toEqual([
    'Bo Between was told.',
    'Test nurse-coordinator took it.',
    'Test nurse-coordinator passed it on.',
    'Dee Deputy was told.',
  ]);
  expect(await countOf(`access_records WHERE matter = 'alert' AND detail LIKE '%passed-on%'`)).toBe(
    1,
  );
});

describe('the on-call list', () => {
  let administrator: Agent;
  beforeAll(async () => {
    administrator = await server.signInStaff('administrator');
  });

  const turn = (more: object = {}) => ({
    staffId: nurseId,
    deputyId: null,
    weekdays: [2, 1],
    from: '20:00',
    until: '06:00',
    fromOn: '2027-04-01',
    untilOn: null,
    ...more,
  });
  const reach = (more: object = {}) => ({
    staffId: nurseId,
    phone: '(206) 555-0161',
    byText: true,
    byMail: false,
    language: 'en',
    ...more,
  });
  const read = async () =>
    (await administrator.get(`/api/clinic/on-call?siteId=${siteId}`).expect(200)).body;
  const save = async (more: object) =>
    administrator.put(`/api/clinic/on-call/${siteId}`).send({
      waitMinutes: 10,
      turns: [turn()],
      reach: [reach()],
      version: (await read()).version,
      ...more,
    });

  test('is kept whole, with numbers that can be dialled, and says whom it would reach', async () => {
    const answer = await save({ waitMinutes: 15 });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({
      waitMinutes: 15,
      isEmpty: false,
      turns: [{ weekdays: [1, 2], from: '20:00', until: '06:00', deputyId: null }],
      now: ['Test nurse-coordinator'],
    });
    expect(answer.body.staff).toContainEqual(
      expect.objectContaining({ id: nurseId, phone: '+12065550161', byText: true }),
    );
    expect(await countOf(`access_records WHERE matter = 'on-call-list'`)).toBe(1);
  });

  test('refuses whom it cannot reach, each beside its field', async () => {
    const answer = await save({
      turns: [
        turn({ staffId: 999_999, untilOn: '2027-03-01' }),
        turn({ deputyId: nurseId, weekdays: [1] }),
      ],
      reach: [reach({ phone: '12' }), reach({ phone: null }), reach({ byText: false })],
    });
    expect(answer.status).toBe(422);
    expect(answer.body.errors.map(({ path }: { path: string }) => path)).toEqual([
      'reach.0.phone',
      'reach.1.phone',
      'reach.2.byMail',
      'turns.0.staffId',
      'turns.0.untilOn',
      'turns.1.deputyId',
    ]);
    expect((await save({ turns: [turn({ weekdays: [], from: '25:00' })] })).status).toBe(422);
    expect((await save({ waitMinutes: 0 })).status).toBe(422);
  });

  test('of two who change it at once, the second looks again', async () => {
    const { version } = await read();
    expect((await save({ version })).status).toBe(200);
    const late = await save({ version });
    expect([late.status, late.body.code]).toEqual([409, 'changed-meanwhile']);
  });
});
