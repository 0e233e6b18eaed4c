import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { once } from 'node:events';
import { connect, type AddressInfo } from 'node:net';
import { join } from 'node:path';
import { brotliCompressSync, gzipSync } from 'node:zlib';
import request from 'supertest';
import { buildApp } from '../../server/app';
import { problem } from '../../shared/contracts/problem';
import { seedWording } from '../../server/wording/seed-wording';
import { startTestServer, testSettings } from '../support/server';
import type { TestServer } from '../support/server';

let server: TestServer;
let folder: string;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'threedawn-pages-'));
  for (const application of ['family', 'clinic']) {
    const root = join(folder, application, 'en');
    mkdirSync(join(root, 'media'), { recursive: true });
    writeFileSync(join(root, 'index.html'), `<!doctype html><title>${application}</title>`);
    writeFileSync(join(root, 'main-AbC_1234.js'), 'let plain = 1;');
    writeFileSync(join(root, 'main-AbC_1234.js.br'), brotliCompressSync('let brotli = 1;'));
    writeFileSync(join(root, 'main-AbC_1234.js.gz'), gzipSync('let gzipped = 1;'));
    writeFileSync(join(root, 'ngsw.json'), '{}');
    writeFileSync(join(root, 'ngsw-worker.js'), 'let worker = 1;');
    writeFileSync(join(root, '.hidden.js'), 'secret');
    writeFileSync(join(root, 'media', 'sun-0A1B2C3D.woff2'), 'font');
  }
  writeFileSync(join(folder, 'secret.txt'), 'secret');
  // A language that the list does not offer yet is not served, whatever lies in the folder.
  for (const root of [join(folder, 'family', 'my'), join(folder, 'clinic', 'ar')]) {
    mkdirSync(root, { recursive: true });
    writeFileSync(join(root, 'index.html'), 'not yet');
  }
  // Staff works in two languages.
  mkdirSync(join(folder, 'clinic', 'es'), { recursive: true });
  writeFileSync(join(folder, 'clinic', 'es', 'index.html'), '<title>clínica</title>');
  server = await startTestServer({ settings: { distDir: folder } });
});
afterAll(async () => {
  rmSync(folder, { recursive: true });
  await server.close();
});

const get = (path: string) => request(server.app).get(path);

describe('headers', () => {
  it('are strict and static on every kind of answer', async () => {
    for (const path of ['/', '/en/', '/en/main-AbC_1234.js', '/api/clinic/session', '/nowhere']) {
      const { headers } = await get(path);
      const policy = headers['content-security-policy'] ?? '';
      expect(policy).toContain("default-src 'self'");
      expect(policy).toContain("script-src 'self';");
      expect(policy).toContain("require-trusted-types-for 'script'");
      expect(policy).toContain('trusted-types angular angular#bundler angular#components app#sw');
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy).not.toContain('nonce');
      expect(headers['referrer-policy']).toBe('no-referrer');
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['x-powered-by']).toBeUndefined();
      expect(headers['strict-transport-security']).toBeUndefined();
    }
  });

  it('demand https and a secure cookie in production', async () => {
    const settings = {
      ...testSettings(server.database.url),
      mode: 'production',
      trustedProxies: 1,
    } as const;
    const app = buildApp({ ...server.context, settings });
    const answer = await request(app).get('/');
    expect(answer.headers['strict-transport-security']).toContain('max-age=63072000');
    const { email } = await server.addStaff(['clinician']);
    const signIn = await request(app)
      .post('/api/clinic/session')
      .set({ 'Sec-Fetch-Site': 'same-origin', 'X-Forwarded-Proto': 'https' })
      .send({ email, password: 'a long and quiet morning' })
      .expect(200);
    expect(String(signIn.headers['set-cookie'])).toContain('Secure');
  });
});

describe('files', () => {
  it.each([
    ['br', 'let brotli = 1;', 'br'],
    ['gzip', 'let gzipped = 1;', 'gzip'],
    ['identity', 'let plain = 1;', undefined],
  ])('come as the browser takes them: %s', async (encoding, _content, expected) => {
    const answer = await get('/en/main-AbC_1234.js').set('Accept-Encoding', encoding).expect(200);
    expect(answer.headers['content-encoding']).toBe(expected);
    expect(answer.headers['content-type']).toMatch(/javascript/);
    expect(answer.headers['vary']).toContain('Accept-Encoding');
    expect(answer.headers['cache-control']).toBe('public, max-age=31536000, immutable');
  });

  it.each(['/en/', '/en/index.html', '/en/ngsw.json', '/en/ngsw-worker.js', '/clinic/en/'])(
    '%s is asked for again each time',
    async (path) => {
      const answer = await get(path).expect(200);
      expect(answer.headers['cache-control']).toBe('no-cache');
      await get(path)
        .set('If-None-Match', answer.headers['etag'] ?? '')
        .expect(304);
    },
  );

  it('screens get their application’s page, missing files do not', async () => {
    expect((await get('/en/m/some-token').expect(200)).text).toContain('family');
    expect((await get('/clinic/en/children/7').expect(200)).text).toContain('clinic');
    await get('/en/missing-AbC_1234.js').expect(404);
    await get('/clinic/en/missing.css').expect(404);
    expect((await get('/en').expect(302)).headers['location']).toBe('/en/');
    expect((await get('/clinic').expect(302)).headers['location']).toBe('/clinic/en/');
    expect((await get('/clinic/').expect(302)).headers['location']).toBe('/clinic/en/');
  });

  it('open the clinic’s side in the language of the browser, where staff has it', async () => {
    expect((await get('/clinic/es/this-morning').expect(200)).text).toContain('clínica');
    for (const [wanted, path] of [
      ['es-MX,es;q=0.9', '/clinic/es/'],
      ['ar', '/clinic/en/'],
    ] as const) {
      const answer = await get('/clinic').set('Accept-Language', wanted).expect(302);
      expect(answer.headers['location']).toBe(path);
      expect(answer.headers['vary']).toContain('Accept-Language');
    }
  });

  it.each([
    '/en/../secret.txt',
    '/en/..%2f..%2fsecret.txt',
    '/en/%2e%2e/%2e%2e/secret.txt',
    '/en/..%5c..%5csecret.txt',
    '/en/.hidden.js',
    '/en/media/..%2f.hidden.js',
    '/en/secret%00.txt',
    '/en/%E0%A4%A.js',
  ])('outside of the folder stay there: %s', async (path) => {
    const answer = await get(path);
    expect([400, 404]).toContain(answer.status);
    expect(answer.text).not.toContain('secret');
  });

  it('in languages that are not offered are not there', async () => {
    await get('/my/').expect(404);
    await get('/xx/').expect(404);
    await get('/clinic/ar/').expect(404);
  });

  it('outlast readers who leave while a page loads', async () => {
    const failures: unknown[] = [];
    const note = (failure: unknown): unknown => failures.push(failure);
    process.on('unhandledRejection', note);
    const listening = server.app.listen(0, '127.0.0.1');
    try {
      await once(listening, 'listening');
      const { port } = listening.address() as AddressInfo;
      for (let reader = 0; reader < 40; reader += 1) {
        const socket = connect(port, '127.0.0.1');
        await once(socket, 'connect');
        socket.write('GET /clinic/en/main-AbC_1234.js HTTP/1.1\r\nHost: localhost\r\n\r\n', () =>
          socket.destroy(),
        );
        await once(socket, 'close');
      }
      const there = await request(listening).get('/clinic/en/').expect(200);
      expect(there.text).toContain('clinic');
      expect(failures).toEqual([]);
    } finally {
      process.off('unhandledRejection', note);
      listening.close();
    }
  });

  it('are only read', async () => {
    await request(server.app).post('/en/').expect(404);
  });
});

describe('pages without script', () => {
  it('the first page offers the built languages, each in its own name', async () => {
    const answer = await get('/').expect(200);
    expect(answer.text).toContain('<a href="/en/" lang="en-US"');
    expect(answer.text).not.toContain('/my/');
    expect(answer.text).not.toMatch(/<script|tubercul/i);
  });

  it('the public sheet names nobody and no hours', async () => {
    await get('/sheet/en').expect(404);
    await seedWording(server.context.db, { language: 'en', now: Date.now() });
    const answer = await get('/sheet/en').expect(200);
    expect(answer.text).toContain('<html lang="en-US" dir="ltr">');
    expect(answer.text).toContain('no food, no milk, no water');
    expect(answer.text).not.toMatch(/<script|tubercul|\d{1,2}:\d{2}/i);
    for (const path of ['/sheet/xx', '/sheet/es', '/sheet/']) await get(path).expect(404);
  });

  it('links that nobody knows lead to the page that says so, without a cookie', async () => {
    for (const path of ['/i/unknown-unknown-unknown', '/m/x', '/m/%3Cscript%3E']) {
      const answer = await get(path).expect(302);
      expect(answer.headers['location']).toMatch(/^\/en\/[im]\//);
      expect(answer.headers['location']).not.toContain('<');
      expect(answer.headers['set-cookie']).toBeUndefined();
      expect(answer.headers['cache-control']).toBe('no-store');
    }
  });
});

describe('problems', () => {
  it.each(['/api/nowhere', '/api/clinic/nowhere', '/api/family/nowhere', '/hooks/nowhere'])(
    '%s is a problem document',
    async (path) => {
      const answer = await get(path).expect(404);
      expect(answer.headers['content-type']).toContain('application/problem+json');
      expect(problem.parse(answer.body)).toMatchObject({
        type: 'about:blank',
        code: 'not-found',
        status: 404,
      });
    },
  );

  it('of unknown cause leave a reference and nothing else', async () => {
    const broken = buildApp({
      ...server.context,
      clock: {
        now: () => {
          throw new Error('the wall clock fell down');
        },
        refresh: () => Promise.resolve(),
      },
    });
    const answer = await request(broken)
      .post('/api/family/links/describe')
      .set('Sec-Fetch-Site', 'same-origin')
      .send({ token: 'unknown-unknown-unknown' })
      .expect(500);
    const { code, reference } = problem.parse(answer.body);
    expect(code).toBe('unexpected');
    expect(reference).toMatch(/^[2-9A-HJ-NP-Z]{8}$/);
    expect(answer.text).not.toContain('wall clock');
  });
});
