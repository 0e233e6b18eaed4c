import { startTestServer, type Agent, type TestServer } from '../support/server';
import { guardian, newChild, signedClinic, wednesday } from '../support/signed-clinic';

let server: TestServer;
let nurse: Agent;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
  server.setNow(wednesday);
  await signedClinic(server);
  nurse = await server.signInStaff('nurse-coordinator');
});
afterAll(() => server.close());

const pathsOf = (body: { errors?: { path: string }[] }): string[] =>
  (body.errors ?? []).map(({ path }) => path);

it.each(['0000-01-01', '0001-01-01', '1899-12-31', '2200-01-01', '9999-12-31', '2027-02-29'])(
  'a day that no calendar of ours holds: %s',
  async (on) => {
    const answer = await nurse.get(`/api/clinic/this-morning?on=${on}`);
    expect([answer.status, pathsOf(answer.body)]).toEqual([422, ['on']]);
  },
);

it.each([
  ['turns the direction of what follows', 'Amari \u202eairaM'],
  ['isolates', 'Amari \u2066Maria'],
  ['ends a text for some programs', 'Amari\u0000Maria'],
  ['rings a bell', 'Amari\u0007'],
])('a name with a sign that %s', async (_, fullName) => {
  const answer = await nurse.post('/api/clinic/children').send(newChild({ fullName }));
  expect([answer.status, pathsOf(answer.body)]).toEqual([422, ['fullName']]);
});

it.each([
  'Amárí O’Brien-\u200dThida',
  '陈小明',
  'نور‌ا',
  '<img src=x onerror=alert(1)>',
  "Robert'); --",
])('a name as people write it, kept as it is: %s', async (fullName) => {
  const { body } = await nurse
    .post('/api/clinic/children')
    .send(newChild({ fullName }))
    .expect(200);
  expect(body.fullName).toBe(fullName);
});

it.each(['Zoé Amari', 'zoé  AMARI', 'Amari, Zoé', 'our Zoé Amari'])(
  'a label for texts that is the name: %s',
  async (familyLabel) => {
    const child = newChild({ fullName: 'Zoé Amari', familyLabel });
    const answer = await nurse.post('/api/clinic/children').send(child);
    expect([answer.status, pathsOf(answer.body)]).toEqual([422, ['familyLabel']]);
  },
);

it('the front desk adds helpers, and makes nobody a guardian who reads letters', async () => {
  const { body: child } = await nurse.post('/api/clinic/children').send(newChild()).expect(200);
  const desk = await server.signInStaff('front-desk');
  const path = `/api/clinic/children/${child.id}/family-members`;
  const stranger = { ...guardian, fullName: 'Somebody Else', phone: '(312) 555-0177' };
  const refused = await desk.post(path).send(stranger);
  expect([refused.status, refused.body.code]).toEqual([403, 'standing-is-decided']);
  const helper = { ...stranger, standing: 'helper', mayConsent: false, seesResults: false };
  await desk.post(path).send(helper).expect(200);
  const raised = await desk.post(path).send(stranger);
  expect(raised.status).toBe(403);
  await desk.post(path).send(guardian).expect(200);
  const lowered = await desk
    .post(path)
    .send({ ...guardian, standing: 'helper', mayConsent: false, seesResults: false });
  expect(lowered.status).toBe(403);
});
