import ICAL from 'ical.js';
import { sendInvitationAnswer } from '../../shared/contracts/children';
import { messageList, wordingList } from '../../shared/contracts/messages';
import { change, inTransaction, select } from '../../server/database/connection';
import { sendCalendarEntries } from '../../server/messages/calendar-entries';
import { tellLetterWaits } from '../../server/messages/letter-waiting';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { tellVisitCancelled } from '../../server/messages/visit-cancelled';
import { loadWording } from '../../server/wording/render';
import { seedWording } from '../../server/wording/seed-wording';
import { insert } from '../support/insert';
import { addNight, localInstant, nightOn, signWords } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

interface Row {
  kind: string;
  channel: string;
  body: string;
  subject: string | null;
  state: string;
  calendar: string | null;
  calendar_method: string | null;
  due_at: Date;
}

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-07', '10:00'));
});
afterAll(() => server.close());

const rows = (): Promise<Row[]> =>
  select<Row>(server.context.db, 'SELECT * FROM messages ORDER BY id');
const reasons = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(server.context.db, 'SELECT reason FROM call_tasks ORDER BY id')
  ).map(({ reason }) => reason);

describe('an invitation', () => {
  const path = (id: number): string => `/api/clinic/family-members/${id}/invitations`;

  test('is refused to strangers, wrong roles, other sites and nobody', async () => {
    await signWords(server);
    const { memberIds } = await addNight(server);
    const [id = 0] = memberIds;
    await server.visitor().post(path(id)).expect(401);
    await (await server.signInStaff('front-desk')).post(path(id)).expect(403);
    const nurse = await server.signInStaff('nurse-coordinator');
    const missing = await nurse.post(path(999_999)).expect(404);
    const [site] = await select<Record<string, unknown>>(server.context.db, 'SELECT * FROM sites');
    const { id: _, clinic_weekdays, dawn_languages, ...columns } = site ?? {};
    const otherSite = await insert(server.context.db, 'sites', {
      ...columns,
      clinic_weekdays: JSON.stringify(clinic_weekdays),
      dawn_languages: JSON.stringify(dawn_languages),
    });
    await change(server.context.db, 'UPDATE households SET site_id = :otherSite', { otherSite });
    const foreign = await nurse.post(path(id)).expect(404);
    expect(foreign.body).toEqual(missing.body);
    await nurse.post(path(0)).expect(422);
    expect(missing.body.code).toBe('not-found');
    expect(await rows()).toEqual([]);
  });

  test('goes by text and e-mail with one link, once for two presses', async () => {
    await signWords(server);
    const { memberIds } = await addNight(server, { members: [{ texts: 'day', mail: true }] });
    const nurse = await server.signInStaff('nurse-coordinator');
    const [id = 0] = memberIds;
    const first = await nurse.post(path(id)).expect(200);
    const second = await nurse.post(path(id)).expect(200);
    expect(sendInvitationAnswer.parse(first.body)).toEqual({
      channels: ['sms', 'mail'],
      callReason: null,
    });
    expect(second.body).toEqual(first.body);
    const sent = await rows();
    expect(sent.map(({ channel }) => channel)).toEqual(['sms', 'mail']);
    const links = sent.map(({ body }) => /http\S+\/i\/[\w-]+/.exec(body)?.[0]);
    expect(links[0]).toBeDefined();
    expect(links[1]).toBe(links[0]);
    for (const { body, subject } of sent)
      expect(`${subject} ${body}`).not.toMatch(/Omar|Hadi|Yusuf|tubercul|\btest\b|result/i);
  });

  test('waits for 8 in the morning', async () => {
    await signWords(server);
    server.setNow(localInstant('2026-12-07', '22:15'));
    const { memberIds } = await addNight(server, { members: [{ texts: 'early' }] });
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.post(path(memberIds[0] ?? 0)).expect(200);
    expect((await rows())[0]?.due_at).toEqual(new Date(localInstant('2026-12-08', '08:00')));
  });

  test.each([
    ['nothing is agreed to', { texts: 'none' } as const, 'invitation-failed'],
    ['the language is not built', { texts: 'day', language: 'am' } as const, 'language-not-signed'],
  ])('becomes a call when %s', async (_, member, callReason) => {
    await signWords(server);
    const { memberIds } = await addNight(server, { members: [member] });
    const nurse = await server.signInStaff('nurse-coordinator');
    const { body } = await nurse.post(path(memberIds[0] ?? 0)).expect(200);
    expect(body).toEqual({ channels: [], callReason });
    expect(await rows()).toEqual([]);
    expect(await reasons()).toEqual([callReason]);
  });
});

describe('the list of messages', () => {
  test('is refused without the right, and for a child out of reach', async () => {
    await server.visitor().get('/api/clinic/messages').expect(401);
    await (await server.signInStaff('language-reviewer')).get('/api/clinic/messages').expect(403);
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.get('/api/clinic/messages?childId=999999').expect(404);
    await nurse.get('/api/clinic/messages?childId=x').expect(422);
  });

  test('shows what went out without what opens a family page, on the access record', async () => {
    await signWords(server);
    const family = await addNight(server);
    await inTransaction(server.context.db, (transaction) =>
      planHouseholdMessages(server.context, transaction, {
        householdId: family.householdId,
        on: nightOn,
      }),
    );
    await insert(server.context.db, 'messages', {
      dedupe_key: 'code:1',
      kind: 'code',
      channel: 'sms',
      household_id: family.householdId,
      address: '+12065550150',
      language: 'en',
      wording_versions: '{}',
      body: 'Harbor Clinic: Your code is 123456.',
      due_at: new Date(server.context.clock.now() - 3_600_000),
      last_useful_at: new Date(server.context.clock.now()),
      next_try_at: new Date(server.context.clock.now() - 3_600_000),
      created_at: new Date(server.context.clock.now()),
    });
    const nurse = await server.signInStaff('front-desk');
    const { body } = await nurse
      .get(`/api/clinic/messages?childId=${family.childIds[0]}`)
      .expect(200);
    const list = messageList.parse(body);
    expect(list.messages.map(({ kind, stateSays }) => [kind, stateSays])).toEqual([
      ['nudge', 'Waits for its time.'],
      ['morning', 'Waits for its time.'],
      ['evening', 'Waits for its time.'],
      ['code', 'On its way.'],
    ]);
    expect(JSON.stringify(body)).not.toMatch(/123456|\/m\/[\w-]{10}/);
    expect(list.health).toMatchObject({ waiting: 1, isStuck: true });
    const seen = await select(
      server.context.db,
      `SELECT matter FROM access_records WHERE matter = 'messages'`,
    );
    expect(seen).toHaveLength(1);
  });
});

describe('what failed', () => {
  const failed = async (more: Record<string, unknown> = {}): Promise<number> => {
    const family = await addNight(server, { members: [{ texts: 'day', phone: '+12065550150' }] });
    const at = server.context.clock.now();
    return insert(server.context.db, 'messages', {
      ...{ dedupe_key: `evening:${Math.random()}`, kind: 'evening', channel: 'sms' },
      ...{ household_id: family.householdId, family_member_id: family.memberIds[0] },
      ...{ address: '+12065550150', language: 'en', wording_versions: '{}', body: 'Visit.' },
      ...{ due_at: new Date(at - 60_000), next_try_at: new Date(at), created_at: new Date(at) },
      ...{ last_useful_at: new Date(at + 3_600_000), state: 'failed', failure_code: '30005' },
      ...{ failure_says: 'This number is unknown or no longer in use.', ended_at: new Date(at) },
      ...more,
    });
  };
  const retry = (id: number): string => `/api/clinic/messages/${id}/retries`;

  test('is not sent again by strangers, wrong roles, other sites', async () => {
    const id = await failed();
    await server.visitor().post(retry(id)).expect(401);
    await (await server.signInStaff('language-reviewer')).post(retry(id)).expect(403);
    await (await server.signInStaff('outreach-nurse')).post(retry(id)).expect(404);
    await (await server.signInStaff('front-desk')).post(retry(999_999)).expect(404);
  });

  test('is told in plain words, with the time, the cost and the child', async () => {
    const id = await failed();
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk.get('/api/clinic/messages?show=failed').expect(200);
    const list = messageList.parse(body);
    expect(list.total).toBe(1);
    expect(list.messages[0]).toMatchObject({
      ...{ id, kindSays: 'Evening text', segments: 1, mayRetry: true },
      stateSays: 'It did not arrive. This number is unknown or no longer in use.',
      failedAt: new Date(server.context.clock.now()).toISOString(),
    });
    expect(list.messages[0]?.childId).not.toBeNull();
    expect(list.health).toMatchObject({ failures: 1, isStuck: false });
    expect(list.health.says).toContain('1 message did not arrive in the last day');
    for (const query of ['show=waiting', 'show=sent', 'channel=mail'])
      expect((await desk.get(`/api/clinic/messages?${query}`)).body.messages).toEqual([]);
    await desk.get('/api/clinic/messages?show=lost').expect(422);
  });

  test('about a letter goes only to who agreed to hear of letters', async () => {
    const id = await failed({ kind: 'letter-waits' });
    await server.context.db.query('UPDATE contact_consents SET covers_letters = FALSE');
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk.post(retry(id)).expect(409);
    expect(body.code).toBe('may-not-be-written');
  });

  test('is queued once for two presses', async () => {
    const id = await failed();
    const desk = await server.signInStaff('front-desk');
    await desk.post(retry(id)).expect(200);
    await desk.post(retry(id)).expect(200);
    expect((await rows()).map(({ state }) => state)).toEqual(['queued']);
    const [noted] = await select<{ matter: string }>(
      server.context.db,
      `SELECT matter FROM access_records WHERE action = 'changed' ORDER BY id DESC`,
    );
    expect(noted?.matter).toBe('messages');
  });

  test.each([
    ['what was delivered', { state: 'delivered' }, 'not-failed'],
    ['what is of no use any more', { last_useful_at: new Date(0) }, 'too-late'],
    ['to a number that is another one now', { address: '+12065550151' }, 'may-not-be-written'],
  ])('is not queued: %s', async (_, more, code) => {
    const id = await failed(more);
    const desk = await server.signInStaff('front-desk');
    expect((await desk.post(retry(id)).expect(409)).body.code).toBe(code);
  });

  test('is not queued: to who opted out, in the quiet hours, or in the place of a newer one', async () => {
    const id = await failed();
    const desk = await server.signInStaff('front-desk');
    await insert(server.context.db, 'opt_outs', {
      ...{ channel: 'sms', address: '+12065550150', said: 'STOP', since_at: new Date(0) },
    });
    expect((await desk.post(retry(id)).expect(409)).body.code).toBe('may-not-be-written');
    await change(server.context.db, 'UPDATE opt_outs SET ended_at = since_at');
    server.setNow(localInstant('2026-12-07', '21:30'));
    await change(server.context.db, 'UPDATE messages SET last_useful_at = :at', {
      at: new Date(localInstant('2026-12-07', '23:00')),
    });
    expect((await desk.post(retry(id)).expect(409)).body.code).toBe('quiet-hours');
    server.setNow(localInstant('2026-12-07', '20:00'));
    const [row] = await select<Record<string, unknown>>(
      server.context.db,
      'SELECT * FROM messages',
    );
    await insert(server.context.db, 'messages', {
      ...{ ...row, id: id + 1, dedupe_key: 'newer', state: 'sent', wording_versions: '{}' },
    });
    expect((await desk.post(retry(id)).expect(409)).body.code).toBe('replaced');
  });

  test('shows on every screen that nothing goes out, with what to do', async () => {
    await server.visitor().get('/api/clinic/outbox').expect(401);
    await (await server.signInStaff('language-reviewer')).get('/api/clinic/outbox').expect(403);
    const at = server.context.clock.now() - 600_000;
    await failed({ state: 'queued', due_at: new Date(at), next_try_at: new Date(at + 900_000) });
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk.get('/api/clinic/outbox').expect(200);
    expect(body).toMatchObject({ isStuck: true, waiting: 1 });
    expect(body.says).toBe(
      'Texts are not going out: 1 message is due, the oldest for 10 minutes. ' +
        'Call the families on the call list and tell the administrator.',
    );
  });
});

describe('calendar entries', () => {
  test('one for each morning and guardian with e-mail; the cancellation keeps the UID', async () => {
    await signWords(server);
    const { morningIds } = await addNight(server, {
      members: [
        { texts: 'early', mail: true },
        { texts: 'day', mail: true, standing: 'helper' },
      ],
    });
    const send = (method: 'REQUEST' | 'CANCEL'): Promise<void> =>
      inTransaction(server.context.db, (transaction) =>
        sendCalendarEntries(server.context, transaction, morningIds, method),
      );
    await send('REQUEST');
    await send('REQUEST');
    await change(server.context.db, 'UPDATE mornings SET calendar_sequence = 1');
    await send('CANCEL');
    const sent = await rows();
    expect(sent.map(({ calendar_method }) => calendar_method)).toEqual(['REQUEST', 'CANCEL']);
    const events = sent.map(({ calendar }) =>
      new ICAL.Component(ICAL.parse(calendar ?? '') as unknown[]).getFirstSubcomponent('vevent'),
    );
    const value = (index: number, name: string): unknown =>
      events[index]?.getFirstPropertyValue(name)?.toString();
    expect(value(0, 'uid')).toBe(value(1, 'uid'));
    expect([value(0, 'sequence'), value(1, 'sequence')]).toEqual(['0', '1']);
    expect([value(0, 'summary'), value(1, 'summary')]).toEqual(['Clinic visit', 'Clinic visit']);
    for (const { calendar, subject, body } of sent)
      expect(`${subject} ${body} ${calendar}`).not.toMatch(
        /Omar|Hadi|Yusuf|tubercul|\btest\b|result/i,
      );
  });
});

describe('no visit', () => {
  test('is told, and the night is taken back', async () => {
    await signWords(server);
    const { morningIds, householdId } = await addNight(server, {
      members: [{ texts: 'early', mail: true }],
    });
    await inTransaction(server.context.db, async (transaction) => {
      await planHouseholdMessages(server.context, transaction, { householdId, on: nightOn });
      await change(
        server.context.db,
        `UPDATE mornings SET state = 'lost', calendar_sequence = 1`,
        {},
        transaction,
      );
      await tellVisitCancelled(server.context, transaction, morningIds);
    });
    const waiting = (await rows()).filter(({ state }) => state === 'queued');
    expect(waiting.map(({ kind, channel }) => `${kind} ${channel}`)).toEqual([
      'visit-cancelled mail',
      'visit-cancelled sms',
    ]);
    expect(waiting[1]?.body).toContain('There is no visit on Wednesday, 9 December.');
  });
});

describe('no visit, shortly before it', () => {
  const lose = (morningIds: readonly number[]): Promise<void> =>
    inTransaction(server.context.db, async (transaction) => {
      await change(server.context.db, `UPDATE mornings SET state = 'lost'`, {}, transaction);
      await tellVisitCancelled(server.context, transaction, morningIds);
    });

  test('goes at once to who agreed to early texts', async () => {
    await signWords(server);
    const { morningIds } = await addNight(server, { members: [{ texts: 'early' }] });
    server.setNow(localInstant(nightOn, '04:30'));
    await lose(morningIds);
    const [row] = await rows();
    expect(row?.kind).toBe('visit-cancelled');
    expect(row?.due_at).toEqual(new Date(localInstant(nightOn, '04:30')));
    expect(await reasons()).toEqual([]);
  });

  test('is a call for the rest: after the arrival it would be of no use', async () => {
    await signWords(server);
    const { morningIds } = await addNight(server, { members: [{ texts: 'day' }] });
    server.setNow(localInstant(nightOn, '04:30'));
    await lose(morningIds);
    expect(await rows()).toEqual([]);
    expect(await reasons()).toEqual(['visit-cancelled-failed']);
  });

  test('is told by a person first to who does not read', async () => {
    await signWords(server);
    const { morningIds } = await addNight(server, {
      members: [{ texts: 'early', readsHow: 'no' }],
    });
    await lose(morningIds);
    expect(await reasons()).toContain('visit-cancelled');
    expect((await rows()).map(({ kind }) => kind)).toEqual(['visit-cancelled']);
  });
});

describe('a letter', () => {
  test('is announced without saying what it is about', async () => {
    await signWords(server);
    const { childIds, memberIds } = await addNight(server, {
      members: [{ texts: 'day', mail: true }],
    });
    const [series] = await select<{ id: number }>(server.context.db, 'SELECT id FROM series');
    const letterId = await insert(server.context.db, 'letters', {
      series_id: series?.id,
      child_id: childIds[0],
      kind: 'all-negative',
      state: 'released',
      is_final: true,
      choice: '{}',
      medicines: 'none-now',
      clinic_language: 'en',
      clinic_body: '[]',
      signed_by_staff_id: 1,
      signed_at: new Date(),
    });
    await insert(server.context.db, 'letter_recipients', {
      letter_id: letterId,
      family_member_id: memberIds[0],
      language: 'en',
      body: '[]',
    });
    await inTransaction(server.context.db, (transaction) =>
      tellLetterWaits(server.context, transaction, letterId),
    );
    const sent = await rows();
    expect(sent.map(({ kind, channel }) => `${kind} ${channel}`)).toEqual([
      'letter-waits sms',
      'letter-waits mail',
    ]);
    expect(sent[0]?.body).toBe(
      'Harbor Clinic: A letter is ready for you. Read it here: http://localhost:4300/en/letters Questions? Call 206-555-0110.',
    );
  });
});

describe('wording', () => {
  test('is listed for those who may, with its sign-off', async () => {
    await server.visitor().get('/api/clinic/wordings').expect(401);
    await (await server.signInStaff('front-desk')).get('/api/clinic/wordings').expect(403);
    await seedWording(server.context.db, { language: 'en', now: 0 });
    const reviewer = await server.signInStaff('language-reviewer');
    const { body } = await reviewer.get('/api/clinic/wordings').expect(200);
    const { wordings } = wordingList.parse(body);
    expect(wordings.length).toBeGreaterThan(300);
    expect(wordings.some(({ isSignedOff }) => isSignedOff)).toBe(false);
  });

  test('is put in once and never overwrites what the clinic has', async () => {
    const { db } = server.context;
    expect(await seedWording(db, { language: 'en', now: 0 })).toBeGreaterThan(300);
    await change(db, `UPDATE wordings SET body = 'Visit' WHERE message_key = 'calendar.title'`);
    expect(await seedWording(db, { language: 'en', now: 0 })).toBe(0);
    expect((await loadWording(db, 'en')).text('calendar.title')).toBe('Visit');
  });

  test('stays with the signed version until a newer one is signed', async () => {
    const { db } = server.context;
    await signWords(server);
    const draft = {
      message_key: 'calendar.title',
      language: 'en',
      version: 2,
      body: 'Visit to the clinic',
      source_hash: '',
      created_at: new Date(),
    };
    await insert(db, 'wordings', draft);
    const before = await loadWording(db, 'en');
    expect([before.text('calendar.title'), before.version('calendar.title')]).toEqual([
      'Clinic visit',
      1,
    ]);
    expect(before.draftNotice(['calendar.title'])).toBeNull();
    await change(db, 'UPDATE wordings SET signed_at = :now WHERE version = 2', { now: new Date() });
    const after = await loadWording(db, 'en');
    expect([after.text('calendar.title'), after.version('calendar.title')]).toEqual([
      'Visit to the clinic',
      2,
    ]);
  });

  test('a draft says that it is one', async () => {
    await seedWording(server.context.db, { language: 'en', now: 0 });
    const wording = await loadWording(server.context.db, 'en');
    expect(wording.isSignedOff(['calendar.title'])).toBe(false);
    expect(wording.draftNotice(['calendar.title'])).toContain('draft');
    await expect(loadWording(server.context.db, 'so')).rejects.toThrow('No language profile');
    await expect(loadWording(server.context.db, 'xx')).rejects.toThrow('Not a language');
  });
});
