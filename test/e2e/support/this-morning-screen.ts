import type { Locator, Page } from '@playwright/test';
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
  async open(): Promise<void> {
    await this.page.goto('/clinic/en/this-morning');
    await this.page.evaluate(() => Object.assign(globalThis, { isSamePage: true }));
  }

  async expectNeverReloaded(): Promise<void> {
    expect(await this.page.evaluate(() => 'isSamePage' in globalThis)).toBe(true);
  }

  /** The column of what the family said. */
  said(name: string): Locator {
    return this.row(name).locator('.said');
  }

  private press(name: string, act: string | RegExp): Promise<void> {
    return this.row(name).getByRole('button', { name: act }).click();
  }

  /** From the door to home, as the nurse's screen leads through it. */
  async run(
    name: string,
    { label, broughtBy }: { label: string; broughtBy: string },
  ): Promise<void> {
    const row = this.row(name);
    await this.press(name, /^Arrived/);
    await this.press(name, /^Door check/);
    await row.getByLabel(/^Nothing since/).check();
    await row.getByLabel('None', { exact: true }).check();
    await row.getByLabel('Well', { exact: true }).check();
    await row.getByLabel(new RegExp(broughtBy)).check();
    await row.getByRole('button', { name: 'Keep this door check' }).click();
    await this.press(name, /^Begin in Room|^Collect now/);
    await this.press(name, /^Collected/);
    await row.getByLabel('Volume, mL').fill('6.5');
    await row.getByLabel('Neutralised now').check();
    await row.getByLabel('With', { exact: true }).fill('sodium carbonate');
    await row.getByRole('button', { name: 'Keep: collected' }).click();
    await this.press(name, /^Label scanned/);
    await row.getByLabel(/scan the label/).fill(label);
    await row.getByRole('button', { name: 'Keep this label' }).click();
    await this.press(name, /^Fed/);
    await this.press(name, /^Gone home/);
    await expect(row.getByText('Gone home.')).toBeVisible();
  }
}
