import { randomUUID } from 'node:crypto';
import { nextMorning } from '../../shared/contracts/family-morning';
import { sayBackAnswered, sayItBack, type SayItBack } from '../../shared/contracts/say-it-back';
import { raiseNotSaidBackCalls } from '../../server/say-it-back/say-back-calls';
import { change, select } from '../../server/database/connection';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import {
  addClinic,
  addHousehold,
  at,
  maryamAndYusuf,
  morningDay,
  type TestClinic,
  type TestHousehold,
} from '../support/mornings';

const path = '/api/family/say-it-back';
const evening = at('15:00', '2027-04-12');

let server: TestServer;
let clinic: TestClinic;
let household: TestHousehold;
let mother: Agent;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  clinic = await addClinic(server.context, await server.siteId());
  household = await addHousehold(server.context, clinic, maryamAndYusuf);
  mother = await server.openFamilySession(household.motherId, 'household');
  server.setNow(evening);
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const rows = <T extends object>(sql: string): Promise<T[]> => select<T>(server.context.db, sql);
const openCalls = async (): Promise<string[]> =>
  (await rows<{ reason: string }>('SELECT reason FROM call_tasks WHERE done_at IS NULL')).map(
    ({ reason }) => reason,
  );
const kept = () =>
  rows<{ series_id: number; question: string; choice: string; is_right: 0 | 1 }>(
    'SELECT series_id, question, choice, is_right FROM say_backs ORDER BY id',
  );

const asked = async (agent = mother): Promise<SayItBack> =>
  sayItBack.parse((await agent.get(path).expect(200)).body);

const bodyFor = (question: string, choice: string, more: Record<string, unknown> = {}) => ({
  submissionKey: randomUUID(),
  on: morningDay,
  question,
  tries: 0,
  choice,
  deviceAt: new Date(server.context.clock.now()).toISOString(),
  ...more,
});
const say = async (question: string, choice: string, more: Record<string, unknown> = {}) =>
  sayBackAnswered.parse(
    (
      await mother
        .post(path)
        .send(bodyFor(question, choice, more))
        .expect(200)
    ).body,
  );
const sayAll = async (): Promise<void> => {
  await say('water', 'no');
  await say('last', 'stop');
  await say('mistake', 'tell');
};

describe('refused', () => {
  it('whoever has no session, and staff', async () => {
    await server.visitor().get(path).expect(401);
    await server.visitor().post(path).send(bodyFor('water', 'no')).expect(401);
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.get(path).expect(401);
    await nurse.post(path).send(bodyFor('water', 'no')).expect(401);
    expect(await kept()).toEqual([]);
  });

  it('a family without a morning on that day, which changes nothing for the one that has', async () => {
    const others = await addHousehold(server.context, clinic, [
      { callMe: 'Nahom', bornOn: '2025-05-05', arrivalTime: '07:45' },
    ]);
    await change(
      server.context.db,
      "UPDATE mornings SET state = 'lost' WHERE series_id = :seriesId",
      { seriesId: others.children[0]?.seriesId },
    );
    const stranger = await server.openFamilySession(others.motherId, 'household');
    await stranger.post(path).send(bodyFor('water', 'no')).expect(404);
    expect((await asked(stranger)).state).toBe('none');
    expect(await kept()).toEqual([]);
  });

  it('a helper to whom the morning was not given', async () => {
    await change(
      server.context.db,
      'UPDATE mornings SET escort_family_member_id = NULL, night_carer_family_member_id = NULL',
      {},
    );
    const helper = await server.openFamilySession(household.grandmotherId, 'household');
    expect((await asked(helper)).state).toBe('none');
    await helper.post(path).send(bodyFor('water', 'no')).expect(404);
    expect(await kept()).toEqual([]);
  });

  it('input that cannot be', async () => {
    for (const more of [
      { submissionKey: 'x' },
      { on: '2027-02-29' },
      { question: 'colour' },
      { tries: -1 },
      { choice: '' },
      { choice: 'perhaps' },
      { deviceAt: 'now' },
    ])
      await mother
        .post(path)
        .send(bodyFor('water', 'no', more))
        .expect(422);
    expect(await kept()).toEqual([]);
  });

  it('a question that this family is not asked, and any answer after the arrival', async () => {
    const refused = await mother.post(path).send(bodyFor('comfort', 'hold')).expect(409);
    expect(refused.body.code).toBe('not-asked');
    server.setNow(at('07:20'));
    const late = await mother.post(path).send(bodyFor('water', 'no')).expect(409);
    expect(late.body.code).toBe('too-late');
  });
});

describe('the questions', () => {
  it('are three, with the times of this plan', async () => {
    const page = await asked();
    expect(page).toMatchObject({ state: 'open', on: morningDay, total: 3 });
    expect(page.questions.map(({ question }) => question)).toEqual(['water', 'last', 'mistake']);
    expect(page.questions[0]?.asks).toBe(
      'It is 5:00 in the morning. May Maryam and Yusuf have a sip of water?',
    );
    const [, last] = page.questions;
    expect(last?.asks).toBe('Until when may Maryam finish the last feed?');
    expect(last?.choices.map(({ says }) => says)).toEqual([
      expect.stringMatching(/^\d+:\d\d /),
      expect.stringMatching(/, when we leave home$/),
      '7:00 in the morning, when we come to the clinic',
      'I am not sure',
    ]);
  });

  it('ask about comfort when the youngest is a baby at the breast', async () => {
    await change(server.context.db, "UPDATE children SET feeding = 'breast'", {});
    const [first] = (await asked()).questions;
    expect(first).toMatchObject({ question: 'comfort', face: 'baby' });
    expect(first?.asks).toContain('Maryam wakes up and wants to nurse');
  });

  it('are asked of a helper to whom the morning was given', async () => {
    const helper = await server.openFamilySession(household.grandmotherId, 'household');
    expect((await asked(helper)).state).toBe('open');
  });

  it('are not offered in words that are not signed', async () => {
    await change(
      server.context.db,
      "UPDATE wordings SET signed_at = NULL WHERE message_key = 'say-back.mistake.explains'",
      {},
    );
    expect((await asked()).state).toBe('none');
    const home = nextMorning.parse((await mother.get('/api/family/next-morning')).body);
    expect(home.sayItBack).toBeNull();
    const refused = await mother.post(path).send(bodyFor('water', 'no')).expect(409);
    expect(refused.body.code).toBe('not-asked');
  });

  it('are not asked about a child whose plan nobody has made yet', async () => {
    await change(server.context.db, 'UPDATE children SET cautions = \'["diabetes"]\'', {});
    expect((await asked()).state).toBe('none');
  });

  it('are linked from the first page until they are done for the series', async () => {
    const card = async () =>
      nextMorning.parse((await mother.get('/api/family/next-morning').expect(200)).body).sayItBack;
    expect(await card()).toBe('Is the plan clear? Three short questions');
    await sayAll();
    expect(await card()).toBeNull();
    server.setNow(at('12:00'));
    expect((await asked()).state).toBe('done');
  });
});

describe('an answer', () => {
  it('is kept word for word, for each child it is about, with both times', async () => {
    const answered = await say('water', 'no', { deviceAt: '2027-04-12T21:58:00.000Z' });
    expect(answered).toMatchObject({ isRight: true, heading: 'Yes, that is it.' });
    const [first, second] = household.children;
    expect(await kept()).toEqual([
      { series_id: first?.seriesId, question: 'water', choice: 'no', is_right: 1 },
      { series_id: second?.seriesId, question: 'water', choice: 'no', is_right: 1 },
    ]);
    const [row] = await rows<{
      said: { question: string; answer: string; explained: string; wording: object };
      language: string;
      family_member_id: number;
      device_at: Date;
      received_at: Date;
    }>('SELECT * FROM say_backs ORDER BY id LIMIT 1');
    expect(row).toMatchObject({
      said: {
        question: 'It is 5:00 in the morning. May Maryam and Yusuf have a sip of water?',
        answer: 'No, not even water',
        explained: answered.says,
      },
      language: 'en',
      family_member_id: household.motherId,
      device_at: new Date('2027-04-12T21:58:00.000Z'),
      received_at: new Date(evening),
    });
    expect(row?.said.wording).toMatchObject({ 'say-back.water.asks': 1, 'say-back.water.no': 1 });
    const records = await rows<{ actor_id: number; detail: object }>(
      "SELECT actor_id, detail FROM access_records WHERE matter = 'say-it-back' AND action = 'changed'",
    );
    expect(records).toMatchObject([
      { actor_id: household.motherId, detail: { question: 'water', isRight: true } },
    ]);
  });

  it('counts once, sent twice or by two phones at once', async () => {
    const body = bodyFor('water', 'yes');
    const [one, two, other] = await Promise.all([
      mother.post(path).send(body),
      mother.post(path).send(body),
      mother.post(path).send(bodyFor('water', 'yes')),
    ]);
    expect([one.status, two.status, other.status]).toEqual([200, 200, 200]);
    expect(one.body).toMatchObject({ isRight: false, says: two.body.says });
    expect(await kept()).toHaveLength(2);
    expect(await openCalls()).toEqual([]);
  });

  it('that misses is explained, asked once more at the end, and then understood', async () => {
    const missed = await say('water', 'yes');
    expect(missed).toMatchObject({ isRight: false, heading: 'Let us look at it once more.' });
    expect(missed.says).toContain('No water for Maryam and Yusuf at 5:00 in the morning.');
    expect(missed.next.questions.map(({ question }) => question)).toEqual([
      'last',
      'mistake',
      'water',
    ]);
    await say('last', 'stop');
    const third = await say('mistake', 'tell');
    expect(third.next).toMatchObject({ state: 'open', says: 'Let us ask this once more.' });
    const last = await say('water', 'no', { tries: 1 });
    expect(last.next).toMatchObject({ state: 'done', questions: [] });
    expect(await openCalls()).toEqual([]);
  });

  it('that says "not sure" is thanked for', async () => {
    const unsure = await say('mistake', 'unsure');
    expect(unsure).toMatchObject({ isRight: false, heading: 'Thank you for telling us.' });
  });

  it('missed after the explanation becomes one call for the evening, with what it was about', async () => {
    await say('water', 'yes');
    await say('last', 'stop');
    await say('mistake', 'tell');
    const end = await say('water', 'unsure', { tries: 1 });
    expect(end.next).toMatchObject({ state: 'done' });
    expect(end.next.says).toContain('We call you');
    const nurse = await server.signInStaff('nurse-coordinator');
    const { body } = await nurse.get('/api/clinic/calls').expect(200);
    expect(body.open).toHaveLength(1);
    expect(body.open[0]).toMatchObject({ reason: 'not-understood' });
    expect(body.open[0].says).toContain('It was about water in the night.');
    expect(JSON.stringify(body.open[0])).toContain('I tell you the plan once more.');
  });

  it('stands in the child’s column of time', async () => {
    await say('last', 'leave');
    const nurse = await server.signInStaff('nurse-coordinator');
    const { body } = await nurse
      .get(`/api/clinic/children/${household.children[0]?.childId}`)
      .expect(200);
    expect(JSON.stringify(body)).toContain('Said the plan back: when to stop: explained.');
  });
});

describe('a family that has not said it back', () => {
  it('is called from the evening on, once', async () => {
    server.setNow(at('15:59', '2027-04-12'));
    expect(await raiseNotSaidBackCalls(server.context)).toBe(0);
    server.setNow(at('21:00', '2027-04-12'));
    expect(await raiseNotSaidBackCalls(server.context)).toBe(1);
    expect(await raiseNotSaidBackCalls(server.context)).toBe(0);
    expect(await openCalls()).toEqual(['not-said-back']);
  });

  it('leaves the list with the last answer', async () => {
    server.setNow(at('21:00', '2027-04-12'));
    await raiseNotSaidBackCalls(server.context);
    await sayAll();
    expect(await openCalls()).toEqual([]);
    expect(await raiseNotSaidBackCalls(server.context)).toBe(0);
  });

  it('is not called when its words are not signed: it is called for that', async () => {
    await change(server.context.db, "UPDATE family_members SET reads_language = 'es'", {});
    server.setNow(at('21:00', '2027-04-12'));
    expect(await raiseNotSaidBackCalls(server.context)).toBe(0);
  });

  it('is not called when a person has just told it the plan', async () => {
    server.setNow(at('21:00', '2027-04-12'));
    await raiseNotSaidBackCalls(server.context);
    const nurse = await server.signInStaff('nurse-coordinator');
    const { body } = await nurse.get('/api/clinic/calls').expect(200);
    await nurse
      .post(`/api/clinic/calls/${body.open[0].id}/outcome`)
      .send({ outcome: 'told', interpreter: 'Interpreter 4417', note: 'Went through it.' })
      .expect(200);
    expect(await raiseNotSaidBackCalls(server.context)).toBe(0);
    expect(await openCalls()).toEqual([]);
  });
});
