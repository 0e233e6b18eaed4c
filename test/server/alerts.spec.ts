import { alertInstead, passOnAlerts } from '../../server/alerts/pass-on-alerts';
import { lookAtOutbox, noneLate } from '../../server/alerts/outbox-alerts';
import { raiseAlert, type NewAlert } from '../../server/alerts/raise-alert';
import type { Surroundings } from '../../server/alerts/tell-alert';
import { change, inTransaction, select } from '../../server/database/connection';
import { insert } from '../support/insert';
import { addOnCallPerson, addTurn, mailOf, onCallSite } from '../support/on-call';
import { familyPhone, openOutboxBench, type OutboxBench } from '../support/outbox';

jest.setTimeout(60_000);
const minute = 60_000;
const rosaPhone = '+12065550151';
const kofiPhone = '+12065550152';

let bench: OutboxBench;
let here: Surroundings;
let siteId: number;
let rosa: number;
let kofi: number;

beforeEach(async () => {
  bench = await openOutboxBench();
  here = {
    db: bench.db,
    settings: bench.settings,
    clock: { now: () => bench.now, refresh: () => Promise.resolve() },
  };
  siteId = await insert(bench.db, 'sites', onCallSite);
  rosa = await addOnCallPerson(bench.db, { name: 'Rosa Delgado', phone: rosaPhone });
  kofi = await addOnCallPerson(bench.db, { name: 'Kofi Asante', phone: kofiPhone });
  await addTurn(bench.db, siteId, rosa, kofi);
});
afterEach(() => bench.close());

const sender = () =>
  bench.sender({
    giveUp: (transaction, message) =>
      message.kind === 'alert' ? alertInstead(here, transaction, message) : Promise.resolve(),
  });
const raise = (more: Partial<NewAlert> = {}): Promise<boolean> =>
  inTransaction(bench.db, (transaction) =>
    raiseAlert(here, transaction, {
      kind: 'not-answered',
      siteId,
      cause: '2027-04-13',
      count: 2,
      usefulUntil: bench.now + 6 * 60 * minute,
      ...more,
    }),
  );
const mailsTo = (address: string): string[] =>
  bench.standIns.store.mails.filter(({ to }) => to === address).map(({ body }) => body);
const alerts = () =>
  select<{ kind: string; ended_at: Date | null; passes_on_at: Date | null }>(
    bench.db,
    'SELECT * FROM alerts ORDER BY id',
  );
const events = async (): Promise<string[]> =>
  (
    await select<{ event: string; staff_id: number | null }>(
      bench.db,
      'SELECT event, staff_id FROM alert_events ORDER BY id',
    )
  ).map(({ event, staff_id: id }) => {
    const who = id === rosa ? ' Rosa' : id === kofi ? ' Kofi' : '';
    return `${event}${who}`;
  });

test('tells who is on call, in words that fit on any telephone', async () => {
  await raise();
  await sender().drain();
  expect(bench.textsTo(rosaPhone)).toEqual([
    `Alder Street: 2 families have not answered. Open Calls. Take it or pass it on: ${bench.settings.origin}/clinic/en/alerts`,
  ]);
  expect(bench.textsTo(kofiPhone)).toEqual([]);
});

test('one cause is one alert, however often it is noticed', async () => {
  expect([await raise(), await raise(), await raise({ cause: 'another' })]).toEqual([
    true,
    false,
    true,
  ]);
  await sender().drain();
  expect(bench.textsTo(rosaPhone)).toHaveLength(2);
});

test('nothing is told when the cause is taken back', async () => {
  await expect(
    inTransaction(bench.db, async (transaction) => {
      await raiseAlert(here, transaction, {
        kind: 'critical-result',
        siteId,
        cause: 'x',
        usefulUntil: bench.now + minute,
      });
      throw new Error('the cause failed');
    }),
  ).rejects.toThrow('the cause failed');
  expect(await alerts()).toEqual([]);
  expect(await bench.rows()).toEqual([]);
});

test('texts that stand still: an e-mail, also to who asked for texts alone', async () => {
  bench.standIns.faults.set([
    { channel: 'sms', does: 'refuse', code: 20429, status: 429, times: 1000 },
  ]);
  await bench.queue({ dedupeKey: 'stuck' });
  await sender().drain();
  bench.now += 6 * minute;
  const first = await lookAtOutbox(here, noneLate);
  expect(first.isHealthy).toBe(false);
  expect(await alerts()).toEqual([]);
  await lookAtOutbox(here, first.late);
  await lookAtOutbox(here, first.late);
  await sender().drain();
  expect(mailsTo(mailOf('Rosa Delgado'))).toEqual([
    expect.stringContaining('Alder Street: texts are not going out. Families have to be called.'),
  ]);
  expect(bench.textsTo(rosaPhone)).toEqual([]);
  expect(await alerts()).toHaveLength(1);
});

test('a clock that was moved makes much late at once and alerts nobody', async () => {
  await bench.queue({ dedupeKey: 'before' });
  bench.now += 60 * minute;
  const first = await lookAtOutbox(here, noneLate);
  await sender().drain();
  await bench.queue({ dedupeKey: 'after', dueAt: bench.now - 10 * minute });
  await lookAtOutbox(here, first.late);
  expect(await alerts()).toEqual([]);
});

test('e-mails that stand still: a text', async () => {
  await change(
    bench.db,
    'UPDATE staff SET alerts_by_text = FALSE, alerts_by_mail = TRUE WHERE id = :rosa',
    { rosa },
  );
  await bench.queue({
    channel: 'mail',
    address: 'a@family.example.org',
    dueAt: bench.now - 6 * minute,
  });
  const { late } = await lookAtOutbox(here, noneLate);
  await lookAtOutbox(here, late);
  await sender().drain();
  expect(bench.textsTo(rosaPhone)).toEqual([
    expect.stringContaining('Alder Street: e-mails are not going out.'),
  ]);
});

test('a service that refuses everybody is seen although nothing waits', async () => {
  bench.standIns.faults.set([{ channel: 'sms', does: 'refuse', code: 21606, times: 1000 }]);
  for (const number of [1, 2, 3]) await bench.queue({ address: `+1206555011${number}` });
  await sender().drain();
  await lookAtOutbox(here, noneLate);
  expect(await alerts()).toMatchObject([{ kind: 'texts-stuck' }]);
});

test('three wrong numbers among texts that arrive are no standstill', async () => {
  bench.standIns.faults.set(
    [1, 2, 3].map((number) => ({
      channel: 'sms',
      does: 'refuse',
      code: 21211,
      to: `+1206555011${number}`,
      times: 1,
    })),
  );
  for (const number of [1, 2, 3, 4]) await bench.queue({ address: `+1206555011${number}` });
  await sender().drain();
  expect((await lookAtOutbox(here, noneLate)).isHealthy).toBe(true);
  expect(await alerts()).toEqual([]);
});

test('it is over when messages go again; the next standstill alerts anew', async () => {
  const standStill = async (): Promise<void> => {
    await bench.queue({ dueAt: bench.now - 6 * minute });
    const { late } = await lookAtOutbox(here, noneLate);
    await lookAtOutbox(here, late);
  };
  await standStill();
  await sender().drain();
  expect(await lookAtOutbox(here, noneLate)).toMatchObject({ isHealthy: true });
  expect((await alerts()).map(({ ended_at: ended }) => ended !== null)).toEqual([true]);
  await standStill();
  expect((await alerts()).map(({ ended_at: ended }) => ended !== null)).toEqual([true, false]);
});

test('two senders that see a standstill at once alert once', async () => {
  await bench.queue({ dueAt: bench.now - 6 * minute });
  const { late } = await lookAtOutbox(here, noneLate);
  await Promise.all([lookAtOutbox(here, late), lookAtOutbox(here, late)]);
  expect(await alerts()).toHaveLength(1);
});

test('an alert goes before everything that waits', async () => {
  for (let number = 0; number < 60; number += 1)
    await bench.queue({ dueAt: bench.now - 4 * minute });
  await raise();
  const one = bench.sender({ atOnce: 1 });
  await one.tick();
  await one.settled();
  expect(bench.standIns.store.texts.map(({ phone }) => phone)).toEqual([rosaPhone]);
  expect(bench.textsTo(familyPhone)).toEqual([]);
});

test('nobody takes it: the deputy is told, and each so often that nobody is worn out', async () => {
  await raise();
  bench.now += 9 * minute;
  expect(await passOnAlerts(here)).toBe(0);
  bench.now += minute;
  expect(await passOnAlerts(here)).toBe(1);
  expect(await events()).toEqual(['told Rosa', 'not-taken Rosa', 'told Kofi']);
  for (let round = 0; round < 10; round += 1) {
    bench.now += 10 * minute;
    await passOnAlerts(here);
  }
  expect((await events()).filter((event) => event.startsWith('told'))).toHaveLength(6);
  expect((await events()).at(-1)).toBe('nobody');
});

test('two senders escalate once', async () => {
  await raise();
  await sender().drain();
  bench.now += 10 * minute;
  const passed = await Promise.all([passOnAlerts(here), passOnAlerts(here), passOnAlerts(here)]);
  expect(passed.reduce((sum, one) => sum + one)).toBe(1);
  await sender().drain();
  expect(bench.textsTo(kofiPhone)).toHaveLength(1);
});

test('a text that is refused becomes an e-mail; where that fails too, the next one is told', async () => {
  bench.standIns.faults.set([
    { channel: 'sms', does: 'refuse', code: 21211, to: rosaPhone, times: 1 },
    { channel: 'mail', does: 'refuse', code: 550, to: mailOf('Rosa Delgado'), times: 1 },
  ]);
  await raise();
  await sender().drain();
  await passOnAlerts(here);
  await sender().drain();
  expect(await events()).toEqual([
    'told Rosa',
    'undelivered Rosa',
    'undelivered Rosa',
    'not-taken Rosa',
    'told Kofi',
  ]);
  expect(bench.textsTo(kofiPhone)).toHaveLength(1);
});

test('what is of no use any more is not sent, and leaves the list', async () => {
  await raise({ usefulUntil: bench.now + minute });
  bench.now += 2 * minute;
  await passOnAlerts(here);
  await sender().drain();
  expect(bench.textsTo(rosaPhone)).toEqual([]);
  expect((await alerts())[0]?.ended_at).not.toBeNull();
});

test('a critical one that nobody took stays', async () => {
  await raise({ kind: 'critical-result', usefulUntil: bench.now + minute });
  bench.now += 48 * 60 * minute;
  await passOnAlerts(here);
  expect((await alerts())[0]?.ended_at).toBeNull();
});

test('without a list the lead clinicians hear of it', async () => {
  await change(bench.db, 'DELETE FROM on_call_turns');
  await insert(bench.db, 'staff_roles', { staff_id: kofi, role: 'lead-clinician' });
  await raise();
  expect(await events()).toEqual(['told Kofi']);
});
