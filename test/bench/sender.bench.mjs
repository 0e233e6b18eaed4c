// What the outbox costs: sending beside the bare library of the text service, queueing beside a plain insert, and a
// sign-in while thousands of messages are due.
import { createRequire } from 'node:module';
import twilio from 'twilio';
import { buildServer } from '../../server/bootstrap/build.mjs';
import { inRoot } from '../../server/bootstrap/folders.mjs';
import { openThrowawayHouse } from '../../server/bootstrap/house.mjs';
import { medianOf } from './support/table.mjs';

export const name = 'Sender: claim and send, queueing, and a sign-in while much is due';

const require = createRequire(import.meta.url);
const built = (path) => require(inRoot('build', 'server', path));

const rounds = 5;
const textsInARound = 200;
const atOnce = 10;
const muchDue = 10_000;
const signIns = 8;
const quiet = { info() {}, warn() {}, error() {} };
/** At least half the rate of the bare library; one more statement; half as slow again. */
const limits = { sending: 2, statements: 1, signIn: 1.5 };

export async function run() {
  await buildServer();
  const house = await openThrowawayHouse({
    // Delivery reports come after the measuring: they are no part of sending.
    environment: { THREEDAWN_STAND_IN_REPORT_PAUSE_MS: '60000', THREEDAWN_LOG_LEVEL: 'silent' },
  });
  const { connect } = built('database/connection.js');
  const db = connect(house.environment.THREEDAWN_DATABASE_URL, { poolSize: atOnce + 2 });
  try {
    const sender = house.processes.find((one) => one.name === 'sender');
    await sender.stop();
    const sending = await measureSending(db, house);
    const queueing = await measureQueueing(db);
    const signingIn = await measureSignIns(db, house, sender);
    return [...sending, ...queueing, ...signingIn];
  } finally {
    await db.close();
    await house.close();
  }
}

const timed = async (work) => {
  const from = performance.now();
  await work();
  return performance.now() - from;
};

let made = 0;
/** Each to a number of its own, all of them reserved for fiction. */
function newText() {
  made += 1;
  const now = Date.now();
  return {
    dedupeKey: `bench:${made}`,
    kind: 'evening',
    channel: 'sms',
    householdId: null,
    familyMemberId: null,
    address: `+131255501${String(made % 100).padStart(2, '0')}`,
    language: 'en',
    wordingVersions: {},
    body: `Alder Street: visit ${made}. Open the page for the plan of the night.`,
    callReason: null,
    dueAt: now - 1000,
    lastUsefulAt: now + 3_600_000,
    createdAt: now,
  };
}

async function queueMany(db, count) {
  const { inTransaction } = built('database/connection.js');
  const { enqueue } = built('outbox/enqueue.js');
  await inTransaction(db, async (transaction) => {
    for (let index = 0; index < count; index += 1) await enqueue(db, transaction, newText());
  });
}

/** The library itself, told nothing but where the pretended service is. */
function bareLibrary({ THREEDAWN_SMS_STAND_IN_URL: url, ...environment }) {
  class Client extends twilio.RequestClient {
    request(options) {
      const uri = options.uri.replace(/^https:\/\/[a-z0-9.-]+\.twilio\.com/, url);
      return super.request({ ...options, uri });
    }
  }
  const client = twilio(environment.TWILIO_ACCOUNT_SID, environment.TWILIO_AUTH_TOKEN, {
    httpClient: new Client(),
  });
  const { TWILIO_FROM: from, THREEDAWN_ORIGIN: origin } = environment;
  return async (texts) => {
    const waiting = [...texts];
    const hand = async () => {
      for (let text = waiting.shift(); text; text = waiting.shift())
        await client.messages.create({
          to: text.address,
          from,
          body: text.body,
          statusCallback: `${origin}/hooks/sms/status`,
        });
    };
    await Promise.all(Array.from({ length: atOnce }, hand));
  };
}

/** The sender's own loop until so many were handed over, and everything settled. */
async function sendByLoop(db, sms, count) {
  const { createSender } = built('outbox/sender.js');
  const { runSender } = built('outbox/sender-loop.js');
  let handed = 0;
  let allHanded;
  const done = new Promise((resolve) => (allHanded = resolve));
  const counting = {
    ...sms,
    send: (text) => {
      handed += 1;
      if (handed === count) allHanded();
      return sms.send(text);
    },
  };
  const sender = createSender({
    db,
    clock: { now: () => Date.now(), refresh: () => Promise.resolve() },
    log: quiet,
    sms: counting,
    mail: { send: () => Promise.reject(new Error('no mail is queued here')), close() {} },
    giveUp: () => Promise.resolve(),
    atOnce,
    perSecond: { sms: 100_000, mail: 100_000 },
  });
  const loop = runSender({ sender, log: quiet, refresh: () => Promise.resolve() });
  await done;
  await loop.stop();
}

async function measureSending(db, { environment }) {
  const { readSettings } = built('config/settings.js');
  const { openSmsChannel } = built('channels/sms/sms-channel.js');
  const sendOwn = (count) => sendByLoop(db, openSmsChannel(readSettings(environment)), count);
  const sendBare = bareLibrary(environment);
  await queueMany(db, 20);
  await sendOwn(20);
  await sendBare(Array.from({ length: 20 }, newText));
  const own = [];
  const bare = [];
  for (let round = 0; round < rounds; round += 1) {
    const texts = Array.from({ length: textsInARound }, newText);
    bare.push(await timed(() => sendBare(texts)));
    await queueMany(db, textsInARound);
    own.push(await timed(() => sendOwn(textsInARound)));
  }
  const [[left]] = await db.query(
    "SELECT COUNT(*) AS n FROM messages WHERE state NOT IN ('sent', 'delivered') AND dedupe_key LIKE 'bench:%'",
  );
  if (Number(left.n) > 0) throw new Error(`${left.n} texts of the bench were not sent`);
  const each = (times) => medianOf(times) / textsInARound;
  return [
    {
      what: `Claim and send, ${atOnce} at once: time a text`,
      value: `${each(own).toFixed(2)} ms (${Math.round(1000 / each(own))}/s)`,
      of: `${each(bare).toFixed(2)} ms (${Math.round(1000 / each(bare))}/s), the bare library`,
      ratio: each(own) / each(bare),
      limit: limits.sending,
    },
  ];
}

async function measureQueueing(db) {
  const { inTransaction } = built('database/connection.js');
  const { enqueue } = built('outbox/enqueue.js');
  const change = (transaction) =>
    db.query("INSERT INTO changes (topic, ref_id) VALUES ('messages', NULL)", { transaction });
  const statements = async (work) => {
    let count = 0;
    db.options.logging = () => (count += 1);
    await inTransaction(db, work);
    db.options.logging = false;
    return count;
  };
  const alone = await statements(change);
  const both = await statements(async (transaction) => {
    await change(transaction);
    await enqueue(db, transaction, newText());
  });
  const withMessage = [];
  const withRow = [];
  for (let index = 0; index < 200; index += 1) {
    withRow.push(
      await timed(() =>
        inTransaction(db, async (transaction) => {
          await change(transaction);
          await change(transaction);
        }),
      ),
    );
    withMessage.push(
      await timed(() =>
        inTransaction(db, async (transaction) => {
          await change(transaction);
          await enqueue(db, transaction, newText());
        }),
      ),
    );
  }
  return [
    {
      what: 'Queueing a message in a change: statements more',
      value: `${both - alone}`,
      of: '1 insert',
      ratio: both - alone,
      limit: limits.statements,
    },
    {
      what: 'A change with a message: time',
      value: `${medianOf(withMessage).toFixed(2)} ms`,
      of: `${medianOf(withRow).toFixed(2)} ms, with a plain row more`,
      ratio: medianOf(withMessage) / medianOf(withRow),
    },
  ];
}

async function signIn({ origin }) {
  const answer = await fetch(`${origin}/api/clinic/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', Origin: origin },
    body: JSON.stringify({
      email: 'rosa@alder.example.org',
      password: 'lantern before first light',
    }),
  });
  if (!answer.ok) throw new Error(`The sign-in answered ${answer.status}`);
  await answer.arrayBuffer();
}

/** The sender loads the library of the text service at its first text; that is its start, not its work. */
async function untilSome(db, count) {
  const giveUpAt = Date.now() + 60_000;
  for (;;) {
    const [[sent]] = await db.query(
      "SELECT COUNT(*) AS n FROM messages WHERE state = 'sent' AND dedupe_key LIKE 'bench:%'",
    );
    if (Number(sent.n) >= count) return;
    if (Date.now() > giveUpAt) throw new Error('The sender does not send');
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

/** In turns: nothing due with the sender at work, and ten thousand due with the sender at work on them. */
async function measureSignIns(db, house, sender) {
  const clear = () => db.query("DELETE FROM messages WHERE dedupe_key LIKE 'bench:%'");
  const some = async () => {
    const times = [];
    for (let index = 0; index < signIns; index += 1) times.push(await timed(() => signIn(house)));
    return times;
  };
  await clear();
  await signIn(house);
  const idle = [];
  const busy = [];
  for (let turn = 0; turn < 3; turn += 1) {
    await sender.start();
    idle.push(...(await some()));
    await sender.stop();
    await queueMany(db, muchDue);
    await sender.start();
    await untilSome(db, 20);
    busy.push(...(await some()));
    const [[left]] = await db.query(
      "SELECT COUNT(*) AS n FROM messages WHERE state = 'queued' AND dedupe_key LIKE 'bench:%'",
    );
    if (Number(left.n) < muchDue / 2)
      throw new Error('The sender was through before the sign-ins were');
    await sender.stop();
    await clear();
  }
  return [
    {
      what: `A sign-in while ${muchDue} messages are due and go out`,
      value: `${Math.round(medianOf(busy))} ms`,
      of: `${Math.round(medianOf(idle))} ms, nothing due`,
      ratio: medianOf(busy) / medianOf(idle),
      limit: limits.signIn,
    },
  ];
}
