import { Injectable } from '@angular/core';
import { FamilyFailure, failureOf } from './family-failure';

const ORIGIN = '/api/family/';
/** A bad signal can hold a request for minutes; the family then waits before a grey page. */
const WAIT_MS = 20_000;

/**
 * The one way from the family's phone to the clinic. Rejects with FamilyFailure only. The browser's own fetch:
 * Angular's client would be 6 kB more of compressed script on every page, measured.
 */
@Injectable({ providedIn: 'root' })
export class FamilyHttp {
  get<T>(path: string): Promise<T> {
    return this.answer<T>(path, {});
  }

  post<T>(path: string, body: object = {}): Promise<T> {
    return this.answer<T>(path, { method: 'POST', body: JSON.stringify(body) });
  }

  private async answer<T>(path: string, request: RequestInit): Promise<T> {
    const patience = new AbortController();
    const timer = setTimeout(() => patience.abort(), WAIT_MS);
    try {
      const response = await fetch(ORIGIN + path, {
        ...request,
        // The worker stays out, so that no signal is seen as no signal and nothing personal is kept by it.
        headers: {
          'content-type': 'application/json',
          'ngsw-bypass': 'on',
          'accept-language': document.documentElement.lang,
        },
        credentials: 'same-origin',
        cache: 'no-store',
        signal: patience.signal,
      });
      const body = await bodyOf(response);
      if (!response.ok) throw failureOf(response.status, body);
      return body as T;
    } catch (error) {
      // A rejected fetch, a lost connection in the middle of an answer, and the end of patience are one to the family.
      throw error instanceof FamilyFailure ? error : new FamilyFailure('unreached', null);
    } finally {
      clearTimeout(timer);
    }
  }
}

/** What was answered, as JSON; null for an empty answer or one that is no JSON (a page of something in between). */
async function bodyOf(response: Response): Promise<unknown> {
  const text = await response.text();
  try {
    return text === '' ? null : (JSON.parse(text) as unknown);
  } catch {
    if (response.ok) throw failureOf(502, null);
    return null;
  }
}
