import { createServer, get, type IncomingMessage, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { connect, select } from '../../server/database/connection';
import { announce } from '../../server/live/announce';
import { createPoller, pollerOf } from '../../server/live/poller';
import { startTestServer, staffPassword, type TestServer } from '../support/server';

let server: TestServer;
let http: Server;
let port: number;

beforeAll(async () => {
  server = await startTestServer();
  http = createServer(server.app);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  ({ port } = http.address() as AddressInfo);
});
afterEach(() => server.database.empty());
afterAll(async () => {
  http.closeAllConnections();
  await new Promise((resolve) => http.close(resolve));
  await server.close();
});

interface Stream {
  readonly response: IncomingMessage;
  /** Waits until the text has come; fails after five seconds. */
  until(text: string): Promise<string>;
  read(): string;
  close(): void;
}

function open(cookie: string): Promise<Stream> {
  return new Promise((resolve, reject) => {
    const headers = { cookie, accept: 'text/event-stream', 'sec-fetch-site': 'same-origin' };
    const request = get(
      { port, host: '127.0.0.1', path: '/api/clinic/live', headers },
      (response) => {
        let received = '';
        const waiting = new Set<() => void>();
        response.setEncoding('utf8').on('data', (chunk: string) => {
          received += chunk;
          for (const look of [...waiting]) look();
        });
        resolve({
          response,
          read: () => received,
          until: (text) =>
            new Promise((found, failed) => {
              const timer = setTimeout(() => failed(new Error(`Not received: ${text}`)), 5000);
              const look = (): void => {
                if (!received.includes(text)) return;
                clearTimeout(timer);
                waiting.delete(look);
                found(received);
              };
              waiting.add(look);
              look();
            }),
          close: () => request.destroy(),
        });
      },
    );
    request.on('error', reject);
  });
}

async function signedInCookie(): Promise<string> {
  const { email } = await server.addStaff(['nurse-coordinator']);
  const answer = await server
    .visitor()
    .post('/api/clinic/session')
    .send({ email, password: staffPassword })
    .expect(200);
  const cookies = answer.headers['set-cookie'] as unknown as string[];
  return cookies.map((cookie) => cookie.split(';')[0]).join('; ');
}

describe('GET /live', () => {
  it('is for signed-in staff alone', async () => {
    await server.visitor().get('/api/clinic/live').expect(401);
  });

  it('says that it is ready, and then what another connection changes', async () => {
    const stream = await open(await signedInCookie());
    expect(stream.response.headers).toMatchObject({
      'content-type': 'text/event-stream; charset=utf-8',
      'cache-control': 'no-store, no-transform',
      'x-accel-buffering': 'no',
    });
    await stream.until('event: ready');
    expect(stream.read()).toContain('retry: 3000');
    const other = connect(server.database.url, { poolSize: 1 });
    try {
      await announce(other, undefined, 'mornings', 4711);
    } finally {
      await other.close();
    }
    await stream.until('data: {"topic":"mornings","refId":4711}');
    stream.close();
  });

  it('does not keep the session alive', async () => {
    const cookie = await signedInCookie();
    await server.context.db.query('UPDATE sessions SET seen_at = seen_at - INTERVAL 5 MINUTE');
    const expiresAt = () =>
      select<{ expires_at: Date; seen_at: Date }>(
        server.context.db,
        'SELECT expires_at, seen_at FROM sessions WHERE subject_id IS NOT NULL',
      );
    const before = await expiresAt();
    const stream = await open(cookie);
    await stream.until('event: ready');
    stream.close();
    await new Promise((resolve) => stream.response.once('close', resolve));
    expect(await expiresAt()).toEqual(before);
  });
});

describe('the poller', () => {
  it('loses none whose transaction commits late, and tells none twice', async () => {
    const { db } = server.context;
    const poller = createPoller(server.context);
    const heard: (number | null)[] = [];
    const stop = poller.subscribe((changes) => heard.push(...changes.map(({ refId }) => refId)));
    await poller.poll();

    const late = await db.transaction();
    await announce(db, late, 'mornings', 1);
    await announce(db, undefined, 'mornings', 2);
    await poller.poll();
    expect(heard).toEqual([2]);

    await late.commit();
    await poller.poll();
    await poller.poll();
    expect(heard).toEqual([2, 1]);
    stop();
  });

  it('never tells what was rolled back, nor what was there before anybody listened', async () => {
    const { db } = server.context;
    await announce(db, undefined, 'calls', 5);
    const poller = createPoller(server.context);
    const heard: (number | null)[] = [];
    const stop = poller.subscribe((changes) => heard.push(...changes.map(({ refId }) => refId)));
    await poller.poll();
    const undone = await db.transaction();
    await announce(db, undone, 'calls', 6);
    await undone.rollback();
    await announce(db, undefined, 'calls', 7);
    await poller.poll();
    expect(heard).toEqual([7]);
    stop();
  });

  it('reads the clock again before it tells of its move', async () => {
    const { db, log } = server.context;
    const steps: string[] = [];
    const clock = {
      now: () => 0,
      refresh: () => {
        steps.push('read');
        return Promise.resolve();
      },
    };
    const poller = createPoller({ db, log, clock });
    const stop = poller.subscribe((changes) => steps.push(...changes.map(({ topic }) => topic)));
    await poller.poll();
    await announce(db, undefined, 'clock');
    await poller.poll();
    expect(steps).toEqual(['read', 'read', 'clock']);
    stop();
  });

  it('is one a process', () => {
    expect(pollerOf(server.context)).toBe(pollerOf(server.context));
  });
});
