import {
  consequences,
  protocolCheck,
  type Consequences,
  type ProtocolDetail,
  type ProtocolValues,
} from '../../shared/contracts/protocols';
import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { morningPlansOf } from '../../server/series/morning-plans';
import { seedWording } from '../../server/wording/seed-wording';
import { addClinic, addHousehold, at, maryamAndYusuf, type TestClinic } from '../support/mornings';
import {
  draftProtocol,
  protocolsPath,
  savedProtocol,
  signProtocol,
  twoHoursMore,
} from '../support/protocols';
import { startTestServer, type Agent, type TestServer } from '../support/server';

/** What a new version of the fasting protocol does to families: before it is signed, and after. */
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

describe('mornings planned before', () => {
  const stops = async (seriesId: number): Promise<string[]> =>
    (await morningPlansOf(server.context.db, { seriesIds: [seriesId] })).map(({ on, plan }) =>
      plan.kind === 'standard'
        ? `${on} ${new Date(plan.stopAt).toISOString().slice(5, 16)} v${plan.protocolVersion}`
        : `${on} individual`,
    );
  const consequencesOf = async ({ id }: ProtocolDetail): Promise<Consequences> =>
    consequences.parse(
      (await clinician.get(`${protocolsPath}/${id}/consequences`).expect(200)).body,
    );

  it('get the new hours from its day on, in plans and in messages', async () => {
    const { db } = server.context;
    const { householdId, children } = await addHousehold(server.context, clinic, maryamAndYusuf);
    const yusuf = children[1]?.seriesId ?? 0;
    await inTransaction(db, async (transaction) => {
      for (const on of ['2027-04-13', '2027-04-14', '2027-04-15'])
        await planHouseholdMessages(server.context, transaction, { householdId, on });
    });
    const waiting = () =>
      select<{ on: string; body: string }>(
        db,
        `SELECT morning_on AS \`on\`, body FROM messages WHERE kind = 'evening' AND channel = 'sms' AND state = 'queued'
         ORDER BY morning_on`,
      );
    const before = await waiting();
    expect(before.map(({ body }) => body.includes('your child 2 after 1:15 at night'))).toEqual([
      true,
      true,
      true,
    ]);

    const one = await draftProtocol(clinician);
    const mended = await savedProtocol(clinician, one, twoHoursMore(one));
    const told = await consequencesOf(mended);
    expect(told).toMatchObject({ plannedMornings: 4, changedMornings: 2, problems: [] });
    expect(told.mornings.map(({ says }) => says)).toEqual([
      '2 planned mornings: children stop earlier, by up to 2 hours.',
    ]);
    expect(told.differences).toContainEqual({
      says: '1 year',
      before: '6 h; at most 12 h',
      after: '8 h; at most 12 h',
    });

    await signProtocol(clinician, mended).expect(200);
    // 07:15 in Los Angeles is 14:15 in UTC; 6 hours before it is 08:15, 8 hours 06:15.
    expect(await stops(yusuf)).toEqual([
      '2027-04-13 04-13T08:15 v3',
      '2027-04-14 04-14T06:15 v4',
      '2027-04-15 04-15T06:15 v4',
    ]);
    const after = await waiting();
    expect(after.map(({ on, body }) => [on, body.includes('your child 2 after 11:15')])).toEqual([
      ['2027-04-13', false],
      ['2027-04-14', true],
      ['2027-04-15', true],
    ]);
    expect(after[0]?.body).toBe(before[0]?.body);
  });

  it('are told to the clinician when children lose their standard plan', async () => {
    await addHousehold(server.context, clinic, maryamAndYusuf);
    const one = await draftProtocol(clinician);
    const bands = one.values.bands.map((band) =>
      band.fromMonths === 12 ? { ...band, individualPlan: true } : band,
    );
    const told = await consequencesOf(
      await savedProtocol(clinician, one, { ...twoHoursMore(one), bands }),
    );
    expect(told.mornings).toEqual([
      {
        says: '2 planned mornings lose their standard plan: a clinician composes one for each.',
        needsCare: true,
      },
    ]);
  });

  it('are said to stay as they are, or not to be there', async () => {
    await addHousehold(server.context, clinic, maryamAndYusuf);
    const one = await draftProtocol(clinician);
    const same = await savedProtocol(clinician, one, { effectiveOn: '2027-04-14' });
    expect((await consequencesOf(same)).mornings.map(({ says }) => says)).toEqual([
      '4 mornings are planned from that day on. Their times stay the same.',
    ]);
    const later = await savedProtocol(clinician, same, { effectiveOn: '2027-05-14' });
    expect(await consequencesOf(later)).toMatchObject({ plannedMornings: 0, changedMornings: 0 });
  });
});

describe('beside the editor', () => {
  const check = async (values: ProtocolValues, preview: object | null = null) =>
    protocolCheck.parse(
      (await clinician.post(`${protocolsPath}/check`).send({ values, preview }).expect(200)).body,
    );
  const tonight = { language: 'en', arrivalTime: '07:00', on: null };

  it('shows what is published for each band, and how far the sources are apart', async () => {
    const { values } = await draftProtocol(clinician);
    const { bands, anaesthesia } = await check(values);
    expect(bands.map(({ age }) => age)).toEqual([
      'under 3 months',
      '3 to 5 months',
      '6 to 11 months',
      '1 year',
      '2 to 4 years',
      '5 years and over',
    ]);
    expect(bands[1]).toMatchObject({
      leastSays: 'Published: 2 to 10 hours',
      longestSays: 'No source for this procedure. Fasts watched in hospital: at most 8 hours',
    });
    expect(bands[1]?.sources).toContainEqual({
      source: 'Curry International TB Center, gastric aspirate glossary',
      says: '3 to 4 hours, nothing by mouth',
    });
    expect(anaesthesia).toContain('Clear drinks before anaesthesia: 1 to 2 hours');
  });

  it('shows each age and feeding the family’s own words, and nothing is stored', async () => {
    const { values } = await draftProtocol(clinician);
    const { preview } = await check({ ...values, allowedItems: ['moist-lips'] }, tonight);
    expect(preview?.on).toBe('2027-04-06');
    expect(preview?.bands.map(({ age, feeding }) => `${age} ${feeding ?? 'none'}`)).toEqual([
      'under 3 months none',
      ...['3 to 5 months', '6 to 11 months'].flatMap((age) =>
        ['breast', 'formula', 'breast-and-formula'].map((feeding) => `${age} ${feeding}`),
      ),
      '1 year family-food',
      '2 to 4 years family-food',
      '5 years and over family-food',
    ]);
    const [individual, breast] = preview?.bands ?? [];
    expect(individual?.individualSays).toContain('A clinician composes one');
    expect(breast?.text).toBe('Noor after 3:00 at night');
    const stop = breast?.steps?.find(({ isLoud }) => isLoud);
    expect(stop).toMatchObject({ time: '3:00', dayPart: 'at night' });
    expect(stop?.lines).toContain('You may wet the lips. Nothing to swallow.');
    expect(stop?.lines).not.toContain('A pacifier is fine.');
  });

  it('tells a stop at midnight as the minute before', async () => {
    const { values } = await draftProtocol(clinician);
    const bands = values.bands.map((band) => ({
      ...band,
      nothingFrom: band.fromMonths === 24 ? '00:00' : null,
    }));
    const { preview } = await check({ ...values, bands }, tonight);
    const older = preview?.bands.find(({ age }) => age === '2 to 4 years');
    expect(older?.text).toBe('Noor after 11:59 at night');
    expect(JSON.stringify(preview)).not.toMatch(/midnight/i);
  });

  it('says where words are a draft that nobody has signed', async () => {
    const { db } = server.context;
    await seedWording(db, { language: 'es', now: 0 });
    const { values } = await draftProtocol(clinician);
    const noticeIn = async (language: string) =>
      (await check(values, { ...tonight, language })).preview?.draftNotice ?? null;
    expect(await noticeIn('en')).toBeNull();
    expect(await noticeIn('es')).not.toBeNull();
  });

  it('has a night on which the clock changes', async () => {
    const { values } = await draftProtocol(clinician);
    const { preview } = await check(values, { ...tonight, on: '2027-11-07' });
    // America/Los_Angeles goes back on 2027-11-07 and forward on 2028-03-12.
    expect(preview?.nights.map(({ on }) => on)).toEqual(['2027-04-06', '2027-11-07', '2028-03-12']);
    const toddler = preview?.bands.find(({ age }) => age === '1 year');
    // Six elapsed hours before 07:00: the clock shows 1:00 twice that night, and the second counts.
    expect(toddler?.text).toBe('Noor after 1:00 at night, the second time');
  });

  it('is told in every built language', async () => {
    const { values } = await draftProtocol(clinician);
    const { languages } = await check(values);
    expect(languages.map(({ id }) => id)).toEqual(['en', 'es', 'ar']);
  });
});
