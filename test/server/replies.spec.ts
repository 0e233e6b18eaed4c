import { inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import type { ReplyOutcome } from '../../server/messages/incoming-text';
import { takeReply } from '../../server/messages/replies';
import { insert } from '../support/insert';
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
        'Who ate or drank?\n4 = Baby\n5 = Big boy\n6 = all of them',
    ]);
    expect(await reasons()).toEqual(['call-us']);
  });

  test('one child is not asked which; the time is', async () => {
    await server.context.db.query(
      `UPDATE mornings SET state = 'lost' WHERE id = ${family.morningIds[1]}`,
    );
    inTheMorning();
    expect(await text('2')).toBe('answered');
    expect((await replies())[0]).toContain('When was it? Tell us here: http://localhost:4300/m/');
  });

  test('which child is asked once and answered by its digit, in any script', async () => {
    inTheMorning();
    await text('2');
    expect(await text('٥')).toBe('answered');
    expect((await answers()).map(({ answer }) => answer).slice(-2)).toEqual(['nothing', 'feed']);
    expect((await replies())[1]).toContain('When was it? Tell us here:');
    expect(await text('2')).toBe('answered');
    expect((await replies())[2]).not.toContain('Who ate or drank?');
    expect((await answers()).map(({ answer }) => answer).slice(-2)).toEqual(['feed', 'feed']);
  });

  test.each(['4', '7', '9'])(
    '%s goes to a person when nobody asked, or it is none',
    async (body) => {
      inTheMorning();
      if (body !== '4') await text('2');
      const before = (await answers()).length;
      expect(await text(body)).toBe('unclear');
      expect(await answers()).toHaveLength(before);
      expect(await reasons()).toContain('text-unclear');
    },
  );

  test('words beside a 2 and a picture beside a 1 reach a person as well', async () => {
    inTheMorning();
    expect(await text('2 she had a bottle')).toBe('answered');
    expect(await reasons()).toEqual(['call-us', 'text-unclear']);
    await server.context.db.query('DELETE FROM call_tasks');
    const sid = `SM${'e'.repeat(32)}`;
    const receivedAt = server.context.clock.now();
    const picture = { providerId: sid, from: phone, body: '1', pictures: 1, receivedAt };
    expect(await takeReply(server.context, picture)).toBe('answered');
    expect(await reasons()).toEqual(['text-picture']);
  });

  test('an answer by text after another one on the page: both kept, the later counts, staff hears once', async () => {
    inTheMorning();
    for (const morningId of family.morningIds)
      await insert(server.context.db, 'fasting_checks', {
        ...{ morning_id: morningId, source: 'web', submission_key: 'web-1', answer: 'feed' },
        ...{ outcome: 'call-us', said: '{}', language: 'en' },
        received_at: new Date(server.context.clock.now() - 60_000),
      });
    expect(await text('1')).toBe('answered');
    expect(await answers()).toHaveLength(4);
    expect(await reasons()).toContain('answers-differ');
    await text('1');
    expect((await reasons()).filter((reason) => reason === 'answers-differ')).toHaveLength(1);
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

  test('STOP before a text that nothing else tells makes a call for it', async () => {
    await insert(server.context.db, 'messages', {
      ...{ dedupe_key: 'clinic-closed:1', kind: 'clinic-closed', channel: 'sms' },
      ...{ household_id: family.householdId, family_member_id: family.memberIds[0] },
      ...{ address: phone, language: 'en', body: 'Words', wording_versions: '{}' },
      ...{ call_reason: 'clinic-closed', state: 'queued', morning_on: nightOn },
      due_at: new Date(localInstant(nightOn, '08:00')),
      last_useful_at: new Date(localInstant(nightOn, '14:00')),
      next_try_at: new Date(localInstant(nightOn, '08:00')),
      created_at: new Date(server.context.clock.now()),
    });
    await text('STOP');
    expect(await reasons()).toEqual(['clinic-closed', 'nobody-to-message', 'opted-out']);
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

  test('"yes" is no START while the texts are on', async () => {
    expect(await text('yes')).toBe('unclear');
    await text('STOP');
    expect(await text('Yes')).toBe('opted-in');
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

describe('a household with a child whose own plan nobody has composed', () => {
  beforeEach(async () => {
    await server.context.db.query(
      `UPDATE children SET cautions = '["diabetes"]' WHERE id = ${family.childIds[0]}`,
    );
  });
  const setDawn = (from: string): Promise<unknown> =>
    server.context.db.query(`UPDATE sites SET dawn_answers_from_time = '${from}'`);

  test.each([
    ['1', '04:30', 'Call us before you leave'],
    ['1', '06:30', 'The nurse decides.'],
    ['2', '06:30', 'We call you by'],
  ])('%s, telephone from %s: no word of going on without food', async (digit, from, says) => {
    inTheMorning();
    await setDawn(from);
    expect(await text(digit)).toBe('answered');
    await setDawn('04:30');
    const [reply] = await replies();
    expect(reply).toContain(says);
    expect(reply).not.toMatch(/nothing (more )?to eat/i);
  });
});
