import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import type { ReplyOutcome } from '../../server/messages/incoming-text';
import { takeReply } from '../../server/messages/replies';
import { addNight, localInstant, nightOn, signWords, type NightFamily } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

let server: TestServer;
let family: NightFamily;
const phone = '+12065550150';

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-08', '12:00'));
  await signWords(server);
  family = await addNight(server, {
    members: [{ texts: 'early', phone }],
    children: [
      { bornOn: '2026-06-01', label: 'Baby', callMe: 'Maryam', feeding: 'formula' },
      { bornOn: '2025-07-01', label: 'Big boy', callMe: 'Yusuf' },
    ],
  });
  await inTransaction(server.context.db, (transaction) =>
    planHouseholdMessages(server.context, transaction, {
      householdId: family.householdId,
      on: nightOn,
    }),
  );
});
afterAll(() => server.close());

let sent = 0;
function text(
  body: string,
  { from = phone, providerId = `SM${(sent += 1).toString(16).padStart(32, '0')}` } = {},
): Promise<ReplyOutcome> {
  return takeReply(server.context, {
    providerId,
    from,
    body,
    receivedAt: server.context.clock.now(),
  });
}
const answers = (): Promise<{ answer: string; source: string }[]> =>
  select(server.context.db, 'SELECT answer, source FROM fasting_checks ORDER BY id');
const replies = async (): Promise<string[]> =>
  (
    await select<{ body: string }>(
      server.context.db,
      `SELECT body FROM messages WHERE kind IN ('reply', 'opt-out-confirmation') ORDER BY id`,
    )
  ).map(({ body }) => body.replace(/\/m\/\S+/, '/m/token'));
const reasons = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY reason',
    )
  ).map(({ reason }) => reason);
const waiting = (): Promise<{ kind: string }[]> =>
  select(
    server.context.db,
    `SELECT kind FROM messages WHERE state = 'queued' AND kind IN ('evening', 'reminder', 'morning') ORDER BY due_at`,
  );
const inTheMorning = (): void => server.setNow(localInstant(nightOn, '05:40'));

describe('what no machine may decide', () => {
  test('a number that nobody gave us gets no answer; a person sees the text', async () => {
    expect(await text('1', { from: '+12065550199' })).toBe('unknown-number');
    expect(await replies()).toEqual([]);
    expect(await answers()).toEqual([]);
    expect(await reasons()).toEqual(['text-unknown-number']);
  });

  test.each(['What about water?', '1 or 2', 'stop time?', '', '4', '11'])(
    '%j goes to a person',
    async (body) => {
      inTheMorning();
      expect(await text(body)).toBe('unclear');
      expect(await answers()).toEqual([]);
      expect(await reasons()).toEqual(['text-unclear']);
      expect((await replies())[0]).toContain('A person reads your text and calls you.');
    },
  );

  test('after the arrival a person reads it', async () => {
    server.setNow(localInstant(nightOn, '07:05'));
    expect(await text('1')).toBe('too-late');
    expect(await answers()).toEqual([]);
    expect(await reasons()).toEqual(['text-too-late']);
  });

  test('without a morning near a person reads it', async () => {
    server.setNow(localInstant('2026-12-06', '12:00'));
    expect(await text('1')).toBe('no-morning');
    expect(await reasons()).toEqual(['text-no-morning']);
  });

  test('the same text reported twice is taken once', async () => {
    inTheMorning();
    const providerId = `SM${'a'.repeat(32)}`;
    expect(await text('1', { providerId })).toBe('answered');
    expect(await text('1', { providerId })).toBe('repeat');
    expect(await answers()).toHaveLength(2);
    expect(await replies()).toHaveLength(1);
  });
});

describe('1, 2 and 3', () => {
  test('1 answers for every child, whatever the script', async () => {
    inTheMorning();
    expect(await text(' ١. ')).toBe('answered');
    expect(await answers()).toEqual([
      { answer: 'nothing', source: 'text' },
      { answer: 'nothing', source: 'text' },
    ]);
    expect(await replies()).toEqual([
      'Harbor Clinic: Thank you. You told us: nothing. Come on Wednesday, 7:00 in the morning, Door B. ' +
        'Still nothing to eat or drink, please.',
    ]);
    expect(await reasons()).toEqual([]);
  });

  test('2 asks one question back and puts the family on the call list', async () => {
    inTheMorning();
    expect(await text('2')).toBe('answered');
    expect((await answers()).map(({ answer }) => answer)).toEqual(['feed', 'feed']);
    expect(await replies()).toEqual([
      'Harbor Clinic: Thank you, that is all right. Call us before you leave: 206-555-0110. ' +
        'When was it? Tell us here: http://localhost:4300/m/token',
    ]);
    expect(await reasons()).toEqual(['call-us']);
  });

  test('2 while nobody answers the telephone: stay, we call', async () => {
    await server.context.db.query(`UPDATE sites SET dawn_answers_from_time = '06:00'`);
    inTheMorning();
    await text('2');
    expect((await replies())[0]).toMatch(/Stay at home\. We call you by 6:\d\d in the morning\./);
    expect(await reasons()).toEqual(['stay-we-call']);
  });

  test('3 lets the child eat and takes the rest of the night back', async () => {
    expect(await text('3')).toBe('not-coming');
    expect((await answers()).map(({ answer }) => answer)).toEqual(['not-coming', 'not-coming']);
    expect((await replies())[0]).toContain('Your child may eat and drink now.');
    expect(await waiting()).toEqual([]);
    expect(await reasons()).toEqual(['not-coming']);
  });

  test('a later digit replaces an earlier one', async () => {
    inTheMorning();
    await text('2');
    await text('1');
    expect((await answers()).map(({ answer }) => answer).slice(-2)).toEqual(['nothing', 'nothing']);
    expect(await reasons()).toEqual([]);
  });

  test('before the question a 1 is asked for again, and a 2 reaches the nurse', async () => {
    expect(await text('1')).toBe('too-early');
    expect(await answers()).toEqual([]);
    expect(await reasons()).toEqual([]);
    expect((await replies())[0]).toContain('We ask on Wednesday morning.');
    expect(await text('2')).toBe('too-early');
    expect(await reasons()).toEqual(['said-feed']);
  });
});

describe('the legal words', () => {
  test.each(['STOP', 'Stop.', ' quit ', 'opt out', 'توقف'])('%j works at once', async (body) => {
    expect(await text(body)).toBe('opted-out');
    expect(await waiting()).toEqual([]);
    expect(await replies()).toHaveLength(1);
    expect(await reasons()).toEqual(['nobody-to-message', 'opted-out']);
    const [row] = await select<{ said: string }>(server.context.db, 'SELECT said FROM opt_outs');
    expect(row?.said).toBe(body);
  });

  test('a second STOP is confirmed no second time', async () => {
    await text('STOP');
    await text('STOP');
    expect(await replies()).toHaveLength(1);
    expect(await select(server.context.db, 'SELECT id FROM opt_outs')).toHaveLength(1);
  });

  test('STOP long before a morning makes no call at once', async () => {
    await server.context.db.query(`DELETE FROM call_tasks`);
    server.setNow(localInstant('2026-12-05', '12:00'));
    await text('STOP');
    expect(await reasons()).not.toContain('opted-out');
  });

  test('START brings the texts of the night back', async () => {
    const before = await waiting();
    await text('STOP');
    expect(await text('START')).toBe('opted-in');
    expect(await waiting()).toEqual(before);
    expect((await replies())[1]).toContain('You get texts about your visits again.');
    expect(await reasons()).toEqual(['opted-out']);
  });

  test('HELP answers with the telephone number', async () => {
    expect(await text('help')).toBe('help');
    expect((await replies())[0]).toContain('Call 206-555-0110');
  });

  test('STOP of an unknown number is kept too', async () => {
    expect(await text('STOP', { from: '+12065550199' })).toBe('opted-out');
    expect(await select(server.context.db, 'SELECT id FROM opt_outs')).toHaveLength(1);
    expect(await replies()).toEqual([]);
  });
});

test('a phone that two households share speaks for the one that is asked', async () => {
  const other = await addNight(server, {
    members: [{ texts: 'early', phone }],
    on: '2026-12-20',
  });
  inTheMorning();
  expect(await text('1')).toBe('answered');
  const rows = await select<{ household_id: number }>(
    server.context.db,
    'SELECT household_id FROM replies',
  );
  expect(rows.map((row) => row.household_id)).toEqual([family.householdId]);
  expect(rows[0]?.household_id).not.toBe(other.householdId);
});
