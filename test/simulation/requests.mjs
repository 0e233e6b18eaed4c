// HTTP as browsers do it: a cookie jar, the header that says "our own page", and patience while the web
// or the database starts again.

const patienceMs = 60_000;
const again = new Set([500, 502, 503]);

export class Refused extends Error {
  constructor(method, path, status, problem) {
    const fields = (problem?.errors ?? []).map((one) => `${one.path}: ${one.message}`).join(' ');
    super(`${method} ${path}: ${status} ${problem?.code ?? ''} ${problem?.detail ?? ''} ${fields}`);
    Object.assign(this, { status, code: problem?.code, problem });
  }
}

/** One browser. `network` is the address the web believes; `tally` counts requests and repeats. */
export class Browser {
  #cookies = new Map();

  constructor({ origin, network, tally }) {
    Object.assign(this, { origin, network, tally });
  }

  get(path) {
    return this.#send('GET', path);
  }

  post(path, body = {}) {
    return this.#send('POST', path, body);
  }

  put(path, body) {
    return this.#send('PUT', path, body);
  }

  async #send(method, path, body) {
    const giveUpAt = performance.now() + patienceMs;
    for (;;) {
      const answer = await this.#once(method, path, body).catch((error) => ({ error }));
      const isDown = answer.error || again.has(answer.status);
      if (!isDown) return this.#read(method, path, answer);
      if (performance.now() > giveUpAt) {
        if (answer.error) throw answer.error;
        return this.#read(method, path, answer);
      }
      this.tally.repeatedRequests += 1;
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  }

  async #once(method, path, body) {
    this.tally.requests += 1;
    const answer = await fetch(`${this.origin}${path}`, {
      method,
      headers: {
        'Sec-Fetch-Site': 'same-origin',
        'X-Forwarded-For': this.network,
        ...(this.#cookies.size > 0 && { Cookie: this.#cookieLine() }),
        ...(body !== undefined && { 'Content-Type': 'application/json' }),
      },
      body: body === undefined ? undefined : JSON.stringify(body),
      signal: globalThis.AbortSignal.timeout(30_000),
    });
    for (const line of answer.headers.getSetCookie()) {
      const [name, value] = line.split(';', 1)[0].split(/=(.*)/s);
      if (value === '') this.#cookies.delete(name);
      else this.#cookies.set(name, value);
    }
    return { status: answer.status, ok: answer.ok, text: await answer.text() };
  }

  #read(method, path, { status, ok, text }) {
    const read = text === '' ? null : JSON.parse(text);
    if (!ok) throw new Refused(method, path, status, read);
    return read;
  }

  #cookieLine() {
    return [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }
}
