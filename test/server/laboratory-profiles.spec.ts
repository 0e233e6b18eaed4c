import { randomUUID } from 'node:crypto';
import { problem } from '../../shared/contracts/problem';
import {
  consequences,
  profileCheck,
  profileDetail,
  versionList,
  type ProfileDetail,
  type ProfileValues,
} from '../../shared/contracts/protocols';
import { change } from '../../server/database/connection';
import { morningPlansOf } from '../../server/series/morning-plans';
import { specimenRows, toSpecimen } from '../../server/specimens/specimen-rows';
import { clinicWords } from '../../server/wording/clinic-words';
import { insert } from '../support/insert';
import { addClinic, addHousehold, at, maryamAndYusuf, type TestClinic } from '../support/mornings';
import { staffPassword, startTestServer, type Agent, type TestServer } from '../support/server';

const path = '/api/clinic/laboratory-profiles';

let server: TestServer;
let clinician: Agent;
let clinic: TestClinic;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(at('10:00', '2027-04-05'));
  clinic = await addClinic(server.context, await server.siteId());
  clinician = await server.signInStaff('clinician');
});
afterAll(() => server.close());

async function draft(agent = clinician): Promise<ProfileDetail> {
  const answer = await agent.post(path).send({ submissionKey: randomUUID() }).expect(200);
  return profileDetail.parse(answer.body);
}
const save = (one: ProfileDetail, values: Partial<ProfileValues>, agent = clinician) =>
  agent.put(`${path}/${one.id}`).send({
    draftVersion: one.draftVersion,
    values: { ...one.values, ...values },
  });
const saved = async (one: ProfileDetail, values: Partial<ProfileValues>) =>
  profileDetail.parse((await save(one, values).expect(200)).body);
const sign = ({ id, draftVersion }: ProfileDetail, agent = clinician) =>
  agent.post(`${path}/${id}/signature`).send({ draftVersion, password: staffPassword });
const fieldsOf = (answer: { body: unknown }): string[] =>
  (problem.parse(answer.body).errors ?? []).map((error) => error.path);

describe('refused', () => {
  it('nobody signed in, the front desk, and signing by anybody but a clinician', async () => {
    await server.visitor().get(path).expect(401);
    await (await server.signInStaff('front-desk')).get(path).expect(403);
    const one = await draft();
    for (const role of ['administrator', 'nurse-coordinator', 'outreach-nurse'] as const)
      await sign(one, await server.signInStaff(role)).expect(403);
    await save(one, {}, await server.signInStaff('administrator')).expect(403);
    const { versions } = versionList.parse((await clinician.get(path).expect(200)).body);
    expect(versions.map(({ state }) => state)).toEqual(['draft', 'in-force']);
  });

  it.each<[string, Partial<ProfileValues>, string]>([
    ['an eighth weekday', { receivingWeekdays: [8 as 7] }, 'values.receivingWeekdays.0'],
    ['a third of a millilitre', { minimumVolumeMl: 0.3 }, 'values.minimumVolumeMl'],
    ['a cut-off that is no time', { cutOffTimes: { '2': '11' } }, 'values.cutOffTimes.2'],
  ])('%s', async (_name, values, field) => {
    expect(fieldsOf(await save(await draft(), values).expect(422))).toEqual([field]);
  });

  it('numbers that contradict each other are kept in the draft and not signed', async () => {
    const faulty = await saved(await draft(), {
      minimumVolumeMl: 15,
      cutOffTimes: { '1': '07:00' },
      receivingFromTimes: { '1': '08:00' },
    });
    const paths = ['cutOffTimes.1', 'maximumVolumeMl'];
    expect(faulty.problems.map((one) => one.path)).toEqual(paths);
    expect(fieldsOf(await sign(faulty).expect(422))).toEqual(paths);
  });

  it('a signed version is never changed, and two who save are told apart', async () => {
    const one = await draft();
    const first = await saved(one, { minutesToLaboratory: 20 });
    await save(one, { minutesToLaboratory: 30 }).expect(409);
    const signed = profileDetail.parse((await sign(first).expect(200)).body);
    expect(signed).toMatchObject({ state: 'to-come', signedBy: 'Test clinician' });
    for (const answer of [await sign(signed).expect(409), await save(signed, {}).expect(409)])
      expect(problem.parse(answer.body).code).toBe('already-signed');
  });
});

it('a clinic without any begins with numbers of published ranges and no name', async () => {
  await change(server.context.db, 'DELETE FROM laboratory_profiles');
  const one = await draft();
  expect(one).toMatchObject({ version: 1, values: { name: '', effectiveOn: '2027-04-05' } });
  expect(one.problems.map((fault) => fault.path)).toEqual(['name']);
});

it('stands beside what is published, and is worked through for one specimen', async () => {
  const { values } = await draft();
  const answer = await clinician
    .post(`${path}/check`)
    .send({ version: 3, values: { ...values, minutesToLaboratory: 40 } })
    .expect(200);
  const { published, example, problems } = profileCheck.parse(answer.body);
  expect(problems).toEqual([]);
  expect(published).toContainEqual({
    field: 'cultureNegativeFinal',
    source: 'Public Health Ontario',
    says: '49 days',
  });
  // Monday 12 April: arrival at 06:00, 20 minutes of wait, 30 minutes to neutralise, 4 hours to receipt.
  expect(example.slice(0, 3)).toEqual([
    'Neutralise by 06:50: collected at 06:20, within 30 minutes. Harbor Street laboratory (demo), version 3.',
    'Pick-up by 09:40: receipt by 10:20, 40 minutes of way. Harbor Street laboratory (demo), version 3.',
    'Receipt by 10:20: collected at 06:20, within 4 hours. Harbor Street laboratory (demo), version 3.',
  ]);
  expect(example.at(-1)).toContain('42 days');
});

it('takes over on its day: specimens of later mornings are held against it, earlier ones are not', async () => {
  const { db } = server.context;
  const { children } = await addHousehold(server.context, clinic, maryamAndYusuf);
  const [child] = children;
  if (!child) throw new Error('No child');
  const one = await saved(await draft(), {
    effectiveOn: '2027-04-14',
    neutraliseWithinMinutes: 60,
    minutesToLaboratory: 40,
  });
  const told = consequences.parse(
    (await clinician.get(`${path}/${one.id}/consequences`).expect(200)).body,
  );
  expect(told.mornings.map(({ says }) => says)).toEqual([
    '4 planned mornings: their specimens are held against the new numbers.',
  ]);
  expect(told.differences).toEqual([
    { says: 'Way to the laboratory', before: '0 minutes', after: '40 minutes' },
    { says: 'Neutralise within', before: '30 minutes', after: '60 minutes' },
  ]);
  await sign(one).expect(200);

  const plans = await morningPlansOf(db, { seriesIds: [child.seriesId] });
  expect(plans.map(({ laboratoryProfileId }) => laboratoryProfileId)).toEqual([
    clinic.profileId,
    one.id,
    one.id,
  ]);
  for (const { morningId, on, number } of plans) {
    await insert(db, 'specimens', {
      morning_id: morningId,
      series_id: child.seriesId,
      child_id: child.childId,
      number,
      volume_ml: 6,
      collected_at: new Date(at('07:30', on)),
      ...(number === 1 ? { received_at: new Date(at('09:00', on)) } : {}),
    });
  }
  const rows = await specimenRows(db, { siteId: clinic.siteId });
  const shown = rows.map((row) => toSpecimen(clinicWords('en'), row, null, at('07:40')));
  expect(shown.map(({ neutraliseBy }) => neutraliseBy.slice(5, 16))).toEqual([
    '04-13T15:00',
    '04-14T15:30',
    '04-15T15:30',
  ]);
  const [first, second] = shown;
  expect(first?.explains.map(({ rule }) => rule)).toContain('specimen.result-days');
  expect(second?.explains.map(({ says }) => says)).toEqual([
    'Neutralise by 08:30: collected at 07:30, within 1 hour. Harbor Street laboratory (demo), version 3.',
    'Pick-up by 10:50: receipt by 11:30, 40 minutes of way. Harbor Street laboratory (demo), version 3.',
    'Receipt by 11:30: the last receipt of the day comes before 4 hours from 07:30 are over. Harbor Street laboratory (demo), version 3.',
  ]);
  expect(second?.explains[2]).toMatchObject({
    rule: 'specimen.receipt-by-cut-off',
    inputs: { withinMinutes: 240, profileVersion: 3 },
  });
});
