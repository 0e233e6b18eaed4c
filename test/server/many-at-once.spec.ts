import { randomUUID } from 'node:crypto';
import { select } from '../../server/database/connection';
import {
  addClinic,
  addHousehold,
  at,
  maryamAndYusuf,
  morningDay,
  type TestClinic,
  type TestHousehold,
} from '../support/mornings';
import { startTestServer, type Agent, type TestServer } from '../support/server';

/**
 * Every family answers in the same minutes before dawn, and a finger taps more than once. With few connections a
 * transaction that asks for a second one while it holds the first would wait for ever.
 */
let server: TestServer;
let clinic: TestClinic;
let household: TestHousehold;
let mother: Agent;
const many = 20;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer({ poolSize: 2 });
});
beforeEach(async () => {
  clinic = await addClinic(server.context, await server.siteId());
  household = await addHousehold(server.context, clinic, maryamAndYusuf);
  mother = await server.openFamilySession(household.motherId, 'household');
  server.setNow(at('05:40'));
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const count = async (table: string, where = 'TRUE'): Promise<number> =>
  Number(
    (
      await select<{ n: number }>(
        server.context.db,
        `SELECT COUNT(*) AS n FROM ${table} WHERE ${where}`,
      )
    )[0]?.n,
  );

const statusesOf = async (send: () => PromiseLike<{ status: number }>): Promise<number[]> => {
  const answers = await Promise.all(Array.from({ length: many }, () => send()));
  return [...new Set(answers.map(({ status }) => status))];
};

it('the same answer twenty times at once is one answer', async () => {
  const body = {
    submissionKey: randomUUID(),
    on: morningDay,
    answers: household.children.map(({ morningId }) => ({ morningId, answer: 'nothing' })),
    deviceAt: new Date(at('05:40')).toISOString(),
  };
  expect(await statusesOf(() => mother.post('/api/family/fasting-checks').send(body))).toEqual([
    200,
  ]);
  expect(await count('fasting_checks')).toBe(2);
});

it('"not coming" twenty times at once is told once and one call', async () => {
  const body = {
    kind: 'not-coming',
    submissionKey: randomUUID(),
    on: morningDay,
    deviceAt: new Date(at('05:40')).toISOString(),
  };
  expect(await statusesOf(() => mother.post('/api/family/morning-changes').send(body))).toEqual([
    200,
  ]);
  expect(await count('fasting_checks')).toBe(2);
  expect(await count('call_tasks', "reason = 'not-coming'")).toBe(1);
});

it('twenty taps on "here" are one arrival', async () => {
  const nurse = await server.signInStaff('nurse-coordinator');
  const morningId = household.children[0]?.morningId ?? 0;
  const path = `/api/clinic/mornings/${morningId}/arrival`;
  expect(await statusesOf(() => nurse.post(path).send({ version: 1 }))).toEqual([200]);
  expect(await count('access_records', "matter = 'arrival'")).toBe(1);
});

it('twenty presses on "invite" are one link', async () => {
  const nurse = await server.signInStaff('nurse-coordinator');
  const path = `/api/clinic/family-members/${household.motherId}/invitations`;
  expect(await statusesOf(() => nurse.post(path))).toEqual([200]);
  expect(await count('family_links', "kind = 'invitation'")).toBe(1);
  expect(await count('messages', "kind = 'invitation'")).toBe(1);
});

it('twenty codes asked for at once are three at the most', async () => {
  const body = { channel: 'sms', address: '+12065550141' };
  const send = () => server.visitor().post('/api/family/codes').send(body);
  const statuses = await statusesOf(send);
  expect(statuses.every((status) => status === 200 || status === 429)).toBe(true);
  expect(await count('messages', "kind = 'code'")).toBeLessThanOrEqual(3);
});
