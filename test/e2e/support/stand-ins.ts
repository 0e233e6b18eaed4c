import { expect } from '@playwright/test';

export interface PretendText {
  readonly id: string;
  readonly direction: 'in' | 'out';
  readonly phone: string;
  readonly body: string;
}

export interface PretendMail {
  readonly id: string;
  readonly messageId: string;
  readonly to: string;
  readonly subject: string;
  readonly body: string;
  readonly isAutomatic: boolean;
  readonly attachments: readonly {
    readonly name: string;
    readonly type: string;
    readonly content: string;
  }[];
}

interface State {
  readonly texts: readonly PretendText[];
  readonly mails: readonly PretendMail[];
}

const patience = { timeout: 20_000, intervals: [100, 200, 400] };

/** What reached the pretended phones and mailboxes of the throwaway house. */
export class StandIns {
  private readonly address = `http://127.0.0.1:${process.env['THREEDAWN_STAND_IN_CONTROL_PORT'] ?? ''}`;

  /** Texts to this number, oldest first. */
  async texts(phone: string): Promise<readonly PretendText[]> {
    const { texts } = await this.state();
    return texts.filter((text) => text.phone === phone && text.direction === 'out');
  }

  async mails(to: string): Promise<readonly PretendMail[]> {
    const { mails } = await this.state();
    return mails.filter((mail) => mail.to === to);
  }

  /** Waits for a text that fits; `after` skips so many texts that were there before. */
  async text(phone: string, pattern: RegExp, after = 0): Promise<PretendText> {
    const fitting = async (): Promise<PretendText | undefined> =>
      (await this.texts(phone)).slice(after).find(({ body }) => pattern.test(body));
    await expect
      .poll(async () => (await fitting())?.body ?? '', {
        ...patience,
        message: `a text to ${phone} like ${String(pattern)}`,
      })
      .toMatch(pattern);
    const found = await fitting();
    if (!found) throw new Error(`The text to ${phone} is gone again.`);
    return found;
  }

  /** Waits for so many mails whose subject fits. */
  async mailsLike(to: string, subject: RegExp, count: number): Promise<readonly PretendMail[]> {
    const fitting = async (): Promise<readonly PretendMail[]> =>
      (await this.mails(to)).filter((mail) => subject.test(mail.subject));
    await expect
      .poll(async () => (await fitting()).length, {
        ...patience,
        message: `${count} e-mails to ${to} like ${String(subject)}`,
      })
      .toBe(count);
    return fitting();
  }

  private async state(): Promise<State> {
    const answer = await fetch(`${this.address}/state`);
    return (await answer.json()) as State;
  }
}

/** The first link of ours in a text or mail. */
export function linkIn(body: string, kind: 'i' | 'm' | ''): string {
  const found = new RegExp(`https?://\\S*/${kind}\\S*`).exec(body)?.[0];
  if (!found) throw new Error(`There is no link in: ${body}`);
  return found.replace(/[.,]$/, '');
}

/** Words that no text, mail or calendar entry may carry: disease, test, result. */
const telling =
  /\b(tubercul\w*|TB|aspirat\w*|gastric|stomach|specimen\w*|sputum|culture\w*|x-?ray|disease\w*|tests?|results?|negative|positive|laborator\w*)\b/i;

/** Fails when a message names the disease, the test, a result, or one of these names and dates. */
export function expectNeutral(message: string, names: readonly string[]): void {
  expect(message).not.toMatch(telling);
  for (const name of names) expect(message).not.toContain(name);
}
