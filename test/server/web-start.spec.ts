import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { Writable } from 'node:stream';
import pino from 'pino';
import request from 'supertest';
import { buildApp } from '../../server/app';
import { connect } from '../../server/database/connection';
import { durabilityFaults, missingMigrations } from '../../server/database/fitness';
import { checkFitness, listen, NotFit } from '../../server/main';
import { createTestDatabase } from '../support/database';
import { startTestServer, testSettings } from '../support/server';
import type { TestServer } from '../support/server';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

const production = () => ({ ...testSettings(server.database.url), mode: 'production' }) as const;

describe('does not start', () => {
  it('as root in production', async () => {
    const { db } = server.context;
    await expect(checkFitness({ settings: production(), db }, 0)).rejects.toThrow(/root/);
    await expect(
      checkFitness({ settings: server.context.settings, db }, 0),
    ).resolves.toBeUndefined();
  });

  it('in production on a database that forgets: the one of the tests does', async () => {
    const { db } = server.context;
    expect((await durabilityFaults(db)).length).toBeGreaterThan(0);
    await expect(checkFitness({ settings: production(), db }, 1000)).rejects.toThrow(
      /innodb_flush_log_at_trx_commit/,
    );
  });

  it('on a schema that is behind', async () => {
    expect(await missingMigrations(server.context.db)).toEqual([]);
    const empty = await createTestDatabase();
    const db = connect(empty.migrateUrl, { poolSize: 1 });
    try {
      const settings = server.context.settings;
      await expect(checkFitness({ settings, db }, 1000)).rejects.toBeInstanceOf(NotFit);
      await expect(checkFitness({ settings, db }, 1000)).rejects.toThrow(/0001-create-clock/);
    } finally {
      await db.close();
      await empty.drop();
    }
  });

  it('on a port that is taken, and says so in words', async () => {
    const first = createServer();
    await new Promise<void>((done) => first.listen(0, '127.0.0.1', done));
    const { port } = first.address() as AddressInfo;
    try {
      await expect(
        listen(createServer(), { ...server.context.settings, host: '127.0.0.1', port }),
      ).rejects.toThrow(new RegExp(`Port ${port} is taken`));
    } finally {
      await new Promise((done) => first.close(done));
    }
  });
});

describe('the log', () => {
  it('keeps routes and statuses, no address, token, query, e-mail or password', async () => {
    const lines: string[] = [];
    const sink = new Writable({
      write: (chunk: Buffer, _encoding, done) => {
        lines.push(chunk.toString());
        done();
      },
    });
    const app = buildApp({ ...server.context, log: pino({ level: 'trace' }, sink) });
    const secretToken = 'a-token-that-stays-secret';
    await request(app).get(`/i/${secretToken}`);
    await request(app).get('/api/clinic/access-record?childId=41');
    await request(app).get(`/api/clinic/nowhere/${secretToken}`);
    await request(app)
      .post('/api/clinic/session')
      .set('Sec-Fetch-Site', 'same-origin')
      .send({ email: 'somebody@example.org', password: 'their own password' });
    await request(app)
      .post('/api/family/links/open')
      .set('Sec-Fetch-Site', 'same-origin')
      .send({ token: secretToken, bornOn: '2025-03-14' });
    const all = lines.join('');
    expect(lines.length).toBeGreaterThanOrEqual(5);
    expect(all).toContain('"route":"/api/clinic/session"');
    expect(all).toContain('"status":404');
    for (const personal of [
      secretToken,
      'childId=41',
      'somebody@',
      'their own',
      '2025-03-14',
      '127.0.0.1',
    ])
      expect(all).not.toContain(personal);
  });
});
