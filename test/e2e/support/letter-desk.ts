import type { Page } from '@playwright/test';
import { say } from './frame-words';
import { expect } from './walk';

/** The desk of one letter, where the button to sign leads to what is missing. */
export class LetterDesk {
  constructor(readonly page: Page) {}

  async open(child: string): Promise<void> {
    const letter = this.page.locator('li.letter').filter({ hasText: child });
    await letter.getByRole('link', { name: say(this.page, 'Open the letter') }).click();
    const name = say(this.page, 'Letter for {}', child);
    await expect(this.page.getByRole('heading', { level: 1, name })).toBeVisible();
  }

  sign() {
    return this.page.getByRole('button', { name: say(this.page, 'Sign and release') });
  }

  private condition(says: string) {
    return this.page.locator('.conditions li').filter({ hasText: say(this.page, says) });
  }

  private label(english: string) {
    return this.page.getByLabel(say(this.page, english), { exact: true });
  }

  private radio(english: string) {
    return this.page.getByRole('radio', { name: say(this.page, english) });
  }

  /** Says what the family does with the medicines and when it comes next; everything else is met already. */
  async decide(nextVisit: string): Promise<void> {
    await this.radio('None now').check();
    await expect(this.condition('What to do with the medicines')).toHaveClass(/is-met/);
    await this.label('Day').fill(nextVisit);
    await this.label('Time').fill('10:30');
    await this.label('Time').blur();
    await expect(this.condition('The next visit')).toHaveClass(/is-met/);
  }

  /** Presses the button while things are missing, follows where it leads, then signs and releases. */
  async settle({ nextVisit, password }: { nextVisit: string; password: string }): Promise<void> {
    await this.sign().click();
    await expect(this.radio('Keep giving all of them')).toBeFocused();
    await this.radio('None now').check();
    await expect(this.condition('What to do with the medicines')).toHaveClass(/is-met/);
    await this.sign().click();
    await expect(this.label('Day')).toBeFocused();
    await this.decide(nextVisit);
    await this.sign().click();
    await expect(this.page.getByText(say(this.page, 'Enter your password to sign.'))).toBeVisible();
    await expect(this.label('Your password, at signing')).toBeFocused();
    await this.label('Your password, at signing').fill(password);
    await this.sign().click();
    await expect(
      this.page.getByText(
        say(this.page, 'Signed and released. The family is told that a letter waits.'),
      ),
    ).toBeVisible();
  }
}
