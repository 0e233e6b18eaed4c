import { morningChanged, thisMorning } from '../../shared/contracts/this-morning';
import { problem } from '../../shared/contracts/problem';
import { select } from '../../server/database/connection';
import { insert } from '../support/insert';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import {
  addClinic,
  addHousehold,
  at,
  iso,
  maryamAndYusuf,
  morningDay,
  type TestClinic,
  type TestHousehold,
} from '../support/mornings';

let server: TestServer;
let clinic: TestClinic;
let household: TestHousehold;
let nurse: Agent;
let maryam: number;
let yusuf: number;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  clinic = await addClinic(server.context, await server.siteId());
  household = await addHousehold(server.context, clinic, maryamAndYusuf);
  [maryam, yusuf] = household.children.map(({ morningId }) => morningId) as [number, number];
  nurse = await server.signInStaff('nurse-coordinator');
  server.setNow(at('07:05'));
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const sheet = async (agent = nurse) =>
  thisMorning.parse((await agent.get('/api/clinic/this-morning').expect(200)).body);

const rowOf = async (morningId: number) => {
  const row = (await sheet()).rows.find((one) => one.morningId === morningId);
  if (!row) throw new Error(`No row ${morningId}`);
  return row;
};

const post = (path: string, body: object, agent = nurse) =>
  agent.post(`/api/clinic/mornings/${path}`).send(body);
const put = (path: string, body: object, agent = nurse) =>
  agent.put(`/api/clinic/mornings/${path}`).send(body);

const arrive = async (morningId: number) =>
  morningChanged.parse((await post(`${morningId}/arrival`, { version: 1 }).expect(200)).body).row;

const doorCheck = (version: number, more: Record<string, unknown> = {}) => ({
  version,
  lastFoodAt: null,
  lastDrinkAt: null,
  isNothingSincePlan: true,
  medicine: '',
  wokeAt: iso('05:50'),
  isWell: true,
  broughtBy: 'grandmother',
  goOnReason: '',
  ...more,
});

const check = async (morningId: number, version: number, more: Record<string, unknown> = {}) =>
  morningChanged.parse(
    (await post(`${morningId}/door-checks`, doorCheck(version, more)).expect(200)).body,
  ).row;

const begin = (morningId: number, version: number, roomId = clinic.roomIds[0]) =>
  post(`${morningId}/collection`, { version, roomId });

const collected = (version: number, more: Record<string, unknown> = {}) => ({
  version,
  outcome: 'collected',
  collectedAt: iso('07:06'),
  volumeMl: 8,
  positionCheck: 'aspirate',
  rinseFluid: '',
  tolerance: '',
  label: 'L-1001',
  neutralisedAt: null,
  neutralisedWith: '',
  ...more,
});

const codeOf = (body: unknown): string => problem.parse(body).code;

/** Arrived, checked and inside: the version of the morning afterwards. */
const inRoom = async (morningId: number, roomId = clinic.roomIds[0]): Promise<number> => {
  const { version } = await arrive(morningId);
  const checked = await check(morningId, version);
  const begun = await begin(morningId, checked.version, roomId).expect(200);
  return morningChanged.parse(begun.body).row.version;
};

const ladders: readonly (readonly ['get' | 'post' | 'put', string])[] = [
  ['get', 'this-morning'],
  ['post', 'mornings/1/arrival'],
  ['post', 'mornings/1/door-checks'],
  ['post', 'mornings/1/collection'],
  ['put', 'mornings/1/collection'],
  ['post', 'mornings/1/feeding'],
];

describe('refused', () => {
  it('whoever has no session', async () => {
    for (const [method, path] of ladders)
      await server.visitor()[method](`/api/clinic/${path}`).send({}).expect(401);
  });

  it('roles without the right', async () => {
    const reviewer = await server.signInStaff('language-reviewer');
    for (const [method, path] of ladders)
      await reviewer[method](`/api/clinic/${path}`).send({}).expect(403);
    const desk = await server.signInStaff('front-desk');
    for (const [method, path] of ladders.slice(2))
      await desk[method](`/api/clinic/${path}`).send({}).expect(403);
    await post(`${maryam}/arrival`, { version: 1 }, desk).expect(200);
  });

  it('a family’s session', async () => {
    const mother = await server.openFamilySession(household.motherId, 'fresh');
    await mother.get('/api/clinic/this-morning').expect(401);
  });

  it('a morning that does not exist, and one of another site, with the same answer', async () => {
    const missing = await post('999999/arrival', { version: 1 }).expect(404);
    const [{ id: _, ...site } = { id: 0 }] = await select<{ id: number }>(
      server.context.db,
      'SELECT * FROM sites LIMIT 1',
    );
    const otherId = await insert(
      server.context.db,
      'sites',
      Object.fromEntries(
        Object.entries({ ...site, name: 'Other' }).map(([column, value]: [string, unknown]) => [
          column,
          Array.isArray(value) ? JSON.stringify(value) : value,
        ]),
      ),
    );
    await server.context.db.query(`UPDATE mornings SET site_id = ${otherId} WHERE id = ${yusuf}`);
    const foreign = await post(`${yusuf}/arrival`, { version: 1 }).expect(404);
    expect(foreign.body).toEqual(missing.body);
  });

  it('input that cannot be, with its path', async () => {
    const { version } = await arrive(maryam);
    const errorsOf = async (more: Record<string, unknown>) => {
      const answer = await post(`${maryam}/door-checks`, doorCheck(version, more)).expect(422);
      return (problem.parse(answer.body).errors ?? []).map(({ path }) => path);
    };
    expect(await errorsOf({ broughtBy: ' ' })).toEqual(['broughtBy']);
    expect(await errorsOf({ lastFoodAt: iso('07:30') })).toEqual(['lastFoodAt']);
    expect(await errorsOf({ lastDrinkAt: iso('07:00', '2027-04-10') })).toEqual(['lastDrinkAt']);
    expect(await errorsOf({ wokeAt: '2027-04-13T25:00:00.000Z' })).toEqual(['wokeAt']);
    await nurse.get('/api/clinic/this-morning?on=2027-02-29').expect(422);
    await post('abc/arrival', { version: 1 }).expect(422);
  });

  it('any other day than the morning’s own', async () => {
    server.setNow(at('07:05', '2027-04-12'));
    expect(codeOf((await post(`${maryam}/arrival`, { version: 1 }).expect(409)).body)).toBe(
      'not-today',
    );
  });
});

describe('the sheet', () => {
  it('lists the day in order of arrival with what is missing, and no result', async () => {
    const page = await sheet();
    expect(page.on).toBe(morningDay);
    expect(page.summary).toBe('Two children: two not heard from.');
    expect(page.rows.map(({ fullName }) => fullName)).toEqual([
      'Maryam Nuur Cali',
      'Yusuf Nuur Cali',
    ]);
    expect(page.otherDays).toEqual(['2027-04-14', '2027-04-15']);
    const [row] = page.rows;
    expect(row).toMatchObject({
      ageInWords: '7 months',
      number: 1,
      ofPlanned: 3,
      suns: ['next', 'later', 'later'],
      escort: 'grandmother, Halima Nuur',
      speaks: 'Somali',
      needsInterpreter: true,
      verdict: null,
      verdictSays: 'Not known',
      bar: {
        isPlanOnly: true,
        fromAt: iso('03:00'),
        leastAt: iso('07:00'),
        longestAt: iso('11:00'),
      },
    });
    expect(row?.phones.map(({ phone }) => phone)).toEqual(['+12065550142', '+12065550141']);
    expect(row?.warnings).toEqual([
      'Grandmother cannot consent: the consent of Hodan Cali is on file.',
      'Like name today: Yusuf Nuur Cali. Scan and look again.',
    ]);
    expect(page.protocolSays).toContain('version 3');
    expect(page.laboratorySays).toContain('version 2');
    expect(JSON.stringify(page)).not.toMatch(/culture|smear|amplification/i);
  });

  it('shows what the family said, word for word, and the verdict of it', async () => {
    server.setNow(at('06:00'));
    const mother = await server.openFamilySession(household.motherId, 'household');
    await mother
      .post('/api/family/fasting-checks')
      .send({
        submissionKey: 'b1d6a9c0-6a3d-4a55-9d3c-0f4d8f6f1a01',
        on: morningDay,
        answers: [
          { morningId: maryam, answer: 'feed', lastIntakeAt: iso('03:30') },
          { morningId: yusuf, answer: 'unsure' },
        ],
        deviceAt: iso('06:00'),
      })
      .expect(200);
    const page = await sheet();
    expect(page.summary).toBe('Two children: two heard from, not here yet.');
    const [first, second] = page.rows;
    expect(first?.said).toEqual([
      {
        at: iso('06:00'),
        source: 'On the page',
        says: 'Milk or food, finished at 03:30. “A bottle or food” Told: come and wait.',
      },
    ]);
    expect(first).toMatchObject({
      verdict: 'not-long-enough',
      verdictSays: 'Not long enough until 07:30',
      fastedMinutes: 150,
      readyAt: iso('07:30'),
    });
    expect(second).toMatchObject({ verdict: 'cannot-tell', verdictSays: 'Cannot tell' });
    expect(second?.bar?.isUnsure).toBe(true);
  });

  it('offers to collect or feed from half an hour before the longest fast, and to feed at it', async () => {
    server.setNow(at('10:29'));
    expect((await rowOf(maryam)).ceiling).toBe('ok');
    server.setNow(at('10:30'));
    expect((await rowOf(maryam)).ceiling).toBe('collect-or-feed');
    server.setNow(at('11:00'));
    expect((await rowOf(maryam)).ceiling).toBe('feed');
  });

  it('needs the same number of queries however many children come', async () => {
    const counted = async (): Promise<number> => {
      let queries = 0;
      const { db } = server.context;
      const query = db.query.bind(db);
      const spy = jest
        .spyOn(db, 'query')
        .mockImplementation((...args: Parameters<typeof query>) => {
          queries += 1;
          return query(...args);
        });
      await sheet();
      spy.mockRestore();
      return queries;
    };
    await sheet();
    const two = await counted();
    server.setNow(at('07:07'));
    for (const callMe of ['Nahom', 'Juniel', 'Tomas'])
      await addHousehold(server.context, clinic, [
        { callMe, bornOn: '2025-05-05', arrivalTime: '07:45' },
      ]);
    await sheet();
    expect(await counted()).toBe(two);
    expect(two).toBeLessThanOrEqual(22);
  });

  it('is one row a session and minute on the access record', async () => {
    await sheet();
    await sheet();
    server.setNow(at('07:06'));
    await sheet();
    const rows = await select<{ n: number }>(
      server.context.db,
      "SELECT COUNT(*) AS n FROM access_records WHERE matter = 'this-morning'",
    );
    expect(Number(rows[0]?.n)).toBe(2);
  });
});

describe('arrival', () => {
  it('is noted once, whoever taps twice', async () => {
    const row = await arrive(maryam);
    expect([row.state, row.arrivedAt, row.version]).toEqual(['here', iso('07:05'), 2]);
    server.setNow(at('07:09'));
    const again = await post(`${maryam}/arrival`, { version: 1 }).expect(200);
    expect(again.body.row.arrivedAt).toBe(iso('07:05'));
    expect(again.body.row.version).toBe(2);
  });

  it('made from an old screen is refused', async () => {
    const answer = await post(`${maryam}/arrival`, { version: 7 }).expect(409);
    expect(codeOf(answer.body)).toBe('changed-meanwhile');
  });
});

describe('door check', () => {
  it('comes after the arrival and decides the verdict, whatever the phone said', async () => {
    expect(codeOf((await post(`${maryam}/door-checks`, doorCheck(1)).expect(409)).body)).toBe(
      'not-here-yet',
    );
    const { version } = await arrive(maryam);
    const row = await check(maryam, version, {
      lastDrinkAt: iso('04:00'),
      isNothingSincePlan: false,
    });
    expect(row).toMatchObject({
      verdict: 'not-long-enough',
      readyAt: iso('08:00'),
      doorCheck: { verdict: 'not-long-enough' },
    });
    expect(row.doorCheck?.says).toBe('Drink at 04:00, woke 05:50, well, with grandmother.');
  });

  it('sent twice is one; a different one from an old screen is refused', async () => {
    const { version } = await arrive(maryam);
    await check(maryam, version);
    await check(maryam, version);
    const other = await post(`${maryam}/door-checks`, doorCheck(version, { isWell: false })).expect(
      409,
    );
    expect(codeOf(other.body)).toBe('changed-meanwhile');
    const rows = await select<{ id: number }>(server.context.db, 'SELECT id FROM door_checks');
    expect(rows).toHaveLength(1);
  });

  it('lets a clinician alone go on, with a reason', async () => {
    const { version } = await arrive(maryam);
    const early = { lastDrinkAt: iso('05:00'), isNothingSincePlan: false };
    const checked = await check(maryam, version, early);
    const refused = await begin(maryam, checked.version).expect(409);
    expect([codeOf(refused.body), refused.body.readyAt]).toEqual(['not-long-enough', iso('09:00')]);
    const byNurse = doorCheck(checked.version, { ...early, goOnReason: 'only a sip' });
    expect(codeOf((await post(`${maryam}/door-checks`, byNurse).expect(403)).body)).toBe(
      'clinician-decides',
    );
    const clinician = await server.signInStaff('clinician');
    const decided = await post(`${maryam}/door-checks`, byNurse, clinician).expect(200);
    await begin(maryam, decided.body.row.version).expect(200);
  });

  it('past the longest fast suggests to feed', async () => {
    const { version } = await arrive(maryam);
    const checked = await check(maryam, version, {
      lastDrinkAt: iso('23:00', '2027-04-12'),
      isNothingSincePlan: false,
    });
    expect(checked.ceiling).toBe('feed');
    expect((await sheet()).suggestion?.says).toContain('Feed Maryam now');
    expect(codeOf((await begin(maryam, checked.version).expect(409)).body)).toBe(
      'longest-fast-passed',
    );
  });

  it('past the longest fast goes on by a clinician’s reason alone, which is kept', async () => {
    const { version } = await arrive(maryam);
    const supper = { lastFoodAt: iso('22:00', '2027-04-12'), isNothingSincePlan: false };
    const checked = await check(maryam, version, supper);
    const with_ = (ceilingReason: string, agent = nurse) =>
      post(
        `${maryam}/collection`,
        { version: checked.version, roomId: clinic.roomIds[0], ceilingReason },
        agent,
      );
    expect(codeOf((await with_('last try').expect(403)).body)).toBe('clinician-decides');
    const clinician = await server.signInStaff('clinician');
    expect(codeOf((await with_(' ', clinician).expect(409)).body)).toBe('longest-fast-passed');
    await with_('glucose 92, last specimen', clinician).expect(200);
    const [kept] = await select<{ ceiling_reason: string }>(
      server.context.db,
      'SELECT ceiling_reason FROM collections',
    );
    expect(kept?.ceiling_reason).toBe('glucose 92, last specimen');
  });

  it('a reason for too short a fast is none for too long a one', async () => {
    const clinician = await server.signInStaff('clinician');
    const { version } = await arrive(maryam);
    const early = {
      lastFoodAt: iso('03:30'),
      isNothingSincePlan: false,
      goOnReason: 'half an hour',
    };
    const answer = await post(`${maryam}/door-checks`, doorCheck(version, early), clinician);
    const { row } = morningChanged.parse(answer.body);
    server.setNow(at('11:40'));
    expect(codeOf((await begin(maryam, row.version).expect(409)).body)).toBe('longest-fast-passed');
  });

  it('tells a sip of water from a meal: the least hours begin again, the longest fast does not', async () => {
    const { version } = await arrive(maryam);
    const sip = { lastDrinkAt: iso('05:00'), drinkItem: 'water', isNothingSincePlan: false };
    const sipped = await check(maryam, version, { ...sip, bloodGlucoseMgDl: 88 });
    expect(sipped).toMatchObject({
      verdict: 'not-long-enough',
      readyAt: iso('09:00'),
      bar: { leastAt: iso('09:00'), longestAt: iso('11:00') },
    });
    expect(sipped.doorCheck?.says).toContain('Water at 05:00');
    expect(sipped.doorCheck?.says).toContain('blood glucose 88 mg/dL');
    const milk = { lastFoodAt: iso('05:00'), foodItem: 'formula', isNothingSincePlan: false };
    const fed = await check(maryam, sipped.version, milk);
    expect(fed.bar).toMatchObject({ leastAt: iso('09:00'), longestAt: iso('13:00') });
    expect(fed.explains).toEqual([
      expect.objectContaining({
        rule: 'fasting-plan.protocol',
        says: expect.stringMatching(
          /^Plan: nothing from 03:00, 4 h 00 min before the arrival at 07:00; longest fast 8 h 00 min\. .*version 3/,
        ) as unknown,
      }),
      {
        rule: 'door-check.not-long-enough',
        inputs: expect.objectContaining({ foodItem: 'formula', readyAt: at('09:00') }) as unknown,
        says: 'Fast: formula at 05:00. Least hours over only at 09:00; hungry since 05:00, longest fast at 13:00.',
      },
    ]);
  });
});

describe('collection', () => {
  it('is opened by the door check, suggested with its reason, and makes the specimen', async () => {
    const { version } = await arrive(maryam);
    expect(codeOf((await begin(maryam, version).expect(409)).body)).toBe('door-check-first');
    const checked = await check(maryam, version);
    expect((await sheet()).suggestion).toMatchObject({
      morningId: maryam,
      roomId: clinic.roomIds[0],
      says: 'Next: Maryam, Room 1. Here, checked and fasted long enough.',
      explains: {
        rule: 'order-of-morning.only-one-ready',
        inputs: { waiting: 1, ready: 1, minutesLeft: 235 },
        says: '1 of 1 waiting children can be collected now. Here, checked and fasted long enough; 3 h 55 min to its longest fast.',
      },
    });
    const begun = morningChanged.parse((await begin(maryam, checked.version).expect(200)).body);
    expect([begun.row.state, begun.warnings]).toEqual(['collecting', []]);
    expect((await sheet()).rooms[0]).toMatchObject({ opensAt: null, says: 'In use: Maryam.' });
    const ended = morningChanged.parse(
      (await put(`${maryam}/collection`, collected(begun.row.version)).expect(200)).body,
    );
    expect(ended.warnings).toEqual([]);
    expect(ended.row).toMatchObject({
      state: 'collected',
      suns: ['done', 'next', 'later'],
      verdictSays: 'Specimen 1, 8 mL, after 4 h 06 min',
      specimen: {
        number: 1,
        volumeMl: 8,
        neutraliseBy: iso('07:36'),
        receiptBy: iso('11:06'),
      },
    });
    const [series] = await select<{ state: string }>(
      server.context.db,
      `SELECT state FROM series WHERE id = ${household.children[0]?.seriesId}`,
    );
    expect(series?.state).toBe('collecting');
    expect((await sheet()).rooms[0]).toMatchObject({
      opensAt: iso('08:05'),
      says: 'Closed, 60 minutes left. Opens at 08:05.',
    });
  });

  it('sent twice, also at the same moment, makes one specimen', async () => {
    const version = await inRoom(maryam);
    const send = () => put(`${maryam}/collection`, collected(version));
    const answers = await Promise.all([send(), send()]);
    expect(answers.map(({ status }) => status)).toEqual([200, 200]);
    const rows = await select<{ id: number }>(server.context.db, 'SELECT id FROM specimens');
    expect(rows).toHaveLength(1);
    const other = await put(`${maryam}/collection`, collected(version, { volumeMl: 3 })).expect(
      409,
    );
    expect(codeOf(other.body)).toBe('changed-meanwhile');
  });

  it('warns outside the laboratory’s profile and never blocks', async () => {
    const version = await inRoom(maryam);
    server.setNow(at('08:00'));
    const ended = await put(
      `${maryam}/collection`,
      collected(version, { volumeMl: 2, label: '', neutralisedAt: iso('07:50') }),
    ).expect(200);
    expect(ended.body.warnings).toEqual([
      'Less than 5 mL, the least that Harbor Street laboratory (demo) wants.',
      'Neutralised after 44 minutes; Harbor Street laboratory (demo) wants 30 at the most.',
      'Not labelled yet: label before it leaves the room.',
    ]);
  });

  it('refuses times that cannot be and a label that is on another specimen', async () => {
    const version = await inRoom(maryam);
    const errorsOf = async (morningId: number, of: number, more: Record<string, unknown>) => {
      const refused = await put(`${morningId}/collection`, collected(of, more)).expect(422);
      return (problem.parse(refused.body).errors ?? []).map(({ path }) => path);
    };
    expect(await errorsOf(maryam, version, { collectedAt: iso('08:00') })).toEqual(['collectedAt']);
    expect(await errorsOf(maryam, version, { collectedAt: iso('06:00') })).toEqual(['collectedAt']);
    expect(await errorsOf(maryam, version, { neutralisedAt: iso('07:01') })).toEqual([
      'neutralisedAt',
    ]);
    expect(await errorsOf(maryam, version, { volumeMl: 0 })).toEqual(['volumeMl']);
    await put(`${maryam}/collection`, collected(version)).expect(200);
    server.setNow(at('07:15'));
    const second = await inRoom(yusuf, clinic.roomIds[1]);
    expect(await errorsOf(yusuf, second, { collectedAt: iso('07:15') })).toEqual(['label']);
  });

  it('takes one child a room and warns while the room is closed', async () => {
    const version = await inRoom(maryam);
    server.setNow(at('07:15'));
    const { version: arrived } = await arrive(yusuf);
    const checked = await check(yusuf, arrived);
    expect(codeOf((await begin(yusuf, checked.version).expect(409)).body)).toBe('room-in-use');
    await put(`${maryam}/collection`, collected(version)).expect(200);
    const begun = await begin(yusuf, checked.version).expect(200);
    expect(begun.body.warnings[0]).toContain('closed until 08:15');
    await begin(yusuf, checked.version).expect(200);
    await begin(yusuf, checked.version, clinic.roomIds[1]).expect(409);
    await begin(yusuf, 99, 424242).expect(409);
  });

  it('not collected keeps the reason; numbers go on from what was taken; the series waits at the end', async () => {
    const seriesId = household.children[0]?.seriesId;
    const mornings = household.children[0]?.morningIds ?? [];
    const first = await inRoom(maryam);
    const lost = await put(`${maryam}/collection`, {
      version: first,
      outcome: 'not-collected',
      reason: 'vomited',
    }).expect(200);
    expect(lost.body.row).toMatchObject({
      state: 'not-collected',
      verdictSays: 'Not collected: vomited',
    });
    for (const [index, on] of ['2027-04-14', '2027-04-15'].entries()) {
      server.setNow(at('07:05', on));
      const morningId = mornings[index + 1] ?? 0;
      const { version } = await arrive(morningId);
      const checked = await check(morningId, version, { wokeAt: iso('05:50', on) });
      const begun = await begin(morningId, checked.version).expect(200);
      await put(
        `${morningId}/collection`,
        collected(begun.body.row.version, { collectedAt: iso('07:06', on), label: `L-${index}` }),
      ).expect(200);
    }
    const numbers = await select<{ number: number }>(
      server.context.db,
      `SELECT number FROM specimens WHERE series_id = ${seriesId} ORDER BY id`,
    );
    expect(numbers.map(({ number }) => number)).toEqual([1, 2]);
    const [series] = await select<{ state: string }>(
      server.context.db,
      `SELECT state FROM series WHERE id = ${seriesId}`,
    );
    expect(series?.state).toBe('awaiting-results');
  });

  it('after a feed needs a new door check', async () => {
    const { version } = await arrive(maryam);
    const checked = await check(maryam, version);
    const fed = await post(`${maryam}/feeding`, { version: checked.version, event: 'fed' }).expect(
      200,
    );
    expect(fed.body.warnings).toHaveLength(1);
    expect(codeOf((await begin(maryam, fed.body.row.version).expect(409)).body)).toBe(
      'door-check-first',
    );
  });
});

describe('afterwards', () => {
  it('fed and gone, each once, on the access record and announced', async () => {
    const version = await inRoom(maryam);
    const ended = await put(`${maryam}/collection`, collected(version)).expect(200);
    const fed = await post(`${maryam}/feeding`, {
      version: ended.body.row.version,
      event: 'fed',
    }).expect(200);
    await post(`${maryam}/feeding`, { version: ended.body.row.version, event: 'fed' }).expect(200);
    const left = await post(`${maryam}/feeding`, {
      version: fed.body.row.version,
      event: 'left',
    }).expect(200);
    expect(left.body.row).toMatchObject({ fedAt: iso('07:05'), leftAt: iso('07:05') });
    const kept = await select<{ matter: string }>(
      server.context.db,
      "SELECT matter FROM access_records WHERE action = 'changed' AND matter <> 'sign-in' ORDER BY id",
    );
    expect(kept.map(({ matter }) => matter)).toEqual([
      'arrival',
      'door-check',
      'collection-begun',
      'collection-ended',
      'fed',
      'left',
    ]);
    const announced = await select<{ n: number }>(
      server.context.db,
      "SELECT COUNT(*) AS n FROM changes WHERE topic = 'mornings'",
    );
    expect(Number(announced[0]?.n)).toBe(6);
  });
});
