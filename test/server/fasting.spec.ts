import { randomUUID } from 'node:crypto';
import {
  familyCalendar,
  morningOutcome,
  morningQuestion,
  nextMorning,
} from '../../shared/contracts/family-morning';
import { problem } from '../../shared/contracts/problem';
import { select } from '../../server/database/connection';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import {
  addClinic,
  addHousehold,
  at,
  iso,
  maryamAndYusuf,
  morningDay,
  type NewChild,
  type TestClinic,
  type TestHousehold,
} from '../support/mornings';

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
  server.setNow(at('05:40'));
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

type Given = { answer: string; lastIntakeAt?: string | null };

const bodyFor = (answers: readonly Given[], more: Record<string, unknown> = {}) => ({
  submissionKey: randomUUID(),
  on: morningDay,
  answers: answers.map((answer, index) => ({
    morningId: household.children[index]?.morningId,
    ...answer,
  })),
  deviceAt: new Date(server.context.clock.now()).toISOString(),
  ...more,
});

const nothing: Given = { answer: 'nothing' };

const answer = async (answers: readonly Given[], more: Record<string, unknown> = {}) =>
  morningOutcome.parse(
    (await mother.post('/api/family/fasting-checks').send(bodyFor(answers, more)).expect(200)).body,
  );

const openCalls = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY id',
    )
  ).map(({ reason }) => reason);

const count = async (table: string): Promise<number> =>
  Number(
    (await select<{ n: number }>(server.context.db, `SELECT COUNT(*) AS n FROM ${table}`))[0]?.n,
  );

describe('refused', () => {
  it('whoever has no session', async () => {
    for (const path of ['next-morning', 'morning-question', 'calendar', 'calendar.ics'])
      await server.visitor().get(`/api/family/${path}`).expect(401);
    await server
      .visitor()
      .post('/api/family/fasting-checks')
      .send(bodyFor([nothing]))
      .expect(401);
    await server.visitor().post('/api/family/morning-changes').send({}).expect(401);
  });

  it('staff, whose session is of the other side', async () => {
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.get('/api/family/next-morning').expect(401);
  });

  it('a morning of another household, and one that does not exist, with the same answer', async () => {
    const others = await addHousehold(server.context, clinic, [
      { callMe: 'Nahom', bornOn: '2025-05-05', arrivalTime: '07:45' },
    ]);
    const foreign = bodyFor([nothing], {
      answers: [{ morningId: others.children[0]?.morningId, answer: 'nothing' }],
    });
    const missing = bodyFor([nothing], { answers: [{ morningId: 999_999, answer: 'nothing' }] });
    const first = await mother.post('/api/family/fasting-checks').send(foreign).expect(404);
    const second = await mother.post('/api/family/fasting-checks').send(missing).expect(404);
    expect(first.body).toEqual(second.body);
    expect(await count('fasting_checks')).toBe(0);
  });

  it('input that cannot be, with its path', async () => {
    const errorsOf = async (body: unknown): Promise<string[]> => {
      const refused = await mother
        .post('/api/family/fasting-checks')
        .send(body as object)
        .expect(422);
      return (problem.parse(refused.body).errors ?? []).map(({ path }) => path);
    };
    expect(await errorsOf(bodyFor([nothing, nothing], { on: '2027-02-29' }))).toEqual(['on']);
    expect(await errorsOf(bodyFor([]))).toEqual(['answers']);
    expect(await errorsOf(bodyFor([nothing]))).toEqual(['answers']);
    expect(await errorsOf(bodyFor([nothing, { answer: 'perhaps' }]))).toEqual(['answers.1.answer']);
    expect(
      await errorsOf(bodyFor([nothing, { answer: 'feed', lastIntakeAt: iso('06:30') }])),
    ).toEqual(['answers.1.lastIntakeAt']);
    const twice = bodyFor([nothing, nothing]);
    twice.answers[1] = { ...nothing, morningId: household.children[0]?.morningId };
    expect(await errorsOf(twice)).toEqual(['answers.1.morningId']);
    expect(await count('fasting_checks')).toBe(0);
  });

  it('an answer before the question opens and after the arrival, saying what to do', async () => {
    server.setNow(at('05:29'));
    const early = await mother
      .post('/api/family/fasting-checks')
      .send(bodyFor([nothing, nothing]))
      .expect(409);
    expect(early.body).toMatchObject({ code: 'too-early', opensAt: iso('05:30') });
    server.setNow(at('07:15'));
    const late = await mother
      .post('/api/family/fasting-checks')
      .send(bodyFor([nothing, nothing]))
      .expect(409);
    expect(late.body).toMatchObject({ code: 'too-late', phone: '+12065550110' });
    expect(late.body.title).toContain('+12065550110');
    const change = await mother
      .post('/api/family/morning-changes')
      .send({
        kind: 'not-coming',
        submissionKey: randomUUID(),
        on: morningDay,
        deviceAt: iso('07:16'),
      })
      .expect(409);
    expect(change.body.code).toBe('too-late');
  });

  it('a language that nothing can be told in: a person calls', async () => {
    await server.context.db.query(
      `UPDATE family_members SET reads_language = 'so' WHERE id = ${household.motherId}`,
    );
    const refused = await mother.get('/api/family/next-morning').expect(409);
    expect(refused.body.code).toBe('language-by-telephone');
  });
});

describe('the next morning', () => {
  const read = async (agent = mother) =>
    nextMorning.parse((await agent.get('/api/family/next-morning').expect(200)).body);

  it('shows both children, the youngest first, each with its own stop', async () => {
    server.setNow(at('19:40', '2027-04-12'));
    const page = await read();
    expect(page.state).toBe('planned');
    expect(page.heading).toBe('Come on Tuesday, 7:00 in the morning');
    expect(page.children.map(({ callMe, face }) => [callMe, face])).toEqual([
      ['Maryam', 'baby'],
      ['Yusuf', 'toddler'],
    ]);
    expect(page.children.map(({ stopAt }) => stopAt?.at)).toEqual([iso('03:00'), iso('01:15')]);
    expect(page.suns).toEqual(['next', 'later', 'later']);
    expect(page.parts.map(({ says }) => says)[1]).toBe('Night from Monday to Tuesday');
    expect(page.draftSays).toBeNull();
    expect(page.protocolSays).toContain('version 3');
    const keys = page.steps.map(({ key }) => key.replace(/-[\d-]+$/, ''));
    expect(keys).toEqual([
      'supper',
      'last-food',
      'stop',
      'last-feed',
      'stop',
      'answer',
      'wake',
      'leave',
      'arrive',
      'eat-again',
      'eat-again',
    ]);
    const times = page.steps.map(({ time }) => time.at);
    expect(times).toEqual([...times].sort());
  });

  it('says that its words are a draft as soon as one of them is not signed off', async () => {
    const { db } = server.context;
    await db.query("UPDATE wordings SET signed_at = NULL WHERE message_key = 'sheet.title'");
    expect((await read()).draftSays).toBeNull();
    await db.query("UPDATE wordings SET signed_at = NULL WHERE message_key = 'step.stop.water'");
    expect((await read()).draftSays).toContain('draft');
  });

  it('draws each lane: full until the stop, empty after it, full again at the end', async () => {
    const [maryam, yusuf] = household.children;
    const { steps } = await read();
    const lane = (childId?: number) =>
      steps.map(({ mouths }) => mouths.find((one) => one.childId === childId)?.mouth);
    for (const child of [maryam, yusuf]) {
      const mouths = lane(child?.childId);
      expect(mouths[0]).toBe('starts');
      expect(mouths.filter((mouth) => mouth === 'ends')).toHaveLength(1);
      expect(mouths.filter((mouth) => mouth === 'begins')).toHaveLength(1);
      const between = mouths.slice(mouths.indexOf('ends') + 1, mouths.indexOf('begins'));
      expect(new Set(between)).toEqual(new Set(['empty']));
    }
  });

  it('says nothing relative but the sentences of the moment, each with its instant', async () => {
    const page = await read();
    const moments = page.moments.map(({ from, says }) => [from, says]);
    expect(moments).toContainEqual([
      iso('01:15'),
      'Nothing more for Yusuf. Maryam may eat and drink until 3:00 at night.',
    ]);
    expect(moments).toContainEqual([
      iso('03:00'),
      'Nothing to eat or drink for Maryam and Yusuf. Not even water.',
    ]);
    const { moments: _left, ...rest } = page;
    expect(JSON.stringify(rest)).not.toMatch(/tomorrow|tonight|yesterday/i);
  });

  it('gives no hours to a child with an individual plan', async () => {
    const individual: NewChild = {
      callMe: 'Samira',
      bornOn: '2025-01-10',
      arrivalTime: '07:30',
      cautions: ['diabetes'],
    };
    const other = await addHousehold(server.context, clinic, [individual]);
    const page = await read(await server.openFamilySession(other.motherId, 'household'));
    const [child] = page.children;
    expect(child?.stopAt).toBeNull();
    expect(child?.individualPlanSays).toContain('We call you');
    expect(page.steps.some(({ key }) => key.startsWith('stop'))).toBe(false);
    expect(page.steps.every(({ mouths }) => mouths.every(({ mouth }) => mouth === 'none'))).toBe(
      true,
    );
  });

  it('moves on two hours after the last arrival, and ends when all is done', async () => {
    server.setNow(at('09:14'));
    expect((await read()).on).toBe(morningDay);
    server.setNow(at('09:15'));
    expect((await read()).on).toBe('2027-04-14');
    await server.context.db.query("UPDATE mornings SET state = 'collected'");
    server.setNow(at('12:00', '2027-04-15'));
    const page = await read();
    expect([page.state, page.suns]).toEqual(['finished', ['done', 'done', 'done']]);
  });

  it('shows a helper only the mornings given to her, and names who brings the children', async () => {
    const grandmother = await server.openFamilySession(household.grandmotherId, 'household');
    expect((await read()).whoBrings).toEqual([
      'At night: you.',
      'In the morning: Halima Nuur, grandmother.',
    ]);
    await server.context.db.query(
      "UPDATE mornings SET escort_family_member_id = NULL WHERE planned_on = '2027-04-13'",
    );
    expect((await read(grandmother)).on).toBe('2027-04-14');
  });

  it('is one row a minute on the access record, with both children', async () => {
    await read();
    await read();
    const rows = await select<{ n: number }>(
      server.context.db,
      `SELECT COUNT(*) AS n FROM access_records JOIN access_record_children ON access_record_id = access_records.id
       WHERE matter = 'next-morning' GROUP BY access_records.id`,
    );
    expect(rows.map(({ n }) => Number(n))).toEqual([2]);
  });
});

describe('the question', () => {
  const read = async () =>
    morningQuestion.parse((await mother.get('/api/family/morning-question').expect(200)).body);

  it('asks for each child after its own time, with labelled instants up to now', async () => {
    const question = await read();
    expect(question.state).toBe('open');
    expect(question.questions.map(({ asks }) => asks)).toEqual([
      'What did Maryam eat or drink after 3:00 at night?',
      'What did Yusuf eat or drink after 1:15 at night?',
    ]);
    const [first] = question.questions;
    expect(first?.choices.map(({ answer: kind }) => kind)).toEqual([
      'nothing',
      'sip',
      'feed',
      'unsure',
    ]);
    const instants = (first?.whenChoices ?? []).flatMap(({ at: time }) =>
      time === null ? [] : [time],
    );
    expect(instants[0]).toBe(iso('03:00'));
    expect(instants.at(-1)).toBe(iso('05:40'));
    expect(first?.whenChoices.at(-1)?.at).toBeNull();
    expect(question.saved.heading).not.toMatch(/come/i);
    expect(question.outcome).toBeNull();
  });

  it('opens by the site’s minutes before the first arrival and closes at the last', async () => {
    server.setNow(at('20:00', '2027-04-12'));
    expect((await read()).state).toBe('too-early');
    server.setNow(at('05:30'));
    expect((await read()).state).toBe('open');
    server.setNow(at('07:15'));
    expect((await read()).state).toBe('closed');
  });

  it('is not there when nothing is planned', async () => {
    await server.context.db.query("UPDATE mornings SET state = 'lost'");
    const refused = await mother.get('/api/family/morning-question').expect(404);
    expect(refused.body.code).toBe('no-question');
    await mother.get('/api/family/morning-question?on=2027-02-30').expect(422);
  });
});

describe('the answer', () => {
  it('nothing for both: come', async () => {
    const outcome = await answer([nothing, nothing]);
    expect(outcome.kind).toBe('come');
    expect(outcome.heading).toBe('Come. Be at Door B at 7:00 in the morning.');
    expect(outcome.receivedSays).toBe('We have your answer, 5:40 in the morning.');
    expect(outcome.youToldUs.map(({ says }) => says)).toEqual([
      'Maryam: nothing since 3:00 at night.',
      'Yusuf: nothing since 1:15 at night.',
    ]);
    expect(await openCalls()).toEqual([]);
  });

  it('a feed that is ready soon after the arrival: come and wait', async () => {
    const outcome = await answer([{ answer: 'feed', lastIntakeAt: iso('03:30') }, nothing]);
    expect(outcome.kind).toBe('come-and-wait');
    expect(outcome.heading).toBe(
      'Come at 7:00 in the morning. Maryam waits until 7:30 in the morning.',
    );
  });

  it('a sip while the nurse answers: call us, and the call is on the list', async () => {
    const outcome = await answer([nothing, { answer: 'sip', lastIntakeAt: iso('05:00') }]);
    expect(outcome.kind).toBe('call-us');
    expect(outcome.lines.join(' ')).toContain('A nurse answers until 8:00 in the morning.');
    expect(await openCalls()).toEqual(['call-us']);
  });

  it('before the telephone opens: a feed waits for our call, "not sure" comes', async () => {
    await server.context.db.query("UPDATE sites SET dawn_answers_from_time = '06:00'");
    const fed = await answer([nothing, { answer: 'feed' }]);
    expect([fed.kind, fed.heading]).toEqual([
      'stay-we-call',
      'Stay at home. We call you by 6:15 in the morning.',
    ]);
    expect(await openCalls()).toEqual(['stay-we-call']);
    const unsure = await answer([nothing, { answer: 'unsure' }]);
    expect(unsure.kind).toBe('come-nurse-decides');
    expect(await openCalls()).toEqual(['not-sure']);
  });

  it('a corrected answer takes the earlier call off the list again', async () => {
    await answer([nothing, { answer: 'sip' }]);
    expect(await openCalls()).toEqual(['call-us']);
    server.setNow(at('05:45'));
    const outcome = await answer([nothing, nothing]);
    expect(outcome.kind).toBe('come');
    expect(await openCalls()).toEqual([]);
    expect(await count('fasting_checks')).toBe(4);
  });

  it('sent twice, also at the same moment, is one answer and the same words', async () => {
    const body = bodyFor([nothing, { answer: 'sip' }]);
    const send = () => mother.post('/api/family/fasting-checks').send(body).expect(200);
    const [first, second] = await Promise.all([send(), send()]);
    const third = await send();
    expect(second.body).toEqual(first.body);
    expect(third.body).toEqual(first.body);
    expect(await count('fasting_checks')).toBe(2);
    expect(await openCalls()).toHaveLength(1);
  });

  it('that comes late from a phone without signal does not overwrite a newer one', async () => {
    server.setNow(at('06:10'));
    await answer([nothing, { answer: 'feed', lastIntakeAt: iso('06:00') }]);
    server.setNow(at('06:30'));
    const replayed = await answer([nothing, nothing], { deviceAt: iso('05:35') });
    expect(replayed.kind).not.toBe('come');
    expect(replayed.youToldUs[1]?.says).toContain('milk or food');
    expect(await openCalls()).toHaveLength(1);
    const rows = await select<{ device_at: Date; received_at: Date }>(
      server.context.db,
      'SELECT device_at, received_at FROM fasting_checks ORDER BY id DESC LIMIT 1',
    );
    expect(rows[0]?.device_at.toISOString()).toBe(iso('05:35'));
    expect(rows[0]?.received_at.toISOString()).toBe(iso('06:30'));
  });

  it('of a phone whose clock is wrong counts by our own', async () => {
    await answer([nothing, { answer: 'sip' }]);
    server.setNow(at('05:50'));
    const slow = await answer([nothing, nothing], { deviceAt: iso('01:00') });
    expect(slow.kind).toBe('come');
    server.setNow(at('05:55'));
    await answer([nothing, { answer: 'sip' }], { deviceAt: iso('09:00') });
    server.setNow(at('06:00'));
    expect((await answer([nothing, nothing])).kind).toBe('come');
  });

  it('is kept word for word, with wording versions, language and both times', async () => {
    await answer([nothing, nothing]);
    const [row] = await select<{
      said: Record<string, unknown>;
      language: string;
      family_member_id: number;
    }>(
      server.context.db,
      'SELECT said, language, family_member_id FROM fasting_checks ORDER BY id LIMIT 1',
    );
    expect(row).toMatchObject({
      language: 'en',
      family_member_id: household.motherId,
      said: {
        question: { says: 'What did Maryam eat or drink after 3:00 at night?' },
        answer: { key: 'question.choice.nothing', says: 'Nothing' },
        outcome: { kind: 'come', heading: 'Come. Be at Door B at 7:00 in the morning.' },
        wording: { 'question.asks': 1, 'outcome.come.heading': 1 },
      },
    });
  });

  it('closes the call about the missing answer and is announced', async () => {
    await server.context.db.query(
      `INSERT INTO call_tasks (open_key, reason, household_id, urgent_at, created_at)
       VALUES ('not-answered:${household.householdId}:${morningDay}', 'not-answered', ${household.householdId}, NOW(), NOW())`,
    );
    await answer([nothing, nothing]);
    expect(await openCalls()).toEqual([]);
    const changes = await select<{ topic: string }>(
      server.context.db,
      "SELECT topic FROM changes WHERE topic = 'mornings'",
    );
    expect(changes).toHaveLength(2);
  });
});

describe('a change', () => {
  const tell = async (change: Record<string, unknown>, status = 200) =>
    (
      await mother
        .post('/api/family/morning-changes')
        .send({
          submissionKey: randomUUID(),
          on: morningDay,
          deviceAt: new Date(server.context.clock.now()).toISOString(),
          ...change,
        })
        .expect(status)
    ).body as unknown;

  it('ill and awake: food first; hard to wake: the emergency number, nothing by mouth', async () => {
    const awake = morningOutcome.parse(await tell({ kind: 'ill', isAwake: true }));
    expect(awake.kind).toBe('food-first');
    expect(await openCalls()).toEqual(['ill']);
    const danger = morningOutcome.parse(await tell({ kind: 'ill', isAwake: false }));
    expect([danger.kind, danger.heading]).toEqual(['emergency', 'Call 911 now.']);
    expect(danger.lines[0]).toContain('nothing by mouth');
    expect(await openCalls()).toEqual(['emergency']);
  });

  it('not coming: food first, a call about a new day, and the morning stays for a person to decide', async () => {
    const outcome = morningOutcome.parse(await tell({ kind: 'not-coming' }));
    expect(outcome.kind).toBe('not-coming');
    expect(await openCalls()).toEqual(['not-coming']);
    const states = await select<{ state: string }>(
      server.context.db,
      'SELECT DISTINCT state FROM mornings',
    );
    expect(states).toEqual([{ state: 'planned' }]);
  });

  it('a little late: the new time is noted for every child, twice sent or once', async () => {
    const submissionKey = randomUUID();
    const change = { kind: 'late', newArrivalAt: iso('07:30'), submissionKey };
    const outcome = morningOutcome.parse(await tell(change));
    await tell(change);
    expect(outcome.kind).toBe('late-noted');
    const rows = await select<{ expected_at: Date; version: number }>(
      server.context.db,
      'SELECT expected_at, version FROM mornings WHERE planned_on = :on ORDER BY id',
      { on: morningDay },
    );
    expect(rows.map(({ expected_at }) => expected_at.toISOString())).toEqual([
      iso('07:30'),
      iso('07:45'),
    ]);
    expect(rows.map(({ version }) => version)).toEqual([2, 2]);
    expect(outcome.canChangeUntil).toBe(iso('07:45'));
  });

  it('so late that the longest fast would pass: feed now', async () => {
    const infant: NewChild = {
      callMe: 'Nahom',
      bornOn: '2026-12-20',
      arrivalTime: '07:00',
      feeding: 'breast',
    };
    household = await addHousehold(server.context, clinic, [infant]);
    mother = await server.openFamilySession(household.motherId, 'household');
    const outcome = morningOutcome.parse(await tell({ kind: 'late', newArrivalAt: iso('09:00') }));
    expect(outcome.kind).toBe('feed-now-and-call');
    expect(outcome.heading).toContain('Feed Nahom now');
    // This household was made at dawn: no evening text has told it anything.
    expect(await openCalls()).toEqual(['feed-now-and-call', 'evening-too-late']);
  });

  it('a new time that is none', async () => {
    for (const newArrivalAt of [
      iso('06:00'),
      iso('05:00'),
      iso('12:00'),
      iso('07:00', '2027-04-14'),
    ])
      expect(await tell({ kind: 'late', newArrivalAt }, 422)).toMatchObject({
        errors: [{ path: 'newArrivalAt' }],
      });
    await tell({ kind: 'sleepy' }, 422);
  });
});

describe('the calendar', () => {
  it('lists every morning and downloads one neutral entry a day', async () => {
    const page = familyCalendar.parse((await mother.get('/api/family/calendar').expect(200)).body);
    expect(page.mornings).toHaveLength(6);
    const file = await mother.get('/api/family/calendar.ics').expect(200);
    expect(file.headers['content-type']).toContain('text/calendar');
    expect(file.text.match(/BEGIN:VEVENT/g)).toHaveLength(3);
    expect(file.text).toContain('METHOD:PUBLISH');
    expect(file.text).not.toMatch(/Maryam|Yusuf|tubercul|aspirate/i);
  });
});
