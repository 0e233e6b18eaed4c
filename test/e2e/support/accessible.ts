import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from '@playwright/test';
import { expect } from './walk';

const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
/** What can differ between day and night; the structure is the same. */
const colourRules = ['color-contrast', 'link-in-text-block'];
/** Long lists repeat the same row; the wording alone has six thousand elements. */
const repeatedRows = 'main li:nth-of-type(n+16), main tr:nth-of-type(n+16)';

/** Waits until a screen has its content, so that not the waiting is judged. */
export async function settled(page: Page): Promise<void> {
  await expect(page.locator('h1').first()).toBeVisible();
  await expect(page.locator('.waiting, .skeleton, mat-spinner')).toHaveCount(0);
}

/** Colours glide from day to night: waits until nothing moves any more. */
async function atRest(page: Page): Promise<void> {
  await page.evaluate(async () => {
    // One frame, so that what has just changed has begun to glide.
    await new Promise((done) => requestAnimationFrame(done));
    const ending = document
      .getAnimations()
      .filter(({ effect }) => effect?.getComputedTiming().iterations !== Infinity);
    await Promise.allSettled(ending.map(({ finished }) => finished));
  });
}

/**
 * Fails with the rule and the place of everything that stands in somebody's way, by day and by night. Colours are the
 * same in every language: one language is judged in both.
 */
export async function expectAccessible(
  page: Page,
  screen: string,
  { byNight = true }: { byNight?: boolean } = {},
): Promise<void> {
  await settled(page);
  const check = async (colorScheme: 'light' | 'dark'): Promise<void> => {
    await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
    await atRest(page);
    const axe = new AxeBuilder({ page }).options({ resultTypes: ['violations'] }).setLegacyMode();
    const judged = colorScheme === 'light' ? axe.withTags(rules) : axe.withRules(colourRules);
    const { violations } = await judged.exclude(repeatedRows).analyze();
    const found = violations.flatMap(({ id, nodes }) =>
      nodes.map(({ target, failureSummary }) => `${id} at ${target.join(' ')}: ${failureSummary}`),
    );
    expect.soft(found, `${screen}, ${colorScheme}`).toEqual([]);
  };
  await check('light');
  if (byNight) await check('dark');
}
