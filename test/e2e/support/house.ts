import { expect, request, type APIRequestContext } from '@playwright/test';
import type { RehearsalState } from '../../../shared/contracts/rehearsal';
import { addDays, dayOf, instantOf, localPartsOf } from '../../../shared/domain/zone';
import { ownAddress } from './own-address';
import { StandIns } from './stand-ins';

export const zone = 'America/Chicago';
/** Of every invented person; printed when the demo clinic starts. */
export const password = 'lantern before first light';

export type Who = 'rosa' | 'okafor' | 'kofi' | 'hanna' | 'milan';
export const signInOf = (who: Who): string => `${who}@alder.example.org`;

/** The throwaway house behind the browser: its clock and what its pretended services delivered. */
export class House {
  readonly standIns = new StandIns();

  private constructor(
    readonly origin: string,
    private readonly requests: APIRequestContext,
  ) {}

  static async open(who: Who = 'rosa'): Promise<House> {
    const origin = process.env['THREEDAWN_ORIGIN'] ?? '';
    // As a page of ours would: a write without the Origin is refused.
    const requests = await request.newContext({
      baseURL: origin,
      extraHTTPHeaders: { Origin: origin, ...ownAddress() },
    });
    const house = new House(origin, requests);
    await house.post('/api/clinic/session', { email: signInOf(who), password });
    return house;
  }

  async get<Answer>(path: string): Promise<Answer> {
    const answer = await this.requests.get(path);
    expect(answer.status(), `GET ${path}`).toBe(200);
    return (await answer.json()) as Answer;
  }

  async post<Answer>(path: string, data: unknown): Promise<Answer> {
    const answer = await this.requests.post(path, { data });
    expect(answer.ok(), `POST ${path}: ${await answer.text()}`).toBe(true);
    return (await answer.json()) as Answer;
  }

  /** Epoch milliseconds of the pretended clock. */
  async now(): Promise<number> {
    return Date.parse((await this.get<RehearsalState>('/api/clinic/rehearsal')).now);
  }

  async today(): Promise<string> {
    return dayOf(await this.now(), zone);
  }

  /** Moves the clock on to an instant; one that has passed moves nothing. */
  async moveTo(at: number): Promise<void> {
    if (at <= (await this.now())) return;
    await this.post('/api/clinic/rehearsal/clock', { to: new Date(at).toISOString() });
  }

  async moveDays(days: number): Promise<void> {
    await this.post('/api/clinic/rehearsal/clock', { minutes: days * 24 * 60 });
  }

  /**
   * Texts rest from 21:00 to 8:00: a run at night goes on to nine in the morning. The demo clinic's next morning lies
   * behind that, because it is chosen so that its evening text can still go out.
   */
  async awake(): Promise<void> {
    const now = await this.now();
    const { hour, on } = localPartsOf(now, zone);
    if (hour < 9) await this.moveTo(instantOf({ on, time: '09:00', zone }));
    if (hour >= 20) await this.moveTo(instantOf({ on: addDays(on, 1), time: '09:00', zone }));
  }

  close(): Promise<void> {
    return this.requests.dispose();
  }
}
