import request from 'supertest';
import { getExpectedTwilioSignature } from 'twilio/lib/webhooks/webhooks';
import { select } from '../../server/database/connection';
import { startTestServer, type TestServer } from '../support/server';

jest.setTimeout(30_000);

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterEach(() => server.database.empty());
afterAll(() => server.close());

const id = `SM${'a'.repeat(32)}`;
const delivered = { MessageSid: id, MessageStatus: 'delivered', To: '+12065550142' };
const reply = { MessageSid: id, From: '+12065550142', To: '+12065550100', Body: '1' };

function post(path: string, form: Record<string, string>, signature?: string) {
  const call = request(server.app).post(path).type('form');
  return (signature === undefined ? call : call.set('X-Twilio-Signature', signature)).send(form);
}

function signedFor(
  path: string,
  form: Record<string, string>,
  {
    token = server.context.settings.sms.authToken,
    origin = server.context.settings.origin,
  }: { token?: string; origin?: string } = {},
): string {
  return getExpectedTwilioSignature(token, `${origin}${path}`, form);
}

const genuine = (path: string, form: Record<string, string>) =>
  post(path, form, signedFor(path, form));

const reports = () =>
  select<{ status: string; error_code: string | null }>(
    server.context.db,
    'SELECT status, error_code FROM delivery_reports ORDER BY id',
  );
const replies = () => select<{ body: string }>(server.context.db, 'SELECT body FROM replies');

describe.each([
  ['/hooks/sms/status', delivered],
  ['/hooks/sms/reply', reply],
])('%s refuses', (path, form) => {
  const refused = async (answer: Promise<request.Response>, status = 403) => {
    expect((await answer).status).toBe(status);
    expect(await reports()).toEqual([]);
    expect(await replies()).toEqual([]);
  };

  it('what is not signed', () => refused(Promise.resolve(post(path, form))));
  it('a wrong signature', () => refused(Promise.resolve(post(path, form, 'bm90IGEgc2lnbmF0dXJl'))));
  it('a signature by another token', () =>
    refused(
      Promise.resolve(post(path, form, signedFor(path, form, { token: 'another'.repeat(5) }))),
    ));
  it('a signature for another form', () =>
    refused(Promise.resolve(post(path, form, signedFor(path, { ...form, MessageSid: 'SM1' })))));
  it('a signature for the address that the request claims', () => {
    const signature = signedFor(path, form, { origin: 'http://elsewhere.example.org' });
    return refused(
      Promise.resolve(post(path, form, signature).set('Host', 'elsewhere.example.org')),
    );
  });
  it('a signed form without a message', () =>
    refused(Promise.resolve(genuine(path, { AccountSid: 'AC1' })), 400));
  it('a signed form that is too long', () =>
    refused(Promise.resolve(genuine(path, { ...form, Body: 'x'.repeat(30_000) })), 413));
});

describe('delivery reports', () => {
  it('are kept once, however often they come, each status by itself', async () => {
    for (const status of ['delivered', 'delivered', 'sent', 'delivered'])
      expect(
        (await genuine('/hooks/sms/status', { ...delivered, MessageStatus: status })).status,
      ).toBe(204);
    expect(await reports()).toEqual([
      { status: 'delivered', error_code: null },
      { status: 'sent', error_code: null },
    ]);
  });

  it('keep the provider’s code', async () => {
    const form = { ...delivered, MessageStatus: 'undelivered', ErrorCode: '30003' };
    await genuine('/hooks/sms/status', form);
    expect(await reports()).toEqual([{ status: 'undelivered', error_code: '30003' }]);
  });

  it('may come for a text that is not settled yet', async () => {
    expect((await genuine('/hooks/sms/status', delivered)).status).toBe(204);
  });
});

describe('replies', () => {
  it('are taken once and answered without a text', async () => {
    for (let time = 0; time < 2; time += 1) {
      const answer = await genuine('/hooks/sms/reply', reply);
      expect(answer.status).toBe(200);
      expect(answer.type).toBe('text/xml');
      expect(answer.text).toContain('<Response></Response>');
    }
    expect(await replies()).toEqual([{ body: '1' }]);
  });

  it('keep every script', async () => {
    await genuine('/hooks/sms/reply', { ...reply, Body: '١ 😀 ሀ' });
    expect(await replies()).toEqual([{ body: '١ 😀 ሀ' }]);
  });

  it('may be empty, such as a picture', async () => {
    const { Body: _body, ...picture } = reply;
    expect((await genuine('/hooks/sms/reply', picture)).status).toBe(200);
  });
});
