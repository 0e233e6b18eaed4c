import { randomUUID } from 'node:crypto';
import { morningOutcome, type MorningOutcome } from '../../shared/contracts/family-morning';
import { addClinic, addHousehold, at, iso, morningDay } from '../support/mornings';
import { startTestServer, type TestServer } from '../support/server';

/**
 * A child for whom a clinician composes a plan (diabetes, tube feeding, under 3 months) is told no hours, and is never
 * told to go on without food for a time that nobody has set.
 */
let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const nobodyEats = /nothing to eat or drink/i;

async function householdOf(withSister: boolean) {
  const clinic = await addClinic(server.context, await server.siteId());
  const household = await addHousehold(server.context, clinic, [
    { callMe: 'Idris', bornOn: '2024-05-05', arrivalTime: '07:00', cautions: ['diabetes'] },
    ...(withSister ? [{ callMe: 'Maryam', bornOn: '2023-02-02', arrivalTime: '07:15' }] : []),
  ]);
  return { household, mother: await server.openFamilySession(household.motherId, 'household') };
}

async function tellLate(withSister = false): Promise<MorningOutcome> {
  const { mother } = await householdOf(withSister);
  const body = {
    kind: 'late',
    submissionKey: randomUUID(),
    on: morningDay,
    newArrivalAt: iso('07:30'),
    deviceAt: new Date(server.context.clock.now()).toISOString(),
  };
  return morningOutcome.parse(
    (await mother.post('/api/family/morning-changes').send(body).expect(200)).body,
  );
}

async function tellNothing(withSister = false): Promise<MorningOutcome> {
  const { household, mother } = await householdOf(withSister);
  const body = {
    submissionKey: randomUUID(),
    on: morningDay,
    answers: household.children.map(({ morningId }) => ({ morningId, answer: 'nothing' })),
    deviceAt: new Date(server.context.clock.now()).toISOString(),
  };
  return morningOutcome.parse(
    (await mother.post('/api/family/fasting-checks').send(body).expect(200)).body,
  );
}

it('late while somebody answers: call us, and no word of waiting without food', async () => {
  server.setNow(at('06:10'));
  const outcome = await tellLate();
  expect(outcome.kind).toBe('call-us');
  expect(outcome.lines.join('\n')).not.toMatch(nobodyEats);
});

it('late while nobody answers: food first', async () => {
  await server.siteId();
  await server.context.db.query("UPDATE sites SET dawn_answers_from_time = '06:45'");
  server.setNow(at('06:10'));
  const outcome = await tellLate(true);
  await server.context.db.query("UPDATE sites SET dawn_answers_from_time = '04:30'");
  expect(outcome.kind).toBe('feed-now-and-call');
  expect(outcome.heading).toContain('Idris');
  expect(outcome.heading).not.toContain('Maryam');
});

it('an answer: a person decides, and only the sister goes on with nothing', async () => {
  server.setNow(at('06:10'));
  expect((await tellNothing()).lines.join('\n')).not.toMatch(nobodyEats);
  await server.database.empty();
  const outcome = await tellNothing(true);
  expect(outcome.kind).toBe('call-us');
  const [line] = outcome.lines.filter((text) => nobodyEats.test(text));
  expect(line).toContain('Maryam');
  expect(line).not.toContain('Idris');
});

it('the night path, the moments and what a phone saves never say it of this child', async () => {
  server.setNow(at('06:10'));
  const { mother } = await householdOf(false);
  const page = await mother.get('/api/family/next-morning').expect(200);
  const question = await mother.get('/api/family/morning-question').expect(200);
  const told = JSON.stringify([page.body, question.body]);
  expect(told).not.toMatch(nobodyEats);
  expect(told).toContain('We call you and tell you the times');
});

it('beside a sister the same sentences name the sister alone', async () => {
  server.setNow(at('06:10'));
  const { mother } = await householdOf(true);
  const { body } = await mother.get('/api/family/morning-question').expect(200);
  const saved = JSON.stringify((body as { saved: unknown }).saved);
  expect(saved).toContain('Nothing to eat or drink for Maryam.');
});
