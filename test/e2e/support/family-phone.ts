import type { Page } from '@playwright/test';
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
    if (isRemembered) await this.page.getByLabel(/^Remember this phone/).check();
    await this.page.getByRole('button', { name: 'Open my visit' }).click();
    await expect(this.heading('Your visit')).toBeHidden();
  }

  async typeBirthDate(bornOn: string): Promise<void> {
    const [year = '', month = '', day = ''] = bornOn.split('-');
    await this.page.getByLabel('Month').fill(month);
    await this.page.getByLabel('Day').fill(day);
    await this.page.getByLabel('Year').fill(year);
  }

  /** The question of the morning, answered with "Nothing". */
  async answerNothing(): Promise<void> {
    await expect(this.page.getByRole('heading', { level: 1, name: /eat or drink/ })).toBeVisible();
    await this.page.getByRole('button', { name: 'Nothing', exact: true }).click();
  }
}
