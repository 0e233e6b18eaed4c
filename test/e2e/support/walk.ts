import {
  test as base,
  expect,
  type BrowserContext,
  type BrowserContextOptions,
  type Page,
} from '@playwright/test';
import type { ClinicLanguage } from '../../../shared/languages/clinic-languages';
import { CleanConsole } from './clean-console';
import { say } from './frame-words';
import { House, password, signInOf, type Who } from './house';
import { ownAddress } from './own-address';

export { expect };

/** Opens the browsers of the people in a walk; all of their consoles are watched. */
export interface People {
  /** A signed-in member of staff at a desk. */
  readonly staff: (who: Who, language?: ClinicLanguage) => Promise<Page>;
  /** A family's phone: narrow, touch, nothing known yet. */
  readonly phone: (options?: BrowserContextOptions) => Promise<Page>;
  /** A visitor at a desk who is not signed in. */
  readonly visitor: () => Promise<Page>;
}

interface Fixtures {
  readonly house: House;
  readonly clean: CleanConsole;
  readonly people: People;
}

const desk = { viewport: { width: 1280, height: 900 } };
const phone = {
  viewport: { width: 390, height: 844 },
  hasTouch: true,
  isMobile: true,
  deviceScaleFactor: 2,
};

export const test = base.extend<Fixtures>({
  house: async ({ browserName: _ }, use) => {
    const house = await House.open();
    await use(house);
    await house.close();
  },
  clean: async ({ browserName: _ }, use) => {
    const clean = new CleanConsole();
    await use(clean);
    expect(clean.complaints, 'the consoles of all pages').toEqual([]);
  },
  people: async ({ browser, clean }, use) => {
    const contexts: BrowserContext[] = [];
    const open = async (options: BrowserContextOptions): Promise<Page> => {
      const context = await browser.newContext({ extraHTTPHeaders: ownAddress(), ...options });
      clean.watch(context);
      contexts.push(context);
      return context.newPage();
    };
    await use({
      staff: async (who, language) => {
        const page = await open(desk);
        await signIn(page, who, language);
        return page;
      },
      phone: (options) => open({ ...phone, ...options }),
      visitor: () => open(desk),
    });
    for (const context of contexts) await context.close();
  },
});

export async function signIn(page: Page, who: Who, language: ClinicLanguage = 'en'): Promise<void> {
  await page.goto(`/clinic/${language}/sign-in`);
  await page.getByLabel(say(page, 'E-mail')).fill(signInOf(who));
  await page.getByLabel(say(page, 'Password')).fill(password);
  await page.getByRole('button', { name: say(page, 'Sign in') }).click();
  await expect(page.getByRole('button', { name: say(page, 'Sign out') })).toBeVisible();
}

/** Goes to a screen by its English word in the menu, without a new page load. */
export async function toScreen(page: Page, word: string): Promise<void> {
  await page
    .getByRole('navigation', { name: say(page, 'Screens') })
    .getByRole('link', { name: say(page, word), exact: true })
    .click();
}
