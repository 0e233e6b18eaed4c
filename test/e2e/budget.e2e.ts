import type { Page } from '@playwright/test';
import { FamilyPhone } from './support/family-phone';
import { planMornings, prepareFamily, toMorningQuestion } from './support/prepared-family';
import { expect, signIn, test } from './support/walk';

/** Brotli bytes of script that a page fetches to be shown; a bare Angular page takes 28 kB, with router and HTTP 61. */
class ScriptMeter {
  private readonly sizes: Promise<number>[] = [];

  constructor(page: Page) {
    page.on('response', (response) => {
      if (response.request().resourceType() !== 'script') return;
      expect(response.headers()['content-encoding'], response.url()).toBe('br');
      this.sizes.push(
        response
          .request()
          .sizes()
          .then(({ responseBodySize }) => responseBodySize),
      );
    });
  }

  async kilobytes(): Promise<number> {
    const sizes = await Promise.all(this.sizes);
    return sizes.reduce((sum, size) => sum + size, 0) / 1000;
  }
}

test('the night path comes with at most 95 kB of script', async ({ house, people, browser }) => {
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Nilo Ferr',
    callMe: 'Nilo',
    phone: '+13125550188',
  });
  const link = await toMorningQuestion(house, family, await planMornings(house, family));
  const known = await people.phone();
  await new FamilyPhone(known).arrive(link, family.bornOn);
  // The same person on a phone that has kept nothing but the sign-in.
  const context = await browser.newContext({
    storageState: await known.context().storageState(),
    viewport: { width: 390, height: 844 },
    serviceWorkers: 'block',
  });
  const page = await context.newPage();
  const meter = new ScriptMeter(page);
  await page.goto('/en/');
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await page.waitForLoadState('networkidle');
  const size = await meter.kilobytes();
  test.info().annotations.push({ type: 'script', description: `${size.toFixed(1)} kB` });
  expect(size).toBeGreaterThan(28);
  expect(size).toBeLessThanOrEqual(95);
  await context.close();
});

test('the first screen of the clinic comes with at most 210 kB of script', async ({ people }) => {
  const page = await people.visitor();
  const meter = new ScriptMeter(page);
  await signIn(page, 'rosa');
  await expect(page).toHaveURL(/this-morning/);
  await page.getByRole('heading', { level: 1 }).waitFor();
  const size = await meter.kilobytes();
  test.info().annotations.push({ type: 'script', description: `${size.toFixed(1)} kB` });
  expect(size).toBeGreaterThan(28);
  expect(size).toBeLessThanOrEqual(210);
});
