import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, BrowserContext, Locator, Page } from '@playwright/test';
import { expect } from '../../e2e/support/walk';
import { contactSheet, type Picture } from './contact-sheet';
import { onPaper, viewsOf, type View } from './views';

const folder = join(__dirname, '..', '..', '..', 'test-results', 'screens');

export interface Screen {
  readonly name: string;
  /** From the origin. */
  readonly address: (language: string) => string;
  /** What has to have happened in the house before the page is opened in this language. */
  readonly before?: (language: string) => Promise<unknown>;
  /** Opens a form or takes a step after the page stands; must work in every language. */
  readonly prepare?: (page: Page) => Promise<void>;
  /** Set when the state is one of waiting, so that nothing is waited for. */
  readonly isWaiting?: boolean;
  readonly views?: (views: readonly View[]) => readonly View[];
  readonly media?: 'print';
  /** With the few colours that the reader's system has. */
  readonly hasForcedColors?: boolean;
  /** 2 for text of twice the size. */
  readonly textSize?: number;
}

interface Pages {
  readonly hand: Page;
  readonly desk: Page;
}

export interface AlbumOptions {
  readonly group: string;
  readonly languages: readonly string[];
  /** Sign in. */
  readonly cookies?: Cookies | undefined;
  /** Makes the house answer in a language, where that does not follow from the address. */
  readonly speak?: (language: string) => Promise<void>;
}

let counted = 0;

/** One album a group of screens: pictures, and a contact sheet of them at the end. */
export class Album {
  private readonly pictures: Picture[] = [];
  private readonly overflows: string[] = [];

  private constructor(
    private readonly group: string,
    private readonly pages: Pages,
    private readonly languages: readonly string[],
    private readonly speak: (language: string) => Promise<void>,
  ) {}

  /** Fills one album; what was taken before a failure is on its sheet too. */
  static async fill(
    browser: Browser,
    options: AlbumOptions,
    work: (album: Album) => Promise<void>,
  ): Promise<void> {
    const album = await Album.open(browser, options);
    try {
      await work(album);
    } finally {
      await album.close();
    }
    expect(album.overflows, 'pages that are wider than their window').toEqual([]);
  }

  private static async open(
    browser: Browser,
    { group, languages, cookies, speak = () => Promise.resolve() }: AlbumOptions,
  ): Promise<Album> {
    const hand = await browser.newContext({ hasTouch: true, isMobile: true });
    const desk = await browser.newContext();
    for (const context of [hand, desk]) {
      if (cookies) await context.addCookies(cookies);
      await keepWorkerOut(context);
    }
    const pages = { hand: await hand.newPage(), desk: await desk.newPage() };
    mkdirSync(join(folder, group), { recursive: true });
    return new Album(group, pages, languages, speak);
  }

  async shoot(screen: Screen): Promise<void> {
    const all =
      screen.media === 'print'
        ? onPaper(this.languages, this.group.startsWith('clinic'))
        : viewsOf(counted, this.languages);
    counted += 1;
    for (const view of screen.views?.(all) ?? all) await this.take(screen, view);
  }

  both(work: (context: BrowserContext) => Promise<unknown>): Promise<unknown> {
    return Promise.all([this.pages.hand, this.pages.desk].map((page) => work(page.context())));
  }

  /** Writes the contact sheet. */
  private async close(): Promise<void> {
    const { desk } = this.pages;
    await this.both((context) => context.unrouteAll({ behavior: 'ignoreErrors' }));
    const file = join(folder, `${this.group}.html`);
    writeFileSync(file, contactSheet(this.group, this.pictures));
    await desk.setViewportSize({ width: 1920, height: 1080 });
    await desk.emulateMedia({ colorScheme: 'light', media: 'screen' });
    await desk.goto(`file://${file}`);
    // The wording alone is a very long page.
    await desk.screenshot({
      path: join(folder, `${this.group}.png`),
      fullPage: true,
      timeout: 90_000,
    });
    await this.both((context) => context.close());
  }

  private async take(screen: Screen, view: View): Promise<void> {
    const page = view.width < 1000 ? this.pages.hand : this.pages.desk;
    const { width, height, language, scheme } = view;
    await page.setViewportSize({ width, height });
    await page.emulateMedia({
      colorScheme: scheme,
      media: 'screen',
      reducedMotion: 'reduce',
      forcedColors: screen.hasForcedColors ? 'active' : 'none',
    });
    await this.speak(language);
    await screen.before?.(language);
    await page.goto(screen.address(language), { waitUntil: 'commit' });
    await standing(page).waitFor();
    if (screen.textSize !== undefined) await enlarge(page, screen.textSize);
    if (!screen.isWaiting) await settled(page);
    // The family's pages hold no line open: they have everything when nothing is on its way.
    if (!screen.isWaiting && !page.url().includes('/clinic/'))
      await page.waitForLoadState('networkidle');
    await screen.prepare?.(page);
    if (!screen.isWaiting) await settled(page);
    if (screen.media) await page.emulateMedia({ media: screen.media, colorScheme: 'light' });
    // What sticks to the foot of the window stands at the foot of the picture, not across its middle.
    if (!screen.isWaiting)
      await page.setViewportSize({ width, height: await heightOf(page, height) });
    const name = `${screen.name}.${width}.${language}.${scheme}`;
    const wide = await page.evaluate(() => document.documentElement.scrollWidth);
    if (wide > width && !screen.media) this.overflows.push(`${name}: ${wide}`);
    const path = join(this.group, `${name}.png`);
    await page.screenshot({ path: join(folder, path), fullPage: true, animations: 'disabled' });
    this.pictures.push({ screen: screen.name, view, path });
  }
}

export type Cookies = Awaited<ReturnType<BrowserContext['cookies']>>;

// Every page is to come fresh from the house, in the language that was asked for.
function keepWorkerOut(context: BrowserContext): Promise<unknown> {
  return context.addInitScript(() => {
    Object.defineProperty(navigator, 'serviceWorker', { value: undefined, configurable: true });
  });
}

/** As a reader sets it for the whole browser: every size of ours follows that of the root. */
async function enlarge(page: Page, times: number): Promise<void> {
  await page.evaluate((factor) => {
    const { style } = document.documentElement;
    style.fontSize = `${parseFloat(getComputedStyle(document.documentElement).fontSize) * factor}px`;
  }, times);
}

/** Of the whole page, at least that of the window; a browser draws no picture of more than some 16 000 pixels. */
async function heightOf(page: Page, least: number): Promise<number> {
  const whole = await page.evaluate(() => document.documentElement.scrollHeight);
  return Math.min(Math.max(whole, least), 16_000);
}

/** A heading, the shape of what comes, or what failed; a page may have its heading from the answer. */
const standing = (page: Page): Locator =>
  page.locator('h1, .skeleton, .waiting, .failed').filter({ visible: true }).first();

async function settled(page: Page): Promise<void> {
  await expect(page.locator('.skeleton, td-sheet-states .waiting')).toHaveCount(0);
  await standing(page).waitFor();
  await page.evaluate(() => document.fonts.ready.then(() => undefined));
}
