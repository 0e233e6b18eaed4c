import { childList, childRecord } from '../../shared/contracts/children';
import { setUp } from '../../shared/contracts/set-up';
import { change, select } from '../../server/database/connection';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import { guardian, newChild, signedClinic, wednesday } from '../support/signed-clinic';

let server: TestServer;
let nurse: Agent;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(wednesday);
  await server.database.empty();
  await signedClinic(server);
  nurse = await server.signInStaff('nurse-coordinator');
});
afterAll(() => server.close());

const add = async (body: unknown) => nurse.post('/api/clinic/children').send(body as object);

describe('nobody without the right', () => {
  it.each([
    ['get', '/children'],
    ['get', '/children/1'],
    ['post', '/children'],
    ['put', '/children/1'],
    ['post', '/children/1/family-members'],
    ['get', '/set-up'],
  ] as const)('%s %s', async (method, path) => {
    await server.visitor()[method](`/api/clinic${path}`).send({}).expect(401);
    const reviewer = await server.signInStaff('language-reviewer');
    await reviewer[method](`/api/clinic${path}`).send({}).expect(403);
  });

  it('opens a child that does not exist, of another site, or of no own family', async () => {
    const missing = await nurse.get('/api/clinic/children/999999').expect(404);
    const { body } = await add(newChild());
    const outreach = await server.signInStaff('outreach-nurse');
    const notOwn = await outreach.get(`/api/clinic/children/${body.id}`).expect(404);
    await change(
      server.context.db,
      'INSERT INTO sites (id, name, short_name, zone, country, region, address, door, door_directions, phone, emergency_number, dawn_answers_from_time, dawn_answers_until_time, clinic_weekdays, arrivals_from_time, arrivals_until_time, minutes_per_child, places_per_morning, staff_pairs, lead_days, usual_wait_minutes, evening_text_time, morning_question_minutes_before, call_list_minutes_before) SELECT id + 1000, name, short_name, zone, country, region, address, door, door_directions, phone, emergency_number, dawn_answers_from_time, dawn_answers_until_time, clinic_weekdays, arrivals_from_time, arrivals_until_time, minutes_per_child, places_per_morning, staff_pairs, lead_days, usual_wait_minutes, evening_text_time, morning_question_minutes_before, call_list_minutes_before FROM sites',
    );
    await change(server.context.db, 'UPDATE households SET site_id = site_id + 1000');
    const elsewhere = await nurse.get(`/api/clinic/children/${body.id}`).expect(404);
    expect(notOwn.body).toEqual(missing.body);
    expect(elsewhere.body).toEqual(missing.body);
    expect((await nurse.get('/api/clinic/children')).body.total).toBe(0);
  });
});

describe('bad input says where', () => {
  it.each([
    ['bornOn', { bornOn: '2025-02-29' }],
    ['bornOn', { bornOn: '2027-04-15' }],
    ['bornOn', { bornOn: '1999-01-01' }],
    ['fullName', { fullName: ' ' }],
    ['fullName', { fullName: 'x'.repeat(161) }],
    ['travelMinutes', { travelMinutes: '30' }],
    ['submissionKey', { submissionKey: '1' }],
    ['familyMembers.0.phone', { familyMembers: [{ ...guardian, phone: '123 4567' }] }],
    ['familyMembers.0.phone', { familyMembers: [{ ...guardian, phone: 'call me' }] }],
    ['familyMembers.0.email', { familyMembers: [{ ...guardian, email: 'a@b\r\nBcc: x' }] }],
    ['familyMembers.0.readsLanguage', { familyMembers: [{ ...guardian, readsLanguage: 'xx' }] }],
    [
      'familyMembers.0.mayConsent',
      { familyMembers: [{ ...guardian, standing: 'helper', seesResults: false }] },
    ],
    [
      'familyMembers.0.seesResults',
      { familyMembers: [{ ...guardian, standing: 'helper', mayConsent: false }] },
    ],
    [
      'familyMembers.0.agreesToTexts',
      { familyMembers: [{ ...guardian, phone: null, agreesToEarlyTexts: false }] },
    ],
  ])('%s of %j', async (path, more) => {
    const { status, body } = await add({ ...newChild(), ...more });
    expect(status).toBe(422);
    expect(body.errors.map((error: { path: string }) => error.path)).toContain(path);
    expect((await nurse.get('/api/clinic/children')).body.total).toBe(0);
  });
});

it('adds a child once: a repeated submit, also at the same moment, answers with the same child', async () => {
  const child = newChild();
  const answers = await Promise.all([add(child), add(child), add(child)]);
  expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
  expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1);
  const record = childRecord.parse(answers[0]?.body);
  expect(record).toMatchObject({ bornOn: '2024-02-29', ageInWords: '3 years', version: 1 });
  expect(record.familyMembers).toMatchObject([
    { phone: '+13125550191', agreesToTexts: true, agreesToEarlyTexts: true, invitation: 'none' },
  ]);
});

it('knows a child by name and birth date whatever the accents, and by its record number', async () => {
  const first = await add(newChild({ fullName: 'Zoé Amari', recordNumber: 'R-7' }));
  const same = await add(newChild({ fullName: 'ZOE AMARI' }));
  const number = await add(newChild({ bornOn: '2023-01-01', recordNumber: 'R-7' }));
  for (const { status, body } of [same, number]) {
    expect(status).toBe(409);
    expect(body).toMatchObject({ code: 'child-known', childId: first.body.id });
  }
});

it('finds by words in any order, accents aside, and by record number; wildcards are letters', async () => {
  await add(newChild({ fullName: 'Trần Gia Linh', recordNumber: 'R-12' }));
  await add(newChild({ fullName: 'Noor' }));
  const found = async (search: string): Promise<string[]> => {
    const { body } = await nurse.get('/api/clinic/children').query({ search }).expect(200);
    return childList.parse(body).children.map(({ fullName }) => fullName);
  };
  expect(await found('linh tran')).toEqual(['Trần Gia Linh']);
  expect(await found('R-12')).toEqual(['Trần Gia Linh']);
  expect(await found('')).toEqual(['Noor', 'Trần Gia Linh']);
  expect(await found('%')).toEqual([]);
  expect((await nurse.get('/api/clinic/children')).body.children[0].next).toBe('No order yet.');
});

it('links a brother’s mother instead of doubling her, and keeps two people on one phone apart', async () => {
  const first = await add(newChild());
  const { householdId } = first.body;
  const second = await add(newChild({ householdId }));
  expect(second.body.siblings).toMatchObject([{ id: first.body.id }]);
  expect(second.body.familyMembers[0].id).toBe(first.body.familyMembers[0].id);
  const grandmother = {
    ...guardian,
    fullName: 'Thida',
    standing: 'helper',
    mayConsent: false,
    seesResults: false,
    email: null,
    agreesToMail: false,
  };
  const path = `/api/clinic/children/${second.body.id}/family-members`;
  await nurse.post(path).send(grandmother).expect(200);
  const { body } = await nurse.post(path).send(grandmother).expect(200);
  expect(body.familyMembers.map((member: { fullName: string }) => member.fullName)).toEqual([
    'Leila Amari',
    'Thida',
  ]);
  await nurse
    .post('/api/clinic/children')
    .send(newChild({ householdId: 999_999 }))
    .expect(404);
});

it('changes a child from the version that was seen', async () => {
  const { body } = await add(newChild());
  const { fullName, callMe, familyLabel, bornOn, recordNumber, feeding, cautions } = body;
  const changes = { fullName, callMe, familyLabel, bornOn, recordNumber, feeding, cautions };
  const path = `/api/clinic/children/${body.id}`;
  const changed = await nurse
    .put(path)
    .send({ ...changes, callMe: 'Zo', version: 1 })
    .expect(200);
  expect(changed.body).toMatchObject({ callMe: 'Zo', version: 2 });
  const late = await nurse.put(path).send({ ...changes, version: 1 });
  expect([late.status, late.body.code]).toEqual([409, 'changed-meanwhile']);
});

it('keeps on record who saw and who changed', async () => {
  const { body } = await add(newChild());
  const rows = await select<{ action: string; matter: string }>(
    server.context.db,
    `SELECT action, matter FROM access_records JOIN access_record_children ON access_record_id = access_records.id
     WHERE child_id = :childId ORDER BY access_records.id`,
    { childId: body.id },
  );
  expect(rows).toEqual([
    { action: 'changed', matter: 'child-added' },
    { action: 'seen', matter: 'child' },
  ]);
});

it('shows the set-up with whose values they are', async () => {
  const { body } = await nurse.get('/api/clinic/set-up').expect(200);
  const shown = setUp.parse(body);
  expect(shown.protocols[0]?.bands.map(({ age }) => age)).toEqual([
    'under 3 months',
    '3 to 5 months',
    '6 to 11 months',
    '1 year',
    '2 to 4 years',
    '5 years and over',
  ]);
  expect(shown.protocols[0]).toMatchObject({
    hasStartingValues: true,
    signedBy: 'Dr. Ines Okafor',
  });
});
