import type { Page } from '@playwright/test';
import { expect } from './walk';

export class SpecimensScreen {
  constructor(readonly page: Page) {}

  /** Hands a specimen to the courier and records that the laboratory has it. */
  async toLaboratory(child: string, number: number, laboratoryNumber: string): Promise<void> {
    const row = this.page
      .locator('li')
      .filter({ has: this.page.getByRole('link', { name: child }) })
      .filter({ hasText: `Specimen ${number} of` });
    await row.getByRole('button', { name: 'Handed to the courier' }).click();
    await row.getByLabel('Laboratory’s number').fill(laboratoryNumber);
    await row.getByRole('button', { name: 'Received by the laboratory' }).click();
    await expect(row).toContainText(laboratoryNumber);
    await expect(row.locator('.stops .is-done')).toHaveCount(4);
  }
}
