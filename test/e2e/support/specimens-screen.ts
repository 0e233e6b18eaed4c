import type { Page } from '@playwright/test';
import { say } from './frame-words';
import { expect } from './walk';

export class SpecimensScreen {
  constructor(readonly page: Page) {}

  /** Hands a specimen to the courier and records that the laboratory has it. */
  async toLaboratory(child: string, number: number, laboratoryNumber: string): Promise<void> {
    const isThis = new RegExp(say(this.page, 'Specimen {} of {}', number, '\\d'));
    const row = this.page
      .locator('li')
      .filter({ has: this.page.getByRole('link', { name: child }) })
      .filter({ hasText: isThis });
    await row.getByRole('button', { name: say(this.page, 'Handed to the courier') }).click();
    await row.getByLabel(say(this.page, 'Laboratory’s number')).fill(laboratoryNumber);
    await row.getByRole('button', { name: say(this.page, 'Received by the laboratory') }).click();
    await expect(row).toContainText(laboratoryNumber);
    await expect(row.locator('.stops .is-done')).toHaveCount(4);
  }
}
