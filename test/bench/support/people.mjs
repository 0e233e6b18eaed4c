// Signs people of the demo clinic in without a screen, for pages that stand behind a sign-in.
import { request } from 'playwright-core';

/** Of every invented person of the demo clinic. */
const password = 'lantern before first light';

async function requestsTo(origin) {
  return request.newContext({ baseURL: origin, extraHTTPHeaders: { Origin: origin } });
}

async function post(requests, path, data) {
  const answer = await requests.post(path, { data });
  if (!answer.ok()) throw new Error(`POST ${path}: ${answer.status()} ${await answer.text()}`);
}

/** Cookies of a member of the staff. */
export async function staffCookies({ origin }, email) {
  const requests = await requestsTo(origin);
  await post(requests, '/api/clinic/session', { email, password });
  const { cookies } = await requests.storageState();
  await requests.dispose();
  return cookies;
}

/** Cookies of a parent, signed in by the code that reaches the pretended phone. */
export async function familyCookies({ origin, environment }, phone) {
  const requests = await requestsTo(origin);
  await post(requests, '/api/family/codes', { channel: 'sms', address: phone });
  const code = await codeFor(environment.THREEDAWN_STAND_IN_CONTROL_PORT, phone);
  await post(requests, '/api/family/codes/check', { code, address: phone });
  const { cookies } = await requests.storageState();
  await requests.dispose();
  return cookies;
}

async function codeFor(port, phone) {
  const giveUpAt = Date.now() + 20_000;
  while (Date.now() < giveUpAt) {
    const { texts } = await (await fetch(`http://127.0.0.1:${port}/state`)).json();
    const code = texts
      .filter((text) => text.phone === phone && text.direction === 'out')
      .map(({ body }) => /\b\d{6}\b/.exec(body)?.[0])
      .find((found) => found !== undefined);
    if (code) return code;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`No code reached ${phone}.`);
}
