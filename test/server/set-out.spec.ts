import { setOut, supplyList } from '../../shared/contracts/supplies';
import { select } from '../../server/database/connection';
import type { DemoClinic } from '../../server/database/seeds/demo-clinic';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import { readyOrder, signedClinic, wednesday } from '../support/signed-clinic';

let server: TestServer;
let nurse: Agent;
let clinic: DemoClinic;
const on = '2027-04-20';

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(wednesday);
  await server.database.empty();
  clinic = await signedClinic(server);
  nurse = await server.signInStaff('nurse-coordinator');
});
afterAll(() => server.close());

const get = async (path: string) =>
  (await nurse.get(`/api/clinic${path}`).expect(200)).body as unknown;
const takeOver = async (): Promise<void> => {
  const { startingRules } = supplyList.parse(await get('/supply-list'));
  const rules = startingRules.map(({ says: _says, ...rule }) => rule);
  await nurse.put('/api/clinic/supply-list').send({ rules }).expect(200);
};

describe('nobody without the right', () => {
  it.each(['/set-out', '/supply-list'])('gets %s', async (path) => {
    await server.visitor().get(`/api/clinic${path}`).expect(401);
    const desk = await server.signInStaff('front-desk');
    await desk.get(`/api/clinic${path}`).expect(403);
  });

  it('ticks or changes the list, and bad input says where', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(`/api/clinic/set-out/${on}/ticks`).send({}).expect(403);
    await desk.put('/api/clinic/supply-list').send({}).expect(403);
    const tick = await nurse
      .post('/api/clinic/set-out/2027-02-29/ticks')
      .send({ items: [], isReady: true });
    expect(tick.status).toBe(422);
    const rule = {
      item: 'gown',
      perChild: 1,
      perMorning: 0,
      childrenPerSpare: null,
      underMonths: null,
    };
    const twice = await nurse.put('/api/clinic/supply-list').send({ rules: [rule, rule] });
    expect([twice.status, twice.body.errors[0].path]).toEqual([422, 'rules.1.item']);
    const none = await nurse
      .put('/api/clinic/supply-list')
      .send({ rules: [{ ...rule, perChild: -1 }] });
    expect([none.status, none.body.errors[0].path]).toEqual([422, 'rules.0.perChild']);
  });
});

it('counts for the children of that morning by the clinic’s own list, and by nothing before it has one', async () => {
  const clinician = await server.signInStaff('clinician');
  for (const [time, room, bornOn] of [
    ['06:00', 0, '2026-10-01'],
    ['06:20', 1, '2024-02-29'],
  ] as const) {
    const order = await readyOrder(clinician, { bornOn }, { morningsPlanned: 1 });
    const place = { childId: order.childId, arrivalTime: time, roomId: clinic.roomIds[room] };
    await clinician
      .post('/api/clinic/series')
      .send({ orderIds: [order.orderId], days: [{ on, places: [place] }], escorts: [] })
      .expect(200);
  }
  const before = setOut.parse(await get(`/set-out?on=${on}`));
  expect([before.hasList, before.lines, before.children.length]).toEqual([false, [], 2]);
  await takeOver();
  const { lines } = setOut.parse(await get(`/set-out?on=${on}`));
  const shown = (item: string) => lines.find((line) => line.item === item);
  expect(shown('feeding-tube')).toMatchObject({ says: 'Feeding tubes', count: 3, ofWhichSpare: 1 });
  expect(shown('infant-feed')?.count).toBe(1);
  expect(shown('cool-box')).toMatchObject({ count: 1, isReady: null });

  const missing = { items: ['infant-feed'], isReady: false, note: 'none in the cupboard' };
  await nurse.post(`/api/clinic/set-out/${on}/ticks`).send(missing).expect(200);
  const rest = await nurse
    .post(`/api/clinic/set-out/${on}/ticks`)
    .send({ items: [], isReady: true })
    .expect(200);
  const after = setOut.parse(rest.body).lines;
  expect(after.filter(({ isReady }) => isReady === false)).toMatchObject([
    { item: 'infant-feed', note: 'none in the cupboard' },
  ]);
  expect(after.filter(({ isReady }) => isReady === null)).toEqual([]);
  expect(after[0]?.tickedBy).toBeTruthy();
  const rows = await select<{ matter: string }>(
    server.context.db,
    "SELECT matter FROM access_records WHERE matter = 'set-out' AND action = 'changed'",
  );
  expect(rows).toHaveLength(2);
});

it('is about tomorrow unless another day is asked for', async () => {
  expect(setOut.parse(await get('/set-out'))).toMatchObject({
    on: '2027-04-15',
    children: [],
    lines: [],
  });
});
