import { once } from 'node:events';
import { getExpectedTwilioSignature } from 'twilio/lib/webhooks/webhooks';
import type { Fault } from './faults';
import type { StandInStore } from './store';
import { textId } from './text-service';
import type { TextAccount } from './text-wire';

export interface TextReportParts {
  readonly account: TextAccount;
  readonly store: StandInStore;
  readonly now: () => Promise<number>;
  /** Public address of the clinic; nothing is posted anywhere else. */
  readonly origin: () => string;
  /** Pause before each report, in milliseconds. */
  readonly pauseMs: number;
}

export interface TextReports {
  report(id: string, fault: Fault | undefined): void;
  /** A text from a family's phone. @returns whether the clinic took it. */
  receiveFromPhone(phone: string, body: string): Promise<boolean>;
  /** Reports on, where a restart cut them off. */
  resume(): void;
  close(): Promise<void>;
}

/** The service's own words (https://www.twilio.com/docs/api/errors/23004). */
const stopWords = new Set(['stop', 'stopall', 'unsubscribe', 'cancel', 'end', 'quit']);
const startWords = new Set(['start', 'yes', 'unstop']);

const goodbye = 'You will get no more texts from this number. Answer START to get them again.';
const welcomeBack = 'You will get texts from this number again.';

/** A clinic that starts again is back within seconds; the real service can be told to repeat as often. */
const tries = 6;
const againAfterMs = 300;

/** The service's calls to the clinic: delivery reports and texts from phones, each signed. */
export function textReports(parts: TextReportParts): TextReports {
  const { account, store, now, pauseMs } = parts;
  const closing = new AbortController();
  const running = new Set<Promise<unknown>>();

  const pause = (ms = pauseMs) => {
    const isOver = AbortSignal.any([closing.signal, AbortSignal.timeout(ms)]);
    return isOver.aborted ? Promise.resolve() : once(isOver, 'abort');
  };

  async function post(url: string, form: Readonly<Record<string, string>>): Promise<boolean> {
    if (!url.startsWith(`${parts.origin()}/`)) return false;
    for (let attempt = 1; attempt <= tries && !closing.signal.aborted; attempt += 1) {
      try {
        const answer = await fetch(url, {
          method: 'POST',
          headers: {
            'Content-Type': 'application/x-www-form-urlencoded',
            'X-Twilio-Signature': getExpectedTwilioSignature(account.token, url, form),
          },
          body: new URLSearchParams(form),
          signal: AbortSignal.any([closing.signal, AbortSignal.timeout(10_000)]),
        });
        await answer.arrayBuffer();
        if (answer.ok) return true;
        if (answer.status < 500) return false;
      } catch {
        // The clinic's web process may be starting again: another try follows.
      }
      await pause(attempt * againAfterMs);
    }
    return false;
  }

  async function reportStatus(id: string, status: string, code: number | null): Promise<void> {
    const text = store.texts.find((one) => one.id === id);
    if (!text?.statusCallback) return;
    await post(text.statusCallback, {
      ApiVersion: '2010-04-01',
      AccountSid: account.sid,
      From: account.from,
      To: text.phone,
      MessageSid: id,
      SmsSid: id,
      MessageStatus: status,
      SmsStatus: status,
      ...(code !== null && { ErrorCode: String(code) }),
    });
  }

  async function follow(id: string, fault: Fault | undefined): Promise<void> {
    const hasFailed = fault?.does === 'report-failure';
    const code = hasFailed ? (fault.code ?? 30003) : null;
    const end = hasFailed ? 'undelivered' : 'delivered';
    await pause();
    store.setStatus(id, 'sent');
    const isInOrder = !['no-reports', 'double-reports', 'late-reports'].includes(fault?.does ?? '');
    if (isInOrder) await reportStatus(id, 'sent', null);
    await pause();
    store.setStatus(id, end, code);
    if (fault?.does === 'no-reports') return;
    if (fault?.does === 'late-reports') {
      await pause(fault.ms);
      await reportStatus(id, 'sent', null);
    }
    await reportStatus(id, end, code);
    if (fault?.does !== 'double-reports') return;
    await reportStatus(id, end, code);
    await reportStatus(id, 'sent', null);
    await reportStatus(id, 'sent', null);
  }

  function begin(work: Promise<unknown>): void {
    const kept = work.finally(() => running.delete(kept));
    running.add(kept);
  }

  async function keepText(
    direction: 'in' | 'out',
    phone: string,
    body: string,
    status: string,
  ): Promise<string> {
    const id = textId();
    const at = await now();
    const shared = { id, direction, phone, body, at, status };
    store.addText({ ...shared, segments: 1, statusCallback: null, errorCode: null });
    return id;
  }

  async function receiveFromPhone(phone: string, body: string): Promise<boolean> {
    const word = body.trim().toLowerCase();
    const id = await keepText('in', phone, body, 'received');
    const wasOut = store.optedOut.has(phone);
    if (stopWords.has(word)) store.setOptedOut(phone, true);
    if (startWords.has(word)) store.setOptedOut(phone, false);
    const isTaken = await post(`${parts.origin()}/hooks/sms/reply`, {
      ApiVersion: '2010-04-01',
      AccountSid: account.sid,
      MessageSid: id,
      SmsMessageSid: id,
      SmsSid: id,
      SmsStatus: 'received',
      From: phone,
      To: account.from,
      Body: body,
      NumMedia: '0',
      NumSegments: '1',
    });
    if (!isTaken) store.setStatus(id, 'not-taken');
    // The service itself answers these words, as the law asks, and only when something changes.
    if (stopWords.has(word) && !wasOut) await keepText('out', phone, goodbye, 'delivered');
    if (startWords.has(word) && wasOut) await keepText('out', phone, welcomeBack, 'delivered');
    return isTaken;
  }

  return {
    report: (id, fault) => begin(follow(id, fault)),
    receiveFromPhone,
    resume: () => {
      for (const { id, direction, status } of store.texts)
        if (direction === 'out' && (status === 'queued' || status === 'sent'))
          begin(follow(id, undefined));
    },
    close: async () => {
      closing.abort();
      await Promise.allSettled(running);
    },
  };
}
