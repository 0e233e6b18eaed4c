import type { Locator, Page } from '@playwright/test';
import type { ClinicLanguage } from '../../../shared/languages/clinic-languages';
import { say, sayLike } from './frame-words';
import { expect } from './walk';

/** "This morning" as the nurse has it open. */
export class ThisMorningScreen {
  constructor(readonly page: Page) {}

  row(name: string): Locator {
    return this.page
      .locator('ol.rows > li')
      .filter({ has: this.page.getByRole('heading', { name, exact: true }) });
  }

  /** Marks the page, so that a reload would show. */
  async open(language: ClinicLanguage = 'en'): Promise<void> {
    await this.page.goto(`/clinic/${language}/this-morning`);
    await this.page.evaluate(() => Object.assign(globalThis, { isSamePage: true }));
  }

  async expectNeverReloaded(): Promise<void> {
    expect(await this.page.evaluate(() => 'isSamePage' in globalThis)).toBe(true);
  }

  /** The column of what the family said. */
  said(name: string): Locator {
    return this.row(name).locator('.said');
  }

  /** Presses one of these, by their English words; the child's name follows them. */
  private press(name: string, ...acts: readonly string[]): Promise<void> {
    const named = acts.map((act) => sayLike(this.page, act).source).join('|');
    return this.row(name)
      .getByRole('button', { name: new RegExp(named) })
      .click();
  }

  /** From the door to home, as the nurse's screen leads through it. */
  async run(
    name: string,
    { label, broughtBy }: { label: string; broughtBy: string },
  ): Promise<void> {
    const row = this.row(name);
    const exactly = (english: string) => row.getByLabel(say(this.page, english), { exact: true });
    const button = (english: string) => row.getByRole('button', { name: say(this.page, english) });
    await this.press(name, 'Arrived');
    await this.press(name, 'Door check');
    await row.getByLabel(sayLike(this.page, 'Nothing since {}')).check();
    await exactly('None').check();
    await exactly('Well').check();
    await row.getByLabel(new RegExp(broughtBy)).check();
    await button('Keep this door check').click();
    await this.press(name, 'Begin in {}', 'Collect now');
    await this.press(name, 'Collected');
    await row.getByLabel(say(this.page, 'Volume, mL')).fill('6.5');
    await row.getByLabel(say(this.page, 'Neutralised now')).check();
    await exactly('With').fill('sodium carbonate');
    await button('Keep: collected').click();
    await this.press(name, 'Label scanned');
    await row.getByLabel(say(this.page, '{}: scan the label', name)).fill(label);
    await button('Keep this label').click();
    await this.press(name, 'Fed');
    await this.press(name, 'Gone home');
    await expect(row.getByText(say(this.page, 'Gone home.'))).toBeVisible();
  }
}
