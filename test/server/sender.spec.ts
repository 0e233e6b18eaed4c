import { change } from '../../server/database/connection';
import { mostAttempts, pauseAfter } from '../../server/outbox/back-off';
import { outboxHealth } from '../../server/outbox/health';
import { keepDeliveryReport } from '../../server/outbox/delivery-reports';
import { insert } from '../support/insert';
import { familyPhone, openOutboxBench, until, type OutboxBench } from '../support/outbox';

const minute = 60_000;
jest.setTimeout(30_000);

let bench: OutboxBench;

beforeEach(async () => {
  bench = await openOutboxBench();
});
afterEach(async () => {
  await bench.close();
});

describe('sending', () => {
  it('sends each of many messages once, with three senders at work', async () => {
    for (let number = 0; number < 60; number += 1)
      await bench.queue({
        dedupeKey: `many:${number}`,
        address: `+1206555${String(100 + number).padStart(4, '0')}`,
        body: `Message ${number}`,
      });
    await Promise.all([1, 2, 3].map(() => bench.sender().drain()));
    const bodies = bench.standIns.store.texts.map((text) => text.body);
    expect(bodies).toHaveLength(60);
    expect(new Set(bodies).size).toBe(60);
    const rows = await bench.rows();
    expect(new Set(rows.map((row) => row.state))).toEqual(new Set(['sent']));
    expect(new Set(rows.map((row) => row.provider_id)).size).toBe(60);
    expect(new Set(rows.map((row) => row.attempts))).toEqual(new Set([1]));
  });

  it('waits until a message is due', async () => {
    await bench.queue({ dedupeKey: 'later', dueAt: bench.now + minute });
    const sender = bench.sender();
    await sender.drain();
    expect((await bench.row('later')).state).toBe('queued');
    bench.now += minute;
    await sender.drain();
    expect((await bench.row('later')).state).toBe('sent');
  });

  it('keeps the provider’s id and the number of parts', async () => {
    await bench.queue({ dedupeKey: 'long', body: 'a'.repeat(161) });
    await bench.sender().drain();
    const row = await bench.row('long');
    expect(row.segments).toBe(2);
    expect(row.provider_id).toBe(bench.standIns.store.texts[0]?.id);
  });

  it('sends a mail with a Message-ID of its own, as automatic, with its calendar entry', async () => {
    const content = 'BEGIN:VCALENDAR\r\nVERSION:2.0\r\nMETHOD:REQUEST\r\nEND:VCALENDAR\r\n';
    await bench.queue({
      dedupeKey: 'mail',
      channel: 'mail',
      address: 'amina@family.example.org',
      calendar: { method: 'REQUEST', content },
    });
    await bench.sender().drain();
    const row = await bench.row('mail');
    const [mail] = bench.standIns.store.mails;
    expect(mail).toMatchObject({
      to: 'amina@family.example.org',
      subject: 'Visit tomorrow',
      messageId: `<message-${row.id}@clinic.example.org>`,
      isAutomatic: true,
    });
    expect(mail?.attachments.some((one) => one.content.includes('METHOD:REQUEST'))).toBe(true);
    expect(row).toMatchObject({ state: 'sent', provider_id: mail?.messageId });
  });
});

describe('what is not sent', () => {
  it('gives up what is of no use any more, with a call', async () => {
    await bench.queue({ dedupeKey: 'late', lastUsefulAt: bench.now + minute });
    bench.now += 2 * minute;
    await bench.sender().drain();
    expect(await bench.row('late')).toMatchObject({
      state: 'given-up',
      failure_code: 'too-late',
      attempts: 0,
    });
    expect(bench.givenUp).toMatchObject([{ callReason: 'evening-text-failed', familyMemberId: 1 }]);
    expect(bench.standIns.store.texts).toHaveLength(0);
  });

  it('sends nothing to a number that opted out after it was queued, and tells a person', async () => {
    await bench.queue({ dedupeKey: 'before-stop' });
    await bench.queue({ dedupeKey: 'nobody-calls', callReason: null });
    const optOut = { channel: 'sms', address: familyPhone, said: 'STOP' };
    await insert(bench.db, 'opt_outs', { ...optOut, since_at: new Date(bench.now) });
    await bench.sender().drain();
    for (const key of ['before-stop', 'nobody-calls'])
      expect(await bench.row(key)).toMatchObject({ state: 'given-up', failure_code: 'opted-out' });
    expect(bench.givenUp).toHaveLength(1);
    expect(bench.textsTo(familyPhone)).toEqual([]);
  });

  it('lets the one confirmation of an opt-out pass, for five minutes', async () => {
    const optOut = { channel: 'sms', address: familyPhone, said: 'STOP' };
    await insert(bench.db, 'opt_outs', { ...optOut, since_at: new Date(bench.now) });
    const confirmation = { kind: 'opt-out-confirmation', body: 'No more texts.', callReason: null };
    await bench.queue({ dedupeKey: 'at-once', ...confirmation });
    await bench.queue({
      dedupeKey: 'hours-later',
      ...confirmation,
      createdAt: bench.now + 6 * minute,
    });
    await bench.sender().drain();
    expect((await bench.row('at-once')).state).toBe('sent');
    expect((await bench.row('hours-later')).state).toBe('given-up');
  });

  it('lets one care text a day and three in a week go to a number without a consent', async () => {
    const sender = bench.sender();
    const day = 24 * 60 * minute;
    const states: string[] = [];
    for (const [key, days] of [
      ['one', 0],
      ['same day', 0.5],
      ['two', 1.1],
      ['three', 2.2],
      ['fourth in the week', 3.3],
      ['a week later', 9.5],
    ] as const) {
      const now = Date.UTC(2027, 3, 12, 18) + days * day;
      bench.now = now;
      await bench.queue({ dedupeKey: key, isWithoutConsent: true, body: `Visit ${key}` });
      await sender.drain();
      const row = await bench.row(key);
      states.push(`${row.state} ${row.failure_code ?? ''}`.trim());
    }
    expect(states).toEqual([
      'sent',
      'given-up care-limit',
      'sent',
      'sent',
      'given-up care-limit',
      'sent',
    ]);
    expect(bench.givenUp).toHaveLength(2);
  });

  it('sends no care text of two parts without a consent, and counts no text with one', async () => {
    await bench.queue({ dedupeKey: 'long', isWithoutConsent: true, body: 'a'.repeat(161) });
    await bench.queue({ dedupeKey: 'agreed' });
    await bench.queue({ dedupeKey: 'short', isWithoutConsent: true, body: 'A visit is planned.' });
    await bench.sender().drain();
    expect((await bench.row('long')).failure_code).toBe('care-limit');
    expect((await bench.row('agreed')).state).toBe('sent');
    expect((await bench.row('short')).state).toBe('sent');
  });

  it('sends again to a number that opted in again', async () => {
    const ended = { since_at: new Date(bench.now - 2), ended_at: new Date(bench.now - 1) };
    await insert(bench.db, 'opt_outs', {
      channel: 'sms',
      address: familyPhone,
      said: 'STOP',
      ...ended,
    });
    await bench.queue({ dedupeKey: 'back' });
    await bench.sender().drain();
    expect((await bench.row('back')).state).toBe('sent');
  });
});

describe('failures', () => {
  it('tries again later after a temporary refusal, ever more slowly', async () => {
    bench.standIns.faults.set([
      { channel: 'sms', does: 'refuse', status: 429, code: 20429, times: 1 },
    ]);
    await bench.queue({ dedupeKey: 'busy' });
    const sender = bench.sender();
    await sender.drain();
    const row = await bench.row('busy');
    expect(row).toMatchObject({ state: 'queued', attempts: 1, failure_code: '20429' });
    expect(row.next_try_at.getTime()).toBeGreaterThan(bench.now);
    bench.now += minute;
    await sender.drain();
    expect(await bench.row('busy')).toMatchObject({
      state: 'sent',
      attempts: 2,
      failure_code: null,
    });
    expect(bench.givenUp).toEqual([]);
  });

  it.each([
    [1, 15_000],
    [2, 45_000],
    [3, 135_000],
    [4, 405_000],
    [9, 900_000],
  ])('pauses after attempt %i about %i ms', (attempts, about) => {
    expect(pauseAfter(attempts, 0)).toBe(about * 0.8);
    expect(pauseAfter(attempts, 0.5)).toBe(about);
    expect(pauseAfter(attempts, 1)).toBe(Math.round(about * 1.2));
  });

  it('gives up after the last attempt, with a call', async () => {
    const busy = { channel: 'sms', does: 'refuse', status: 429, code: 20429 } as const;
    bench.standIns.faults.set([{ ...busy, times: mostAttempts }]);
    await bench.queue({ dedupeKey: 'never', lastUsefulAt: bench.now + 10 * 60 * minute });
    const sender = bench.sender();
    for (let attempt = 1; attempt <= mostAttempts; attempt += 1) {
      await sender.drain();
      bench.now += 20 * minute;
    }
    expect(await bench.row('never')).toMatchObject({ state: 'given-up', attempts: mostAttempts });
    expect(bench.givenUp).toMatchObject([{ failure: { code: '20429' } }]);
    expect(bench.standIns.store.texts).toEqual([]);
  });

  it.each([
    ['no such number', { code: 21211, status: 400 }],
    ['not a mobile number', { code: 21614, status: 400 }],
    ['unknown number', { code: 30005, status: 400 }],
    ['landline', { code: 30006, status: 400 }],
  ])('gives up at once: %s', async (_case, refusal) => {
    bench.standIns.faults.set([{ channel: 'sms', does: 'refuse', times: 1, ...refusal }]);
    await bench.queue({ dedupeKey: 'refused' });
    await bench.sender().drain();
    expect(await bench.row('refused')).toMatchObject({
      state: 'given-up',
      attempts: 1,
      failure_code: String(refusal.code),
    });
    expect(bench.givenUp).toHaveLength(1);
  });

  it('remembers an opt-out that only the provider had heard of', async () => {
    bench.standIns.store.setOptedOut(familyPhone, true);
    await bench.queue({ dedupeKey: 'first' });
    const sender = bench.sender();
    await sender.drain();
    expect((await bench.row('first')).failure_code).toBe('21610');
    await bench.queue({ dedupeKey: 'second' });
    await sender.drain();
    expect((await bench.row('second')).failure_code).toBe('opted-out');
  });

  it.each([
    ['550', 'given-up'],
    ['452', 'queued'],
  ])('mail refused with %s: %s', async (code, state) => {
    bench.standIns.faults.set([{ channel: 'mail', does: 'refuse', code: Number(code), times: 1 }]);
    await bench.queue({ dedupeKey: 'mail', channel: 'mail', address: 'a@family.example.org' });
    await bench.sender().drain();
    expect(await bench.row('mail')).toMatchObject({ state, failure_code: code });
  });

  it.each([
    ['mail', 'a@family.example.org\r\nBcc: x@other.example.org', 'bad-address'],
    ['mail', 'nobody', 'bad-address'],
    ['sms', '555', 'bad-number'],
  ] as const)('never hands an address like this over: %s %j', async (channel, address, code) => {
    await bench.queue({ dedupeKey: 'bad', channel, address });
    await bench.sender().drain();
    expect(await bench.row('bad')).toMatchObject({ state: 'given-up', failure_code: code });
    expect(bench.standIns.store.mails).toEqual([]);
  });

  it('keeps a message whose services are away, and sends it when they are back', async () => {
    await bench.queue({ dedupeKey: 'away' });
    await bench.queue({ dedupeKey: 'away-too', channel: 'mail', address: 'a@family.example.org' });
    const { smsUrl, mailUrl } = bench.standIns;
    await bench.standIns.close();
    const sender = bench.sender();
    await sender.drain();
    for (const key of ['away', 'away-too'])
      expect(await bench.row(key)).toMatchObject({ state: 'queued', attempts: 1 });
    expect(smsUrl).not.toBe(mailUrl);
  });
});

describe('an attempt whose end nobody knows', () => {
  const inDoubt = async (does: 'hold' | 'accept-then-hold') => {
    bench.standIns.faults.set([{ channel: 'sms', does, times: 1 }]);
    await bench.queue({ dedupeKey: 'doubt' });
    // A sender that was lost after handing over: its claim runs out while the request hangs.
    const lost = bench.sender({ claimLastsMs: 300 });
    await lost.tick();
    await until('the claim has run out', async () => {
      const taken = await bench.sender().tick();
      return taken > 0;
    });
  };

  it('is found at the provider and not sent again', async () => {
    await inDoubt('accept-then-hold');
    const sender = bench.sender();
    await until('it is settled', async () => {
      await sender.drain();
      return (await bench.row('doubt')).state === 'sent';
    });
    expect(bench.textsTo(familyPhone)).toHaveLength(1);
    expect((await bench.row('doubt')).provider_id).toBe(bench.standIns.store.texts[0]?.id);
  });

  it('is sent again when the provider does not know it', async () => {
    await inDoubt('hold');
    const sender = bench.sender();
    await until('it is settled', async () => {
      await sender.drain();
      return (await bench.row('doubt')).state === 'sent';
    });
    expect(bench.textsTo(familyPhone)).toHaveLength(1);
    expect((await bench.row('doubt')).attempts).toBe(2);
  });

  it('is in doubt after a fault of the provider: asked for first, then sent again', async () => {
    bench.standIns.faults.set([{ channel: 'sms', does: 'refuse', status: 503, times: 1 }]);
    await bench.queue({ dedupeKey: 'doubt' });
    const sender = bench.sender({ claimLastsMs: 4000 });
    await sender.drain();
    expect(await bench.row('doubt')).toMatchObject({ state: 'sending', attempts: 1 });
    await until('it is settled', async () => {
      await sender.drain();
      return (await bench.row('doubt')).state === 'sent';
    });
    expect(bench.textsTo(familyPhone)).toHaveLength(1);
  });

  it('does not take another message with the same words for it', async () => {
    await bench.queue({ dedupeKey: 'same-words' });
    await bench.sender().drain();
    await inDoubt('hold');
    const sender = bench.sender();
    await until('it is settled', async () => {
      await sender.drain();
      return (await bench.row('doubt')).state === 'sent';
    });
    expect(bench.textsTo(familyPhone)).toHaveLength(2);
  });

  it('is told to a person when the provider gives no answer until it is of no use', async () => {
    await bench.queue({ dedupeKey: 'doubt', lastUsefulAt: bench.now + minute });
    await change(
      bench.db,
      `UPDATE messages SET state = 'sending', attempts = 1, claimed_by = 'gone', claimed_until = '2020-01-01'`,
    );
    bench.now += 2 * minute;
    await bench.standIns.close();
    await bench.sender().drain();
    expect(await bench.row('doubt')).toMatchObject({
      state: 'given-up',
      failure_code: 'outcome-unknown',
    });
    expect(bench.givenUp).toHaveLength(1);
  });
});

describe('delivery reports', () => {
  const sent = async () => {
    bench.standIns.faults.set([{ channel: 'sms', does: 'no-reports', times: 9 }]);
    await bench.queue({ dedupeKey: 'reported' });
    const sender = bench.sender();
    await sender.drain();
    const { provider_id: providerId } = await bench.row('reported');
    const report = (status: string, errorCode: string | null = null) =>
      keepDeliveryReport(bench.db, {
        providerId: providerId ?? '',
        status,
        errorCode,
        receivedAt: bench.now,
      });
    return { sender, report };
  };

  it('move a text forward only, in any order and however often they come', async () => {
    const { sender, report } = await sent();
    await report('delivered');
    await report('delivered');
    await report('sent');
    await report('queued');
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('delivered');
    await report('undelivered', '30003');
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('delivered');
    expect(bench.givenUp).toEqual([]);
  });

  it('bring a person in when a text did not arrive', async () => {
    const { sender, report } = await sent();
    await report('undelivered', '30005');
    await sender.drain();
    expect(await bench.row('reported')).toMatchObject({ state: 'failed', failure_code: '30005' });
    expect(bench.givenUp).toMatchObject([{ callReason: 'evening-text-failed' }]);
    await sender.drain();
    expect(bench.givenUp).toHaveLength(1);
  });

  it('make no double when a lost text arrives after all while another attempt waits', async () => {
    const { sender, report } = await sent();
    await report('undelivered', '30003');
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('queued');
    await report('delivered');
    bench.now += 5 * minute;
    await sender.drain();
    expect(await bench.row('reported')).toMatchObject({ state: 'delivered', attempts: 1 });
    expect(bench.textsTo(familyPhone)).toHaveLength(1);
    expect(bench.givenUp).toEqual([]);
  });

  it('let the first attempt arrive late although the second is lost', async () => {
    const { sender, report } = await sent();
    await report('undelivered', '30008');
    await sender.drain();
    bench.now += 5 * minute;
    await sender.drain();
    const { provider_id: second } = await bench.row('reported');
    await keepDeliveryReport(bench.db, {
      ...{ providerId: second ?? '', status: 'undelivered', errorCode: '30005' },
      receivedAt: bench.now,
    });
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('failed');
    await report('delivered');
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('delivered');
    expect(bench.givenUp).toHaveLength(1);
  });

  it.each([
    ['30004', 'failed'],
    ['30006', 'failed'],
    ['30007', 'failed'],
    ['30034', 'failed'],
    ['99999', 'failed'],
    ['30001', 'queued'],
    ['30008', 'queued'],
  ])('code %s leaves the text %s', async (code, state) => {
    const { sender, report } = await sent();
    await report('undelivered', code);
    await sender.drain();
    expect(await bench.row('reported')).toMatchObject({ state, failure_code: code });
  });

  it('give a handset out of reach another attempt while that is useful', async () => {
    const { sender, report } = await sent();
    await report('undelivered', '30003');
    await sender.drain();
    expect((await bench.row('reported')).state).toBe('queued');
    bench.now += 5 * minute;
    await sender.drain();
    expect(await bench.row('reported')).toMatchObject({ state: 'sent', attempts: 2 });
    expect(bench.givenUp).toEqual([]);
  });
});

it('knows when nothing goes out', async () => {
  await bench.queue({ dedupeKey: 'waits' });
  expect(await outboxHealth(bench.db, bench.now)).toMatchObject({ waiting: 1, isStuck: false });
  expect(await outboxHealth(bench.db, bench.now + 6 * minute)).toMatchObject({ isStuck: true });
  await bench.sender().drain();
  expect(await outboxHealth(bench.db, bench.now + 6 * minute)).toEqual({
    waiting: 0,
    sending: 0,
    oldestDueAt: null,
    isStuck: false,
    failures: 0,
  });
});

it('knows that nothing goes out while a service refuses everything again and again', async () => {
  bench.standIns.faults.set([
    { channel: 'sms', does: 'refuse', status: 401, code: 20003, times: 9 },
  ]);
  await bench.queue({ dedupeKey: 'locked-out', lastUsefulAt: bench.now + 10 * 60 * minute });
  const sender = bench.sender();
  for (let tries = 0; tries < 3; tries += 1) {
    await sender.drain();
    bench.now += 2 * minute;
  }
  const health = await outboxHealth(bench.db, bench.now);
  expect(health).toMatchObject({ waiting: 1, isStuck: true, failures: 0 });
  for (let tries = 0; tries < 5; tries += 1) {
    bench.now += 20 * minute;
    await sender.drain();
  }
  expect(await outboxHealth(bench.db, bench.now)).toMatchObject({ waiting: 0, failures: 1 });
});
