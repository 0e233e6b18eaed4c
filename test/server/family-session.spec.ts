import request from 'supertest';
import { familySession, linkDescription } from '../../shared/contracts/family-session';
import { problem } from '../../shared/contracts/problem';
import { checkCode, codeMinutes } from '../../server/auth/codes';
import { issueHouseholdLink, issueInvitation } from '../../server/auth/links';
import { hashToken } from '../../server/auth/token-hash';
import { change, inTransaction, select } from '../../server/database/connection';
import { seedWording } from '../../server/wording/seed-wording';
import { addFamily } from '../support/family';
import { insert } from '../support/insert';
import type { TestFamily } from '../support/family';
import { signedCookie, startTestServer } from '../support/server';
import type { Agent, TestServer } from '../support/server';

const bornOn = '2025-03-14';
const hour = 3_600_000;

let server: TestServer;
let family: TestFamily;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  family = await addFamily(server.context, await server.siteId(), { bornOn });
  const { id } = await server.addStaff(['clinician']);
  const now = Date.now();
  await seedWording(server.context.db, { language: 'en', now, signedBy: { staffId: id, at: now } });
});
afterEach(async () => {
  server.setNow(null);
  await server.database.empty();
});
afterAll(() => server.close());

const db = () => server.context.db;
const invite = () =>
  inTransaction(db(), (transaction) =>
    issueInvitation(db(), transaction, server.context.settings, {
      familyMemberId: family.guardianId,
      householdId: family.householdId,
    }),
  );
const householdLink = (expiresAt: number, familyMemberId = family.guardianId) =>
  inTransaction(db(), (transaction) =>
    issueHouseholdLink(db(), transaction, server.context.settings, {
      familyMemberId,
      householdId: family.householdId,
      morningOn: '2027-04-14',
      expiresAt,
    }),
  );
const open = (agent: Agent, token: string, more: object = { bornOn }) =>
  agent.post('/api/family/links/open').send({ token, ...more });
const describeLink = async (agent: Agent, token: string) =>
  linkDescription.parse(
    (await agent.post('/api/family/links/describe').send({ token }).expect(200)).body,
  );
const codeOf = (body: unknown): string => problem.parse(body).code;
const linkRows = () => select<object>(db(), 'SELECT * FROM family_links ORDER BY id');
const calls = () =>
  select<{ reason: string; family_member_id: number }>(
    db(),
    'SELECT reason, family_member_id FROM call_tasks WHERE done_at IS NULL',
  );
/** The code of the newest message, as it would reach the telephone. */
async function sentCode(): Promise<string> {
  const [row] = await select<{ body: string }>(
    db(),
    "SELECT body FROM messages WHERE kind = 'code' ORDER BY id DESC LIMIT 1",
  );
  return /\b\d{6}\b/.exec(row?.body ?? '')?.[0] ?? '';
}
const otherThan = (code: string): string => (code === '000000' ? '000001' : '000000');

describe('refused', () => {
  it('nobody without a session, and no cookie of the other side', async () => {
    await server.visitor().get('/api/family/session').expect(401);
    const secret = server.context.settings.sessionSecret;
    for (const cookie of [
      `threedawn_family=${signedCookie('made-up', secret)}`,
      `threedawn_family=${signedCookie('made-up', 'a secret of somebody else entirely')}`,
      `threedawn_phone=${'A'.repeat(43)}`,
      'threedawn_phone=short',
    ])
      await request(server.app).get('/api/family/session').set('Cookie', cookie).expect(401);
    const staff = await server.signInStaff('clinician');
    await staff.get('/api/family/session').expect(401);
  });

  it('a family at the clinic’s door', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'fresh');
    await agent.get('/api/clinic/session').expect(401);
    await agent.get('/api/clinic/people').expect(401);
  });

  it.each([
    ['no token', {}],
    ['a short token', { token: 'abc', bornOn }],
    ['a token with a path in it', { token: '../../../etc/passwd-long-enough', bornOn }],
    ['a day that does not exist', { token: 'A'.repeat(22), bornOn: '2027-02-29' }],
    ['a number for a day', { token: 'A'.repeat(22), bornOn: 20250314 }],
  ])('%s, beside the field', async (_name, body) => {
    const answer = await server.visitor().post('/api/family/links/open').send(body).expect(422);
    expect(problem.parse(answer.body).errors?.length).toBeGreaterThan(0);
  });

  it('unknown links, without a word about anybody', async () => {
    const token = 'unknown-unknown-unknown';
    const described = await describeLink(server.visitor(), token);
    expect(described).toMatchObject({ state: 'unknown', needs: 'birth-date' });
    expect(codeOf((await open(server.visitor(), token).expect(404)).body)).toBe('link-unknown');
  });
});

describe('an invitation', () => {
  it('is described as often as one likes and never changed by it, nor by the page of the link', async () => {
    const { token, url } = await invite();
    const before = await linkRows();
    for (let times = 0; times < 3; times += 1) {
      expect(await describeLink(server.visitor(), token)).toMatchObject({
        kind: 'invitation',
        state: 'open',
        needs: 'birth-date',
      });
      const page = await request(server.app).get(new URL(url).pathname).expect(302);
      expect(page.headers['location']).toBe(`/en/i/${token}`);
      await request(server.app).head(new URL(url).pathname).expect(302);
    }
    expect(await linkRows()).toEqual(before);
    await open(server.visitor(), token).expect(200);
  });

  it('says nothing about the child or the family before the second step', async () => {
    const { token } = await invite();
    const answer = await server.visitor().post('/api/family/links/describe').send({ token });
    const says = JSON.stringify(answer.body);
    for (const secret of ['Yusuf', 'Amina', bornOn, '+12065551', '@example.org'])
      expect(says).not.toContain(secret);
  });

  it('opens once, with the birth date, under a new session id', async () => {
    const { token } = await invite();
    const agent = server.visitor();
    const answer = await open(agent, token).expect(200);
    expect(familySession.parse(answer.body)).toMatchObject({
      reach: 'household',
      standing: 'guardian',
      maySeeLetters: true,
      isRemembered: false,
      freshUntil: null,
      opens: 'next-morning',
    });
    const cookie = String(answer.headers['set-cookie']);
    expect(cookie).toContain('threedawn_family=');
    expect(cookie).toContain('Path=/api/family');
    expect(cookie).toContain('HttpOnly');
    await agent.get('/api/family/session').expect(200);
    expect(codeOf((await open(server.visitor(), token).expect(410)).body)).toBe('link-used');
    expect((await describeLink(server.visitor(), token)).state).toBe('used');
  });

  it('opens for one of many who try at once', async () => {
    const { token } = await invite();
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => open(server.visitor(), token)),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 410, 410, 410, 410, 410]);
  });

  it('locks after five wrong birth dates, also when they come at once, and a person calls', async () => {
    const { token } = await invite();
    const first = await open(server.visitor(), token, { bornOn: '2020-01-01' }).expect(422);
    expect(first.body).toMatchObject({
      code: 'birth-date-wrong',
      triesLeft: 4,
      errors: [{ path: 'bornOn' }],
    });
    const answers = await Promise.all(
      Array.from({ length: 8 }, () => open(server.visitor(), token, { bornOn: '2020-01-01' })),
    );
    expect(answers.filter(({ status }) => status === 422)).toHaveLength(3);
    expect(answers.filter(({ status }) => status === 423)).toHaveLength(5);
    expect(codeOf((await open(server.visitor(), token).expect(423)).body)).toBe('link-locked');
    expect(await calls()).toEqual([{ reason: 'link-locked', family_member_id: family.guardianId }]);
    const [row] = await select<{ tries: number }>(db(), 'SELECT tries FROM family_links');
    expect(row?.tries).toBe(5);
  });

  it('without a birth date does not open', async () => {
    const { token } = await invite();
    await open(server.visitor(), token, {}).expect(422);
    await open(server.visitor(), token, { bornOn: null }).expect(422);
  });

  it('ends after 72 hours of real time, whatever the business clock says, and with the next one', async () => {
    const { token } = await invite();
    server.setNow(Date.now() + 30 * 24 * hour);
    expect((await describeLink(server.visitor(), token)).state).toBe('open');
    await change(db(), 'UPDATE family_links SET expires_at = expires_at - INTERVAL 72 HOUR');
    expect(codeOf((await open(server.visitor(), token).expect(410)).body)).toBe('link-expired');
    const second = await invite();
    const third = await invite();
    expect((await describeLink(server.visitor(), second.token)).state).toBe('expired');
    expect((await describeLink(server.visitor(), third.token)).state).toBe('open');
  });

  it('is kept as a hash only', async () => {
    const { token } = await invite();
    const rows = JSON.stringify(await linkRows());
    expect(rows).not.toContain(token);
    expect(rows).toContain(hashToken(token));
  });
});

describe('a household link', () => {
  const expiresAt = Date.parse('2027-04-14T16:00:00.000Z');

  it('is the same for the same member and morning, and another for the next member', async () => {
    const first = await householdLink(expiresAt);
    const again = await householdLink(expiresAt + hour);
    const helpers = await householdLink(expiresAt, family.helperId);
    expect(again).toEqual(first);
    expect(helpers.token).not.toBe(first.token);
    expect(first.url).toBe(`http://localhost:4300/m/${first.token}`);
  });

  it('opens again and again until its morning is over by the business clock', async () => {
    const { token } = await householdLink(expiresAt);
    server.setNow(expiresAt - 1);
    await open(server.visitor(), token).expect(200);
    await open(server.visitor(), token).expect(200);
    server.setNow(expiresAt);
    expect(codeOf((await open(server.visitor(), token).expect(410)).body)).toBe('link-expired');
  });

  it('opens at once on the phone that was remembered, and on no other', async () => {
    const { token: invitation } = await invite();
    const phone = server.visitor();
    const answer = await open(phone, invitation, { bornOn, isRemembered: true }).expect(200);
    expect(familySession.parse(answer.body).isRemembered).toBe(true);
    expect(String(answer.headers['set-cookie'])).toMatch(
      /threedawn_phone=[\w-]{43}; Max-Age=2592000; Path=\/api\/family;.*HttpOnly/,
    );
    server.setNow(expiresAt - hour);
    const { token } = await householdLink(expiresAt);
    expect((await describeLink(phone, token)).needs).toBe('nothing');
    await open(phone, token, {}).expect(200);
    expect((await describeLink(server.visitor(), token)).needs).toBe('birth-date');
    await open(server.visitor(), token, {}).expect(422);
    // The helper's link on the guardian's phone is still the helper's.
    const helpers = await householdLink(expiresAt, family.helperId);
    expect((await describeLink(phone, helpers.token)).needs).toBe('birth-date');
  });

  it('of another household does not open with this child’s birth date', async () => {
    const others = await addFamily(server.context, await server.siteId(), { bornOn: '2024-01-02' });
    const { token } = await inTransaction(db(), (transaction) =>
      issueHouseholdLink(db(), transaction, server.context.settings, {
        familyMemberId: others.guardianId,
        householdId: others.householdId,
        morningOn: '2027-04-14',
        expiresAt: Date.now() + hour,
      }),
    );
    await open(server.visitor(), token).expect(422);
  });
});

describe('the phone', () => {
  const remembered = async (): Promise<Agent> => {
    const { token } = await invite();
    const agent = server.visitor();
    await open(agent, token, { bornOn, isRemembered: true }).expect(200);
    return agent;
  };

  it('stays known after the session, for the instructions only', async () => {
    const agent = await remembered();
    await agent.delete('/api/family/session').expect(204);
    expect(await select(db(), 'SELECT 1 FROM sessions')).toEqual([]);
    const answer = await agent.get('/api/family/session').expect(200);
    expect(familySession.parse(answer.body)).toMatchObject({
      reach: 'household',
      isRemembered: true,
    });
    expect(await select(db(), 'SELECT 1 FROM sessions')).toEqual([]);
  });

  it.each(['/api/family/phone/forget', '/api/family/session/forget'])(
    'is forgotten by %s',
    async (path) => {
      const agent = await remembered();
      const answer = await agent.post(path).expect(200);
      expect(answer.headers['clear-site-data']).toBe('"cache", "storage"');
      await agent.get('/api/family/session').expect(401);
      const rows = await select<{ ended_at: Date | null }>(
        db(),
        'SELECT ended_at FROM remembered_phones',
      );
      expect(rows.every(({ ended_at }) => ended_at !== null)).toBe(true);
      expect(await select(db(), 'SELECT 1 FROM sessions')).toEqual([]);
    },
  );

  it('is forgotten after 30 days', async () => {
    const agent = await remembered();
    await agent.delete('/api/family/session').expect(204);
    await change(db(), 'UPDATE remembered_phones SET expires_at = expires_at - INTERVAL 30 DAY');
    await agent.get('/api/family/session').expect(401);
  });
});

describe('a code', () => {
  const phoneOf = async (id: number): Promise<string> => {
    const [row] = await select<{ phone: string }>(
      db(),
      'SELECT phone FROM family_members WHERE id = :id',
      { id },
    );
    return row?.phone ?? '';
  };
  const send = (agent: Agent, body: object = { channel: 'sms' }) =>
    agent.post('/api/family/codes').send(body);
  const check = (agent: Agent, code: string, more: object = {}) =>
    agent.post('/api/family/codes/check').send({ code, ...more });

  it('opens the letters for fifteen minutes, under a new session id', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    const before = await select<{ id_hash: string }>(db(), 'SELECT id_hash FROM sessions');
    await send(agent).expect(200);
    const visitor = server.visitor();
    await send(visitor, { channel: 'sms', address: await phoneOf(family.guardianId) }).expect(200);
    const answer = await check(visitor, await sentCode(), {
      address: await phoneOf(family.guardianId),
    }).expect(200);
    const session = familySession.parse(answer.body);
    expect(session.reach).toBe('fresh');
    const minutes = (Date.parse(session.freshUntil ?? '') - Date.now()) / 60_000;
    expect(minutes).toBeGreaterThan(14);
    expect(minutes).toBeLessThanOrEqual(15);
    const after = await select<{ id_hash: string }>(db(), 'SELECT id_hash FROM sessions');
    expect(after.map(({ id_hash }) => id_hash)).not.toEqual(before.map(({ id_hash }) => id_hash));
    const closed = await visitor.post('/api/family/session/close-letters').send({}).expect(200);
    expect(familySession.parse(closed.body)).toMatchObject({
      reach: 'household',
      freshUntil: null,
    });
  });

  it('is a text of six digits without a name, useful for ten minutes, never kept readable', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await send(agent).expect(200);
    const [message] = await select<{
      body: string;
      due_at: Date;
      last_useful_at: Date;
      call_reason: string | null;
    }>(db(), 'SELECT body, due_at, last_useful_at, call_reason FROM messages');
    expect(await sentCode()).toMatch(/^\d{6}$/);
    expect(message?.body).not.toMatch(/Yusuf|Amina/);
    expect(message!.last_useful_at.getTime() - message!.due_at.getTime()).toBe(600_000);
    expect(message?.call_reason).toBeNull();
    const rows = JSON.stringify(await select(db(), 'SELECT * FROM sign_in_codes'));
    expect(rows).not.toContain(await sentCode());
  });

  it('of ten minutes is right at 10:00 and wrong at 10:01', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    const request = (code: string) => ({ code, address: null, isRemembered: false });
    const createdAt = async () =>
      (
        await select<{ created_at: Date }>(
          db(),
          'SELECT created_at FROM sign_in_codes ORDER BY id DESC LIMIT 1',
        )
      )[0]!.created_at.getTime();
    await send(agent).expect(200);
    const late = (await createdAt()) + codeMinutes * 60_000 + 1_000;
    await expect(
      checkCode(server.context, family.guardianId, request(await sentCode()), late),
    ).rejects.toMatchObject({ code: 'code-wrong' });
    await send(agent).expect(200);
    const justInTime = (await createdAt()) + codeMinutes * 60_000;
    await expect(
      checkCode(server.context, family.guardianId, request(await sentCode()), justInTime),
    ).resolves.toMatchObject({ familyMemberId: family.guardianId });
  });

  it('works once', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await send(agent).expect(200);
    const code = await sentCode();
    const answers = await Promise.all(
      [1, 2, 3].map(() => check(server.visitor(), code, { address: null })),
    );
    expect(answers.every(({ status }) => status === 422)).toBe(true);
    const phone = await phoneOf(family.guardianId);
    const right = await Promise.all(
      [1, 2, 3].map(() => check(server.visitor(), code, { address: phone })),
    );
    expect(right.map(({ status }) => status).sort()).toEqual([200, 422, 422]);
  });

  it('is worthless after five wrong tries, and the account is not locked: the next code works', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await send(agent).expect(200);
    const code = await sentCode();
    for (let tries = 0; tries < 5; tries += 1)
      expect(codeOf((await check(agent, otherThan(code)).expect(422)).body)).toBe('code-wrong');
    await check(agent, code).expect(422);
    await send(agent).expect(200);
    await check(agent, await sentCode()).expect(200);
  });

  it('ends with the next one', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await send(agent).expect(200);
    const first = await sentCode();
    await send(agent).expect(200);
    if (first !== (await sentCode())) await check(agent, first).expect(422);
    await check(agent, await sentCode()).expect(200);
  });

  it('is sent three times in a quarter of an hour at the most', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    for (let times = 0; times < 3; times += 1) await send(agent).expect(200);
    const answer = await send(agent).expect(429);
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
    expect(await select(db(), "SELECT 1 FROM messages WHERE kind = 'code'")).toHaveLength(3);
  });

  it('is asked for with the same answer whether the address is known or not', async () => {
    const known = await phoneOf(family.guardianId);
    const answers = [
      await send(server.visitor(), { channel: 'sms', address: known }),
      await send(server.visitor(), { channel: 'sms', address: '+12065559999' }),
      await send(server.visitor(), { channel: 'mail', address: 'nobody@example.org' }),
      await send(server.visitor(), { channel: 'sms', address: 'not a number' }),
    ];
    expect(new Set(answers.map(({ status, body }) => JSON.stringify([status, body]))).size).toBe(1);
    expect(await select(db(), "SELECT 1 FROM messages WHERE kind = 'code'")).toHaveLength(1);
    const wrong = [
      await check(server.visitor(), otherThan(await sentCode()), { address: known }),
      await check(server.visitor(), '123456', { address: '+12065559999' }),
    ];
    expect(new Set(wrong.map(({ status, body }) => JSON.stringify([status, body]))).size).toBe(1);
  });

  it('finds the number as people write it', async () => {
    const known = await phoneOf(family.guardianId);
    const written = `(${known.slice(2, 5)}) ${known.slice(5, 8)}-${known.slice(8)}`;
    await send(server.visitor(), { channel: 'sms', address: written }).expect(200);
    const agent = server.visitor();
    await check(agent, await sentCode(), { address: written }).expect(200);
    await agent.get('/api/family/session').expect(200);
  });

  it('needs an address from whom nobody knows', async () => {
    const answer = await send(server.visitor()).expect(422);
    expect(problem.parse(answer.body).errors).toEqual([
      { path: 'address', message: 'Give a telephone number or an e-mail address.' },
    ]);
    await check(server.visitor(), '12345').expect(422);
    await check(server.visitor(), '12 34 56').expect(422);
  });

  it('is not sent in words that nobody signed; a person calls', async () => {
    await change(db(), 'UPDATE wordings SET signed_at = NULL, signed_by_staff_id = NULL');
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await send(agent).expect(200);
    expect(await select(db(), "SELECT 1 FROM messages WHERE kind = 'code'")).toEqual([]);
    expect(await calls()).toEqual([
      { reason: 'language-not-signed', family_member_id: family.guardianId },
    ]);
  });

  it('never takes a helper to the letters', async () => {
    await change(
      db(),
      "UPDATE family_members SET phone = '+12065550177' WHERE id = :helperId",
      family as unknown as Record<string, unknown>,
    );
    const agent = server.visitor();
    await send(agent, { channel: 'sms', address: '+12065550177' }).expect(200);
    const answer = await check(agent, await sentCode(), { address: '+12065550177' }).expect(200);
    expect(familySession.parse(answer.body)).toMatchObject({
      reach: 'household',
      standing: 'helper',
      maySeeLetters: false,
      freshUntil: null,
      codeGoesTo: [],
    });
    // Not even with a session that says so.
    const forced = await server.openFamilySession(family.helperId, 'fresh');
    expect(familySession.parse((await forced.get('/api/family/session')).body).reach).toBe(
      'household',
    );
  });
});

describe('a session', () => {
  it('shows where a code would go, shortened', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    const { codeGoesTo } = familySession.parse((await agent.get('/api/family/session')).body);
    expect(codeGoesTo.map(({ channel }) => channel)).toEqual(['sms', 'mail']);
    expect(JSON.stringify(codeGoesTo)).not.toMatch(/206555|amina-\d/);
  });

  it('is no longer fresh when its fifteen minutes are over', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'fresh');
    expect(familySession.parse((await agent.get('/api/family/session')).body).reach).toBe('fresh');
    await change(db(), "UPDATE sessions SET data = JSON_SET(data, '$.family.freshUntil', :now)", {
      now: Date.now(),
    });
    expect(familySession.parse((await agent.get('/api/family/session')).body).reach).toBe(
      'household',
    );
  });

  it('ends for somebody who is no longer anybody’s guardian or helper', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'household');
    await change(db(), 'DELETE FROM child_family_members WHERE family_member_id = :guardianId', {
      guardianId: family.guardianId,
    });
    await agent.get('/api/family/session').expect(401);
  });

  it('is gone after the sign-out', async () => {
    const agent = await server.openFamilySession(family.guardianId, 'fresh');
    await agent.post('/api/family/session/sign-out').expect(204);
    expect(await select(db(), 'SELECT 1 FROM sessions')).toEqual([]);
    await agent.get('/api/family/session').expect(401);
  });

  it('opens the morning question when it is asked, until two hours after arrival', async () => {
    const arrivalAt = Date.parse('2027-04-14T14:00:00.000Z'); // 07:00 in Los Angeles
    await addMorning(arrivalAt);
    const agent = await server.openFamilySession(family.guardianId, 'household');
    const opensAt = async (now: number) => {
      server.setNow(now);
      return familySession.parse((await agent.get('/api/family/session')).body).opens;
    };
    expect(await opensAt(arrivalAt - 91 * 60_000)).toBe('next-morning');
    expect(await opensAt(arrivalAt - 90 * 60_000)).toBe('morning-question');
    expect(await opensAt(arrivalAt + 2 * hour - 1)).toBe('morning-question');
    expect(await opensAt(arrivalAt + 2 * hour)).toBe('next-morning');
  });
});

/** A planned morning of the child, with the order, protocol and room that the tables demand. */
async function addMorning(arrivalAt: number): Promise<void> {
  const siteId = await server.siteId();
  const at = new Date();
  const roomId = await insertRow('rooms', { site_id: siteId, name: 'Room 1', closure_minutes: 35 });
  const protocolId = await insertRow('fasting_protocols', {
    site_id: siteId,
    version: 1,
    title: 'Starting',
    effective_on: '2027-01-01',
    body: '{}',
    has_starting_values: true,
  });
  const profileId = await insertRow('laboratory_profiles', {
    site_id: siteId,
    version: 1,
    name: 'Laboratory',
    effective_on: '2027-01-01',
    body: '{}',
  });
  const orderId = await insertRow('orders', {
    child_id: family.childId,
    ordered_by_name: 'Test Clinician',
    answer_to: 'Test Clinic',
    reason: 'Test',
    details: '{}',
    mornings_planned: 3,
    intends_to_treat: false,
    created_by_staff_id: 1,
    created_at: at,
  });
  const seriesId = await insertRow('series', {
    child_id: family.childId,
    order_id: orderId,
    site_id: siteId,
    fasting_protocol_id: protocolId,
    laboratory_profile_id: profileId,
    mornings_planned: 3,
    created_by_staff_id: 1,
    created_at: at,
  });
  await insertRow('mornings', {
    series_id: seriesId,
    child_id: family.childId,
    site_id: siteId,
    number: 1,
    planned_on: '2027-04-14',
    arrival_time: '07:00',
    arrival_at: new Date(arrivalAt),
    room_id: roomId,
    calendar_uid: 'one@test',
  });
}
const insertRow = (table: string, row: Record<string, unknown>) => insert(db(), table, row);
