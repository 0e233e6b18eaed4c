import { contactConsents } from '../../shared/contracts/contact-consents';
import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { insert } from '../support/insert';
import { addNight, localInstant, nightOn, signWords, type NightFamily } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

let server: TestServer;
let family: NightFamily;
const phone = '+12065550150';
const path = (id = family.memberIds[0]): string => `/api/clinic/family-members/${id}/consents`;
const yes = {
  ...{ channel: 'sms', address: phone, visits: true, letters: true, earlyMorning: true },
  how: 'by-telephone',
};

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-08', '12:00'));
  await signWords(server);
  family = await addNight(server, { members: [{ texts: 'none', phone }] });
});
afterAll(() => server.close());

const kinds = async (): Promise<string[]> =>
  (
    await select<{ kind: string }>(
      server.context.db,
      `SELECT kind FROM messages WHERE state = 'queued' ORDER BY due_at`,
    )
  ).map(({ kind }) => kind);
const plan = (): Promise<void> =>
  inTransaction(server.context.db, (transaction) =>
    planHouseholdMessages(server.context, transaction, {
      householdId: family.householdId,
      on: nightOn,
    }),
  );

describe('consents are refused', () => {
  test('without a session and with the wrong role', async () => {
    await server.visitor().get(path()).expect(401);
    await server.visitor().post(path()).send(yes).expect(401);
    const reviewer = await server.signInStaff('language-reviewer');
    await reviewer.get(path()).expect(403);
    await reviewer.post(path()).send(yes).expect(403);
  });

  test('for nobody, and for somebody of another site in the same words', async () => {
    const desk = await server.signInStaff('front-desk');
    const missing = await desk.get(path(999_999)).expect(404);
    const outreach = await server.signInStaff('outreach-nurse');
    const foreign = await outreach.get(path()).expect(404);
    expect(foreign.body).toEqual(missing.body);
    await outreach.post(path()).send(yes).expect(404);
  });

  test.each([
    ['letters without visits', { visits: false, earlyMorning: false }],
    ['early e-mails', { channel: 'mail', address: 'a@example.org' }],
    ['no way of asking', { how: 'guessed' }],
    ['no address', { address: '' }],
  ])('%s', async (_, wrong) => {
    const desk = await server.signInStaff('front-desk');
    await desk
      .post(path())
      .send({ ...yes, ...wrong })
      .expect(422);
    expect(await select(server.context.db, 'SELECT id FROM contact_consent_events')).toEqual([]);
  });

  test('a number that is not this person’s any more', async () => {
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk
      .post(path())
      .send({ ...yes, address: '+12065550151' })
      .expect(409);
    expect(body.code).toBe('another-number');
  });
});

describe('a yes', () => {
  test('is kept with number, purposes, who asked, how and in which words, and plans the night', async () => {
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk.post(path()).send(yes).expect(200);
    const now = contactConsents.parse(body);
    expect(now.ways).toEqual([
      {
        ...{ channel: 'sms', address: phone, visits: true, letters: true, earlyMorning: true },
        hasOptedOut: false,
      },
    ]);
    expect(now.history).toHaveLength(3);
    expect(now.history[0]?.says).toContain('Asked by telephone. (consent.ask.sms 1)');
    expect(now.history[0]?.by).not.toBeNull();
    expect(now.asked[0]?.saysInFamilyLanguage).toContain('May Harbor Clinic send you texts');
    expect(await kinds()).toEqual(['evening', 'morning', 'nudge']);
  });

  test('said twice is one', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    await desk.post(path()).send(yes).expect(200);
    expect(await select(server.context.db, 'SELECT id FROM contact_consent_events')).toHaveLength(
      3,
    );
  });

  test('pressed twice at once is one', async () => {
    const desk = await server.signInStaff('front-desk');
    await Promise.all([1, 2, 3].map(() => desk.post(path()).send(yes).expect(200)));
    expect(await select(server.context.db, 'SELECT id FROM contact_consent_events')).toHaveLength(
      3,
    );
    expect(await select(server.context.db, 'SELECT id FROM contact_consents')).toHaveLength(1);
  });

  test('belongs to the number: another one is asked again', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    await server.context.db.query(`UPDATE family_members SET phone = '+12065550159'`);
    await plan();
    expect(await kinds()).toEqual([]);
  });

  test('taken back works at once, and both stay in the history', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    const no = { ...yes, visits: false, letters: false, earlyMorning: false };
    const { body } = await desk.post(path()).send(no).expect(200);
    expect(contactConsents.parse(body).history).toHaveLength(6);
    expect(await kinds()).toEqual([]);
    const calls = await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL',
    );
    expect(calls.map(({ reason }) => reason)).toEqual(['nobody-to-message']);
  });

  const waits = (kind: string, callReason: string) =>
    insert(server.context.db, 'messages', {
      ...{ dedupe_key: `${kind}:1`, kind, channel: 'sms', household_id: family.householdId },
      ...{ family_member_id: family.memberIds[0], address: phone, language: 'en', body: 'Words' },
      ...{ wording_versions: '{}', call_reason: callReason, state: 'queued' },
      due_at: new Date(localInstant('2026-12-09', '08:00')),
      last_useful_at: new Date(localInstant('2026-12-11', '08:00')),
      next_try_at: new Date(localInstant('2026-12-09', '08:00')),
      created_at: new Date(server.context.clock.now()),
    });
  const callsOpen = async (): Promise<string[]> =>
    (
      await select<{ reason: string }>(
        server.context.db,
        'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY reason',
      )
    ).map(({ reason }) => reason);

  test('taken back for letters alone takes back what waits about letters, and somebody calls', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    await waits('letter-waits', 'letter-notice-failed');
    await desk
      .post(path())
      .send({ ...yes, letters: false })
      .expect(200);
    expect(await kinds()).toEqual(['evening', 'morning', 'nudge']);
    expect(await callsOpen()).toEqual(['letter-notice-failed']);
  });

  test('taken back has somebody call about what only the waiting text would have told', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    await waits('visit-cancelled', 'visit-cancelled-failed');
    const no = { ...yes, visits: false, letters: false, earlyMorning: false };
    await desk.post(path()).send(no).expect(200);
    expect(await kinds()).toEqual([]);
    expect(await callsOpen()).toEqual(['nobody-to-message', 'visit-cancelled-failed']);
  });

  test('to texts but not to early ones moves the question to the evening', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk
      .post(path())
      .send({ ...yes, earlyMorning: false })
      .expect(200);
    expect(await kinds()).toEqual(['evening']);
  });

  test('an opt-out stands beside it', async () => {
    await insert(server.context.db, 'opt_outs', {
      ...{ channel: 'sms', address: phone, said: 'Stop.' },
      since_at: new Date(server.context.clock.now()),
    });
    const desk = await server.signInStaff('front-desk');
    const { body } = await desk.post(path()).send(yes).expect(200);
    const { ways, history } = contactConsents.parse(body);
    expect(ways[0]?.hasOptedOut).toBe(true);
    expect(history.some(({ says }) => says.includes('“Stop.”'))).toBe(true);
    expect(await kinds()).toEqual([]);
  });
});

describe('the history', () => {
  test('cannot be changed by the running application', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    await expect(
      server.context.db.query(`UPDATE contact_consent_events SET event = 'withdrawn'`),
    ).rejects.toThrow(/denied/);
  });
});

describe('without a consent on file', () => {
  test('nothing is texted, unless the site uses the exemption for care texts', async () => {
    await plan();
    expect(await kinds()).toEqual([]);
    await server.context.db.query('UPDATE sites SET texts_without_consent = TRUE');
    await plan();
    // Never before 8 in the morning: that needs a yes of its own.
    expect(await kinds()).toEqual(['evening']);
    const flags = await select<{ is_without_consent: number }>(
      server.context.db,
      'SELECT is_without_consent FROM messages',
    );
    expect(flags).toEqual([{ is_without_consent: 1 }]);
  });

  test('a first no is a no too: it is kept once and nothing goes out any more', async () => {
    await server.context.db.query('UPDATE sites SET texts_without_consent = TRUE');
    await plan();
    expect(await kinds()).toEqual(['evening']);
    const desk = await server.signInStaff('front-desk');
    const no = { ...yes, visits: false, letters: false, earlyMorning: false };
    await desk.post(path()).send(no).expect(200);
    const { body } = await desk.post(path()).send(no).expect(200);
    expect(contactConsents.parse(body).history).toHaveLength(1);
    expect(await kinds()).toEqual([]);
  });

  test('a no is a no also where the site uses the exemption', async () => {
    await server.context.db.query('UPDATE sites SET texts_without_consent = TRUE');
    const desk = await server.signInStaff('front-desk');
    await desk.post(path()).send(yes).expect(200);
    const no = { ...yes, visits: false, letters: false, earlyMorning: false };
    await desk.post(path()).send(no).expect(200);
    expect(await kinds()).toEqual([]);
  });
});
