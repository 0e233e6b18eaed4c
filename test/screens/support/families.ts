import { randomUUID } from 'node:crypto';
import { request, type APIRequestContext } from '@playwright/test';
import type {
  MorningOutcome,
  MorningQuestion,
  NextMorning,
} from '../../../shared/contracts/family-morning';
import { expect } from '../../e2e/support/walk';
import { linkIn, type StandIns } from '../../e2e/support/stand-ins';
import { rootQuery } from '../../support/database';
import type { Cookies } from './album';

/** The database of the house. */
const schema = 'threedawn';

/** Makes one person read this language, so that one visit can be seen in all of them. */
export async function readIn(phone: string, language: string): Promise<void> {
  await rootQuery(`UPDATE ${schema}.family_members SET reads_language = ? WHERE phone = ?`, [
    language,
    phone,
  ]);
}

/** The address of the first link of this kind that a person was sent, without origin and language. */
export async function linkOf(standIns: StandIns, phone: string, kind: 'i' | 'm'): Promise<string> {
  const { body } = await standIns.text(phone, new RegExp(`/${kind}/`));
  return new URL(linkIn(body, kind)).pathname;
}

/** A family's phone without a screen: signed in, and able to answer. */
export class FamilyVoice {
  private constructor(private readonly requests: APIRequestContext) {}

  static async open(): Promise<FamilyVoice> {
    const origin = process.env['THREEDAWN_ORIGIN'] ?? '';
    const requests = await request.newContext({
      baseURL: origin,
      extraHTTPHeaders: { Origin: origin },
    });
    return new FamilyVoice(requests);
  }

  async openLink(address: string, child: string): Promise<void> {
    const [born] = await rootQuery<{ bornOn: string }[]>(
      `SELECT DATE_FORMAT(born_on, '%Y-%m-%d') AS bornOn FROM ${schema}.children WHERE full_name = ?`,
      [child],
    );
    const token = address.split('/').at(-1);
    await this.post('links/open', { token, bornOn: born?.bornOn, isRemembered: true });
  }

  async signInByCode(standIns: StandIns, phone: string): Promise<void> {
    const before = (await standIns.texts(phone)).length;
    await this.post('codes', { channel: 'sms', address: phone });
    const { body } = await standIns.text(phone, /\d{6}/, before);
    const code = /\d{6}/.exec(body)?.[0];
    await this.post('codes/check', { code, address: phone });
  }

  async cookies(): Promise<Cookies> {
    return (await this.requests.storageState()).cookies;
  }

  question(): Promise<MorningQuestion> {
    return this.get('morning-question');
  }

  nextMorning(): Promise<NextMorning> {
    return this.get('next-morning');
  }

  /** One answer for each child, youngest first. */
  async answer(
    answers: readonly { answer: string; lastIntakeAt?: string | null }[],
  ): Promise<MorningOutcome> {
    const { on, questions, now } = await this.question();
    return this.post('fasting-checks', {
      submissionKey: randomUUID(),
      on,
      deviceAt: now,
      answers: questions.map(({ morningId }, index) => ({ morningId, ...answers[index] })),
    });
  }

  async change(change: object): Promise<MorningOutcome> {
    const { on, now } = await this.question();
    return this.post('morning-changes', {
      submissionKey: randomUUID(),
      on,
      deviceAt: now,
      ...change,
    });
  }

  close(): Promise<void> {
    return this.requests.dispose();
  }

  private async get<Answer>(path: string): Promise<Answer> {
    const answer = await this.requests.get(`/api/family/${path}`);
    expect(answer.status(), `GET ${path}`).toBe(200);
    return (await answer.json()) as Answer;
  }

  private async post<Answer>(path: string, data: unknown): Promise<Answer> {
    const answer = await this.requests.post(`/api/family/${path}`, { data });
    const text = await answer.text();
    expect(answer.ok(), `POST ${path}: ${text}`).toBe(true);
    return (text === '' ? {} : JSON.parse(text)) as Answer;
  }
}
