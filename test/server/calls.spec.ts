import { callList } from '../../shared/contracts/calls';
import { inTransaction, select } from '../../server/database/connection';
import { callInstead } from '../../server/calls/call-instead';
import { closeCalls, raiseCall, type NewCall } from '../../server/calls/calls';
import { closeNeedlessCalls } from '../../server/calls/needless-calls';
import { raiseUnansweredCalls } from '../../server/calls/unanswered-calls';
import { insert } from '../support/insert';
import { addNight, localInstant, nightOn, signWords, type NightFamily } from '../support/night';
import { startTestServer, type Agent, type TestServer } from '../support/server';

let server: TestServer;
let family: NightFamily;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant(nightOn, '05:30'));
  await signWords(server);
  family = await addNight(server, { members: [{ texts: 'early', needsInterpreter: true }] });
});
afterAll(() => server.close());

const raise = (more: Partial<NewCall> = {}): Promise<boolean> =>
  inTransaction(server.context.db, (transaction) =>
    raiseCall(server.context.db, transaction, {
      reason: 'said-feed',
      openKey: 'said-feed:1',
      householdId: family.householdId,
      childId: family.childIds[0],
      morningId: family.morningIds[0],
      familyMemberId: family.memberIds[0],
      isForClinician: false,
      urgentAt: server.context.clock.now(),
      now: server.context.clock.now(),
      ...more,
    }),
  );
const onlyId = async (): Promise<number> => {
  const [row] = await select<{ id: number }>(
    server.context.db,
    'SELECT id FROM call_tasks WHERE done_at IS NULL ORDER BY id DESC LIMIT 1',
  );
  return row?.id ?? 0;
};
const done = (agent: Agent, id: number, body: object) =>
  agent.post(`/api/clinic/calls/${id}/outcome`).send(body);

describe('who may not', () => {
  test('without signing in', async () => {
    await server.visitor().get('/api/clinic/calls').expect(401);
    await server.visitor().post('/api/clinic/calls/1/claim').expect(401);
    await server
      .visitor()
      .post('/api/clinic/calls/1/outcome')
      .send({ outcome: 'told' })
      .expect(401);
  });

  test('with the wrong role', async () => {
    const agent = await server.signInStaff('language-reviewer');
    await agent.get('/api/clinic/calls').expect(403);
    await agent.post('/api/clinic/calls/1/claim').expect(403);
    await done(agent, 1, { outcome: 'told' }).expect(403);
  });

  test('for a family of another site, and for a task that is not there', async () => {
    await raise();
    const id = await onlyId();
    const agent = await server.signInStaff('nurse-coordinator');
    const other = await insert(server.context.db, 'sites', {
      ...(
        await select<Record<string, unknown>>(server.context.db, 'SELECT * FROM sites LIMIT 1')
      ).map(({ id: _, clinic_weekdays, dawn_languages, ...site }) => ({
        ...site,
        clinic_weekdays: JSON.stringify(clinic_weekdays),
        dawn_languages: JSON.stringify(dawn_languages),
      }))[0],
    });
    await server.context.db.query(`UPDATE households SET site_id = ${other}`);
    expect((await agent.get('/api/clinic/calls').expect(200)).body.open).toEqual([]);
    await agent.post(`/api/clinic/calls/${id}/claim`).expect(404);
    const foreign = await done(agent, id, { outcome: 'reached' }).expect(404);
    const missing = await done(agent, 999_999, { outcome: 'reached' }).expect(404);
    expect(foreign.body).toEqual(missing.body);
  });

  test('with an outcome that does not exist, or a number that is none', async () => {
    await raise();
    const agent = await server.signInStaff('nurse-coordinator');
    const wrong = await done(agent, await onlyId(), { outcome: 'shouted' }).expect(422);
    expect(wrong.body).toMatchObject({ code: 'invalid', errors: [{ path: 'outcome' }] });
    await done(agent, await onlyId(), { outcome: 'told', note: 'x'.repeat(501) }).expect(422);
    await agent.post('/api/clinic/calls/x/claim').expect(422);
  });

  test('an outreach nurse sees no family that she has not taken on', async () => {
    await raise();
    const agent = await server.signInStaff('outreach-nurse');
    expect((await agent.get('/api/clinic/calls').expect(200)).body.open).toEqual([]);
  });
});

describe('a call about a result', () => {
  beforeEach(() =>
    raise({
      reason: 'positive-result',
      openKey: 'positive-result:1',
      isForClinician: true,
      detail: 'Specimen 2: detected.',
    }),
  );

  test('shows the front desk neither reason nor script, and lets it close nothing', async () => {
    const agent = await server.signInStaff('front-desk');
    const { body } = await agent.get('/api/clinic/calls').expect(200);
    expect(JSON.stringify(body)).not.toMatch(/positive|germ|detected|specimen/i);
    expect(body.open[0]).toMatchObject({ reason: 'about-results', says: 'A call about results.' });
    await done(agent, await onlyId(), { outcome: 'not-needed' }).expect(403);
  });

  test('is told by a clinician alone', async () => {
    const nurse = await server.signInStaff('nurse-coordinator');
    const refused = await done(nurse, await onlyId(), {
      outcome: 'told',
      interpreter: 'Line 4711',
    });
    expect(refused.status).toBe(403);
    expect(refused.body.code).toBe('clinician-only');
    const clinician = await server.signInStaff('clinician');
    await done(clinician, await onlyId(), { outcome: 'reached' }).expect(422);
    await done(clinician, await onlyId(), { outcome: 'told', interpreter: 'Line 4711' }).expect(
      200,
    );
    const [row] = await select(server.context.db, 'SELECT outcome, interpreter FROM call_tasks');
    expect(row).toEqual({ outcome: 'told', interpreter: 'Line 4711' });
  });

  test('names its interpreter when the family needs one', async () => {
    const clinician = await server.signInStaff('clinician');
    const { body } = await done(clinician, await onlyId(), {
      outcome: 'told',
      interpreter: ' ',
    }).expect(422);
    expect(body.errors).toMatchObject([{ path: 'interpreter' }]);
  });
});

describe('the list', () => {
  test('opens a task once for each key, the earlier hour counts', async () => {
    const now = server.context.clock.now();
    expect(await raise({ urgentAt: now + 60_000 })).toBe(true);
    expect(await raise({ urgentAt: now, detail: 'A bottle at 4:00.' })).toBe(false);
    const agent = await server.signInStaff('nurse-coordinator');
    const { body } = await agent.get('/api/clinic/calls').expect(200);
    const list = callList.parse(body);
    expect(list.open).toHaveLength(1);
    expect(list.open[0]).toMatchObject({
      urgentAt: new Date(now).toISOString(),
      says: 'Amina Omar Hadi 0 told us that the child ate or drank. A bottle at 4:00.',
      childName: 'Yusuf Omar Hadi',
      familyMember: { needsInterpreter: true, relationship: 'mother' },
    });
    expect(list.open[0]?.script[0]).toContain('this is Harbor Clinic');
  });

  test('says the plan where the family has to hear it', async () => {
    await raise({ reason: 'language-not-signed', openKey: 'language-not-signed:1' });
    const agent = await server.signInStaff('front-desk');
    const { body } = await agent.get('/api/clinic/calls').expect(200);
    expect(body.open[0].script).toEqual(
      expect.arrayContaining([
        'You come on Wednesday, 9 December, 7:00 in the morning, Door B.',
        'Yusuf: nothing to eat or drink after Wednesday, 9 December, 1:00 at night.',
      ]),
    );
  });

  test('is on the access record, once a view', async () => {
    await raise();
    const agent = await server.signInStaff('nurse-coordinator');
    await agent.get('/api/clinic/calls').expect(200);
    const rows = await select(
      server.context.db,
      `SELECT child_id FROM access_record_children JOIN access_records record ON record.id = access_record_id
       WHERE record.matter = 'calls' AND record.action = 'seen'`,
    );
    expect(rows).toEqual([{ child_id: family.childIds[0] }]);
  });

  test('keeps two people from calling the same family', async () => {
    await raise();
    const id = await onlyId();
    const first = await server.signInStaff('nurse-coordinator');
    const second = await server.signInStaff('front-desk');
    const { body } = await first.post(`/api/clinic/calls/${id}/claim`).expect(200);
    expect(body.open[0].claimedBy).toBe('Test nurse-coordinator');
    await first.post(`/api/clinic/calls/${id}/claim`).expect(200);
    const refused = await second.post(`/api/clinic/calls/${id}/claim`).expect(409);
    expect(refused.body.code).toBe('claimed-by-another');
  });

  test('keeps a family that was not reached, and each try', async () => {
    await raise();
    const agent = await server.signInStaff('nurse-coordinator');
    const { body } = await done(agent, await onlyId(), { outcome: 'not-reached' }).expect(200);
    expect(body.open).toHaveLength(1);
    expect(body.done).toMatchObject([{ outcome: 'not-reached' }]);
    // An hour and a half before the arrival there is no time for another hour of the day.
    expect(body.open[0].urgentAt).toBe(new Date(localInstant(nightOn, '05:40')).toISOString());
  });

  test('answers the same outcome twice like the first, and another one with a conflict', async () => {
    await raise();
    const id = await onlyId();
    const agent = await server.signInStaff('nurse-coordinator');
    await done(agent, id, { outcome: 'reached' }).expect(200);
    await done(agent, id, { outcome: 'reached' }).expect(200);
    const conflict = await done(agent, id, { outcome: 'not-needed' }).expect(409);
    expect(conflict.body.code).toBe('already-done');
  });

  test('closes what has become needless', async () => {
    await raise();
    const close = (): Promise<number> =>
      inTransaction(server.context.db, (transaction) =>
        closeCalls(server.context.db, transaction, ['said-feed:1'], {
          now: server.context.clock.now(),
        }),
      );
    expect(await close()).toBe(1);
    expect(await close()).toBe(0);
    const agent = await server.signInStaff('nurse-coordinator');
    const { body } = await agent.get('/api/clinic/calls').expect(200);
    expect(body.done).toMatchObject([{ outcome: 'not-needed', doneBy: 'The system' }]);
  });
});

describe('mornings without an answer', () => {
  const open = (): Promise<{ reason: string }[]> =>
    select(server.context.db, 'SELECT reason FROM call_tasks WHERE open_key IS NOT NULL');

  test('are called from the set time before the arrival, once', async () => {
    server.setNow(localInstant(nightOn, '05:59'));
    expect(await raiseUnansweredCalls(server.context)).toBe(0);
    server.setNow(localInstant(nightOn, '06:00'));
    expect(await raiseUnansweredCalls(server.context)).toBe(1);
    expect(await raiseUnansweredCalls(server.context)).toBe(0);
    expect(await open()).toEqual([{ reason: 'not-answered' }]);
  });

  test('leave the list when the answer comes', async () => {
    server.setNow(localInstant(nightOn, '06:10'));
    await raiseUnansweredCalls(server.context);
    await insert(server.context.db, 'fasting_checks', {
      morning_id: family.morningIds[0],
      source: 'web',
      submission_key: 'k',
      answer: 'nothing',
      outcome: 'come',
      said: '{}',
      language: 'en',
      received_at: new Date(),
    });
    await raiseUnansweredCalls(server.context);
    expect(await open()).toEqual([]);
  });

  test('are not called again after somebody spoke with the family', async () => {
    server.setNow(localInstant(nightOn, '06:10'));
    await raiseUnansweredCalls(server.context);
    const agent = await server.signInStaff('nurse-coordinator');
    await done(agent, await onlyId(), { outcome: 'reached', note: 'Nothing since 9.' }).expect(200);
    expect(await raiseUnansweredCalls(server.context)).toBe(0);
    expect(await open()).toEqual([]);
  });
});

describe('a call that the data make needless', () => {
  const open = async (): Promise<string[]> =>
    (
      await select<{ reason: string }>(
        server.context.db,
        'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY id',
      )
    ).map(({ reason }) => reason);
  const reason = 'evening-text-failed';
  const raiseAbout = async (): Promise<NightFamily> => {
    server.setNow(localInstant('2026-12-08', '19:00'));
    const night = await addNight(server);
    await inTransaction(server.context.db, (transaction) =>
      callInstead(server.context)(transaction, {
        ...{ id: 1, callReason: reason, householdId: night.householdId, morningOn: nightOn },
        familyMemberId: night.memberIds[0] ?? null,
      }),
    );
    return night;
  };

  test('knows its child and morning, and stays while nothing changed', async () => {
    const { childIds, morningIds } = await raiseAbout();
    expect(await closeNeedlessCalls(server.context)).toBe(0);
    const [row] = await select<{ child_id: number; morning_id: number }>(
      server.context.db,
      `SELECT child_id, morning_id FROM call_tasks WHERE reason = '${reason}'`,
    );
    expect(row).toEqual({ child_id: childIds[0], morning_id: morningIds[0] });
  });

  test('comes off when the family has answered', async () => {
    const { morningIds } = await raiseAbout();
    await insert(server.context.db, 'fasting_checks', {
      ...{ morning_id: morningIds[0], source: 'web', submission_key: 'k', answer: 'nothing' },
      ...{ outcome: 'come', said: '{}', language: 'en', received_at: new Date() },
    });
    expect(await closeNeedlessCalls(server.context)).toBe(1);
    expect(await open()).not.toContain(reason);
  });

  test('stays when the family only runs late', async () => {
    const { morningIds } = await raiseAbout();
    await insert(server.context.db, 'fasting_checks', {
      ...{ morning_id: morningIds[0], source: 'web', submission_key: 'k', answer: 'late' },
      ...{ outcome: 'come', said: '{}', language: 'en', received_at: new Date() },
    });
    expect(await closeNeedlessCalls(server.context)).toBe(0);
  });

  test('comes off when the morning is over or was lost, not while somebody is calling', async () => {
    await raiseAbout();
    await server.context.db.query(`UPDATE mornings SET state = 'lost'`);
    await server.context.db.query('UPDATE call_tasks SET claimed_by_staff_id = 1');
    expect(await closeNeedlessCalls(server.context)).toBe(0);
    await server.context.db.query('UPDATE call_tasks SET claimed_by_staff_id = NULL');
    expect(await closeNeedlessCalls(server.context)).toBe(1);
  });
});

test('calls of one morning, person or household are found without reading every call there ever was', async () => {
  const keyOf = async (where: string): Promise<string | null | undefined> =>
    (
      await select<{ possible_keys: string | null }>(
        server.context.db,
        `EXPLAIN SELECT id FROM call_tasks WHERE ${where}`,
      )
    )[0]?.possible_keys;
  expect(await keyOf("morning_id = 1 AND reason = 'not-answered'")).toBe('call_tasks_morning');
  expect(await keyOf('family_member_id = 1 AND series_id = 1')).toBe('call_tasks_member');
  expect(await keyOf('household_id = 1 AND claimed_by_staff_id = 1')).toBe('call_tasks_household');
});
