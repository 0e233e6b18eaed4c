import { appendFileSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer, request } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { validateRequest } from 'twilio/lib/webhooks/webhooks';
import { startStandIns, type StandIns } from './start-stand-ins';

const account = { sid: `AC${'0'.repeat(32)}`, token: '1'.repeat(32), from: '+12065550100' };
const phone = '+12065550142';
const at = Date.UTC(2027, 3, 13, 12, 30, 15);

let folder: string;
let standIns: StandIns;
let posts: { url: string; form: Record<string, string>; isGenuine: boolean }[];
let clinic: ReturnType<typeof createServer>;
let origin: string;

const start = () =>
  startStandIns({
    account,
    origin: () => origin,
    ports: { sms: 0, mail: 0, control: 0 },
    now: () => Promise.resolve(at),
    file: join(folder, 'stand-ins.jsonl'),
    reportPauseMs: 2,
  });

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'threedawn-stand-ins-'));
  posts = [];
  clinic = createServer((req, res) => {
    let body = '';
    req.on('data', (chunk: Buffer) => (body += chunk.toString()));
    req.on('end', () => {
      const form = Object.fromEntries(new URLSearchParams(body));
      const signature = String(req.headers['x-twilio-signature']);
      const isGenuine = validateRequest(account.token, signature, `${origin}${req.url}`, form);
      posts.push({ url: req.url ?? '', form, isGenuine });
      res.writeHead(204).end();
    });
  });
  await new Promise<void>((resolve) => clinic.listen(0, '127.0.0.1', resolve));
  origin = `http://127.0.0.1:${(clinic.address() as AddressInfo).port}`;
  standIns = await start();
});
afterEach(async () => {
  await standIns.close();
  clinic.closeAllConnections();
  await new Promise((resolve) => clinic.close(resolve));
  rmSync(folder, { recursive: true });
});

interface Answer {
  status: number;
  body: Record<string, unknown>;
}

async function ask(
  path: string,
  form?: Record<string, string>,
  token = account.token,
): Promise<Answer> {
  const answer = await fetch(`${standIns.smsUrl}/2010-04-01/Accounts/${account.sid}${path}`, {
    method: form ? 'POST' : 'GET',
    headers: {
      Authorization: `Basic ${Buffer.from(`${account.sid}:${token}`).toString('base64')}`,
    },
    ...(form && { body: new URLSearchParams(form) }),
  });
  return { status: answer.status, body: (await answer.json()) as Record<string, unknown> };
}

const text = (more: Record<string, string> = {}) =>
  ask('/Messages.json', {
    To: phone,
    From: account.from,
    Body: 'Visit tomorrow.',
    StatusCallback: `${origin}/hooks/sms/status`,
    ...more,
  });

async function untilPosts(count: number): Promise<void> {
  const giveUpAt = Date.now() + 5000;
  while (posts.length < count && Date.now() < giveUpAt)
    await new Promise((resolve) => setTimeout(resolve, 5));
  expect(posts).toHaveLength(count);
}

describe('the text service', () => {
  it('takes a text and answers in the service’s own form', async () => {
    const { status, body } = await text();
    expect(status).toBe(201);
    expect(body).toMatchObject({
      account_sid: account.sid,
      body: 'Visit tomorrow.',
      date_created: 'Tue, 13 Apr 2027 12:30:15 +0000',
      date_sent: null,
      direction: 'outbound-api',
      error_code: null,
      from: account.from,
      num_segments: '1',
      status: 'queued',
      to: phone,
    });
    expect(body['sid']).toMatch(/^SM[0-9a-f]{32}$/);
  });

  it('reports signed how the text fares', async () => {
    const { body } = await text();
    await untilPosts(2);
    expect(posts.map(({ form }) => form['MessageStatus'])).toEqual(['sent', 'delivered']);
    for (const post of posts) {
      expect(post).toMatchObject({ url: '/hooks/sms/status', isGenuine: true });
      expect(post.form['MessageSid']).toBe(body['sid']);
    }
  });

  it('reports late when told so, and counts what it did wrong', async () => {
    const control = (path: string, more: RequestInit = {}) =>
      fetch(`${standIns.controlUrl}${path}`, {
        ...more,
        headers: { 'Content-Type': 'application/json' },
      });
    const late = { channel: 'sms', does: 'late-reports', ms: 150 };
    await control('/faults', { method: 'PUT', body: JSON.stringify({ faults: [late] }) });
    const sentAt = performance.now();
    await text();
    await untilPosts(2);
    expect(performance.now() - sentAt).toBeGreaterThanOrEqual(150);
    expect(posts.map(({ form }) => form['MessageStatus'])).toEqual(['sent', 'delivered']);
    const told = await control('/faults');
    expect(await told.json()).toEqual({ done: { 'sms late-reports': 1 } });
  });

  it.each([
    ['a bad number', { To: '555' }, 400, 21211],
    ['another sender', { From: '+12065550101' }, 400, 21212],
    ['no words', { Body: '' }, 400, 21602],
    ['too many words', { Body: 'x'.repeat(1601) }, 400, 21617],
  ])('refuses %s', async (_case, more, status, code) => {
    const answer = await text(more);
    expect(answer).toMatchObject({ status, body: { code, status } });
    expect(answer.body['more_info']).toContain(String(code));
  });

  it('lets in its account alone', async () => {
    const answer = await ask('/Messages.json', undefined, 'wrong');
    expect(answer).toMatchObject({ status: 401, body: { code: 20003 } });
  });

  it('lists texts by number and by day of sending, newest first', async () => {
    await text({ Body: 'one' });
    await text({ Body: 'two' });
    await text({ Body: 'other', To: '+12065550143' });
    await untilPosts(6);
    const bodies = async (query: string) => {
      const { body } = await ask(`/Messages.json?${query}`);
      return (body['messages'] as { body: string }[]).map((one) => one.body);
    };
    const to = `To=${encodeURIComponent(phone)}`;
    expect(await bodies(to)).toEqual(['two', 'one']);
    expect(await bodies(`${to}&PageSize=1`)).toEqual(['two']);
    expect(await bodies(`${to}&DateSent=2027-04-13`)).toEqual(['two', 'one']);
    expect(await bodies(`${to}&DateSent=2027-04-14`)).toEqual([]);
    expect(await bodies(`${to}&DateSent%3E=2027-04-14`)).toEqual([]);
  });

  it('honours STOP and START, and brings every text to the clinic', async () => {
    expect(await standIns.receiveFromPhone(phone, ' Stop ')).toBe(true);
    expect(await text()).toMatchObject({ status: 400, body: { code: 21610 } });
    await standIns.receiveFromPhone(phone, 'START');
    expect((await text()).status).toBe(201);
    expect(posts[0]).toMatchObject({
      url: '/hooks/sms/reply',
      isGenuine: true,
      form: { From: phone, To: account.from, Body: ' Stop ' },
    });
    const outgoing = standIns.store.texts.filter((one) => one.direction === 'out');
    expect(outgoing.slice(0, 2).map((one) => one.status)).toEqual(['delivered', 'delivered']);
  });

  it('posts to the clinic and nowhere else', async () => {
    await text({ StatusCallback: 'http://127.0.0.1:9/elsewhere' });
    await text();
    await untilPosts(2);
    expect(posts.every(({ url }) => url === '/hooks/sms/status')).toBe(true);
  });
});

it('keeps everything over a restart, also when the last line was cut off', async () => {
  await text();
  await untilPosts(2);
  await standIns.receiveFromPhone(phone, 'STOP');
  const before = standIns.store.texts.map(({ id, status }) => ({ id, status }));
  await standIns.close();
  const file = join(folder, 'stand-ins.jsonl');
  appendFileSync(file, '{"text":{"id":"SM');
  standIns = await start();
  expect(standIns.store.texts.map(({ id, status }) => ({ id, status }))).toEqual(before);
  expect([...standIns.store.optedOut]).toEqual([phone]);
  await text({ To: '+12065550143' });
  await untilPosts(5);
  await standIns.close();
  standIns = await start();
  expect(standIns.store.texts.at(-1)).toMatchObject({ phone: '+12065550143', status: 'delivered' });
});

describe('the control address', () => {
  it('is for this machine alone', async () => {
    const answer = await fetch(`${standIns.controlUrl}/state`);
    expect(answer.status).toBe(200);
    const status = await new Promise((resolve) => {
      request(`${standIns.controlUrl}/state`, { headers: { Host: 'bound.example.org' } }, (one) => {
        one.resume();
        resolve(one.statusCode);
      }).end();
    });
    expect(status).toBe(403);
  });

  it('takes no body that a page could send unasked', async () => {
    const answer = await fetch(`${standIns.controlUrl}/replies`, {
      method: 'POST',
      headers: { 'Content-Type': 'text/plain' },
      body: JSON.stringify({ phone, body: '1' }),
    });
    expect(answer.status).toBe(422);
    expect(standIns.store.texts).toEqual([]);
  });
});
