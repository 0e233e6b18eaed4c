import { randomUUID } from 'node:crypto';
import { problem } from '../../shared/contracts/problem';
import {
  protocolDetail,
  versionList,
  type ProtocolDetail,
  type ProtocolValues,
} from '../../shared/contracts/protocols';
import { select } from '../../server/database/connection';
import { currentProtocol } from '../../server/protocols/protocols';
import { insert } from '../support/insert';
import { addClinic, at } from '../support/mornings';
import {
  draftProtocol,
  protocolsPath,
  saveProtocol,
  savedProtocol,
  signProtocol,
  twoHoursMore,
} from '../support/protocols';
import { staffPassword, startTestServer, type Agent, type TestServer } from '../support/server';

const path = protocolsPath;
const monday = '2027-04-05';

let server: TestServer;
let clinician: Agent;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(at('10:00', monday));
  await addClinic(server.context, await server.siteId());
  clinician = await server.signInStaff('clinician');
});
afterAll(() => server.close());

const draft = (agent = clinician) => draftProtocol(agent);
const save = (one: ProtocolDetail, values: Partial<ProtocolValues>, agent = clinician) =>
  saveProtocol(agent, one, values);
const saved = (one: ProtocolDetail, values: Partial<ProtocolValues>) =>
  savedProtocol(clinician, one, values);
const sign = (
  one: Pick<ProtocolDetail, 'id' | 'draftVersion'>,
  agent = clinician,
  password = staffPassword,
) => signProtocol(agent, one, password);
const codeOf = (answer: { body: unknown }): string => problem.parse(answer.body).code;
const fieldsOf = (answer: { body: unknown }): string[] =>
  (problem.parse(answer.body).errors ?? []).map((error) => error.path);
describe('refused', () => {
  it('nobody signed in', async () => {
    await server.visitor().get(path).expect(401);
    await server.visitor().post(path).send({ submissionKey: randomUUID() }).expect(401);
    await server.visitor().post(`${path}/1/signature`).send({}).expect(401);
  });

  it('the administrator reads, and neither writes nor signs', async () => {
    const one = await draft();
    const administrator = await server.signInStaff('administrator');
    await administrator.get(path).expect(200);
    await administrator.get(`${path}/${one.id}`).expect(200);
    for (const answer of [
      await administrator.post(path).send({ submissionKey: randomUUID() }).expect(403),
      await save(one, {}, administrator).expect(403),
      await sign(one, administrator).expect(403),
    ])
      expect(codeOf(answer)).toBe('not-allowed');
  });

  it('the front desk sees nothing of it', async () => {
    const desk = await server.signInStaff('front-desk');
    await desk.get(path).expect(403);
    await desk.post(`${path}/check`).send({}).expect(403);
  });

  it('a nurse coordinator drafts and does not sign', async () => {
    const nurse = await server.signInStaff('nurse-coordinator');
    const one = await draft(nurse);
    const mended = await save(one, twoHoursMore(one), nurse).expect(200);
    await sign(protocolDetail.parse(mended.body), nurse).expect(403);
    expect(await signedVersions()).toEqual([3]);
  });

  it('another site’s version, for everything', async () => {
    const [site] = await select<Record<string, unknown>>(
      server.context.db,
      'SELECT * FROM sites LIMIT 1',
    );
    const { id: _id, ...columns } = site ?? {};
    const elsewhere = await insert(server.context.db, 'sites', {
      ...columns,
      name: 'Hill Clinic',
      clinic_weekdays: '[1,2,3]',
      ...('dawn_languages' in columns ? { dawn_languages: '["en"]' } : {}),
    });
    const id = await insert(server.context.db, 'fasting_protocols', {
      site_id: elsewhere,
      version: 1,
      title: 'Theirs',
      effective_on: '2027-01-01',
      body: JSON.stringify({ usualWaitMinutes: 1, eatAgainAfterMinutes: 1, bands: [] }),
      has_starting_values: false,
    });
    const mine = await draft();
    await clinician.get(`${path}/${id}`).expect(404);
    await clinician.get(`${path}/${id}/consequences`).expect(404);
    await save({ ...mine, id, draftVersion: 1 }, {}).expect(404);
    await sign({ id, draftVersion: 1 }).expect(404);
    await clinician.post(`${path}/${id}/discard`).send({ draftVersion: 1 }).expect(404);
    const list = versionList.parse((await clinician.get(path).expect(200)).body);
    expect(list.versions.map((version) => version.title)).not.toContain('Theirs');
  });

  it('a wrong password', async () => {
    const one = await draft();
    const mended = await saved(one, twoHoursMore(one));
    const answer = await sign(mended, clinician, 'another long morning').expect(422);
    expect(fieldsOf(answer)).toEqual(['password']);
    expect(await signedVersions()).toEqual([3]);
  });

  it.each<[string, object, string]>([
    ['half an hour in eighths', { usualWaitMinutes: 7.5 }, 'values.usualWaitMinutes'],
    ['no day', { effectiveOn: '2027-02-29' }, 'values.effectiveOn'],
    ['a comfort nobody knows', { allowedItems: ['candy'] }, 'values.allowedItems.0'],
    [
      'a clock that does not exist',
      {
        bands: [
          {
            fromMonths: 0,
            toMonths: null,
            individualPlan: false,
            leastHours: null,
            longestHours: null,
            nothingFrom: '24:00',
          },
        ],
      },
      'values.bands.0.nothingFrom',
    ],
  ])('%s', async (_name, values, field) => {
    const answer = await save(await draft(), values).expect(422);
    expect(fieldsOf(answer)).toEqual([field]);
  });
});

const signedVersions = async (): Promise<number[]> =>
  (
    await select<{ version: number }>(
      server.context.db,
      'SELECT version FROM fasting_protocols WHERE signed_at IS NOT NULL ORDER BY version',
    )
  ).map(({ version }) => version);

describe('a draft', () => {
  it('is made from the version in force, a week ahead, once', async () => {
    const submissionKey = randomUUID();
    const first = protocolDetail.parse(
      (await clinician.post(path).send({ submissionKey }).expect(200)).body,
    );
    expect(first).toMatchObject({
      version: 4,
      state: 'draft',
      isStartingValues: true,
      draftVersion: 1,
      values: { effectiveOn: '2027-04-12', allowedItems: ['pacifier'] },
    });
    const again = await clinician.post(path).send({ submissionKey }).expect(200);
    expect(protocolDetail.parse(again.body).id).toBe(first.id);
    const other = await clinician.post(path).send({ submissionKey: randomUUID() }).expect(409);
    expect(other.body).toMatchObject({ code: 'draft-open', draftId: first.id });
  });

  it('two nurses who begin together make one', async () => {
    const nurse = await server.signInStaff('nurse-coordinator');
    const answers = await Promise.all(
      [clinician, nurse].map((agent) => agent.post(path).send({ submissionKey: randomUUID() })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('is saved with its faults, and says each beside its field', async () => {
    const one = await draft();
    const bands = one.values.bands.filter(({ fromMonths }) => fromMonths !== 6);
    const faulty = await saved(one, { title: 'Harbor hours', bands });
    expect(faulty.problems).toEqual([
      { path: 'bands.2.fromMonths', message: 'No band holds 6 to 11 months.' },
    ]);
    expect(faulty.draftVersion).toBe(2);
  });

  it('tells two editors apart: the second looks at what the first wrote', async () => {
    const one = await draft();
    await saved(one, { title: 'From the first' });
    const late = await save(one, { title: 'From the second' }).expect(409);
    expect(codeOf(late)).toBe('changed-meanwhile');
    const now = await clinician.get(`${path}/${one.id}`).expect(200);
    expect(protocolDetail.parse(now.body).values.title).toBe('From the first');
    expect(codeOf(await sign(one).expect(409))).toBe('changed-meanwhile');
  });

  it('is discarded, and its number is free again', async () => {
    const one = await draft();
    const { id, draftVersion } = one;
    await clinician.post(`${path}/${id}/discard`).send({ draftVersion: 9 }).expect(409);
    await clinician.post(`${path}/${id}/discard`).send({ draftVersion }).expect(200);
    await clinician.get(`${path}/${id}`).expect(404);
    expect((await draft()).version).toBe(4);
  });

  it('holds no hours for an individual plan, whatever was typed before', async () => {
    const one = await draft();
    const bands = one.values.bands.map((band) =>
      band.fromMonths === 3 ? { ...band, individualPlan: true } : band,
    );
    const held = (await saved(one, { bands })).values.bands.find((band) => band.fromMonths === 3);
    expect(held).toMatchObject({ individualPlan: true, leastHours: null, longestHours: null });
  });
});

describe('signing', () => {
  it('refuses a gap, an overlap and a shipped title, with their fields', async () => {
    const one = await draft();
    const [first, second, ...rest] = one.values.bands;
    const overlap = [first, { ...second, toMonths: 6 }, ...rest] as ProtocolValues['bands'];
    const faulty = await saved(one, {
      title: 'Starting values, to be confirmed by the clinic',
      effectiveOn: monday,
      bands: overlap,
    });
    const answer = await sign(faulty).expect(422);
    expect(codeOf(answer)).toBe('not-ready');
    expect(fieldsOf(answer)).toEqual(['title', 'effectiveOn', 'bands.2.fromMonths']);
    expect(await signedVersions()).toEqual([3]);
  });

  it('keeps the version for ever, and puts who and when on record', async () => {
    const one = await draft();
    const mended = await saved(one, twoHoursMore(one));
    const signed = protocolDetail.parse((await sign(mended).expect(200)).body);
    expect(signed).toMatchObject({
      state: 'to-come',
      isStartingValues: false,
      signedBy: 'Test clinician',
      signedAt: new Date(at('10:00', monday)).toISOString(),
      problems: [],
    });
    for (const answer of [
      await sign(signed).expect(409),
      await save(signed, { title: 'Later thoughts' }).expect(409),
      await clinician
        .post(`${path}/${signed.id}/discard`)
        .send({ draftVersion: signed.draftVersion })
        .expect(409),
    ])
      expect(codeOf(answer)).toBe('already-signed');
    const records = await select<{ detail: { what: string; id: number }; actor_name: string }>(
      server.context.db,
      "SELECT detail, actor_name FROM access_records WHERE matter = 'fasting-protocol' ORDER BY id",
    );
    expect(records.map(({ detail, actor_name }) => [detail.what, actor_name])).toEqual([
      ['draft-made', 'Test clinician'],
      ['draft-saved', 'Test clinician'],
      ['signed', 'Test clinician'],
    ]);
  });

  it('signs once when it is sent twice at the same moment', async () => {
    const one = await draft();
    const mended = await saved(one, twoHoursMore(one));
    const answers = await Promise.all([sign(mended), sign(mended)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const [{ count } = { count: 0 }] = await select<{ count: number }>(
      server.context.db,
      "SELECT COUNT(*) AS count FROM access_records WHERE JSON_VALUE(detail, '$.what') = 'signed'",
    );
    expect(count).toBe(1);
  });

  it('takes over on its day and not before', async () => {
    const one = await draft();
    await sign(await saved(one, twoHoursMore(one))).expect(200);
    const siteId = await server.siteId();
    const versionOn = async (on: string): Promise<number> =>
      (await currentProtocol(server.context.db, siteId, on)).version;
    expect(await versionOn('2027-04-13')).toBe(3);
    expect(await versionOn('2027-04-14')).toBe(4);
    server.setNow(at('10:00', '2027-04-14'));
    const { versions } = versionList.parse((await clinician.get(path).expect(200)).body);
    expect(versions.map(({ version, state }) => [version, state])).toEqual([
      [4, 'in-force'],
      [3, 'past'],
    ]);
  });
});
