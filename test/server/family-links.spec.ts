import request from 'supertest';
import { familySession, linkDescription } from '../../shared/contracts/family-session';
import { problem } from '../../shared/contracts/problem';
import { issueHouseholdLink, issueInvitation } from '../../server/auth/links';
import { hashToken } from '../../server/auth/token-hash';
import { change, inTransaction, select } from '../../server/database/connection';
import { seedWording } from '../../server/wording/seed-wording';
import { addFamily } from '../support/family';
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

  it('unknown links, in the language of the page', async () => {
    for (const language of ['en', 'es', 'ar'] as const)
      await seedWording(server.context.db, { language, now: Date.now() });
    const token = 'unknown-unknown-unknown';
    const told = async (language: string): Promise<string> => {
      const answer = await server
        .visitor()
        .post('/api/family/links/describe')
        .set('Accept-Language', language)
        .send({ token })
        .expect(200);
      return (answer.body as { clinic: { phoneSays: string } }).clinic.phoneSays;
    };
    expect(await told('ar')).toMatch(/ممرضة/);
    expect(await told('es')).toMatch(/enfermera/);
    expect(await told('xx')).toMatch(/nurse/);
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
