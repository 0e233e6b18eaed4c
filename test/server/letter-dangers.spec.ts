import { letterList } from '../../shared/contracts/letters';
import { select } from '../../server/database/connection';
import { insert } from '../support/insert';
import { addClinic, addHousehold, at, morningDay, type TestHousehold } from '../support/mornings';
import { staffPassword, startTestServer, type Agent, type TestServer } from '../support/server';

/** What must never reach a family before a person has told it, and who must not read it at all. */
let server: TestServer;
let nurse: Agent;
let colleague: Agent;
let clinician: Agent;
let household: TestHousehold;
let seriesId: number;
let specimenId: number;

const nextDay = '2027-04-14';
const choices = {
  medicines: 'keep-giving',
  medicinesOn: null,
  nextVisitAt: '2027-06-08T16:00:00.000Z',
  leftOut: [],
};

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  const { db } = server.context;
  server.setNow(at('12:00', nextDay));
  const clinic = await addClinic(server.context, await server.siteId());
  household = await addHousehold(server.context, clinic, [
    { callMe: 'Samira', bornOn: '2025-01-10', arrivalTime: '06:00' },
  ]);
  await db.query('UPDATE child_family_members SET sees_results = (standing = "guardian")');
  const [child] = household.children;
  if (!child) throw new Error('no child');
  seriesId = child.seriesId;
  await db.query(`UPDATE mornings SET state = 'collected' WHERE id = ${child.morningId}`);
  specimenId = await insert(db, 'specimens', {
    series_id: seriesId,
    morning_id: child.morningId,
    child_id: child.childId,
    number: 1,
    label: 'LAB-1',
    volume_ml: 6,
    collected_at: new Date(at('06:30')),
    received_at: new Date(at('08:30')),
  });
  nurse = await server.signInStaff('nurse-coordinator');
  colleague = await server.signInStaff('nurse-coordinator');
  clinician = await server.signInStaff('clinician');
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const enter = async (body: object): Promise<void> => {
  await nurse
    .post(`/api/clinic/specimens/${specimenId}/results`)
    .send({ reportedOn: morningDay, ...body })
    .expect(200);
};

const smearNegative = { test: 'smear', value: 'negative', finality: 'preliminary' };
const detected = { test: 'amplification', value: 'detected', finality: 'preliminary' };

async function currentResults(): Promise<number[]> {
  const rows = await select<{ id: number }>(
    server.context.db,
    'SELECT id FROM results WHERE is_current = TRUE ORDER BY id',
  );
  return rows.map(({ id }) => id);
}

const sign = async (release: boolean) =>
  clinician.post(`/api/clinic/series/${seriesId}/letters`).send({
    choices,
    release,
    resultsSeen: await currentResults(),
    password: staffPassword,
  });

const openCall = async (reason: string): Promise<number> =>
  (
    await select<{ id: number }>(
      server.context.db,
      'SELECT id FROM call_tasks WHERE reason = :reason AND done_at IS NULL',
      { reason },
    )
  )[0]?.id ?? 0;

const endCall = (id: number, body: object) =>
  clinician.post(`/api/clinic/calls/${id}/outcome`).send(body).expect(200);

const letterNotices = async (): Promise<number> =>
  (
    await select(
      server.context.db,
      `SELECT id FROM messages WHERE kind = 'letter-waits'
       UNION ALL SELECT id FROM call_tasks WHERE reason = 'letter-notice-failed'`,
    )
  ).length;

it('a letter signed before a positive came is not released any more', async () => {
  await enter(smearNegative);
  const signed = await sign(false);
  expect([signed.status, signed.body.state]).toEqual([200, 'signed']);
  await enter(detected);
  const released = await clinician
    .post(`/api/clinic/letters/${signed.body.letterId}/release`)
    .send({});
  expect([released.status, released.body.code]).toEqual([409, 'results-changed']);
  expect(await letterNotices()).toBe(0);
  const mother = await server.openFamilySession(household.motherId, 'fresh');
  expect((await mother.get('/api/family/letters').expect(200)).body.letters).toEqual([]);
});

it('a letter whose results still stand is released', async () => {
  await enter(smearNegative);
  const signed = await sign(false);
  const path = `/api/clinic/letters/${signed.body.letterId}/release`;
  await clinician.post(path).send({}).expect(200);
  expect((await clinician.post(path).send({})).body.state).toBe('released');
  expect(await letterNotices()).toBe(1);
});

it('a family that was reached only at the second try has been told', async () => {
  await enter(detected);
  expect((await sign(true)).body.code).toBe('not-ready');
  await endCall(await openCall('positive-result'), { outcome: 'not-reached' });
  expect((await sign(true)).body.code).toBe('not-ready');
  await endCall(await openCall('positive-result'), { outcome: 'told', interpreter: '4471' });
  expect((await sign(true)).status).toBe(200);
});

it('a call that was found needless does not stand for the telling of a positive', async () => {
  await enter(detected);
  await endCall(await openCall('positive-result'), { outcome: 'not-needed' });
  const held = await sign(true);
  expect(held.body.errors.map((error: { path: string }) => error.path)).toContain(
    'call-about-positive',
  );
});

it('no text of a letter goes out unsigned, the headings and the lines of the mornings neither', async () => {
  await enter(smearNegative);
  for (const key of ['letter.heading.mornings', 'letter.morning.waiting']) {
    await server.context.db.query(
      'UPDATE wordings SET signed_by_staff_id = NULL, signed_at = NULL WHERE message_key = :key',
      { replacements: { key } },
    );
    const held = await sign(true);
    expect(held.body.errors.map((error: { path: string }) => error.path)).toContain(
      'wording-signed-off',
    );
    await server.context.db.query(
      "UPDATE wordings SET signed_by_staff_id = 1, signed_at = '2027-01-05' WHERE message_key = :key",
      { replacements: { key } },
    );
  }
});

it('an outreach nurse reads no results at the desk and no letter of a family that is not hers', async () => {
  await enter(smearNegative);
  const signed = await sign(true);
  const outreach = await server.signInStaff('outreach-nurse');
  await outreach.post(`/api/clinic/series/${seriesId}/letter-desk`).send({}).expect(403);
  expect(letterList.parse((await outreach.get('/api/clinic/letters')).body).letters).toEqual([]);
  await outreach.get(`/api/clinic/letters/${signed.body.letterId}.pdf`).expect(404);
  await colleague.get(`/api/clinic/letters/${signed.body.letterId}.pdf`).expect(200);
});

it('an outreach nurse sees and checks only the mornings of her own families', async () => {
  const morningId = household.children[0]?.morningIds[1] ?? 0;
  const outreach = await server.signInStaff('outreach-nurse');
  const sheet = async () => (await outreach.get(`/api/clinic/this-morning?on=${nextDay}`)).body;
  expect((await sheet()).rows).toEqual([]);
  const check = {
    version: 1,
    lastFoodAt: null,
    lastDrinkAt: null,
    isNothingSincePlan: true,
    medicine: null,
    wokeAt: null,
    isWell: true,
    broughtBy: 'mother',
    goOnReason: null,
  };
  const path = `/api/clinic/mornings/${morningId}/door-checks`;
  expect((await outreach.post(path).send(check)).status).toBe(404);
  await insert(server.context.db, 'call_tasks', {
    open_key: 'letter-unread:1',
    reason: 'letter-unread',
    household_id: household.householdId,
    is_for_clinician: false,
    urgent_at: new Date(at('12:00', nextDay)),
    created_at: new Date(at('12:00', nextDay)),
  });
  const callId = await openCall('letter-unread');
  await outreach.post(`/api/clinic/calls/${callId}/claim`).send({}).expect(200);
  expect((await sheet()).rows).toHaveLength(1);
  expect((await outreach.post(path).send(check)).body.code).toBe('not-here-yet');
});
