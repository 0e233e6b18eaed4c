import type { Locator, Page } from '@playwright/test';
import type { LanguageId } from '../../../shared/languages/languages';
import { shippedWords } from '../../support/words';
import { say, sayLike } from './frame-words';
import type { StandIns } from './stand-ins';
import { wordingLike } from './wording-like';
import { expect } from './walk';

/** The family's pages on a phone. */
export class FamilyPhone {
  constructor(readonly page: Page) {}

  heading(name: string | RegExp) {
    return this.page.getByRole('heading', { level: 1, name });
  }

  /** Opens a link on a phone that nobody knows yet: the birth date of a child first. */
  async arrive(link: string, bornOn: string, { isRemembered = true } = {}): Promise<void> {
    await this.page.goto(link);
    await this.typeBirthDate(bornOn);
    if (isRemembered) await this.page.getByLabel(sayLike(this.page, 'Remember this phone')).check();
    await this.page.getByRole('button', { name: say(this.page, 'Open my visit') }).click();
    await expect(this.heading(say(this.page, 'Your visit'))).toBeHidden();
  }

  async typeBirthDate(bornOn: string): Promise<void> {
    const [year = '', month = '', day = ''] = bornOn.split('-');
    await this.page.getByLabel(say(this.page, 'Month')).fill(month);
    await this.page.getByLabel(say(this.page, 'Day')).fill(day);
    await this.page.getByLabel(say(this.page, 'Year')).fill(year);
  }

  /** The question of the morning, answered with "Nothing", in the language of the page. */
  async answerNothing(language: LanguageId = 'en'): Promise<void> {
    await expect(this.heading(wordingLike(language, 'question.asks'))).toBeVisible();
    const name = shippedWords(language)['question.choice.nothing'];
    await this.page.getByRole('button', { name, exact: true }).click();
  }

  /** Has a fresh code sent to the telephone and types it in. @returns the text that brought it. */
  async typeFreshCode(standIns: StandIns, number: string, language: LanguageId): Promise<string> {
    await expect(this.heading(say(this.page, 'Letters'))).toBeVisible();
    const sent = (await standIns.texts(number)).length;
    // The only choice where the family has a telephone alone; otherwise the first.
    await this.page
      .getByRole('button', { name: sayLike(this.page, 'Send me a code') })
      .first()
      .click();
    const { body } = await standIns.text(number, wordingLike(language, 'message.code.text'), sent);
    await this.page
      .getByLabel(say(this.page, 'Code with 6 digits'))
      .fill(/(?<!\d)\d{6}(?!\d)/.exec(body)?.[0] ?? '');
    await this.page.getByRole('button', { name: say(this.page, 'Open'), exact: true }).click();
    return body;
  }

  /** Opens the letter that is marked as new. */
  async openNewLetter(): Promise<Locator> {
    await this.page
      .getByRole('link')
      .filter({ has: this.page.getByText(say(this.page, 'New'), { exact: true }) })
      .click();
    const letter = this.page.getByRole('article');
    await expect(letter).toBeVisible();
    return letter;
  }

  /** The letter that is open, as the file for paper. */
  async fetchPdf(): Promise<Buffer> {
    const id = /\d+$/.exec(this.page.url())?.[0];
    const answer = await this.page.request.get(`/api/family/letters/${id}.pdf`);
    expect(answer.headers()['content-type']).toContain('application/pdf');
    return answer.body();
  }
}
