import { messageSegments } from '../../shared/domain/message-segments';
import { change, inTransaction, select } from '../../server/database/connection';
import { planHouseholdMessages } from '../../server/messages/plan-messages';
import { seedWording } from '../../server/wording/seed-wording';
import { insert } from '../support/insert';
import { addNight, localInstant, nightOn, signWords, type NightFamily } from '../support/night';
import { startTestServer, type TestServer } from '../support/server';

interface Queued {
  kind: string;
  channel: string;
  family_member_id: number;
  body: string;
  subject: string | null;
  state: string;
  due_at: Date;
  last_useful_at: Date;
  dedupe_key: string;
}

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  await server.database.empty();
  server.setNow(localInstant('2026-12-07', '10:00'));
});
afterAll(() => server.close());

const plan = ({ householdId }: NightFamily, on = nightOn): Promise<void> =>
  inTransaction(server.context.db, (transaction) =>
    planHouseholdMessages(server.context, transaction, { householdId, on }),
  );
const queued = (): Promise<Queued[]> =>
  select<Queued>(server.context.db, 'SELECT * FROM messages ORDER BY due_at, channel, id');
const waiting = async (): Promise<Queued[]> =>
  (await queued()).filter(({ state }) => state === 'queued');
const reasons = async (): Promise<string[]> =>
  (
    await select<{ reason: string }>(
      server.context.db,
      'SELECT reason FROM call_tasks WHERE done_at IS NULL ORDER BY reason',
    )
  ).map(({ reason }) => reason);
const at = (on: string, time: string): Date => new Date(localInstant(on, time));

const baby = { bornOn: '2026-06-01', label: 'Baby', callMe: 'Maryam', feeding: 'formula' } as const;
const brother = { bornOn: '2025-07-01', label: 'Big boy', callMe: 'Yusuf' } as const;

describe('who may not be written to', () => {
  test('nobody without a consent; somebody calls', async () => {
    await signWords(server);
    await plan(await addNight(server, { members: [{ texts: 'none' }] }));
    expect(await queued()).toEqual([]);
    expect(await reasons()).toEqual(['nobody-to-message']);
  });

  test('nobody in words that are not signed off; somebody calls, once', async () => {
    await seedWording(server.context.db, { language: 'en', now: 0 });
    const family = await addNight(server);
    await plan(family);
    await plan(family);
    expect(await queued()).toEqual([]);
    expect(await reasons()).toEqual(['language-not-signed']);
  });

  test('nobody in a language that is not built, and not in English instead', async () => {
    await signWords(server);
    await plan(await addNight(server, { members: [{ texts: 'early', language: 'so' }] }));
    expect(await queued()).toEqual([]);
    expect(await reasons()).toEqual(['language-not-signed']);
  });

  test('no number that has opted out, whoever shares it', async () => {
    await signWords(server);
    const family = await addNight(server, { members: [{ texts: 'early', phone: '+12065550150' }] });
    await insert(server.context.db, 'opt_outs', {
      channel: 'sms',
      address: '+12065550150',
      said: 'STOP',
      since_at: new Date(0),
    });
    await plan(family);
    expect(await queued()).toEqual([]);
    expect(await reasons()).toEqual(['nobody-to-message']);
  });

  test('nobody before 8 in the morning without a yes to it: the evening asks instead', async () => {
    await signWords(server);
    await plan(await addNight(server, { members: [{ texts: 'day' }] }));
    const messages = await queued();
    expect(messages.map(({ kind }) => kind)).toEqual(['evening']);
    expect(messages[0]?.body).toContain('In the morning answer here: http://localhost:4300/m/');
  });

  test('nobody at night about a plan that changed after 21:00; somebody calls', async () => {
    await signWords(server);
    const family = await addNight(server, { members: [{ texts: 'day' }] });
    server.setNow(localInstant('2026-12-08', '22:30'));
    await plan(family);
    expect(await queued()).toEqual([]);
    expect(await reasons()).toEqual(['evening-too-late']);
  });
});

describe('a night', () => {
  test('evening text the day before and the question in the morning', async () => {
    await signWords(server);
    await plan(await addNight(server, { children: [baby, brother] }));
    const messages = await queued();
    expect(messages.map(({ kind, due_at }) => [kind, due_at])).toEqual([
      ['evening', at('2026-12-08', '18:00')],
      // The baby's last feed, 40 minutes before its stop at 3:00; the brother of the same night sleeps.
      ['reminder', at(nightOn, '02:20')],
      ['morning', at(nightOn, '05:30')],
      ['nudge', at(nightOn, '05:45')],
    ]);
    const [evening, reminder, morning] = messages;
    expect(evening?.body.replace(/\/m\/\S+/, '/m/token')).toBe(
      [
        'Harbor Clinic: Come Wednesday, 9 December, 7:00 in the morning, Door B.',
        'Night from Tuesday to Wednesday: no food, no drink, no water',
        'Baby after 3:00 at night',
        'Big boy after 1:00 at night',
        'We text you in the morning. Plan: http://localhost:4300/m/token Call 206-555-0110',
      ].join('\n'),
    );
    expect(evening?.last_useful_at).toEqual(at('2026-12-08', '21:00'));
    expect(reminder?.body).toContain('Baby: the last feed is from 2:20 at night to 3:00 at night.');
    expect(morning?.body).toContain(
      'Baby after 3:00 at night?\nBig boy after 1:00 at night?\n1 = nothing',
    );
    expect(morning?.last_useful_at).toEqual(at(nightOn, '07:00'));
    for (const { body } of messages) {
      expect(messageSegments(body).segments).toBeLessThanOrEqual(2);
      expect(body).not.toMatch(/Yusuf|Maryam|Omar|Hadi|2025|2026|tube|test|result|tb\b|tubercul/i);
    }
  });

  test('one child, two parts at most', async () => {
    await signWords(server);
    await plan(await addNight(server, { children: [brother] }));
    const messages = await queued();
    expect(messages.map(({ kind }) => kind)).toEqual(['evening', 'morning', 'nudge']);
    for (const { body } of messages) expect(messageSegments(body).segments).toBeLessThanOrEqual(2);
    expect(messages[1]?.body).toContain('What did your child eat or drink?');
  });

  test('no food from 00:00 is told as 11:59, never as 12:00', async () => {
    await signWords(server);
    await plan(await addNight(server, { children: [{ ...brother, arrivalTime: '06:00' }] }));
    const [evening] = await queued();
    expect(evening?.body).toContain('Big boy after 11:59 at night');
    expect(evening?.body).not.toContain('12:00');
  });

  test('elapsed hours count in the night when the clock goes back', async () => {
    await signWords(server);
    server.setNow(localInstant('2026-10-30', '10:00'));
    const on = '2026-11-01';
    await plan(await addNight(server, { children: [brother], on }), on);
    const [evening] = await queued();
    expect(evening?.body).toContain('Big boy after 1:00 at night, the second time');
    expect(evening?.body).toContain('Night from Saturday to Sunday');
  });

  test('e-mail beside the text where it was agreed to', async () => {
    await signWords(server);
    await plan(await addNight(server, { members: [{ texts: 'early', mail: true }] }));
    expect((await queued()).map(({ kind, channel }) => `${kind} ${channel}`)).toEqual([
      'evening sms',
      'evening mail',
      'morning sms',
      'morning mail',
      'nudge sms',
    ]);
    for (const { subject, body } of await queued())
      expect(`${subject} ${body}`).not.toMatch(/Yusuf|Omar|Hadi|test\b|result|tubercul/i);
  });

  test('the night to the one who has the child then, the morning to the one who brings it', async () => {
    await signWords(server);
    const family = await addNight(server, {
      members: [{ texts: 'early' }, { texts: 'early', standing: 'helper' }],
    });
    const [mother, grandmother] = family.memberIds;
    await change(
      server.context.db,
      'UPDATE mornings SET night_carer_family_member_id = :mother, escort_family_member_id = :grandmother',
      { mother, grandmother },
    );
    await plan(family);
    const messages = await queued();
    expect(messages.map(({ kind, family_member_id }) => [kind, family_member_id])).toEqual([
      ['evening', mother],
      ['morning', grandmother],
      ['nudge', grandmother],
    ]);
    expect(messages[0]?.body).not.toContain('We text you');
  });

  test('a child with a plan of its own gets no hours by text; a person tells them', async () => {
    await signWords(server);
    await plan(await addNight(server, { children: [{ ...brother, cautions: ['diabetes'] }] }));
    const [evening] = await queued();
    expect(evening?.body).toContain('Big boy as we told you on the phone');
    expect(await reasons()).toEqual(['individual-plan']);
  });

  test('who does not read is called as well', async () => {
    await signWords(server);
    await plan(await addNight(server, { members: [{ texts: 'early', readsHow: 'no' }] }));
    expect(await reasons()).toEqual(['does-not-read']);
  });
});

describe('planning again', () => {
  test('changes nothing when nothing changed', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    const before = await queued();
    await plan(family);
    await plan(family);
    expect(await queued()).toEqual(before);
  });

  test('replaces what waits when the time changes, and takes it up again when it changes back', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    const first = await waiting();
    const move = (time: string): Promise<number> =>
      change(
        server.context.db,
        'UPDATE mornings SET arrival_time = :time, arrival_at = :arrivalAt',
        { time, arrivalAt: at(nightOn, time) },
      );
    await move('07:45');
    await plan(family);
    const second = await waiting();
    expect(second.map(({ kind }) => kind)).toEqual(['evening', 'morning', 'nudge']);
    expect(second[0]?.body).toContain('7:45 in the morning');
    await move('07:00');
    await plan(family);
    expect((await waiting()).map(({ dedupe_key }) => dedupe_key)).toEqual(
      first.map(({ dedupe_key }) => dedupe_key),
    );
  });

  test('keeps the link that was sent', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    const linkOf = (body: string | undefined): string => /\/m\/\S+/.exec(body ?? '')?.[0] ?? '';
    const [first] = await waiting();
    await change(server.context.db, `UPDATE children SET family_label = 'Little one'`);
    await plan(family);
    const [second] = await waiting();
    expect(second?.body).toContain('Little one');
    expect(linkOf(second?.body)).toBe(linkOf(first?.body));
  });

  test('takes everything back when the morning is lost', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    await change(server.context.db, `UPDATE mornings SET state = 'lost'`);
    await plan(family);
    expect(await waiting()).toEqual([]);
  });

  test('asks nobody who has answered', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    await insert(server.context.db, 'fasting_checks', {
      morning_id: family.morningIds[0],
      source: 'web',
      submission_key: 'k',
      answer: 'nothing',
      outcome: 'come',
      said: '{}',
      language: 'en',
      received_at: new Date(server.context.clock.now()),
    });
    await plan(family);
    expect((await waiting()).map(({ kind }) => kind)).toEqual(['evening']);
  });

  test('takes the call off when the words are signed after all', async () => {
    await seedWording(server.context.db, { language: 'en', now: 0 });
    const family = await addNight(server);
    await plan(family);
    expect(await reasons()).toEqual(['language-not-signed']);
    await change(server.context.db, 'UPDATE wordings SET signed_at = :now', { now: new Date() });
    await plan(family);
    expect(await reasons()).toEqual([]);
    expect(await waiting()).toHaveLength(3);
  });
});

describe('days ahead and changes at once', () => {
  const moveTo = (time: string): Promise<number> =>
    change(server.context.db, 'UPDATE mornings SET arrival_time = :time, arrival_at = :at', {
      time,
      at: at(nightOn, time),
    });
  const sent = (kind: string): Promise<number> =>
    change(
      server.context.db,
      `UPDATE messages SET state = 'sent' WHERE kind = :kind AND state = 'queued'`,
      { kind },
    );
  const bodies = async (kind: string): Promise<string[]> =>
    (await waiting()).filter((row) => row.kind === kind).map(({ body }) => body);

  test('three days before the first morning there is a word, and none before the next', async () => {
    await signWords(server);
    server.setNow(localInstant('2026-12-04', '10:00'));
    const family = await addNight(server);
    await plan(family);
    const [ahead] = await queued();
    expect([ahead?.kind, ahead?.due_at]).toEqual(['ahead', at('2026-12-06', '10:00')]);
    expect(ahead?.body).toContain('Your visit is on Wednesday, 9 December, 7:00 in the morning');
    await change(server.context.db, `UPDATE messages SET state = 'withdrawn'`);
    const [series] = await select<{ id: number }>(server.context.db, 'SELECT id FROM series');
    const [room] = await select<{ id: number }>(server.context.db, 'SELECT id FROM rooms');
    await insert(server.context.db, 'mornings', {
      ...{ series_id: series?.id, child_id: family.childIds[0], site_id: family.siteId },
      ...{ number: 2, planned_on: '2026-12-10', arrival_time: '07:00', room_id: room?.id },
      ...{ arrival_at: at('2026-12-10', '07:00'), calendar_uid: 'second@example.org' },
    });
    await plan(family, '2026-12-10');
    expect((await waiting()).map(({ kind }) => kind)).toEqual(['evening', 'morning', 'nudge']);
  });

  test('who is planned later than that hears no word ahead', async () => {
    await signWords(server);
    await plan(await addNight(server));
    expect((await queued()).map(({ kind }) => kind)).not.toContain('ahead');
  });

  test('a new time after the word ahead goes out at once, as news', async () => {
    await signWords(server);
    server.setNow(localInstant('2026-12-04', '10:00'));
    const family = await addNight(server);
    await plan(family);
    await sent('ahead');
    server.setNow(localInstant('2026-12-07', '12:00'));
    await moveTo('07:45');
    await plan(family);
    const [news] = await bodies('ahead');
    expect(news).toContain('New time! Your visit is now on Wednesday, 9 December, 7:45');
    await plan(family);
    expect(await bodies('ahead')).toHaveLength(1);
  });

  test('a plan that changes after the evening text is told anew, and again when it goes back', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    server.setNow(localInstant('2026-12-08', '18:10'));
    await sent('evening');
    await moveTo('07:45');
    await plan(family);
    expect((await bodies('evening'))[0]).toContain('New plan! Come Wednesday, 9 December, 7:45');
    await sent('evening');
    await moveTo('07:00');
    await plan(family);
    const [back] = await bodies('evening');
    expect(back).toContain('New plan! Come Wednesday, 9 December, 7:00');
    await sent('evening');
    await plan(family);
    expect(await bodies('evening')).toEqual([]);
    expect(await reasons()).toEqual([]);
  });

  test('a change after 21:00 to who has heard another plan is a call', async () => {
    await signWords(server);
    const family = await addNight(server, { members: [{ texts: 'day' }] });
    await plan(family);
    await sent('evening');
    server.setNow(localInstant('2026-12-08', '22:00'));
    await moveTo('07:45');
    await plan(family);
    expect(await waiting()).toEqual([]);
    expect(await reasons()).toEqual(['evening-too-late']);
  });

  test('other words for the same plan are not told again', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    await sent('evening');
    await change(server.context.db, `UPDATE children SET family_label = 'Little one'`);
    await plan(family);
    expect(await bodies('evening')).toEqual([]);
    expect((await bodies('morning'))[0]).toContain('Little one');
  });

  test('a new number hears the plan that the old one heard', async () => {
    await signWords(server);
    const family = await addNight(server);
    await plan(family);
    await sent('evening');
    await change(server.context.db, `UPDATE family_members SET phone = '+12065550177'`);
    await plan(family);
    expect((await waiting()).filter(({ kind }) => kind === 'evening')).toHaveLength(1);
  });

  test('two who share a telephone get one text', async () => {
    await signWords(server);
    const phone = '+12065550150';
    const family = await addNight(server, {
      members: [
        { texts: 'early', phone },
        { texts: 'early', phone, standing: 'helper' },
      ],
      children: [baby, brother],
    });
    const [mother, aunt] = family.memberIds;
    for (const [place, carer] of [mother, aunt].entries())
      await change(
        server.context.db,
        'UPDATE mornings SET night_carer_family_member_id = :carer WHERE id = :id',
        { carer, id: family.morningIds[place] },
      );
    await plan(family);
    const evenings = (await waiting()).filter(({ kind }) => kind === 'evening');
    expect(evenings).toHaveLength(1);
  });
});
