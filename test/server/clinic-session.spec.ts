import request from 'supertest';
import { clinicSession } from '../../shared/contracts/clinic-session';
import { problem } from '../../shared/contracts/problem';
import { hashToken } from '../../server/auth/token-hash';
import { change, select } from '../../server/database/connection';
import { signedCookie, staffPassword, startTestServer } from '../support/server';
import type { Agent, TestServer } from '../support/server';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const sessions = () =>
  select<{ id_hash: string; subject_id: number | null }>(
    server.context.db,
    'SELECT id_hash, subject_id FROM sessions',
  );

const signIn = (agent: Agent, email: string, password = staffPassword) =>
  agent.post('/api/clinic/session').send({ email, password });

/** The session's id as it stands in the answer's cookie, or null. */
function sessionIdOf(headers: Record<string, unknown>): string | null {
  const cookies = (headers['set-cookie'] as string[] | undefined) ?? [];
  const cookie = cookies.find((one) => one.startsWith('threedawn_clinic=s'));
  return cookie ? (/s%3A([^.]+)\./.exec(cookie)?.[1] ?? null) : null;
}

describe('refused', () => {
  it('nobody without a session', async () => {
    const answer = await server.visitor().get('/api/clinic/session').expect(401);
    expect(problem.parse(answer.body).code).toBe('not-signed-in');
    expect(answer.headers['content-type']).toContain('application/problem+json');
  });

  it('a session that was never given, forged, or belongs to the other side', async () => {
    const { id } = await server.addStaff(['clinician']);
    const secret = server.context.settings.sessionSecret;
    for (const cookie of [
      `threedawn_clinic=${signedCookie('made-up', secret)}`,
      `threedawn_clinic=${signedCookie('made-up', 'another secret that is long enough')}`,
      'threedawn_clinic=s%3Anonsense',
      'threedawn_clinic=',
    ])
      await request(server.app).get('/api/clinic/session').set('Cookie', cookie).expect(401);
    await server.context.db.query(
      `INSERT INTO sessions (id_hash, side, subject_id, data, created_at, seen_at, expires_at)
       VALUES (:idHash, 'family', :id, :data, NOW(3), NOW(3), NOW(3) + INTERVAL 1 HOUR)`,
      {
        replacements: {
          idHash: hashToken('of-the-family'),
          id,
          data: JSON.stringify({ cookie: {}, passport: { user: id } }),
        },
      },
    );
    await request(server.app)
      .get('/api/clinic/session')
      .set('Cookie', `threedawn_clinic=${signedCookie('of-the-family', secret)}`)
      .expect(401);
  });

  it.each([
    ['neither header', {}],
    ['another site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['a sister site', { 'Sec-Fetch-Site': 'same-site' }],
    ['an address typed by hand', { 'Sec-Fetch-Site': 'none' }],
    ['another origin', { Origin: 'http://localhost:4301' }],
    [
      'another site that also names our origin',
      { 'Sec-Fetch-Site': 'cross-site', Origin: 'http://localhost:4300' },
    ],
  ])('a write from %s', async (_name, headers) => {
    const { email } = await server.addStaff(['clinician']);
    for (const method of ['post', 'put', 'patch', 'delete'] as const) {
      const answer = await request(server.app)
        [method]('/api/clinic/session')
        .set(headers)
        .send({ email, password: staffPassword })
        .expect(403);
      expect(problem.parse(answer.body).code).toBe('cross-origin');
    }
    expect(await sessions()).toEqual([]);
  });

  it('nothing from an old browser that names our origin alone', async () => {
    const { email } = await server.addStaff(['clinician']);
    await request(server.app)
      .post('/api/clinic/session')
      .set('Origin', 'http://localhost:4300')
      .send({ email, password: staffPassword })
      .expect(200);
  });

  it.each([
    ['bad JSON', '{"email":', 'application/json', 400, 'bad-json'],
    [
      'a body over 64 kB',
      `{"email":"${'a'.repeat(70_000)}"}`,
      'application/json',
      413,
      'too-large',
    ],
    [
      'a form',
      'email=a%40example.org&password=b',
      'application/x-www-form-urlencoded',
      415,
      'json-only',
    ],
    ['text', 'hello', 'text/plain', 415, 'json-only'],
    ['a bare word', '"hello"', 'application/json', 400, 'bad-json'],
    ['a list', '[]', 'application/json', 422, 'invalid'],
  ])('%s', async (_name, body, type, status, code) => {
    const answer = await server
      .visitor()
      .post('/api/clinic/session')
      .set('Content-Type', type)
      .send(body)
      .expect(status);
    expect(problem.parse(answer.body).code).toBe(code);
  });

  it('wrong shapes, each beside its field', async () => {
    const answer = await server
      .visitor()
      .post('/api/clinic/session')
      .send({ email: 'nobody', password: '' })
      .expect(422);
    expect(problem.parse(answer.body).errors?.map(({ path }) => path)).toEqual([
      'email',
      'password',
    ]);
    await server.visitor().post('/api/clinic/session').send({ email: 7, password: {} }).expect(422);
    await server.visitor().post('/api/clinic/session').expect(422);
  });

  it('one answer for an unknown e-mail, a wrong password, an account without one and an ended account', async () => {
    const known = await server.addStaff(['clinician']);
    const ended = await server.addStaff(['clinician']);
    const without = await server.addStaff(['clinician']);
    await change(server.context.db, 'UPDATE staff SET is_active = FALSE WHERE id = :id', ended);
    await change(
      server.context.db,
      'UPDATE staff SET password_hash = NULL WHERE id = :id',
      without,
    );
    const bodies: unknown[] = [];
    for (const [email, password] of [
      ['unknown@example.org', staffPassword],
      [known.email, 'a wrong one, and a long one'],
      [ended.email, staffPassword],
      [without.email, staffPassword],
    ] as const)
      bodies.push((await signIn(server.visitor(), email, password).expect(401)).body);
    expect(new Set(bodies.map((body) => JSON.stringify(body))).size).toBe(1);
    expect(await sessions()).toEqual([]);
  });

  it('the sixth try of one address on one account, with the time to wait; not another person', async () => {
    const victim = await server.addStaff(['clinician']);
    const other = await server.addStaff(['clinician']);
    for (let tries = 0; tries < 5; tries += 1)
      await signIn(server.visitor(), victim.email, 'guessed again').expect(401);
    const answer = await signIn(server.visitor(), victim.email).expect(429);
    expect(problem.parse(answer.body).code).toBe('too-many-tries');
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(800);
    expect(Number(answer.headers['retry-after'])).toBeLessThanOrEqual(900);
    await signIn(server.visitor(), other.email).expect(200);
  });

  it('many addresses guessing at one account, without locking its owner out', async () => {
    const { email } = await server.addStaff(['clinician']);
    await signIn(server.visitor(), email).expect(200);
    // What fifty other addresses would have left behind.
    await change(server.context.db, "DELETE FROM rate_limits WHERE limit_key LIKE 'sign-in-pair%'");
    await server.context.db.query(
      `INSERT INTO rate_limits (limit_key, hits, resets_at) VALUES (:key, 50, :soon)`,
      {
        replacements: {
          key: `sign-in-account:${hashToken(email).slice(0, 32)}`,
          soon: new Date(Date.now() + 600_000),
        },
      },
    );
    await signIn(server.visitor(), email).expect(200);
    await change(
      server.context.db,
      "DELETE FROM rate_limits WHERE limit_key LIKE 'sign-in-trusted%'",
    );
    await signIn(server.visitor(), email).expect(429);
  });
});

describe('a session', () => {
  it('tells who is signed in, for how long and what that allows', async () => {
    const agent = await server.signInStaff(['nurse-coordinator', 'front-desk']);
    const answer = await agent.get('/api/clinic/session').expect(200);
    const session = clinicSession.parse(answer.body);
    expect(session.staff.roles).toEqual(['front-desk', 'nurse-coordinator']);
    expect(session.staff.rights).toContain('mornings.run');
    expect(session.staff.rights).not.toContain('letters.sign');
    expect(session.site.zone).toBe('America/Los_Angeles');
    expect(answer.headers['cache-control']).toBe('no-store');
    const minutes = (Date.parse(session.endsAt) - Date.now()) / 60_000;
    expect(minutes).toBeGreaterThan(29);
    expect(minutes).toBeLessThanOrEqual(30);
  });

  it('gets a new id at sign-in, and the old one opens nothing', async () => {
    const { email } = await server.addStaff(['clinician']);
    const agent = server.visitor();
    const first = sessionIdOf((await signIn(agent, email).expect(200)).headers);
    const second = sessionIdOf((await signIn(agent, email).expect(200)).headers);
    expect(first).not.toBeNull();
    expect(second).not.toBeNull();
    expect(second).not.toBe(first);
    expect((await sessions()).map(({ id_hash }) => id_hash)).toEqual([hashToken(second!)]);
  });

  it('has a cookie for its own path that no script reads', async () => {
    const { email } = await server.addStaff(['clinician']);
    const answer = await signIn(server.visitor(), email).expect(200);
    const [cookie] = answer.headers['set-cookie'] as unknown as string[];
    expect(cookie).toMatch(/^threedawn_clinic=s%3A/);
    expect(cookie).toContain('Path=/api/clinic');
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect(cookie).not.toMatch(/Expires|Max-Age/);
  });

  it('ends with the sign-out: the row is gone and the kept cookie opens nothing', async () => {
    const { email } = await server.addStaff(['clinician']);
    const agent = server.visitor();
    const id = sessionIdOf((await signIn(agent, email).expect(200)).headers)!;
    await agent.delete('/api/clinic/session').expect(204);
    expect(await sessions()).toEqual([]);
    await request(server.app)
      .get('/api/clinic/session')
      .set('Cookie', `threedawn_clinic=${signedCookie(id, server.context.settings.sessionSecret)}`)
      .expect(401);
  });

  it('ends after half an hour without activity', async () => {
    const agent = await server.signInStaff('clinician');
    await shiftSessions(29);
    await agent.get('/api/clinic/session').expect(200);
    await shiftSessions(29);
    await agent.get('/api/clinic/session').expect(200);
    await shiftSessions(31);
    await agent.get('/api/clinic/session').expect(401);
  });

  it('is not kept alive by what a screen fetches by itself', async () => {
    const agent = await server.signInStaff('clinician');
    await shiftSessions(20);
    await agent.get('/api/clinic/session').set('Threedawn-Background', '1').expect(200);
    await shiftSessions(11);
    await agent.get('/api/clinic/session').expect(401);
  });

  it('ends after twelve hours whatever was done', async () => {
    const agent = await server.signInStaff('clinician');
    await change(
      server.context.db,
      'UPDATE sessions SET created_at = created_at - INTERVAL 719 MINUTE',
    );
    await shiftSessions(2, ['seen_at']);
    await agent.get('/api/clinic/session').expect(200);
    const [row] = await select<{ left: number }>(
      server.context.db,
      'SELECT TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(3), expires_at) AS `left` FROM sessions',
    );
    expect(row?.left).toBeLessThanOrEqual(60);
    await shiftSessions(1);
    await agent.get('/api/clinic/session').expect(401);
  });

  it('is touched at most once a minute', async () => {
    const agent = await server.signInStaff('clinician');
    const seen = () => select<{ seen_at: Date }>(server.context.db, 'SELECT seen_at FROM sessions');
    const before = await seen();
    await agent.get('/api/clinic/session').expect(200);
    expect(await seen()).toEqual(before);
  });

  it('keeps neither id nor password in the tables', async () => {
    const { email } = await server.addStaff(['clinician']);
    const id = sessionIdOf((await signIn(server.visitor(), email).expect(200)).headers)!;
    const rows = await select<object>(server.context.db, 'SELECT * FROM sessions');
    expect(JSON.stringify(rows)).not.toContain(id);
  });
});

/** Lets minutes pass for every session, as the tables see it. */
async function shiftSessions(
  minutes: number,
  columns = ['created_at', 'seen_at', 'expires_at'],
): Promise<void> {
  const sets = columns.map((name) => `${name} = ${name} - INTERVAL :minutes MINUTE`);
  await change(server.context.db, `UPDATE sessions SET ${sets.join(', ')}`, { minutes });
}
