import type { Page } from '@playwright/test';
import { expect } from './walk';

/** The desk of one letter, where the button to sign leads to what is missing. */
export class LetterDesk {
  constructor(readonly page: Page) {}

  async open(child: string): Promise<void> {
    const letter = this.page.locator('li.letter').filter({ hasText: child });
    await letter.getByRole('link', { name: 'Open the letter' }).click();
    await expect(
      this.page.getByRole('heading', { level: 1, name: `Letter for ${child}` }),
    ).toBeVisible();
  }

  sign() {
    return this.page.getByRole('button', { name: 'Sign and release' });
  }

  private condition(says: string) {
    return this.page.locator('.conditions li').filter({ hasText: says });
  }

  /** Says what the family does with the medicines and when it comes next; everything else is met already. */
  async decide(nextVisit: string): Promise<void> {
    await this.page.getByRole('radio', { name: 'None now' }).check();
    await expect(this.condition('What to do with the medicines')).toHaveClass(/is-met/);
    await this.page.getByLabel('Day', { exact: true }).fill(nextVisit);
    await this.page.getByLabel('Time', { exact: true }).fill('10:30');
    await this.page.getByLabel('Time', { exact: true }).blur();
    await expect(this.condition('The next visit')).toHaveClass(/is-met/);
  }

  /** Presses the button while things are missing, follows where it leads, then signs and releases. */
  async settle({ nextVisit, password }: { nextVisit: string; password: string }): Promise<void> {
    await this.sign().click();
    await expect(this.page.getByRole('radio', { name: 'Keep giving all of them' })).toBeFocused();
    await this.page.getByRole('radio', { name: 'None now' }).check();
    await expect(this.condition('What to do with the medicines')).toHaveClass(/is-met/);
    await this.sign().click();
    await expect(this.page.getByLabel('Day', { exact: true })).toBeFocused();
    await this.decide(nextVisit);
    await this.sign().click();
    await expect(this.page.getByText('Enter your password to sign.')).toBeVisible();
    await expect(this.page.getByLabel('Your password, at signing')).toBeFocused();
    await this.page.getByLabel('Your password, at signing').fill(password);
    await this.sign().click();
    await expect(
      this.page.getByText('Signed and released. The family is told that a letter waits.'),
    ).toBeVisible();
  }
}
