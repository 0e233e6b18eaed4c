import type { Locator, Page } from '@playwright/test';
import { expect, toScreen } from './walk';

/** The rehearsal: a clock that moves forward, and the pretended phones. */
export class RehearsalScreen {
  constructor(readonly page: Page) {}

  async open(): Promise<void> {
    await toScreen(this.page, 'Rehearsal');
    await expect(this.page.getByRole('heading', { level: 1, name: 'Rehearsal' })).toBeVisible();
  }

  /** Moves on to a moment that the screen offers, for example 'Morning question: Wednesday'. */
  async toMoment(says: RegExp): Promise<void> {
    await this.move(this.page.getByRole('button', { name: says }).first());
  }

  async quarterOn(): Promise<void> {
    await this.move(this.page.getByRole('button', { name: '15 minutes on' }));
  }

  /** Goes on in quarters of an hour until something has happened. */
  async onUntil(hasHappened: () => Promise<boolean>): Promise<void> {
    for (let quarters = 0; !(await hasHappened()); quarters += 1) {
      expect(quarters, 'quarters of an hour gone by').toBeLessThan(20);
      await this.quarterOn();
    }
  }

  /** A text from a family's phone. */
  async answer(person: string, digit: '1' | '2' | '3'): Promise<void> {
    await this.choose(person);
    const phone = this.phone(person);
    const before = await phone.getByText('Sent from this phone').count();
    await phone.getByRole('button', { name: `Answer ${digit}` }).click();
    await expect(phone.getByText('Sent from this phone')).toHaveCount(before + 1);
  }

  async choose(person: string): Promise<void> {
    await this.page
      .getByRole('navigation', { name: 'Phones of the demo families' })
      .getByRole('button', { name: person })
      .click();
    await expect(this.phone(person)).toBeVisible();
  }

  phone(person: string): Locator {
    return this.page.getByRole('region', { name: person, exact: true });
  }

  mailbox(email: string): Locator {
    return this.page.getByRole('region', { name: email });
  }

  private async move(button: Locator): Promise<void> {
    const answered = this.page.waitForResponse(
      (response) => response.url().endsWith('/rehearsal/clock') && response.ok(),
      { timeout: 40_000 },
    );
    await button.click();
    await answered;
    await expect(this.page.getByRole('button', { name: '15 minutes on' })).toBeEnabled();
  }
}
