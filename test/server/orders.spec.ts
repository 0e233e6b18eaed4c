import { order, orderList } from '../../shared/contracts/orders';
import { reportingDueOn, reportingRuleOf } from '../../server/sites/rule-packs';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import {
  guardian,
  newChild,
  newConsent,
  newOrder,
  signedClinic,
  wednesday,
} from '../support/signed-clinic';

let server: TestServer;
let clinician: Agent;
let childId: number;
let motherId: number;
let grandmotherId: number;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(wednesday);
  await server.database.empty();
  await signedClinic(server);
  clinician = await server.signInStaff('clinician');
  const helper = { ...guardian, fullName: 'Thida', standing: 'helper' as const };
  const { body } = await clinician.post('/api/clinic/children').send(
    newChild({
      familyMembers: [guardian, { ...helper, mayConsent: false, seesResults: false }],
    }),
  );
  childId = body.id;
  [motherId, grandmotherId] = body.familyMembers.map((member: { id: number }) => member.id);
});
afterAll(() => server.close());

const add = (body: unknown) => clinician.post('/api/clinic/orders').send(body as object);

describe('nobody without the right', () => {
  it.each([
    ['get', '/orders'],
    ['get', '/orders/1'],
    ['post', '/orders'],
    ['post', '/orders/1/signature'],
    ['post', '/orders/1/consent'],
    ['post', '/orders/1/reported'],
  ] as const)('%s %s', async (method, path) => {
    await server.visitor()[method](`/api/clinic${path}`).send({}).expect(401);
    const desk = await server.signInStaff('front-desk');
    await desk[method](`/api/clinic${path}`).send({}).expect(403);
  });

  it('signs as a nurse, or touches an order that is not there', async () => {
    const { body } = await add(newOrder(childId));
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse.post(`/api/clinic/orders/${body.id}/signature`).send({}).expect(403);
    await clinician.post('/api/clinic/orders/999999/signature').send({}).expect(404);
    await clinician.post('/api/clinic/orders').send(newOrder(999_999)).expect(404);
  });
});

describe('the stop card', () => {
  const card = newOrder(1).stopCard;

  it.each([
    'hasSuspectedMeningitis',
    'hasSuspectedMiliaryDisease',
    'hasBreathingDistress',
    'isDrowsy',
  ])('%s is not bookable', async (sign) => {
    const { status, body } = await add(newOrder(childId, { stopCard: { ...card, [sign]: true } }));
    expect([status, body.code]).toEqual([422, 'not-bookable']);
    expect(body.title).toContain('telephone the physician');
    expect(body.errors[0].path).toBe(`stopCard.${sign}`);
  });

  it('offers sputum first, unless the note says what came of it', async () => {
    const stopCard = { ...card, canBringUpSputum: true };
    const request = newOrder(childId, { stopCard });
    const refused = await add(request);
    expect([refused.status, refused.body.code]).toEqual([422, 'offer-sputum-first']);
    const note = 'Sputum offered on 12 April, none came.';
    await add({ ...request, details: { ...request.details, note } }).expect(200);
  });
});

it.each([
  ['details.weightKg', { details: { ...newOrder(1).details, weightKg: 130 } }],
  ['details.medicinesSince', { details: { ...newOrder(1).details, medicinesSince: '2027-02-29' } }],
  ['details.medicinesSince', { details: { ...newOrder(1).details, medicinesSince: '2027-04-15' } }],
  ['morningsPlanned', { morningsPlanned: 6 }],
  ['reason', { reason: 'x'.repeat(501) }],
])('bad input says where: %s', async (path, more) => {
  const { status, body } = await add({ ...newOrder(childId), ...more });
  expect(status).toBe(422);
  expect(body.errors[0].path).toBe(path);
});

it('goes from order to signature and consent, each once', async () => {
  const request = newOrder(childId);
  const [first, again] = await Promise.all([add(request), add(request)]);
  expect(again.body.id).toBe(first.body.id);
  const placed = order.parse(first.body);
  expect(placed.stillNeeded).toEqual([
    'A clinician still has to sign this order.',
    'The consent of a guardian is still missing.',
  ]);
  const path = `/api/clinic/orders/${placed.id}`;
  await clinician.post(`${path}/reported`).expect(409);
  const old = await clinician.post(`${path}/signature`).send({ version: 9 });
  expect([old.status, old.body.code]).toEqual([409, 'changed-meanwhile']);
  const signed = await clinician.post(`${path}/signature`).send({ version: 1 }).expect(200);
  // Wednesday; the report is due on the next working day.
  expect(signed.body).toMatchObject({ reportingDueOn: '2027-04-15', version: 2 });
  await clinician.post(`${path}/signature`).send({ version: 1 }).expect(200);

  const helper = await clinician.post(`${path}/consent`).send(newConsent(grandmotherId));
  expect([helper.status, helper.body.errors[0].path]).toEqual([422, 'familyMemberId']);
  const telephone = newConsent(motherId, { how: 'telephone' });
  expect((await clinician.post(`${path}/consent`).send(telephone)).body.errors[0].path).toBe(
    'witness',
  );
  const future = newConsent(motherId, { givenAt: '2027-04-14T18:00:01.000Z' });
  expect((await clinician.post(`${path}/consent`).send(future)).body.errors[0].path).toBe(
    'givenAt',
  );
  const consented = await clinician.post(`${path}/consent`).send(newConsent(motherId)).expect(200);
  expect(consented.body).toMatchObject({ stillNeeded: [], consent: { givenBy: 'Leila Amari' } });
  await clinician.post(`${path}/consent`).send(newConsent(motherId)).expect(200);
  const other = newConsent(motherId, { givenAt: '2027-04-14T16:00:00.000Z' });
  expect((await clinician.post(`${path}/consent`).send(other)).body.code).toBe('consent-known');

  const reported = await clinician.post(`${path}/reported`).expect(200);
  expect(reported.body.reportedAt).toBe('2027-04-14T18:00:00.000Z');
  const { body } = await clinician.get('/api/clinic/orders').query({ childId }).expect(200);
  expect(orderList.parse(body).orders).toHaveLength(1);
});

// Clinical facts 4.4: one working day in Los Angeles County, three in England.
it.each([
  ['US', '2027-04-16', [], '2027-04-19'],
  ['US', '2027-04-16', ['2027-04-19'], '2027-04-20'],
  ['GB', '2027-04-15', [], '2027-04-20'],
  ['US', '2028-02-28', [], '2028-02-29'],
])('the report in %s of %s, closed on %j, is due on %s', (country, from, closed, due) => {
  const rule = reportingRuleOf({ country, region: null });
  expect(rule && reportingDueOn(rule, from, new Set(closed))).toBe(due);
});
