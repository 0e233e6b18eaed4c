import {
  previewSeriesAnswer,
  seriesProposal,
  planSeriesAnswer,
} from '../../shared/contracts/series';
import { change, select } from '../../server/database/connection';
import { morningPlansOf } from '../../server/series/morning-plans';
import type { DemoClinic } from '../../server/database/seeds/demo-clinic';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import { readyOrder, signedClinic, wednesday, type ReadyOrder } from '../support/signed-clinic';

let server: TestServer;
let clinician: Agent;
let clinic: DemoClinic;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(wednesday);
  await server.database.empty();
  clinic = await signedClinic(server);
  clinician = await server.signInStaff('clinician');
});
afterAll(() => server.close());

const post = (path: string, body: object) => clinician.post(`/api/clinic${path}`).send(body);
const days = ['2027-04-20', '2027-04-21', '2027-04-22'];

const planOf = (
  orders: readonly ReadyOrder[],
  places: readonly [string, number][] = [['06:00', 0]],
  on: readonly string[] = days,
) => ({
  orderIds: orders.map(({ orderId }) => orderId),
  days: on.map((day) => ({
    on: day,
    places: orders.map(({ childId }, index) => ({
      childId,
      arrivalTime: places[index]?.[0],
      roomId: clinic.roomIds[places[index]?.[1] ?? 0],
    })),
  })),
  escorts: [],
});

const count = async (sql: string): Promise<number> =>
  (await select<{ n: number }>(server.context.db, `SELECT COUNT(*) AS n FROM ${sql}`))[0]?.n ?? 0;

describe('nobody without the right', () => {
  it.each([
    '/series/proposals',
    '/series/previews',
    '/series',
    '/mornings/1/loss',
    '/series/1/closure',
  ])('post %s', async (path) => {
    await server.visitor().post(`/api/clinic${path}`).send({}).expect(401);
    const desk = await server.signInStaff('front-desk');
    await desk.post(`/api/clinic${path}`).send({}).expect(403);
  });

  it('plans an order that is not there, or closes and loses what is not', async () => {
    const search = { orderIds: [999_999], from: '2027-04-19', morningsPlanned: 3 };
    await post('/series/proposals', search).expect(404);
    await post('/mornings/999999/loss', { reason: 'snow' }).expect(404);
    await post('/series/999999/closure', { reason: 'moved' }).expect(404);
  });
});

it('proposes runs, and says for every other day why not', async () => {
  const order = await readyOrder(clinician);
  const wrong = await post('/series/proposals', {
    orderIds: [order.orderId],
    from: '2027-02-29',
    morningsPlanned: 3,
  });
  expect([wrong.status, wrong.body.errors[0].path]).toEqual([422, 'from']);
  const { body } = await post('/series/proposals', {
    orderIds: [order.orderId],
    from: '2027-04-12',
    morningsPlanned: 3,
  }).expect(200);
  const proposal = seriesProposal.parse(body);
  const says = (on: string): string[] =>
    proposal.days.find((day) => day.on === on)?.refused.map((refusal) => refusal.says) ?? [];
  expect(proposal.days[0]?.on).toBe('2027-04-14');
  expect(says('2027-04-14')).toEqual(['Too soon: planning needs 1 day']);
  expect(says('2027-04-15')).toEqual([
    'The run would break on Saturday, 17 April: not a clinic day',
  ]);
  expect(says('2027-04-17')).toEqual([
    'The clinic does not collect on Saturdays',
    'The laboratory receives nothing on Saturdays',
  ]);
  expect(says('2027-04-29')).toEqual(['Closed: staff day']);
  expect(proposal.runs[0]).toMatchObject({ startsInDays: 5, days: [{ on: '2027-04-19' }, {}, {}] });
  expect(proposal.protocolSays).toContain('Starting values');
});

it('plans nothing by a protocol that nobody signed', async () => {
  const order = await readyOrder(clinician);
  await change(server.context.db, 'UPDATE fasting_protocols SET signed_at = NULL');
  const { status, body } = await post('/series', planOf([order]));
  expect([status, body.code]).toEqual([409, 'no-signed-protocol']);
});

describe('brothers and sisters', () => {
  let orders: ReadyOrder[];
  const places: [string, number][] = [
    ['06:00', 0],
    ['06:20', 1],
  ];
  beforeEach(async () => {
    const baby = await readyOrder(clinician, {
      bornOn: '2026-11-02',
      feeding: 'breast',
      callMe: 'Noor',
    });
    const { householdId } = baby.record;
    orders = [
      baby,
      await readyOrder(clinician, { householdId, callMe: 'Sami', bornOn: '2024-12-01' }),
    ];
  });

  it('come on the same mornings in neighbouring places, the youngest first', async () => {
    const { body } = await post('/series/proposals', {
      orderIds: orders.map(({ orderId }) => orderId).reverse(),
      from: '2027-04-19',
      morningsPlanned: 3,
    }).expect(200);
    expect(body.runs[0].days[0].places).toMatchObject([
      { childId: orders[0]?.childId, arrivalTime: '06:00' },
      { childId: orders[1]?.childId, arrivalTime: '06:20' },
    ]);
    const preview = await post('/series/previews', planOf(orders, places)).expect(200);
    // 5 months: 4 and 6 hours; 2 years: 6 and 13 hours (starting protocol).
    expect(previewSeriesAnswer.parse(preview.body).firstNight).toMatchObject([
      { nothingAfter: '02:00 Tuesday', longestFast: '08:00, if fed until 02:00' },
      { nothingAfter: '00:20 Tuesday', longestFast: '13:20, if fed until 00:20' },
    ]);
    const planned = await post('/series', planOf(orders, places)).expect(200);
    const answer = planSeriesAnswer.parse(planned.body);
    expect(answer.series).toHaveLength(2);
    expect(answer.familyWillHear.length).toBeGreaterThan(0);
    expect(JSON.stringify(answer.familyWillHear)).not.toMatch(/\/[mi]\/[\w-]{16}/);
    const { siteId } = clinic;
    const plans = await morningPlansOf(server.context.db, { siteId, on: '2027-04-20' });
    expect(plans.map(({ callMe, number, ofPlanned }) => [callMe, number, ofPlanned])).toEqual([
      ['Noor', 1, 3],
      ['Sami', 1, 3],
    ]);
    expect(await count("messages WHERE kind = 'evening' AND channel = 'sms'")).toBe(3);
    expect(await count("messages WHERE kind = 'calendar'")).toBe(6);
  });

  it('are planned once, whoever presses twice', async () => {
    const plan = planOf(orders, places);
    const answers = await Promise.all([post('/series', plan), post('/series', plan)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const [won, lost] = answers[0].status === 200 ? answers : [answers[1], answers[0]];
    expect(lost.body).toMatchObject({ code: 'already-planned', seriesId: won.body.series[0].id });
    expect(await count('mornings')).toBe(6);
  });

  it.each([
    ['days.2.on', (plan: ReturnType<typeof planOf>) => (plan.days[1]!.on = '2027-04-23')],
    ['days.0.places', (plan: ReturnType<typeof planOf>) => plan.days[0]!.places.pop()],
    ['days', (plan: ReturnType<typeof planOf>) => plan.days.pop()],
    [
      'escorts.0.familyMemberId',
      (plan: ReturnType<typeof planOf>) =>
        plan.escorts.push({ on: '2027-04-20', familyMemberId: 999_999 } as never),
    ],
  ])('bad input says where: %s', async (path, spoil) => {
    const plan = planOf(orders, places);
    spoil(plan);
    const { status, body } = await post('/series', plan);
    expect(status).toBe(422);
    expect(body.errors[0].path).toBe(path);
    expect(await count('series')).toBe(0);
  });
});

it('lets one of two have the last place, and tells the other kindly', async () => {
  const orders = [await readyOrder(clinician), await readyOrder(clinician)];
  const answers = await Promise.all(orders.map((order) => post('/series', planOf([order]))));
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const lost = answers.find(({ status }) => status === 409)?.body;
  expect(lost.code).toBe('place-taken');
  expect(lost.title).toContain('choose among the places that are left');
  const left = seriesProposal.parse(lost.proposal);
  expect(left.days.find(({ on }) => on === days[0])?.placesLeft).toBe(4);
  expect(left.runs[0]?.days[0]?.places[0]?.arrivalTime).toBe('06:20');
  expect(await count('series')).toBe(1);
  expect(await count('mornings')).toBe(3);
});

it.each([
  ['a closed day', ['2027-04-27', '2027-04-28', '2027-04-29'], '06:00', 'Closed: staff day.'],
  [
    'a weekend',
    ['2027-04-16', '2027-04-17', '2027-04-18'],
    '06:00',
    'The clinic does not collect on Saturdays.',
  ],
  ['today', ['2027-04-14', '2027-04-15', '2027-04-16'], '06:00', 'Too soon: planning needs 1 day.'],
  ['a place that is none', days, '06:10', 'The clinic has no such place.'],
])('refuses %s and says why', async (_, on, time, says) => {
  const order = await readyOrder(clinician);
  const { status, body } = await post('/series', planOf([order], [[time, 0]], on));
  expect([status, body.code]).toEqual([409, 'day-refused']);
  expect(body.detail).toContain(says);
  expect(await count('mornings')).toBe(0);
});

it('plans over 29 February', async () => {
  server.setNow(Date.parse('2028-02-21T18:00:00Z'));
  const order = await readyOrder(clinician);
  const leap = ['2028-02-28', '2028-02-29', '2028-03-01'];
  await post('/series', planOf([order], [['06:00', 0]], leap)).expect(200);
  const { siteId } = clinic;
  const [plan] = await morningPlansOf(server.context.db, { siteId, on: '2028-02-29' });
  expect(plan).toMatchObject({ number: 2, arrivalAt: Date.parse('2028-02-29T12:00:00Z') });
  // Born on 29 February 2024, four years old that day: 6 hours before 06:00 in Chicago.
  expect(plan?.plan).toMatchObject({ ageMonths: 48, stopAt: Date.parse('2028-02-29T06:00:00Z') });
});

it('says that a child with a caution needs an individual plan', async () => {
  const order = await readyOrder(clinician, { cautions: ['prematurity'] });
  const { body } = await post('/series/previews', planOf([order])).expect(200);
  expect(body.firstNight[0].individualPlanNeeded).toContain('prematurity');
});

describe('the usual night', () => {
  it('is asked when planning: a place that passes the longest fast is refused with its hours', async () => {
    const order = await readyOrder(clinician, { bornOn: '2026-11-02', feeding: 'breast' });
    const search = { orderIds: [order.orderId], from: '2027-04-19', morningsPlanned: 3, weeks: 1 };
    const night = { childId: order.childId, lastMealTime: '20:00' };
    const told = { ...search, nights: [{ ...night, nightFeedTimes: ['01:30', '04:30'] }] };
    const fed = seriesProposal.parse((await post('/series/proposals', told).expect(200)).body);
    expect(fed.runs.length).toBeGreaterThan(0);
    const without = { ...search, nights: [{ ...night, nightFeedTimes: [] }] };
    const hungry = seriesProposal.parse(
      (await post('/series/proposals', without).expect(200)).body,
    );
    expect(hungry.runs).toEqual([]);
    // 20:00 to 6:00 and half an hour of waiting; 6 hours are the longest at five months.
    expect(hungry.days[1]?.refused).toMatchObject([
      {
        code: 'fast-too-long',
        says: 'Too late for Zoé: 10.5 hours without food with the usual wait, 6 at the most',
      },
    ]);
    const wrong = { ...search, nights: [{ ...night, nightFeedTimes: ['25:00'] }] };
    const { status, body } = await post('/series/proposals', wrong);
    expect([status, body.errors[0].path]).toEqual([422, 'nights.0.nightFeedTimes.0']);
  });

  it('says which feed falls away, stays with the child and is offered the next time', async () => {
    const order = await readyOrder(clinician, { bornOn: '2026-11-02', feeding: 'breast' });
    const nights = [
      { childId: order.childId, lastMealTime: '20:00', nightFeedTimes: ['01:30', '04:30'] },
    ];
    const plan = { ...planOf([order]), nights };
    const preview = await post('/series/previews', plan).expect(200);
    expect(previewSeriesAnswer.parse(preview.body).firstNight[0]?.fallsAway).toBe(
      'The feed at 04:30',
    );
    const search = { orderIds: [order.orderId], from: '2027-04-19', morningsPlanned: 3 };
    await post('/series', planOf([await readyOrder(clinician)], [['06:20', 1]])).expect(200);
    await post('/series', plan).expect(200);
    await change(
      server.context.db,
      'DELETE FROM mornings WHERE series_id IN (SELECT id FROM series WHERE order_id = :id)',
      { id: order.orderId },
    );
    await change(server.context.db, 'DELETE FROM series WHERE order_id = :id', {
      id: order.orderId,
    });
    const { body } = await post('/series/proposals', search).expect(200);
    expect(body.children[0].usualNight).toEqual({
      lastMealTime: '20:00',
      nightFeedTimes: ['01:30', '04:30'],
    });
  });
});

it('waits for a ride and for a report that is due, by the lead times of the clinic', async () => {
  const order = await readyOrder(clinician);
  const db = server.context.db;
  await change(db, 'UPDATE orders SET reporting_due_on = :on, reported_at = NULL', {
    on: '2027-04-16',
  });
  await change(db, 'UPDATE sites SET reporting_lead_days = 2');
  const search = { orderIds: [order.orderId], from: '2027-04-14', morningsPlanned: 1 };
  const codes = async (more: object): Promise<string[]> => {
    const { body } = await post('/series/proposals', { ...search, ...more }).expect(200);
    return seriesProposal.parse(body).days[1]?.refused.map(({ code }) => code) ?? [];
  };
  expect(await codes({ needsRide: true })).toEqual(['ride-lead-time', 'reporting-lead-time']);
  expect(await codes({})).toEqual(['reporting-lead-time']);
  await change(db, 'UPDATE orders SET reported_at = NOW(3)');
  expect(await codes({})).toEqual([]);
  const plan = { ...planOf([order], [['06:00', 0]], ['2027-04-15']), needsRide: true };
  await change(db, 'UPDATE orders SET mornings_planned = 1');
  const { status, body } = await post('/series', plan);
  expect([status, body.code]).toEqual([409, 'day-refused']);
  expect(body.detail).toContain('A ride must be booked 3 days ahead.');
  expect(seriesProposal.parse(body.proposal).days.length).toBeGreaterThan(0);
});

it('names a public holiday, and reads what is booked in the weeks it looks at alone', async () => {
  const order = await readyOrder(clinician);
  const { body } = await post('/series/proposals', {
    orderIds: [order.orderId],
    from: '2027-05-24',
    morningsPlanned: 1,
    weeks: 12,
  }).expect(200);
  const proposal = seriesProposal.parse(body);
  expect(proposal.days).toHaveLength(84);
  // The last Monday of May (5 U.S.C. 6103).
  expect(proposal.days.find(({ on }) => on === '2027-05-31')?.refused).toEqual([
    { code: 'public-holiday', says: 'Public holiday: Memorial Day' },
  ]);
  expect(proposal.capacitySays).toContain('2 rooms, 1 pair of staff, at most 5 children');
});

it('needs signature and consent first', async () => {
  const order = await readyOrder(clinician);
  await change(server.context.db, 'UPDATE orders SET signed_at = NULL');
  const { status, body } = await post('/series', planOf([order]));
  expect([status, body.code]).toEqual([409, 'not-ready']);
  expect(body.stillNeeded[0]).toContain('sign');
});

it('frees the place of a lost morning, takes its messages back and cancels its entry, once', async () => {
  const order = await readyOrder(clinician);
  const { body } = await post('/series', planOf([order])).expect(200);
  const [morning] = await morningPlansOf(server.context.db, { seriesIds: [body.series[0].id] });
  const path = `/mornings/${morning?.morningId}/loss`;
  expect((await post(path, { reason: '' })).status).toBe(422);
  await post(path, { reason: 'ill' }).expect(200);
  await post(path, { reason: 'ill' }).expect(200);
  expect(await count("mornings WHERE state = 'lost' AND place_key IS NULL")).toBe(1);
  expect(await count("messages WHERE calendar_method = 'CANCEL'")).toBe(1);
  expect(
    await count(
      "messages WHERE kind = 'evening' AND state = 'queued' AND morning_on = '2027-04-20'",
    ),
  ).toBe(0);
  const other = await readyOrder(clinician, {}, { morningsPlanned: 1 });
  await post('/series', planOf([other], [['06:00', 0]], ['2027-04-20'])).expect(200);

  await post(`/series/${body.series[0].id}/closure`, { reason: 'moved away' }).expect(200);
  expect(await count("mornings WHERE state = 'lost'")).toBe(3);
  expect(await count("series WHERE state = 'closed'")).toBe(1);
});
