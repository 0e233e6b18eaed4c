import { familySession } from '../../shared/contracts/family-session';
import { problem } from '../../shared/contracts/problem';
import { checkCode, codeMinutes } from '../../server/auth/codes';
import { change, select } from '../../server/database/connection';
import { seedWording } from '../../server/wording/seed-wording';
import { addFamily, addPlannedMorning } from '../support/family';
import type { TestFamily } from '../support/family';
import { startTestServer } from '../support/server';
import type { Agent, TestServer } from '../support/server';

const hour = 3_600_000;

let server: TestServer;
let family: TestFamily;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  family = await addFamily(server.context, await server.siteId());
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
const codeOf = (body: unknown): string => problem.parse(body).code;
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
    await addPlannedMorning(server.context, family, arrivalAt);
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
