import { change, select } from '../../server/database/connection';
import { closeNeedlessCalls } from '../../server/calls/needless-calls';
import { followUnreadLetters } from '../../server/messages/unread-letters';
import { insert } from '../support/insert';
import { addNight, localInstant, signWords, type NightMember } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

let server: TestServer;
const released = localInstant('2026-12-10', '15:00');
const day = 86_400_000;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(released);
  await signWords(server);
});
afterAll(() => server.close());

async function addLetter(member: NightMember = { texts: 'day', mail: true }): Promise<number> {
  const { childIds, memberIds } = await addNight(server, { members: [member] });
  const { db } = server.context;
  const [series] = await select<{ id: number }>(db, 'SELECT id FROM series');
  const id = await insert(db, 'letters', {
    ...{ series_id: series?.id, child_id: childIds[0], kind: 'all-negative', state: 'released' },
    ...{ is_final: true, choice: '{}', medicines: 'none-now', clinic_language: 'en' },
    ...{ clinic_body: '[]', signed_by_staff_id: 1, signed_at: new Date(released) },
    released_at: new Date(released),
  });
  await insert(db, 'letter_recipients', {
    ...{ letter_id: id, family_member_id: memberIds[0], language: 'en', body: '[]' },
  });
  return id;
}
async function after(days: number): Promise<void> {
  server.setNow(released + days * day);
  await followUnreadLetters(server.context);
  await followUnreadLetters(server.context);
}
const reminders = async (): Promise<string[]> =>
  (
    await select<{ channel: string }>(
      server.context.db,
      `SELECT channel FROM messages WHERE kind = 'letter-reminder' ORDER BY id`,
    )
  ).map(({ channel }) => channel);
const open = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY id',
    )
  ).map(({ reason }) => reason);

test('text on day 3, call on 7, a visit or the post on 14, a clinician on 30, each once', async () => {
  await addLetter();
  await after(2.9);
  expect(await reminders()).toEqual([]);
  await after(3.1);
  expect(await reminders()).toEqual(['sms', 'mail']);
  expect(await open()).toEqual([]);
  await after(7.1);
  expect(await open()).toEqual(['letter-unread']);
  await after(14.1);
  expect(await open()).toEqual(['letter-unread-outreach']);
  await after(30.1);
  expect(await open()).toEqual(['letter-unread-clinician']);
  const [task] = await select<{ is_for_clinician: number }>(
    server.context.db,
    'SELECT is_for_clinician FROM call_tasks WHERE done_at IS NULL',
  );
  expect(task?.is_for_clinician).toBe(1);
  await after(60);
  expect(await open()).toEqual(['letter-unread-clinician']);
  expect(await reminders()).toHaveLength(2);
});

test('the reminder says nothing of what is in the letter', async () => {
  await addLetter();
  await after(3.1);
  const rows = await select<{ body: string }>(server.context.db, 'SELECT body FROM messages');
  for (const { body } of rows)
    expect(body).not.toMatch(/Yusuf|Omar|tubercul|\btest\b|result|negative/i);
});

test('nothing follows once it was opened, and the call comes off by itself', async () => {
  const letterId = await addLetter();
  await after(7.1);
  expect(await open()).toEqual(['letter-unread']);
  await change(
    server.context.db,
    'UPDATE letter_recipients SET first_opened_at = :now WHERE letter_id = :letterId',
    { letterId, now: new Date(server.context.clock.now()) },
  );
  expect(await closeNeedlessCalls(server.context)).toBe(1);
  expect(await open()).toEqual([]);
  await after(14.1);
  expect(await open()).toEqual([]);
});

test('nor once a person has told it', async () => {
  await addLetter();
  await after(7.1);
  await change(
    server.context.db,
    `UPDATE call_tasks SET open_key = NULL, done_at = :now, outcome = 'told'`,
    { now: new Date(server.context.clock.now()) },
  );
  await after(14.1);
  expect(await open()).toEqual([]);
});

test('a letter that was released no more is not followed', async () => {
  await addLetter();
  await change(server.context.db, `UPDATE letters SET state = 'withdrawn'`);
  await after(30.1);
  expect(await open()).toEqual([]);
});

test('who agreed to nothing gets no text; the calls come all the same', async () => {
  await addLetter({ texts: 'none' });
  await after(3.1);
  expect(await reminders()).toEqual([]);
  await after(7.1);
  expect(await open()).toEqual(['letter-unread']);
});
