import { randomUUID } from 'node:crypto';
import { individualPlanPreview, individualPlans } from '../../shared/contracts/individual-plans';
import { morningQuestion, nextMorning } from '../../shared/contracts/family-morning';
import { problem } from '../../shared/contracts/problem';
import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { keepUsualNight } from '../../server/individual-plans/usual-nights';
import {
  addClinic,
  addHousehold,
  at,
  iso,
  morningDay,
  type TestHousehold,
} from '../support/mornings';
import { startTestServer, type Agent, type TestServer } from '../support/server';

/** A child with diabetes and one medicine: no standard plan; a clinician composes one from signed phrases. */
let server: TestServer;
let household: TestHousehold;
let clinician: Agent;
let childId: number;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(at('12:00', '2027-04-12'));
  const clinic = await addClinic(server.context, await server.siteId());
  household = await addHousehold(server.context, clinic, [
    { callMe: 'Idris', bornOn: '2024-05-05', arrivalTime: '07:00', cautions: ['diabetes'] },
  ]);
  childId = household.children[0]?.childId ?? 0;
  clinician = await server.signInStaff('clinician');
  await planned();
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const planned = (): Promise<void> =>
  inTransaction(server.context.db, (transaction) =>
    planHouseholdMessages(server.context, transaction, {
      householdId: household.householdId,
      on: morningDay,
    }),
  );

const body = {
  stops: [
    { item: 'solid-food', leastHours: 5 },
    { item: 'cows-milk', leastHours: 5 },
    { item: 'water', leastHours: 2, nothingFrom: '04:30' },
  ],
  longestHours: 9,
  lastFeedTime: '01:15',
  phrases: [{ key: 'glucose-on-waking' }, { key: 'glucose-low-feed-and-call', glucoseMgDl: 70 }],
  medicines: [
    { name: 'Insulin glargine', way: 'clinician-decides' },
    { name: 'Levetiracetam', way: 'usual-time-with-sip', time: '06:00', sipMl: 5 },
  ],
};
const request = (more: Record<string, unknown> = {}) => ({
  seriesId: household.children[0]?.seriesId,
  afterVersion: 0,
  body,
  submissionKey: randomUUID(),
  ...more,
});
const url = (more = ''): string => `/api/clinic/children/${childId}/individual-plans${more}`;
const sign = (more: Record<string, unknown> = {}) => clinician.post(url()).send(request(more));
const read = async () => individualPlans.parse((await clinician.get(url()).expect(200)).body);
const openCalls = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY reason',
    )
  ).map(({ reason }) => reason);
const evening = async (): Promise<string> =>
  (
    await select<{ body: string }>(
      server.context.db,
      `SELECT body FROM messages WHERE kind = 'evening' AND channel = 'sms' AND state = 'queued' AND morning_on = '${morningDay}'`,
    )
  )
    .map((row) => row.body)
    .join('\n');
const pathsOf = (answer: { body: unknown }): string[] =>
  (problem.parse(answer.body).errors ?? []).map(({ path }) => path);

describe('refused', () => {
  it('no session, and a family’s', async () => {
    await server.visitor().get(url()).expect(401);
    await server.visitor().post(url()).send(request()).expect(401);
    const mother = await server.openFamilySession(household.motherId, 'fresh');
    await mother.get(url()).expect(401);
  });

  it('whoever is no clinician may read, and neither sign, look ahead nor end', async () => {
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.get(url()).expect(200);
    await nurse.post(url()).send(request()).expect(403);
    await nurse.post(url('/preview')).send({ body }).expect(403);
    await nurse.post('/api/clinic/individual-plans/1/end').send({ reason: 'x' }).expect(403);
    const desk = await server.signInStaff('front-desk');
    await desk.get(url()).expect(403);
  });

  it('a child that does not exist, a series of another child, a plan that does not exist', async () => {
    await clinician.get('/api/clinic/children/999999/individual-plans').expect(404);
    await sign({ seriesId: 999_999 }).expect(404);
    await clinician
      .post('/api/clinic/individual-plans/999999/end')
      .send({ reason: 'x' })
      .expect(404);
  });

  it.each<[Record<string, unknown>, string[]]>([
    [{ body: { ...body, stops: [] } }, ['body.stops']],
    [{ body: { ...body, longestHours: 5 } }, ['body.longestHours', 'body.longestHours']],
    [{ body: { ...body, longestHours: 5.1 } }, ['body.longestHours']],
    [{ body: { ...body, phrases: [{ key: 'sing-a-song' }] } }, ['body.phrases.0.key']],
    [
      { body: { ...body, phrases: [{ key: 'glucose-low-feed-and-call' }] } },
      ['body.phrases.0.glucoseMgDl'],
    ],
    [
      { body: { ...body, medicines: [{ name: ' ', way: 'after-the-test' }] } },
      ['body.medicines.0.name'],
    ],
    [{ seriesId: null, from: '2027-04-14', until: '2027-04-13' }, ['until']],
    [{ from: '2027-04-14' }, ['from']],
  ])('input that cannot be: %j', async (more, paths) => {
    expect(pathsOf(await sign(more).expect(422))).toEqual(paths);
  });

  it('a version that somebody else has passed', async () => {
    await sign().expect(200);
    const late = await sign().expect(409);
    expect(problem.parse(late.body).code).toBe('changed-meanwhile');
    await sign({ afterVersion: 1 }).expect(200);
  });
});

describe('before there is a plan', () => {
  it('the record says so and a clinician has a call', async () => {
    expect(await read()).toMatchObject({
      isMissing: true,
      neededBecause: ['diabetes'],
      versions: [],
      explains: [{ rule: 'fasting-plan.individual-plan-missing' }],
    });
    expect(await openCalls()).toContain('individual-plan');
    expect(await evening()).toContain('your child 1 as we told you on the phone');
  });
});

describe('a signed plan', () => {
  it('does not hold for an arrival at which its longest fast has passed: a clinician composes again', async () => {
    const late = {
      ...body,
      stops: [{ item: 'solid-food', nothingFrom: '22:00' }],
      lastFeedTime: null,
    };
    // From 22:00 nine hours end at 7:00, when the child arrives.
    const read = individualPlans.parse((await sign({ body: late }).expect(200)).body);
    expect(read).toMatchObject({
      isMissing: true,
      neededBecause: ['a fast that would be too long'],
      versions: [{ version: 1, isInForce: false }],
    });
    expect(await openCalls()).toContain('individual-plan');
    expect(await evening()).not.toContain('22:00');
    expect(await evening()).toContain('as we told you on the phone');
  });

  it('is kept with its signer, supersedes, ends, and each is on the access record', async () => {
    const first = individualPlans.parse((await sign().expect(200)).body);
    expect(first).toMatchObject({
      isMissing: false,
      neededBecause: [],
      versions: [{ version: 1, isInForce: true, endedSays: null }],
      explains: [{ rule: 'fasting-plan.individual', inputs: { individualVersion: 1 } }],
    });
    expect(first.versions[0]?.says).toMatch(/^Version 1, signed by Test clinician on /);
    expect(first.explains[0]?.says).toBe(
      'Plan: this child’s own, version 1, signed by Test clinician: first stop 02:00, nothing at all from 04:30; longest fast 9 h 00 min.',
    );
    const second = individualPlans.parse(
      (await sign({ afterVersion: 1, body: { ...body, longestHours: 8 } }).expect(200)).body,
    );
    expect(second.versions.map(({ version, isInForce }) => [version, isInForce])).toEqual([
      [2, true],
      [1, false],
    ]);
    for (const { id } of second.versions)
      await clinician
        .post(`/api/clinic/individual-plans/${id}/end`)
        .send({ reason: 'now without insulin' })
        .expect(200);
    expect(await read()).toMatchObject({
      isMissing: true,
      versions: [{ endedSays: 'ended: now without insulin' }, {}],
    });
    const record = (await clinician.get(`/api/clinic/children/${childId}`).expect(200)).body as {
      happenings: { says: string }[];
    };
    expect(record.happenings.map(({ says }) => says)).toEqual(
      expect.arrayContaining([
        'A plan for this child alone was signed, version 2.',
        'The child’s own plan, version 1, no longer holds: now without insulin.',
      ]),
    );
    const changes = await select<{ matter: string }>(
      server.context.db,
      `SELECT matter FROM access_records WHERE action = 'changed' AND matter = 'individual-plan'`,
    );
    expect(changes).toHaveLength(4);
  });

  it('sent twice is one version', async () => {
    const twice = request();
    await clinician.post(url()).send(twice).expect(200);
    await clinician.post(url()).send(twice).expect(200);
    expect((await read()).versions).toHaveLength(1);
  });

  it('closes the call and puts its own times into the texts, each thing with its time', async () => {
    await sign().expect(200);
    expect(await openCalls()).not.toContain('individual-plan');
    const text = await evening();
    expect(text).toContain('your child 1, food and milk: after 2:00 at night');
    expect(text).toContain('your child 1, water: after 4:30');
    expect(text).not.toContain('as we told you');
  });

  it('leads the night path: last feed, each stop, waking, the medicine with its sip', async () => {
    await sign().expect(200);
    const mother = await server.openFamilySession(household.motherId, 'household');
    const page = nextMorning.parse((await mother.get('/api/family/next-morning').expect(200)).body);
    const shown = page.steps.map(({ key, time, title }) => [
      key.replace(/-\d+$/, ''),
      time.clock,
      title,
    ]);
    expect(shown).toEqual(
      expect.arrayContaining([
        ['last-feed', '1:15', 'Wake Idris. Give milk or food one more time.'],
        ['item-stop-solid-food', '2:00', 'No more food for Idris'],
        ['stop', '4:30', 'Nothing more for Idris'],
        [
          'medicine-1',
          '6:00',
          'Levetiracetam: give it at 6:00 in the morning, with 5 mL of water at the most. Measure the water.',
        ],
      ]),
    );
    const lines = page.steps.flatMap((step) => step.lines);
    expect(lines).toContain('Check the blood sugar of Idris after waking up.');
    expect(lines.join('\n')).toContain('under 70 mg/dL? Feed Idris now.');
    expect(lines).toContain(
      'Insulin glargine: a doctor tells you about it. Give it only after that.',
    );
    expect(page.children[0]).toMatchObject({ individualPlanSays: null });
    expect(page.protocolSays).toMatch(
      /^These are Idris’s own times\. Test clinician signed them on/,
    );
  });

  it('asks and checks by the plan’s own times', async () => {
    await sign().expect(200);
    server.setNow(at('05:40'));
    const mother = await server.openFamilySession(household.motherId, 'household');
    const asked = morningQuestion.parse(
      (await mother.get('/api/family/morning-question').expect(200)).body,
    );
    expect(asked.questions[0]?.asks).toBe(
      'What did Idris eat or drink after the times on your plan?',
    );
    const tell = (answer: string, lastIntakeAt: string | null) =>
      mother.post('/api/family/fasting-checks').send({
        submissionKey: randomUUID(),
        on: morningDay,
        answers: [{ morningId: household.children[0]?.morningId, answer, lastIntakeAt }],
        deviceAt: iso('05:40'),
      });
    expect((await tell('nothing', null).expect(200)).body).toMatchObject({ kind: 'come' });
    // Water needs 2 h, its clock time is the family's, not the child's: 4:50 is long enough at 7:00.
    expect((await tell('sip', iso('04:50')).expect(200)).body).toMatchObject({ kind: 'come' });
    expect((await tell('feed', iso('02:30')).expect(200)).body).toMatchObject({
      kind: 'come-and-wait',
    });
    const kept = await select<{ explanation: { rule: string } }>(
      server.context.db,
      'SELECT explanation FROM fasting_checks ORDER BY id',
    );
    expect(kept.map(({ explanation }) => explanation.rule)).toEqual([
      'fasting-check.long-enough-at-arrival',
      'fasting-check.long-enough-at-arrival',
      'fasting-check.ready-after-arrival',
    ]);
  });

  it('with phrases that nobody signed is told by a person', async () => {
    await server.context.db.query(
      `UPDATE wordings SET signed_at = NULL, signed_by_staff_id = NULL
       WHERE message_key = 'own-plan.phrase.glucose-on-waking'`,
    );
    await sign().expect(200);
    expect(await openCalls()).toContain('individual-plan');
    const mother = await server.openFamilySession(household.motherId, 'household');
    const page = nextMorning.parse((await mother.get('/api/family/next-morning').expect(200)).body);
    const lines = page.steps.flatMap((step) => step.lines);
    expect(lines).toContain('There is more in Idris’s own plan. We call you and tell you.');
    expect(lines.join('\n')).not.toContain('blood sugar');
  });
});

describe('the look ahead', () => {
  const preview = async (more: Record<string, unknown> = {}) =>
    individualPlanPreview.parse(
      (
        await clinician
          .post(url('/preview'))
          .send({ body: { ...body, ...more } })
          .expect(200)
      ).body,
    );

  it('says line by line what the family reads, keeps nothing, and names who is called', async () => {
    await server.context.db.query(
      `UPDATE family_members SET reads_language = 'es' WHERE id = ${household.grandmotherId}`,
    );
    const shown = await preview();
    expect(shown).toMatchObject({ problems: [], on: morningDay, arrivalTime: '07:00' });
    expect(shown.languages.map(({ language, isSigned }) => [language, isSigned])).toEqual([
      ['en', true],
      ['es', false],
    ]);
    expect(shown.explains[0]?.says).toBe(
      'Plan as composed here, not signed yet: first stop 02:00, nothing at all from 04:30; longest fast 9 h 00 min.',
    );
    expect(shown.languages[0]?.lines).toContain('2:00 at night: No more food for Idris');
    expect(shown.languages[0]?.lines).toContain('4:30 at night: No more water for Idris');
    expect((await read()).versions).toEqual([]);
  });

  it('names what must be mended, of the plan and of the morning', async () => {
    expect((await preview({ longestHours: 5 })).problems[0]).toEqual({
      path: 'longestHours',
      message: 'Must be longer than 5 hours.',
    });
    // Food ends at 2:00 and the collection is at 7:30 at the latest: 5 h 15 min are too short.
    const { problems } = await preview({ longestHours: 5.25 });
    expect(problems).toEqual([
      {
        path: 'longestHours',
        message: 'The usual wait at the clinic alone would pass the longest fast.',
      },
    ]);
  });
});

it('the usual night feed that falls away is named on the path and to staff', async () => {
  await sign().expect(200);
  await inTransaction(server.context.db, (transaction) =>
    keepUsualNight(server.context.db, transaction, childId, {
      lastMealTime: '19:00',
      nightFeedTimes: ['03:30', '00:30'],
    }),
  );
  const mother = await server.openFamilySession(household.motherId, 'household');
  const page = nextMorning.parse((await mother.get('/api/family/next-morning').expect(200)).body);
  expect(page.steps.find(({ key }) => key.startsWith('night-feed'))?.title).toBe(
    'No feed at 3:30 at night. The last feed before takes its place.',
  );
  expect((await read()).explains.map(({ says }) => says)).toContain(
    'Usual night feeds that fall away: 03:30.',
  );
});
