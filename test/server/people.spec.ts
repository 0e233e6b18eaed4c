import { addStaffAnswer, clinicSession, staffList } from '../../shared/contracts/clinic-session';
import { problem } from '../../shared/contracts/problem';
import { accessRecordList } from '../../shared/contracts/set-up';
import { record } from '../../server/access-record/record';
import { change, select } from '../../server/database/connection';
import { makeFirstAdministrator, Refused } from '../../server/people/first-administrator';
import { addFamily } from '../support/family';
import { staffPassword, startTestServer } from '../support/server';
import type { Agent, TestServer } from '../support/server';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const newPerson = {
  fullName: 'Miriam Test Nurse',
  credentials: 'RN',
  email: 'Miriam@Example.org',
  roles: ['nurse-coordinator'],
};
const add = (agent: Agent, more: object = {}) =>
  agent.post('/api/clinic/people').send({ ...newPerson, ...more });
const tokenOf = (link: string): string => new URL(link).pathname.split('/').at(-1) ?? '';
const accept = (token: string, password: string) =>
  server.visitor().post('/api/clinic/staff-invitations/accept').send({ token, password });
const invited = async (): Promise<{ id: number; token: string; email: string }> => {
  const agent = await server.signInStaff('administrator');
  const { staff, invitationLink } = addStaffAnswer.parse((await add(agent).expect(200)).body);
  return { id: staff.id, token: tokenOf(invitationLink), email: staff.email };
};

describe('refused', () => {
  it('nobody signed in, and roles that may not manage people', async () => {
    await server.visitor().get('/api/clinic/people').expect(401);
    for (const role of [
      'clinician',
      'front-desk',
      'language-reviewer',
      'nurse-coordinator',
    ] as const) {
      const agent = await server.signInStaff(role);
      expect(problem.parse((await add(agent).expect(403)).body).code).toBe('not-allowed');
    }
    expect(
      await select(server.context.db, "SELECT 1 FROM staff WHERE email = 'miriam@example.org'"),
    ).toEqual([]);
  });

  it.each([
    ['no name', { fullName: ' ' }, 'fullName'],
    ['a name of 200 letters', { fullName: 'a'.repeat(200) }, 'fullName'],
    [
      'an e-mail with a second header in it',
      { email: 'a@example.org\r\nBcc: b@example.org' },
      'email',
    ],
    ['no role', { roles: [] }, 'roles'],
    ['an unknown role', { roles: ['nurse-coordinator', 'king'] }, 'roles.1'],
    ['a family’s role', { roles: ['guardian'] }, 'roles.0'],
  ])('%s', async (_name, more, path) => {
    const agent = await server.signInStaff('administrator');
    const answer = await add(agent, more).expect(422);
    expect(problem.parse(answer.body).errors?.[0]?.path).toBe(path);
  });

  it('an e-mail that somebody has, in whatever letters', async () => {
    const agent = await server.signInStaff('administrator');
    await add(agent).expect(200);
    const answer = await add(agent, { email: 'MIRIAM@example.ORG' }).expect(422);
    expect(problem.parse(answer.body).errors?.[0]?.path).toBe('email');
  });

  it('an unknown person', async () => {
    const agent = await server.signInStaff('administrator');
    await agent.post('/api/clinic/people/999999/deactivate').expect(404);
    await agent
      .put('/api/clinic/people/999999/roles')
      .send({ roles: ['clinician'] })
      .expect(404);
    await agent.post('/api/clinic/people/one/deactivate').expect(422);
  });
});

describe('an invitation', () => {
  it('goes by e-mail through the outbox and is answered once; the table keeps its hash', async () => {
    const { id, token } = await invited();
    const [message] = await select<{ address: string; body: string; channel: string }>(
      server.context.db,
      'SELECT address, body, channel FROM messages WHERE staff_id = :id',
      { id },
    );
    expect(message).toMatchObject({ address: 'miriam@example.org', channel: 'mail' });
    expect(message?.body).toContain(`/clinic/en/join/${token}`);
    const rows = JSON.stringify(await select(server.context.db, 'SELECT * FROM staff_invitations'));
    expect(rows).not.toContain(token);
    const agent = await server.signInStaff('administrator');
    const list = staffList.parse((await agent.get('/api/clinic/people').expect(200)).body);
    expect(list.staff.find((one) => one.id === id)).toMatchObject({
      hasPassword: false,
      isActive: true,
    });
    expect(JSON.stringify(list)).not.toContain(token);
  });

  it.each([
    ['of 14 characters', 'a quiet mornin', 422],
    ['of 15', 'a quiet morning', 200],
    [
      'of 64, letters only',
      'the heron stands in shallow water before the sun comes to harbor',
      200,
    ],
    [
      'of 128',
      'the heron stands in the shallow water before the sun comes up and '.repeat(2).slice(0, 128),
      200,
    ],
    ['in another script', 'صباح هادئ قبل الفجر بقليل', 200],
    ['of one letter many times', 'a'.repeat(20), 422],
    ['along the keyboard', 'qwertyuiopasdfg', 422],
    ['of their own e-mail and a year', 'miriam@example.org2027', 422],
    ['of 600 characters', 'the quiet morning '.repeat(34), 422],
  ])(
    'accepts or refuses a password %s, without rules of composition',
    async (_name, password, status) => {
      const { token, email } = await invited();
      const answer = await accept(token, password);
      expect(answer.status).toBe(status);
      if (status === 200)
        await server.visitor().post('/api/clinic/session').send({ email, password }).expect(200);
      else expect(problem.parse(answer.body).errors?.[0]?.path).toBe('password');
    },
  );

  it('works once, not after 72 hours, and not for an ended account, all with one answer', async () => {
    const { token } = await invited();
    await accept(token, 'a quiet morning by the harbor').expect(200);
    const used = await accept(token, 'another quiet morning').expect(410);
    const unknown = await accept('A'.repeat(43), 'another quiet morning').expect(410);
    await server.database.empty();
    const second = await invited();
    await change(
      server.context.db,
      'UPDATE staff_invitations SET expires_at = expires_at - INTERVAL 72 HOUR',
    );
    const expired = await accept(second.token, 'another quiet morning').expect(410);
    await server.database.empty();
    const third = await invited();
    await change(server.context.db, 'UPDATE staff SET is_active = FALSE WHERE id = :id', third);
    const ended = await accept(third.token, 'another quiet morning').expect(410);
    expect(
      new Set([used, unknown, expired, ended].map(({ body }) => JSON.stringify(body))).size,
    ).toBe(1);
  });
});

describe('people', () => {
  it('who are deactivated are out at once', async () => {
    const administrator = await server.signInStaff('administrator');
    const { id, email } = await server.addStaff(['clinician']);
    const agent = server.visitor();
    await agent.post('/api/clinic/session').send({ email, password: staffPassword }).expect(200);
    await administrator.post(`/api/clinic/people/${id}/deactivate`).expect(200);
    await agent.get('/api/clinic/session').expect(401);
    await server
      .visitor()
      .post('/api/clinic/session')
      .send({ email, password: staffPassword })
      .expect(401);
  });

  it('whose roles change sign in again and have the new rights only', async () => {
    const administrator = await server.signInStaff('administrator');
    const { id, email } = await server.addStaff(['lead-clinician']);
    const agent = server.visitor();
    const signIn = () => agent.post('/api/clinic/session').send({ email, password: staffPassword });
    await signIn().expect(200);
    await agent.get('/api/clinic/access-record').expect(200);
    await administrator
      .put(`/api/clinic/people/${id}/roles`)
      .send({ roles: ['front-desk'] })
      .expect(200);
    await agent.get('/api/clinic/session').expect(401);
    await signIn().expect(200);
    await agent.get('/api/clinic/access-record').expect(403);
  });

  it('always have an administrator among them', async () => {
    const { id, email } = await server.addStaff(['administrator']);
    const agent = server.visitor();
    await agent.post('/api/clinic/session').send({ email, password: staffPassword }).expect(200);
    const own = await agent.post(`/api/clinic/people/${id}/deactivate`).expect(409);
    expect(problem.parse(own.body).code).toBe('own-account');
    const last = await agent
      .put(`/api/clinic/people/${id}/roles`)
      .send({ roles: ['clinician'] })
      .expect(409);
    expect(problem.parse(last.body).code).toBe('last-administrator');
  });
});

describe('the first administrator', () => {
  const person = { fullName: 'Ada Test Keeper', email: 'ada@example.org' };
  const clinic = { name: 'Test Harbor Clinic', zone: 'America/Chicago', phone: '+12065550110' };

  it('is made by the command with a link that works once, and only when there is none', async () => {
    await expect(makeFirstAdministrator(server.context, person)).rejects.toThrow(/no clinic yet/);
    await expect(
      makeFirstAdministrator(server.context, person, { ...clinic, zone: 'Mars/Olympus' }),
    ).rejects.toThrow(/zone/);
    const link = await makeFirstAdministrator(server.context, person, clinic);
    await accept(tokenOf(link), 'the first of many mornings').expect(200);
    await accept(tokenOf(link), 'the first of many mornings').expect(410);
    const answer = await server
      .visitor()
      .post('/api/clinic/session')
      .send({ email: person.email, password: 'the first of many mornings' })
      .expect(200);
    expect(clinicSession.parse(answer.body).site).toMatchObject({ zone: clinic.zone });
    await expect(
      makeFirstAdministrator(server.context, { ...person, email: 'second@example.org' }),
    ).rejects.toBeInstanceOf(Refused);
  });

  it('needs a name and an e-mail', async () => {
    await expect(
      makeFirstAdministrator(server.context, { fullName: '', email: 'nobody' }),
    ).rejects.toBeInstanceOf(Refused);
  });
});

describe('the access record', () => {
  it('shows the newest rows first, filters them, and keeps who read it', async () => {
    const { context } = server;
    const { childId } = await addFamily(context, await server.siteId());
    const nurse = {
      side: 'clinic' as const,
      id: 77,
      name: 'Test Nurse',
      sessionHash: null,
      address: '127.0.0.1',
    };
    const at = Date.parse('2027-04-14T14:00:00.000Z');
    await record(context.db, undefined, nurse, {
      action: 'seen',
      matter: 'child',
      childIds: [childId],
      at,
    });
    await record(context.db, undefined, nurse, {
      action: 'changed',
      matter: 'set-up',
      childIds: [],
      at: at + 1,
    });
    const agent = await server.signInStaff('lead-clinician');
    const read = async (query: string) =>
      accessRecordList.parse(
        (await agent.get(`/api/clinic/access-record${query}`).expect(200)).body,
      );
    const all = await read('');
    expect(all.chain).toBe('not-sealed-yet');
    expect(all.rows.slice(0, 3).map(({ matter }) => matter)).toEqual([
      'sign-in',
      'set-up',
      'child',
    ]);
    const ofChild = await read(`?childId=${childId}`);
    expect(ofChild.rows.map(({ matter }) => matter)).toEqual(['access-record', 'child']);
    expect(ofChild.rows[1]?.children).toEqual([{ id: childId, fullName: 'Yusuf Test Child' }]);
    expect((await read('?staffId=77')).rows).toHaveLength(2);
    expect((await read('?staffId=77&from=2027-04-15')).rows).toHaveLength(0);
    for (const query of ['?childId=0', '?childId=x', '?from=2027-02-29', '?staffId=-1'])
      await agent.get(`/api/clinic/access-record${query}`).expect(422);
  });
});
