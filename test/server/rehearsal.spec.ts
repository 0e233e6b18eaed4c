import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import request from 'supertest';
import { rehearsalState } from '../../shared/contracts/rehearsal';
import { buildApp } from '../../server/app';
import { movableClock } from '../../server/clock/clock';
import type { Context } from '../../server/context';
import { select } from '../../server/database/connection';
import { momentsOf } from '../../server/stand-ins/moments';
import { runSender, type SenderLoop } from '../../server/outbox/sender-loop';
import { insert } from '../support/insert';
import { familyPhone, openOutboxBench, until, type OutboxBench } from '../support/outbox';
import { staffPassword, startTestServer, type Agent, type TestServer } from '../support/server';

jest.setTimeout(60_000);

let bench: OutboxBench;
let server: TestServer;
let web: Server;
let context: Context;
let loop: SenderLoop | undefined;
let origin = '';

/** Web, stand-ins and sender together, as in a rehearsal at home. */
beforeEach(async () => {
  web = createServer();
  await new Promise<void>((resolve) => web.listen(0, '127.0.0.1', resolve));
  origin = `http://127.0.0.1:${(web.address() as AddressInfo).port}`;
  bench = await openOutboxBench({ origin: () => origin });
  server = await startTestServer({ settings: { ...bench.settings, rehearsal: true } });
  context = { ...server.context, clock: movableClock(server.context.db) };
  web.on('request', buildApp(context));
});
afterEach(async () => {
  await loop?.stop();
  loop = undefined;
  await new Promise((resolve) => {
    web.close(resolve);
    web.closeAllConnections();
  });
  await bench.close();
  await server.close();
});

const staff = async (role: 'nurse-coordinator' | 'language-reviewer'): Promise<Agent> => {
  const { email } = await server.addStaff([role]);
  const agent = request.agent(buildApp(context));
  agent.set('Sec-Fetch-Site', 'same-origin');
  await agent.post('/api/clinic/session').send({ email, password: staffPassword }).expect(200);
  return agent;
};

async function family(): Promise<{ householdId: number; childId: number; memberId: number }> {
  const createdAt = new Date();
  const householdId = await insert(context.db, 'households', {
    site_id: await server.siteId(),
    created_at: createdAt,
  });
  const childId = await insert(context.db, 'children', {
    household_id: householdId,
    full_name: 'Yusuf Demo',
    call_me: 'Yusuf',
    family_label: 'Yusuf',
    born_on: '2024-05-02',
    feeding: 'family-food',
    cautions: '[]',
    created_at: createdAt,
  });
  const memberId = await insert(context.db, 'family_members', {
    household_id: householdId,
    full_name: 'Amina Demo',
    phone: familyPhone,
    email: 'amina@family.example.org',
    reads_language: 'en',
    speaks_language: 'Somali',
    created_at: createdAt,
  });
  await insert(context.db, 'child_family_members', {
    child_id: childId,
    family_member_id: memberId,
    standing: 'guardian',
    relationship: 'mother',
  });
  return { householdId, childId, memberId };
}

const startLoop = () => {
  loop = runSender({
    sender: bench.sender({ db: context.db, clock: context.clock }),
    log: context.log,
    refresh: () => context.clock.refresh(),
    idleMs: 50,
  });
};

describe('only who may rehearse', () => {
  it.each([
    ['get', '/api/clinic/rehearsal'],
    ['post', '/api/clinic/rehearsal/clock'],
    ['post', '/api/clinic/rehearsal/replies'],
  ] as const)('%s %s: nobody signed in, wrong role', async (method, path) => {
    const visitor = request.agent(buildApp(context)).set('Sec-Fetch-Site', 'same-origin');
    expect((await visitor[method](path).send({ minutes: 5 })).status).toBe(401);
    const reviewer = await staff('language-reviewer');
    expect((await reviewer[method](path).send({ minutes: 5 })).status).toBe(403);
  });

  it('and never outside a rehearsal', async () => {
    const real = { ...context, settings: { ...context.settings, rehearsal: false } };
    const { email } = await server.addStaff(['nurse-coordinator']);
    const agent = request.agent(buildApp(real)).set('Sec-Fetch-Site', 'same-origin');
    await agent.post('/api/clinic/session').send({ email, password: staffPassword }).expect(200);
    expect((await agent.get('/api/clinic/rehearsal')).status).toBe(404);
  });

  it.each([
    ['clock', {}],
    ['clock', { minutes: 0 }],
    ['clock', { minutes: 1.5 }],
    ['clock', { to: '2027-02-29T00:00:00.000Z' }],
    ['replies', { phone: familyPhone }],
    ['replies', { phone: familyPhone, body: 'x'.repeat(641) }],
  ])('bad input to %s: %j', async (path, body) => {
    const nurse = await staff('nurse-coordinator');
    const answer = await nurse.post(`/api/clinic/rehearsal/${path}`).send(body);
    expect(answer.status).toBe(422);
  });
});

it('shows the phones and mailboxes of the families, and keeps who looked', async () => {
  const { childId } = await family();
  await bench.queue({ dedupeKey: 'text', body: 'Visit tomorrow.' });
  await bench.queue({
    dedupeKey: 'mail',
    channel: 'mail',
    address: 'amina@family.example.org',
    body: 'Open the page.',
  });
  await bench.sender().drain();
  const nurse = await staff('nurse-coordinator');
  const answer = await nurse.get('/api/clinic/rehearsal').expect(200);
  const state = rehearsalState.parse(answer.body);
  expect(state.phones).toMatchObject([
    {
      phone: familyPhone,
      name: 'Amina Demo',
      relationship: 'mother',
      children: ['Yusuf'],
      texts: [{ direction: 'out', body: 'Visit tomorrow.' }],
    },
  ]);
  expect(state.mailboxes).toMatchObject([{ mails: [{ subject: 'Visit tomorrow' }] }]);
  const seen = await select<{ child_id: number }>(
    context.db,
    `SELECT child_id FROM access_record_children c JOIN access_records r ON r.id = c.access_record_id
     WHERE r.matter = 'rehearsal'`,
  );
  expect(seen).toEqual([{ child_id: childId }]);
});

it('brings signed reports and replies home', async () => {
  await family();
  bench.now = Date.now();
  await bench.queue({ dedupeKey: 'text' });
  startLoop();
  await until('the text is delivered', async () => (await bench.row('text')).state === 'delivered');
  const nurse = await staff('nurse-coordinator');
  await nurse
    .post('/api/clinic/rehearsal/replies')
    .send({ phone: familyPhone, body: 'STOP' })
    .expect(200);
  const outs = await select(context.db, 'SELECT address FROM opt_outs WHERE ended_at IS NULL');
  expect(outs).toEqual([{ address: familyPhone }]);
  const unknown = await nurse
    .post('/api/clinic/rehearsal/replies')
    .send({ phone: '+12065550199', body: '1' });
  expect(unknown.status).toBe(404);
});

describe('the clock', () => {
  it('moves forward only, and every screen hears of it', async () => {
    const nurse = await staff('nurse-coordinator');
    await nurse.post('/api/clinic/rehearsal/clock').send({ minutes: 90 }).expect(200);
    const { body } = await nurse.get('/api/clinic/rehearsal').expect(200);
    expect(rehearsalState.parse(body).offsetMinutes).toBe(90);
    const changes = await select(context.db, "SELECT topic FROM changes WHERE topic = 'clock'");
    expect(changes.length).toBeGreaterThan(0);
    const back = await nurse
      .post('/api/clinic/rehearsal/clock')
      .send({ to: new Date(Date.now()).toISOString() });
    expect(back.status).toBe(422);
    expect((back.body as { code: string }).code).toBe('clock-moves-forward');
  });

  it('stops on the way wherever a text falls due, so that a skipped night is sent in order', async () => {
    const hour = 3_600_000;
    bench.now = Date.now();
    const due = (hours: number, body: string) =>
      bench.queue({
        dedupeKey: body,
        body,
        dueAt: bench.now + hours * hour,
        lastUsefulAt: bench.now + (hours + 1) * hour,
      });
    await due(6, 'evening');
    await due(16, 'morning');
    await due(40, 'another day');
    startLoop();
    const nurse = await staff('nurse-coordinator');
    await nurse
      .post('/api/clinic/rehearsal/clock')
      .send({ to: new Date(bench.now + 20 * hour).toISOString() })
      .expect(200);
    expect(bench.textsTo(familyPhone)).toEqual(['evening', 'morning']);
    expect((await bench.row('another day')).state).toBe('queued');
  });
});

describe('moments worth going to', () => {
  it('come from the planned mornings, soonest first', () => {
    // 13 April 2027 in Los Angeles is UTC-7.
    const day = {
      plannedOn: '2027-04-13',
      zone: 'America/Los_Angeles',
      eveningTextTime: '18:00:00',
      questionMinutesBefore: 90,
      callListMinutesBefore: 60,
      firstArrivalAt: new Date('2027-04-13T13:30:00Z'),
      lastArrivalAt: new Date('2027-04-13T14:15:00Z'),
    };
    expect(momentsOf([day], Date.parse('2027-04-12T20:00:00Z')).map(({ at }) => at)).toEqual([
      '2027-04-13T01:00:00.000Z',
      '2027-04-13T12:00:00.000Z',
      '2027-04-13T12:30:00.000Z',
      '2027-04-13T13:30:00.000Z',
      '2027-04-13T14:15:00.000Z',
    ]);
    const [next] = momentsOf([day], Date.parse('2027-04-13T12:00:00Z'));
    expect(next?.says).toContain('call list');
  });
});

it('says so when the stand-ins are away', async () => {
  await bench.standIns.close();
  const nurse = await staff('nurse-coordinator');
  const answer = await nurse.get('/api/clinic/rehearsal');
  expect(answer.status).toBe(503);
  expect(answer.body).toMatchObject({ code: 'stand-ins-away' });
});
