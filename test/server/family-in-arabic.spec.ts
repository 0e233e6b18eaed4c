import {
  familyCalendar,
  morningQuestion,
  nextMorning,
} from '../../shared/contracts/family-morning';
import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { seedWording } from '../../server/wording/seed-wording';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import {
  addClinic,
  addHousehold,
  at,
  maryamAndYusuf,
  morningDay,
  type TestHousehold,
} from '../support/mornings';

let server: TestServer;
let household: TestHousehold;
let mother: Agent;

beforeAll(async () => {
  server = await startTestServer();
  const { context } = server;
  const clinic = await addClinic(context, await server.siteId());
  household = await addHousehold(context, clinic, maryamAndYusuf);
  await seedWording(context.db, {
    language: 'ar',
    signedBy: { staffId: clinic.staffId, at: at('09:00', '2027-01-04') },
    now: at('09:00', '2027-01-04'),
  });
  await context.db.query("UPDATE family_members SET reads_language = 'ar'");
  mother = await server.openFamilySession(household.motherId, 'household');
});
afterAll(() => server.close());

const read = async (path: string): Promise<unknown> =>
  (await mother.get(`/api/family/${path}`).expect(200)).body as unknown;

/** Every text that a family reads in an answer: keys, pictures and instants have neither space nor Arabic letter. */
function sentences(value: unknown, found: string[] = []): string[] {
  if (typeof value === 'string' && /[ \u0600-\u06ff]/.test(value)) found.push(value);
  else if (Array.isArray(value)) for (const one of value) sentences(one, found);
  else if (value !== null && typeof value === 'object')
    for (const one of Object.values(value)) sentences(one, found);
  return found;
}

/** What the clinic and the family call things, which no language changes; isolated, one within another. */
const names = /[\u2066\u2068][^\u2066\u2068\u2069]*\u2069/g;
const ownWords = (text: string): string => {
  let rest = text;
  while (rest.search(names) >= 0) rest = rest.replace(names, '');
  return rest;
};

describe('a family that reads Arabic', () => {
  it('reads its night and morning in Arabic, names apart', async () => {
    server.setNow(at('19:40', '2027-04-12'));
    const page = nextMorning.parse(await read('next-morning'));
    expect(page.heading).toBe('تعالوا يوم الثلاثاء، 7:00 صباحًا');
    expect(page.parts.map(({ says }) => says)).toEqual([
      'مساء الاثنين 12 أبريل',
      'الليل من الاثنين إلى الثلاثاء',
      'صباح الثلاثاء 13 أبريل',
    ]);
    const stops = page.steps.filter(({ key }) => key.startsWith('stop'));
    expect(stops.map(({ time }) => `${time.clock} ${time.dayPart}`)).toEqual([
      '1:15 ليلًا',
      '3:00 ليلًا',
    ]);
    expect(stops.flatMap(({ lines }) => lines)).toContain(
      'أنتم يمكنكم أن تأكلوا وتشربوا. الطفلان فقط ينتظران.',
    );
    const { door: _itsOwn, ...rest } = page;
    const foreign = sentences(rest).filter((text) => /[a-z]{2}/i.test(ownWords(text)));
    expect(foreign).toEqual([]);
    expect(page.draftSays).toBeNull();
  });

  it('is asked in Arabic, with the dual for two children', async () => {
    server.setNow(at('05:40'));
    const page = morningQuestion.parse(await read('morning-question'));
    expect(page.questions.map(({ asks }) => asks)).toEqual([
      'أي طعام أو شراب دخل فم \u2068Maryam\u2069 بعد 3:00 ليلًا؟',
      'أي طعام أو شراب دخل فم \u2068Yusuf\u2069 بعد 1:15 ليلًا؟',
    ]);
    expect(sentences(page).filter((text) => /[a-z]{2}/i.test(ownWords(text)))).toEqual([]);
    const calendar = familyCalendar.parse(await read('calendar'));
    expect(calendar.mornings[0]?.says).toContain('الصباح 1 من 3. الثلاثاء 13 أبريل.');
  });

  it('is written to in Arabic', async () => {
    server.setNow(at('12:00', '2027-04-12'));
    await inTransaction(server.context.db, (transaction) =>
      planHouseholdMessages(server.context, transaction, {
        householdId: household.householdId,
        on: morningDay,
      }),
    );
    const messages = await select<{ kind: string; language: string; body: string }>(
      server.context.db,
      "SELECT kind, language, body FROM messages WHERE channel = 'sms' ORDER BY due_at",
    );
    expect(messages.map(({ kind }) => kind)).toContain('evening');
    expect(new Set(messages.map(({ language }) => language))).toEqual(new Set(['ar']));
    for (const { body } of messages)
      expect(ownWords(body).replace(/https?:\S+/g, '')).not.toMatch(/[a-z]{2}/i);
  });
});
