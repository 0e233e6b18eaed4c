import ICAL from 'ical.js';
import { change } from '../../server/database/connection';
import { addNight, localInstant, signWords, type NightFamily } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

let server: TestServer;
let family: NightFamily;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-07', '10:00'));
  await signWords(server);
  family = await addNight(server, {
    members: [{ texts: 'day' }, { texts: 'day', standing: 'helper' }],
    children: [
      { bornOn: '2026-06-01', label: 'Baby', callMe: 'Maryam', feeding: 'formula' },
      { bornOn: '2025-07-01', label: 'Big boy', callMe: 'Yusuf', arrivalTime: '07:20' },
    ],
  });
});
afterAll(() => server.close());

const feedPath = '/api/family/calendar-feed';
const openFor = async (place = 0): Promise<string> => {
  const agent = await server.openFamilySession(family.memberIds[place] ?? 0, 'household');
  const { body } = await agent.post(feedPath).expect(200);
  return new URL(String(body.url)).pathname;
};
const eventsIn = (text: string): ICAL.Component[] =>
  new ICAL.Component(ICAL.parse(text) as unknown[]).getAllSubcomponents('vevent');

describe('a feed is refused', () => {
  test('to strangers, and at addresses that were never given', async () => {
    await server.visitor().get(feedPath).expect(401);
    await server.visitor().post(feedPath).expect(401);
    await server.visitor().post(`${feedPath}/withdrawal`).expect(401);
    for (const name of [`${'a'.repeat(22)}.ics`, 'a.ics', `${'a'.repeat(22)}`, '..%2f.ics'])
      await server.visitor().get(`/feeds/${name}`).expect(404);
  });

  test('once it was withdrawn, also when another one was given', async () => {
    const agent = await server.openFamilySession(family.memberIds[0] ?? 0, 'household');
    const { body } = await agent.post(feedPath).expect(200);
    const first = new URL(body.url).pathname;
    await server.visitor().get(first).expect(200);
    expect((await agent.post(`${feedPath}/withdrawal`).expect(200)).body).toEqual({ url: null });
    await server.visitor().get(first).expect(404);
    const second = new URL((await agent.post(feedPath).expect(200)).body.url).pathname;
    expect(second).not.toBe(first);
    await server.visitor().get(second).expect(200);
    await server.visitor().get(first).expect(404);
  });
});

describe('a feed', () => {
  test('has one neutral entry for the household’s morning', async () => {
    const path = await openFor();
    const answer = await server.visitor().get(path).expect(200);
    expect(answer.headers['content-type']).toBe('text/calendar; charset=utf-8');
    const events = eventsIn(answer.text);
    expect(events).toHaveLength(1);
    const [event] = events;
    expect(event?.getFirstPropertyValue('summary')).toBe('Clinic visit');
    expect(event?.getFirstPropertyValue('class')).toBe('PRIVATE');
    expect(answer.text).toContain('DTSTART:20261209T150000Z');
    expect(answer.text).not.toMatch(
      /Maryam|Yusuf|Omar|Baby|Big boy|ATTENDEE|tubercul|test|result/i,
    );
    for (const line of answer.text.split('\r\n'))
      expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
  });

  test('is the same address when it is asked for again, and keeps only a hash of it', async () => {
    const path = await openFor();
    expect(await openFor()).toBe(path);
    const [rows] = await server.context.db.query('SELECT * FROM calendar_feeds');
    const token = path.slice('/feeds/'.length, -'.ics'.length);
    expect(JSON.stringify(rows)).not.toContain(token);
  });

  test('answers 304 until what it shows changes', async () => {
    const path = await openFor();
    const { headers } = await server.visitor().get(path).expect(200);
    const etag = String(headers['etag']);
    server.setNow(localInstant('2026-12-07', '11:00'));
    await server.visitor().get(path).set('If-None-Match', etag).expect(304);
    await change(
      server.context.db,
      `UPDATE mornings SET arrival_time = '07:40', arrival_at = :at, calendar_sequence = 1`,
      { at: new Date(localInstant('2026-12-09', '07:40')) },
    );
    const after = await server.visitor().get(path).set('If-None-Match', etag).expect(200);
    expect(after.text).toContain('DTSTART:20261209T154000Z');
    expect(after.text).toContain('SEQUENCE:1');
  });

  test('loses a morning that was lost, and stays a calendar without any', async () => {
    const path = await openFor();
    await change(server.context.db, `UPDATE mornings SET state = 'lost'`);
    const { text } = await server.visitor().get(path).expect(200);
    expect(eventsIn(text)).toEqual([]);
    expect(text.startsWith('BEGIN:VCALENDAR\r\n')).toBe(true);
  });

  test('shows a helper only the mornings that were given to the helper', async () => {
    const path = await openFor(1);
    expect(eventsIn((await server.visitor().get(path).expect(200)).text)).toEqual([]);
    await change(server.context.db, 'UPDATE mornings SET escort_family_member_id = :helper', {
      helper: family.memberIds[1],
    });
    expect(eventsIn((await server.visitor().get(path).expect(200)).text)).toHaveLength(1);
  });

  test('shows nothing in words that are not signed off', async () => {
    const path = await openFor();
    await change(server.context.db, 'UPDATE wordings SET signed_at = NULL');
    expect(eventsIn((await server.visitor().get(path).expect(200)).text)).toEqual([]);
  });

  test('is on the access record', async () => {
    const path = await openFor();
    await server.visitor().get(path).expect(200);
    const [rows] = await server.context.db.query(
      `SELECT action FROM access_records WHERE matter = 'calendar-feed' ORDER BY id`,
    );
    expect(rows).toEqual([{ action: 'changed' }, { action: 'seen' }]);
  });
});
