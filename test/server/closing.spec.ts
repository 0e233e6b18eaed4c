import { closing } from '../../shared/contracts/closing';
import { nextMorning } from '../../shared/contracts/family-morning';
import type { StaffRole } from '../../shared/access/rights';
import { change, inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { searchFor } from '../../server/series/search';
import { rootQuery } from '../support/database';
import { insert } from '../support/insert';
import {
  addNight,
  localInstant,
  nightOn,
  signWords,
  type NightFamily,
  type NightMember,
} from '../support/night';
import { startTestServer, type Agent, type TestServer } from '../support/server';

interface Text {
  kind: string;
  channel: string;
  state: string;
  body: string;
  due_at: Date;
  household_id: number;
  family_member_id: number;
}

let server: TestServer;
let nurse: Agent;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant(nightOn, '04:00'));
  nurse = await server.signInStaff('nurse-coordinator');
  await signWords(server);
});
afterAll(() => server.close());

const path = (on = nightOn): string => `/api/clinic/closings/${on}`;
const noVisit = 'No visit on Wednesday, 9 December. Your child may eat now.';
const snow = { reason: 'snow', says: null };
const close = async (on = nightOn, body: object = snow) =>
  closing.parse((await nurse.post(path(on)).send(body).expect(200)).body);
const look = async (on = nightOn) => closing.parse((await nurse.get(path(on)).expect(200)).body);
const family = (member: NightMember, arrivalTime = '07:00', more: object = {}) =>
  addNight(server, {
    members: [member],
    children: [{ bornOn: '2025-07-01', label: 'Big boy', arrivalTime }],
    ...more,
  });
const texts = (kind = 'clinic-closed'): Promise<Text[]> =>
  select<Text>(server.context.db, 'SELECT * FROM messages WHERE kind = :kind ORDER BY id', {
    kind,
  });
const calls = (): Promise<{ reason: string; household_id: number }[]> =>
  select(
    server.context.db,
    'SELECT reason, household_id FROM call_tasks WHERE done_at IS NULL ORDER BY id',
  );
const callsOf = async ({ householdId }: NightFamily): Promise<string[]> =>
  (await calls()).filter((call) => call.household_id === householdId).map(({ reason }) => reason);
const mornings = (): Promise<
  { id: number; state: string; lost_reason: string | null; place_key: string | null }[]
> =>
  select(server.context.db, 'SELECT id, state, lost_reason, place_key FROM mornings ORDER BY id');

describe('nobody else closes a morning', () => {
  test.each<StaffRole>(['front-desk', 'language-reviewer', 'outreach-nurse', 'administrator'])(
    '%s',
    async (role) => {
      const night = await family({ texts: 'early' });
      const agent = await server.signInStaff(role);
      await agent.get(path()).expect(403);
      await agent.post(path()).send(snow).expect(403);
      expect(await mornings()).toMatchObject([{ id: night.morningIds[0], state: 'planned' }]);
    },
  );

  test('nobody without a session, and no other page', async () => {
    await server.visitor().get(path()).expect(401);
    await server.visitor().post(path()).send(snow).expect(401);
    await nurse.post(path()).set('Sec-Fetch-Site', 'cross-site').send(snow).expect(403);
  });

  test.each([
    ['a day that is past', '2026-12-08', snow, 'on'],
    ['a day that does not exist', '2026-02-30', snow, 'on'],
    ['an unknown reason', nightOn, { reason: 'fog', says: null }, 'reason'],
    ['another reason without words', nightOn, { reason: 'other', says: ' ' }, 'says'],
    ['too many words', nightOn, { reason: 'other', says: 'x'.repeat(121) }, 'says'],
  ])('%s', async (_what, on, body, field) => {
    await family({ texts: 'early' });
    const { body: answer } = await nurse.post(path(on)).send(body).expect(422);
    expect(answer.errors[0].path).toBe(field);
    expect((await mornings())[0]?.state).toBe('planned');
  });

  test('a morning of another site stays as it is', async () => {
    const other = await insert(server.context.db, 'sites', {
      ...(await select<Record<string, unknown>>(server.context.db, 'SELECT * FROM sites'))[0],
      id: null,
      clinic_weekdays: '[1,2,3,4,5]',
      dawn_languages: '["en"]',
    });
    const night = await family({ texts: 'early' });
    await change(server.context.db, 'UPDATE mornings SET site_id = :other', { other });
    await close();
    expect(await callsOf(night)).toEqual([]);
    expect((await mornings())[0]?.state).toBe('planned');
  });
});

describe('at four in the morning', () => {
  test('says before what would happen, and changes nothing by looking', async () => {
    await family({ texts: 'early' });
    await family({ texts: 'day' }, '07:45');
    const before = await look();
    expect(before).toMatchObject({
      isToday: true,
      closed: null,
      families: [
        { how: 'text', textAt: '2026-12-09T12:00:00.000Z', isClosed: false },
        { how: 'call', textAt: null, says: 'Call: no yes to texts at this hour.' },
      ],
      apart: [],
    });
    expect(before.textSays).toContain(noVisit);
    expect((await mornings()).map(({ state }) => state)).toEqual(['planned', 'planned']);
    expect(await texts()).toEqual([]);
  });

  test('who agreed to early texts gets one at once, everybody else a call', async () => {
    const early = await family({ texts: 'early' });
    const day = await family({ texts: 'day' }, '07:15');
    const none = await family({ texts: 'none' }, '07:30');
    const mail = await family({ texts: 'none', mail: true }, '07:45');
    const noReader = await family({ texts: 'early', readsHow: 'no' }, '08:00');
    const answer = await close();
    expect(answer.closed).toMatchObject({ reason: 'snow', reasonSays: 'Snow or ice' });
    const sent = await texts();
    expect(sent).toHaveLength(1);
    expect(sent[0]).toMatchObject({
      household_id: early.householdId,
      channel: 'sms',
      state: 'queued',
      due_at: new Date(localInstant(nightOn, '04:00')),
    });
    expect(sent[0]?.body).toContain(noVisit);
    expect(await callsOf(early)).toEqual(['plan-anew']);
    for (const called of [day, none, mail, noReader])
      expect(await callsOf(called)).toEqual(['clinic-closed', 'plan-anew']);
  });

  test('a language that is not signed off is a call, never another language', async () => {
    const night = await family({ texts: 'early', language: 'es' });
    expect((await look()).families[0]?.says).toContain('interpreter');
    await close();
    expect(await texts()).toEqual([]);
    expect(await callsOf(night)).toEqual(['clinic-closed', 'plan-anew']);
  });

  test('the mornings are lost through no fault of the family, and the place is free', async () => {
    await family({ texts: 'early' });
    await change(server.context.db, "UPDATE mornings SET place_key = 'one place'");
    await close();
    expect(await mornings()).toMatchObject([
      { state: 'lost', lost_reason: 'clinic closed: Snow or ice', place_key: null },
    ]);
    const closures = await select<{ closed_on: string; reason: string }>(
      server.context.db,
      'SELECT closed_on, reason FROM closures',
    );
    expect(closures).toEqual([{ closed_on: nightOn, reason: 'Snow or ice' }]);
  });

  test('what waited is taken back, and the calls that were to bring the family', async () => {
    server.setNow(localInstant('2026-12-07', '10:00'));
    const night = await family({ texts: 'early', mail: true });
    const { householdId } = night;
    await inTransaction(server.context.db, (transaction) =>
      planHouseholdMessages(server.context, transaction, { householdId, on: nightOn }),
    );
    await insert(server.context.db, 'call_tasks', {
      open_key: `not-answered:${householdId}:${nightOn}`,
      reason: 'not-answered',
      household_id: householdId,
      morning_id: night.morningIds[0],
      urgent_at: new Date(),
      created_at: new Date(),
    });
    server.setNow(localInstant(nightOn, '04:00'));
    await close();
    const rows = await select<Text>(server.context.db, 'SELECT * FROM messages');
    const waiting = rows.filter(({ state }) => state === 'queued').map(({ kind }) => kind);
    // The calendar's entry goes as well; nothing else about this morning.
    expect(waiting.sort()).toEqual(['clinic-closed', 'visit-cancelled']);
    expect(rows.some(({ state }) => state === 'withdrawn')).toBe(true);
    expect(await callsOf(night)).toEqual(['plan-anew']);
  });

  test('a second tap, or a second nurse, changes nothing and tells nobody twice', async () => {
    const night = await family({ texts: 'early' });
    await family({ texts: 'day' }, '07:30');
    const other = await server.signInStaff('clinician');
    await Promise.all([
      nurse.post(path()).send(snow).expect(200),
      nurse.post(path()).send(snow).expect(200),
      other.post(path()).send({ reason: 'courier', says: null }).expect(200),
    ]);
    await close();
    expect(await texts()).toHaveLength(1);
    expect((await calls()).map(({ reason }) => reason).sort()).toEqual([
      'clinic-closed',
      'plan-anew',
      'plan-anew',
    ]);
    const [row] = await select<{ calendar_sequence: number }>(
      server.context.db,
      'SELECT calendar_sequence FROM mornings WHERE id = :id',
      { id: night.morningIds[0] },
    );
    expect(row?.calendar_sequence).toBe(1);
    // A call that was done is not asked for again by a third tap.
    await change(server.context.db, 'UPDATE call_tasks SET open_key = NULL, done_at = NOW(3)');
    await close();
    expect(await calls()).toEqual([]);
  });

  test('whoever is planning for that day comes first and is closed too', async () => {
    const night = await family({ texts: 'early' }, '07:00', { on: '2026-12-10' });
    await change(server.context.db, 'UPDATE fasting_protocols SET signed_at = NOW(3)');
    await change(server.context.db, 'UPDATE laboratory_profiles SET signed_at = NOW(3)');
    const closingWaits = async (): Promise<boolean> =>
      (
        await rootQuery<unknown[]>(
          `SELECT 1 FROM information_schema.processlist
           WHERE info LIKE 'SELECT id FROM sites%FOR UPDATE' AND command <> 'Sleep'`,
        )
      ).length > 0;
    const { closed, hasWaited } = await inTransaction(server.context.db, async (transaction) => {
      const wanted = { from: nightOn, weeks: 1, count: 1, now: server.context.clock.now() };
      const search = { siteId: night.siteId, children: [], ...wanted };
      await searchFor(server.context.db, search, transaction);
      const closed = close();
      let hasWaited = false;
      for (let look = 0; look < 300 && !hasWaited; look += 1) hasWaited = await closingWaits();
      await change(
        server.context.db,
        'UPDATE mornings SET planned_on = :on WHERE id = :id',
        { on: nightOn, id: night.morningIds[0] },
        transaction,
      );
      return { closed, hasWaited };
    });
    await closed;
    expect(hasWaited).toBe(true);
    expect((await mornings()).map(({ state }) => state)).toEqual(['lost']);
  });

  test('who is on the way, here or done stays as it is and is named for a person', async () => {
    const near = await family({ texts: 'early' }, '04:20');
    const here = await family({ texts: 'early' }, '06:00');
    const home = await family({ texts: 'early' }, '07:00');
    await change(
      server.context.db,
      "UPDATE mornings SET state = 'here', arrived_at = :at WHERE id = :id",
      { id: here.morningIds[0], at: new Date(localInstant(nightOn, '03:55')) },
    );
    const answer = await close();
    expect(answer.apart).toMatchObject([
      { morningId: near.morningIds[0], isOnTheWay: true },
      { morningId: here.morningIds[0], isOnTheWay: false },
    ]);
    expect((await mornings()).map(({ state }) => state)).toEqual(['planned', 'here', 'lost']);
    expect((await texts()).map((text) => text.household_id)).toEqual([home.householdId]);
    expect(await callsOf(near)).toEqual(['clinic-closed-on-the-way']);
    expect(await callsOf(here)).toEqual([]);
  });

  test('one child at the door: nothing is sent about the brother', async () => {
    const night = await addNight(server, {
      members: [{ texts: 'early' }],
      children: [
        { bornOn: '2026-06-01', label: 'Baby', arrivalTime: '07:00' },
        { bornOn: '2025-07-01', label: 'Big boy', arrivalTime: '08:00' },
      ],
    });
    await change(server.context.db, "UPDATE mornings SET state = 'collected' WHERE id = :id", {
      id: night.morningIds[0],
    });
    const answer = await close();
    expect(answer.families).toEqual([]);
    expect(answer.apart).toHaveLength(2);
    expect(await texts()).toEqual([]);
  });

  test('brothers and sisters: one text, each child planned anew', async () => {
    const night = await addNight(server, {
      members: [{ texts: 'early' }],
      children: [
        { bornOn: '2026-06-01', label: 'Baby', arrivalTime: '07:00' },
        { bornOn: '2025-07-01', label: 'Big boy', arrivalTime: '07:15' },
      ],
    });
    await close();
    expect(await texts()).toHaveLength(1);
    expect(await callsOf(night)).toEqual(['plan-anew', 'plan-anew']);
  });

  test('is on the access record with every child, why and by whom', async () => {
    const night = await family({ texts: 'early' });
    await close(nightOn, { reason: 'other', says: 'Burst pipe' });
    const [row] = await select<{ actor_name: string; detail: { reason: string }; child: number }>(
      server.context.db,
      `SELECT actor_name, detail, child_id AS child FROM access_records
       JOIN access_record_children ON access_record_id = id WHERE matter = 'morning-closed'`,
    );
    expect(row).toMatchObject({
      actor_name: 'Test nurse-coordinator',
      detail: { reason: 'Burst pipe', on: nightOn },
      child: night.childIds[0],
    });
  });
});

describe('on another day', () => {
  test('the evening before: a text with the day, at once', async () => {
    server.setNow(localInstant('2026-12-08', '17:00'));
    await family({ texts: 'day' });
    await close();
    const [text] = await texts();
    expect(text?.body).toContain('There is no visit on Wednesday');
    expect(text?.due_at.getTime()).toBe(localInstant('2026-12-08', '17:00'));
  });

  test('late in the evening before nobody is texted: who fasts from this night on is called', async () => {
    server.setNow(localInstant('2026-12-08', '22:00'));
    const night = await family({ texts: 'early' });
    await close();
    expect(await texts()).toEqual([]);
    expect(await callsOf(night)).toEqual(['visit-cancelled', 'plan-anew']);
  });

  test('days ahead a text waits for the end of the quiet hours', async () => {
    server.setNow(localInstant('2026-12-04', '23:00'));
    await family({ texts: 'early' });
    expect((await look()).families[0]).toMatchObject({ how: 'text' });
    await close();
    expect((await texts())[0]?.due_at.getTime()).toBe(localInstant('2026-12-05', '08:00'));
  });
});

describe('the family’s page', () => {
  test('says that there is no visit, and that the child may eat', async () => {
    const night = await family({ texts: 'early' });
    const phone = await server.openFamilySession(night.memberIds[0] ?? 0, 'household');
    await close();
    const page = nextMorning.parse((await phone.get('/api/family/next-morning').expect(200)).body);
    expect(page.heading).toBe(noVisit);
    expect(page.subheading).toContain('We call you about a new day.');
    const { body } = await phone.get('/api/family/morning-question').expect(404);
    expect(body.title).toBe(noVisit);
  });

  test('says so above the morning of tomorrow, and is silent the day after', async () => {
    const night = await family({ texts: 'early' });
    await change(
      server.context.db,
      `INSERT INTO mornings (series_id, child_id, site_id, number, planned_on, arrival_time, arrival_at, room_id,
         calendar_uid)
       SELECT series_id, child_id, site_id, 2, '2026-12-10', arrival_time, :arrivalAt, room_id, 'two@example.org'
       FROM mornings`,
      { arrivalAt: new Date(localInstant('2026-12-10', '07:00')) },
    );
    const phone = await server.openFamilySession(night.memberIds[0] ?? 0, 'household');
    const page = async () =>
      nextMorning.parse((await phone.get('/api/family/next-morning').expect(200)).body);
    await close();
    expect(await page()).toMatchObject({
      heading: noVisit,
      subheading: expect.stringContaining('The next visit is on Thursday'),
    });
    const { body } = await phone.get('/api/family/morning-question').expect(200);
    expect(body.stateSays).toBe(noVisit);
    server.setNow(localInstant('2026-12-10', '05:00'));
    expect((await page()).heading).not.toContain('No visit');
  });
});
