import { TestBed } from '@angular/core/testing';
import { FamilyFailure } from './family-failure';
import { FamilyHttp } from './family-http';

const answer = (status: number, text: string) =>
  ({ ok: status < 400, status, text: () => Promise.resolve(text) }) as Response;
const problem = (code: string) =>
  JSON.stringify({ type: 'about:blank', title: 'No.', status: 422, code, triesLeft: 4 });

describe('the way to the clinic', () => {
  const sent = jest.fn<Promise<Response>, [string, RequestInit]>();
  const http = () => TestBed.inject(FamilyHttp);
  const failureOf = (request: Promise<unknown>) =>
    request.then(
      () => null,
      (error: unknown) => error as FamilyFailure,
    );

  beforeEach(() => {
    sent.mockReset();
    globalThis.fetch = sent as unknown as typeof fetch;
  });

  it('sends JSON past the service worker and gives the answer', async () => {
    sent.mockResolvedValue(answer(200, '{"done":true}'));
    expect(await http().post('codes', { channel: 'sms' })).toEqual({ done: true });
    const [address, request] = sent.mock.calls[0] ?? [];
    expect(address).toBe('/api/family/codes');
    expect(request).toMatchObject({
      method: 'POST',
      body: '{"channel":"sms"}',
      headers: { 'ngsw-bypass': 'on' },
    });
  });

  it.each([
    [401, 'signed-out'],
    [403, 'refused'],
    [409, 'refused'],
    [422, 'refused'],
    [423, 'refused'],
    [408, 'broken'],
    [429, 'too-often'],
    [500, 'broken'],
    [502, 'unreached'],
    [503, 'unreached'],
    [504, 'unreached'],
  ])('reads status %i as %s', async (status, kind) => {
    sent.mockResolvedValue(answer(status, problem('some-code')));
    const failure = await failureOf(http().get('session'));
    expect(failure).toBeInstanceOf(FamilyFailure);
    expect(failure).toMatchObject({ kind, code: 'some-code' });
    expect(failure?.number('triesLeft')).toBe(4);
  });

  it('is not reached when there is no network, or when something in between answers with a page', async () => {
    sent.mockRejectedValueOnce(new TypeError('Failed to fetch'));
    expect((await failureOf(http().get('session')))?.kind).toBe('unreached');
    sent.mockResolvedValueOnce(answer(200, '<html>Sign in to this network</html>'));
    expect((await failureOf(http().get('session')))?.kind).toBe('unreached');
  });

  it('does not wait for ever', async () => {
    jest.useFakeTimers();
    sent.mockImplementation(
      (_address, { signal }) =>
        new Promise((_resolve, reject) => {
          signal?.addEventListener('abort', () => reject(new Error('aborted')));
        }),
    );
    const failure = failureOf(http().get('session'));
    await jest.advanceTimersByTimeAsync(20_000);
    jest.useRealTimers();
    expect((await failure)?.kind).toBe('unreached');
  });
});
