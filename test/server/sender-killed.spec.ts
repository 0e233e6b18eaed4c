import { change } from '../../server/database/connection';
import { account, familyPhone, openOutboxBench, until, type OutboxBench } from '../support/outbox';
import { startProgram, type Program } from '../support/program';

jest.setTimeout(120_000);

let bench: OutboxBench;
const programs: Program[] = [];

beforeEach(async () => {
  bench = await openOutboxBench();
  bench.now = Date.now();
});
afterEach(async () => {
  await Promise.all(programs.splice(0).map((program) => program.kill()));
  await bench.close();
});

/** The sender itself, as npm start runs it. */
async function startSender(): Promise<Program> {
  const { databaseUrl, mail, origin, sessionSecret, linkSecret, sms } = bench.settings;
  const program = await startProgram('server/worker.ts', {
    NODE_ENV: 'test',
    THREEDAWN_ORIGIN: origin,
    THREEDAWN_DATABASE_URL: databaseUrl,
    THREEDAWN_SESSION_SECRET: sessionSecret,
    THREEDAWN_LINK_SECRET: linkSecret,
    THREEDAWN_SMS_PROVIDER: 'stand-in',
    THREEDAWN_SMS_STAND_IN_URL: sms.standInUrl,
    TWILIO_ACCOUNT_SID: account.sid,
    TWILIO_AUTH_TOKEN: account.token,
    TWILIO_FROM: account.from,
    THREEDAWN_MAIL_URL: mail.url,
    THREEDAWN_LOG_LEVEL: 'silent',
  });
  programs.push(program);
  return program;
}

/** As when the minute of the dead sender's claims has passed. */
const claimsRunOut = () =>
  change(
    bench.db,
    `UPDATE messages SET claimed_until = '2020-01-01 00:00:00.000' WHERE state = 'sending'`,
  );

const stateOf = async (key: string) => (await bench.row(key)).state;

it('killed after the claim and before the text was taken: sent once', async () => {
  bench.standIns.faults.set([{ channel: 'sms', does: 'hold', times: 1 }]);
  await bench.queue({ dedupeKey: 'held' });
  const first = await startSender();
  await until('it is claimed', async () => (await stateOf('held')) === 'sending');
  await first.kill();
  expect(bench.textsTo(familyPhone)).toEqual([]);
  await claimsRunOut();
  bench.standIns.faults.set([]);
  await startSender();
  await until('it is sent', async () => (await stateOf('held')) === 'sent');
  expect(bench.textsTo(familyPhone)).toHaveLength(1);
  expect((await bench.row('held')).attempts).toBe(2);
});

it('killed after the text was taken and before it was settled: sent once', async () => {
  bench.standIns.faults.set([{ channel: 'sms', does: 'accept-then-hold', times: 1 }]);
  await bench.queue({ dedupeKey: 'taken' });
  const first = await startSender();
  await until('the service has it', () => bench.textsTo(familyPhone).length === 1);
  await first.kill();
  expect(await stateOf('taken')).toBe('sending');
  await claimsRunOut();
  await startSender();
  await until('it is settled', async () => (await stateOf('taken')) === 'sent');
  expect(bench.textsTo(familyPhone)).toHaveLength(1);
  expect((await bench.row('taken')).provider_id).toBe(bench.standIns.store.texts[0]?.id);
});

it('killed after a mail was taken: sent again as the same mail', async () => {
  bench.standIns.faults.set([{ channel: 'mail', does: 'accept-then-hold', times: 1 }]);
  await bench.queue({ dedupeKey: 'mail', channel: 'mail', address: 'a@family.example.org' });
  const first = await startSender();
  await until('the service has it', () => bench.standIns.store.mails.length === 1);
  await first.kill();
  await claimsRunOut();
  await startSender();
  await until('it is settled', async () => (await stateOf('mail')) === 'sent');
  expect(new Set(bench.standIns.store.mails.map((mail) => mail.messageId)).size).toBe(1);
});

it('killed again and again with much to send: nothing lost, nothing doubled', async () => {
  const count = 40;
  bench.standIns.faults.set([{ channel: 'sms', does: 'delay', ms: 60, times: 1000 }]);
  for (let number = 0; number < count; number += 1)
    await bench.queue({ dedupeKey: `many:${number}`, body: `Text ${number}` });
  for (const after of [5, 15, 25]) {
    const sender = await startSender();
    await until(`${after} went out`, () => bench.standIns.store.texts.length >= after);
    await sender.kill();
    await claimsRunOut();
  }
  await startSender();
  await until('all are settled', async () =>
    (await bench.rows()).every((row) => row.state === 'sent'),
  );
  const bodies = bench.textsTo(familyPhone);
  expect(bodies).toHaveLength(count);
  expect(new Set(bodies).size).toBe(count);
});

it('told to stop, it finishes what is in flight and takes nothing more', async () => {
  bench.standIns.faults.set([{ channel: 'sms', does: 'delay', ms: 1500, times: 1 }]);
  await bench.queue({ dedupeKey: 'in-flight' });
  const sender = await startSender();
  await until('it is claimed', async () => (await stateOf('in-flight')) === 'sending');
  sender.process.kill('SIGTERM');
  expect(await sender.ended).toBe(0);
  expect(await stateOf('in-flight')).toBe('sent');
  expect(sender.complaints()).toBe('');
});

it('tells a person by a call when a message is given up', async () => {
  bench.standIns.faults.set([{ channel: 'sms', does: 'refuse', code: 21211, times: 1 }]);
  await bench.queue({ dedupeKey: 'refused' });
  await startSender();
  await until('it is given up', async () => (await stateOf('refused')) === 'given-up');
  const [calls] = await bench.db.query('SELECT reason, open_key FROM call_tasks');
  expect(calls).toEqual([
    { reason: 'evening-text-failed', open_key: 'evening-text-failed:1:2027-04-13' },
  ]);
});
