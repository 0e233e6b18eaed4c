import { randomUUID } from 'node:crypto';
import type { StaffRole } from '../../shared/access/rights';
import {
  placesOfCountry,
  setUp,
  type SaveSiteRequest,
  type SetUp,
} from '../../shared/contracts/set-up';
import { change, inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { addNight, localInstant, nightOn, signWords } from '../support/night';
import { startTestServer, type Agent, type TestServer } from '../support/server';

let server: TestServer;
let administrator: Agent;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-01', '10:00'));
  administrator = await server.signInStaff('administrator');
});
afterAll(() => server.close());

const read = async (agent = administrator): Promise<SetUp> =>
  setUp.parse((await agent.get('/api/clinic/set-up').expect(200)).body);
const formOf = ({ site: { id: _id, ...form } }: SetUp): SaveSiteRequest => form;
const put = (path: string, body: object, agent = administrator) =>
  agent.put(`/api/clinic/set-up/${path}`).send(body);
const post = (path: string, body: object, agent = administrator) =>
  agent.post(`/api/clinic/set-up/${path}`).send(body);
const save = async (more: object, status = 200) => {
  const now = await read();
  return put(`sites/${now.site.id}`, { ...formOf(now), ...more }).expect(status);
};
const records = (): Promise<{ matter: string; detail: Record<string, unknown> }[]> =>
  select(
    server.context.db,
    "SELECT matter, detail FROM access_records WHERE action = 'changed' AND matter <> 'sign-in' ORDER BY id",
  );

describe('nobody else sets the clinic up', () => {
  const writes = [
    ['put', 'sites/1'],
    ['post', 'sites'],
    ['put', 'rooms/1'],
    ['post', 'rooms'],
    ['post', 'closures'],
    ['post', 'closures/end'],
    ['put', 'holidays'],
  ] as const;

  test.each<StaffRole>(['nurse-coordinator', 'lead-clinician', 'front-desk', 'language-reviewer'])(
    '%s',
    async (role) => {
      const agent = await server.signInStaff(role);
      for (const [method, path] of writes)
        await agent[method](`/api/clinic/set-up/${path}`).send({}).expect(403);
    },
  );

  test('nobody without a session; the care team reads', async () => {
    for (const [method, path] of writes)
      await server.visitor()[method](`/api/clinic/set-up/${path}`).send({}).expect(401);
    const nurse = await server.signInStaff('nurse-coordinator');
    await read(nurse);
    const desk = await server.signInStaff('front-desk');
    await desk.get('/api/clinic/set-up').expect(403);
  });

  test('a site, a room and a day that are not there', async () => {
    const form = formOf(await read());
    await administrator.get('/api/clinic/set-up?siteId=999999').expect(404);
    await put('sites/999999', form).expect(404);
    const closure = { by: 'minutes', minutes: 60 };
    await put('rooms/999999', { name: 'R', closure, isInUse: true, version: 1 }).expect(404);
    await post('rooms', { siteId: 999999, name: 'R', closure, submissionKey: randomUUID() }).expect(
      404,
    );
    await post('closures', {
      siteId: 999999,
      from: '2026-12-10',
      until: '2026-12-10',
      reason: 'x',
    }).expect(404);
  });
});

describe('a site', () => {
  test.each([
    ['name', { name: ' ' }],
    ['shortName', { shortName: 'TB Clinic' }],
    ['address', { address: 'TB Clinic, 4 Alder Street' }],
    ['door', { door: 'Tuberculosis entrance' }],
    ['country', { country: 'XX' }],
    ['country', { country: 'usa' }],
    ['region', { region: 'ZZ' }],
    ['zone', { zone: 'America/Nowhere' }],
    ['phone', { phone: '12' }],
    ['emergencyNumber', { emergencyNumber: 'call us' }],
    ['dawnPhone.until', { dawnPhone: { from: '08:00', until: '05:00' } }],
    ['dawnPhone.from', { dawnPhone: { from: '24:00', until: '25:00' } }],
    ['dawnLanguages', { dawnLanguages: [] }],
    ['dawnLanguages', { dawnLanguages: ['xx'] }],
    ['clinicWeekdays', { clinicWeekdays: [] }],
    ['clinicWeekdays.0', { clinicWeekdays: [8] }],
    ['arrivals.until', { arrivals: { from: '09:00', until: '06:00' } }],
    ['placesPerMorning', { placesPerMorning: 0 }],
    ['minutesPerChild', { minutesPerChild: 0 }],
    ['eveningTextTime', { eveningTextTime: '21:00' }],
    ['eveningTextTime', { eveningTextTime: '09:00' }],
    ['aheadTextTime', { aheadTextTime: '07:30' }],
    ['morningQuestionMinutesBefore', { morningQuestionMinutesBefore: 10 }],
    ['nudgeMinutesBefore', { nudgeMinutesBefore: 120 }],
    ['callListMinutesBefore', { callListMinutesBefore: 90 }],
  ])('refuses %s %j and says so beside the field', async (field, more) => {
    const { body } = await save(more, 422);
    expect(body.errors.map(({ path }: { path: string }) => path)).toContain(field);
    expect(await records()).toEqual([]);
  });

  test('keeps what was changed, once, and names the fields on the access record', async () => {
    const before = await read();
    const { body } = await save({
      phone: '(206) 555-0123',
      dawnLanguages: ['en', 'es'],
      arrivals: { from: '06:30', until: '08:30' },
      emergencyNumber: null,
    });
    const after = setUp.parse(body);
    expect(after.site).toMatchObject({
      phone: '+12065550123',
      dawnLanguages: ['en', 'es'],
      arrivals: { from: '06:30', until: '08:30' },
      emergencyNumber: '911',
      version: before.site.version + 1,
    });
    expect(await records()).toMatchObject([
      { matter: 'site', detail: { changed: ['phone', 'dawnLanguages', 'arrivals'] } },
    ]);
  });

  test('two people at once: one is asked to look again, and nothing of the other is lost', async () => {
    const form = formOf(await read());
    const { site } = await read();
    const answers = await Promise.all([
      put(`sites/${site.id}`, { ...form, door: 'Door C' }),
      put(`sites/${site.id}`, { ...form, door: 'Door D' }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(answers.find(({ status }) => status === 409)?.body.code).toBe('changed-meanwhile');
  });

  test('another door: what waits for a coming night says so, and the calendar moves', async () => {
    await signWords(server);
    const night = await addNight(server, { members: [{ texts: 'early', mail: true }] });
    const { householdId } = night;
    server.setNow(localInstant('2026-12-07', '10:00'));
    await inTransaction(server.context.db, (transaction) =>
      planHouseholdMessages(server.context, transaction, { householdId, on: nightOn }),
    );
    await save({ door: 'Door Q' });
    const rows = await select<{ kind: string; state: string; body: string }>(
      server.context.db,
      "SELECT kind, state, body FROM messages WHERE kind IN ('evening', 'calendar')",
    );
    const evening = rows.filter(({ kind }) => kind === 'evening');
    const waiting = evening.filter(({ state }) => state === 'queued');
    expect(waiting.length).toBeGreaterThan(0);
    expect(waiting.every(({ body }) => body.includes('Door Q'))).toBe(true);
    expect(rows.some(({ kind, body }) => kind === 'calendar' && body.includes('Door Q'))).toBe(
      true,
    );
  });

  test('another clock is refused while mornings are to come', async () => {
    await addNight(server);
    const { body } = await save({ zone: 'America/Denver' }, 422);
    expect(body.errors[0].path).toBe('zone');
    server.setNow(localInstant('2026-12-20', '10:00'));
    await save({ zone: 'America/Denver' });
  });

  test('another site starts with a room and the unsigned starting protocol; a repeat adds none', async () => {
    const { version: _version, ...form } = formOf(await read());
    const body = { ...form, name: 'Second site', submissionKey: randomUUID() };
    const first = setUp.parse((await post('sites', body).expect(200)).body);
    const again = setUp.parse((await post('sites', body).expect(200)).body);
    expect(again.site.id).toBe(first.site.id);
    expect(first.sites.map(({ name }) => name)).toContain('Second site');
    expect(first.rooms).toHaveLength(1);
    expect(first.protocols).toMatchObject([{ hasStartingValues: true, signedAt: null }]);
    const url = `/api/clinic/set-up?siteId=${first.site.id}`;
    expect((await administrator.get(url).expect(200)).body.site.name).toBe('Second site');
  });

  test('a country brings its regions and its emergency number', async () => {
    const places = async (country: string) =>
      placesOfCountry.parse(
        (await administrator.get(`/api/clinic/set-up/places?country=${country}`).expect(200)).body,
      );
    expect(await places('US')).toMatchObject({ emergencyNumber: '911' });
    expect((await places('US')).regions).toContainEqual({ code: 'IL', name: 'Illinois' });
    expect(await places('DE')).toMatchObject({ emergencyNumber: null });
    await administrator.get('/api/clinic/set-up/places?country=us').expect(422);
  });
});

describe('rooms', () => {
  const air = (airChangesPerHour: number, clearedPercent: number) => ({
    by: 'air',
    airChangesPerHour,
    clearedPercent,
  });
  const addRoom = async (closure: object, name = 'Room 9') => {
    const { site } = await read();
    return post('rooms', { siteId: site.id, name, closure, submissionKey: randomUUID() });
  };

  // CDC 2003, table B.1.
  test.each([
    [6, 99, 46],
    [6, 99.9, 69],
    [12, 99, 23],
    [12, 99.9, 35],
  ])('%s air changes an hour, %s %%: closed for %s minutes', async (changes, percent, minutes) => {
    const { body } = await addRoom(air(changes, percent));
    expect(setUp.parse(body).rooms.at(-1)).toMatchObject({
      closureMinutes: minutes,
      closure: air(changes, percent),
    });
  });

  test.each([
    [air(0, 99), 'closure.airChangesPerHour'],
    [air(61, 99), 'closure.airChangesPerHour'],
    [air(6, 95), 'closure.clearedPercent'],
    [{ by: 'minutes', minutes: -1 }, 'closure.minutes'],
    [{ by: 'minutes', minutes: 481 }, 'closure.minutes'],
  ])('refuses %j', async (closure, field) => {
    const { body, status } = await addRoom(closure);
    expect(status).toBe(422);
    expect(body.errors[0].path).toBe(field);
  });

  test('changes by version, and leaves use only when no morning waits for it', async () => {
    const night = await addNight(server);
    const [room] = (await read()).rooms;
    const body = {
      name: 'Room 1',
      closure: { by: 'minutes', minutes: 75 },
      isInUse: false,
      version: room?.version,
    };
    const refused = await put(`rooms/${room?.id}`, body).expect(422);
    expect(refused.body.errors[0].path).toBe('isInUse');
    await change(server.context.db, "UPDATE mornings SET state = 'lost' WHERE id = :id", {
      id: night.morningIds[0],
    });
    const kept = setUp.parse((await put(`rooms/${room?.id}`, body).expect(200)).body);
    expect(kept.rooms[0]).toMatchObject({ isInUse: false, closureMinutes: 75 });
    const { body: late } = await put(`rooms/${room?.id}`, body).expect(409);
    expect(late.code).toBe('changed-meanwhile');
    expect((await records()).map(({ matter }) => matter)).toEqual(['room']);
  });
});

describe('the calendar', () => {
  const span = async (from: string, until: string, reason = 'stock taking') => ({
    siteId: (await read()).site.id,
    from,
    until,
    reason,
  });

  test.each([
    ['until', '2026-12-11', '2026-12-10'],
    ['until', '2026-12-10', '2027-02-28'],
    ['from', '2026-11-30', '2026-12-02'],
    ['from', '2026-02-30', '2026-03-01'],
  ])('refuses %s of %s to %s', async (field, from, until) => {
    const { body } = await post('closures', await span(from, until)).expect(422);
    expect(body.errors[0].path).toBe(field);
  });

  test('days that are closed show as a span, and name the mornings planned on them', async () => {
    await addNight(server);
    const { body } = await post('closures', await span('2026-12-08', '2026-12-10')).expect(200);
    const after = setUp.parse(body);
    expect(after.closures).toEqual([
      { from: '2026-12-08', until: '2026-12-10', reason: 'stock taking', mornings: 1 },
    ]);
    expect(after.stranded).toEqual([
      { on: nightOn, mornings: 1, says: 'The clinic is closed: stock taking.' },
    ]);
    const opened = await post('closures/end', await span('2026-12-09', '2026-12-09')).expect(200);
    expect(setUp.parse(opened.body)).toMatchObject({
      closures: [{ from: '2026-12-08' }, { from: '2026-12-10' }],
      stranded: [],
    });
    expect((await records()).map(({ matter }) => matter)).toEqual(['days-closed', 'days-opened']);
  });

  test('a weekday that is given up strands its mornings', async () => {
    await addNight(server);
    const { body } = await save({ clinicWeekdays: [1, 2, 4, 5] });
    expect(setUp.parse(body).stranded).toMatchObject([
      { on: nightOn, says: 'Wednesday is no clinic day.' },
    ]);
  });

  test('a morning that families were told about does not open again', async () => {
    await addNight(server);
    const nurse = await server.signInStaff('nurse-coordinator');
    await nurse
      .post(`/api/clinic/closings/${nightOn}`)
      .send({ reason: 'snow', says: null })
      .expect(200);
    const { body } = await post('closures/end', await span(nightOn, nightOn)).expect(409);
    expect(body.code).toBe('families-told');
    expect((await read()).closures).toHaveLength(1);
  });

  test('holidays of the coming year, and “we are open”', async () => {
    const before = await read();
    const christmas = before.holidays.find(({ on }) => on === '2026-12-25');
    expect(christmas).toEqual({
      on: '2026-12-25',
      name: 'Christmas Day',
      isOpen: false,
      mornings: 0,
    });
    const body = { siteId: before.site.id, on: '2026-12-25', isOpen: true };
    await put('holidays', body).expect(200);
    const open = setUp.parse((await put('holidays', body).expect(200)).body);
    expect(open.holidays.find(({ on }) => on === '2026-12-25')?.isOpen).toBe(true);
    expect((await records()).map(({ matter }) => matter)).toEqual(['holiday']);
    await put('holidays', { ...body, on: '2026-12-24' }).expect(422);
    await put('holidays', { ...body, isOpen: false }).expect(200);
    expect((await read()).holidays.find(({ on }) => on === '2026-12-25')?.isOpen).toBe(false);
  });
});
