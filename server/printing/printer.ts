import type { Browser } from 'playwright-core';
import { Problem } from '../http/problem';

export interface Printer {
  /** Prints a whole HTML page to a tagged PDF. @throws Problem 503 'no-printer' when there is no browser. */
  print(html: string): Promise<Buffer>;
  close(): Promise<void>;
}

const idleMs = 60_000;
const printTimeoutMs = 20_000;

/**
 * One warm browser for this process and one page at a time: a browser takes some 450 MB and 1.1 s to start, a letter
 * 0.3 s. It closes after a minute without work and is started again when it has died. The page has no script and no
 * network, whatever stands in a letter.
 */
export function openPrinter(executablePath: string): Printer {
  let browser: Promise<Browser> | null = null;
  let queue: Promise<unknown> = Promise.resolve();
  let idle: NodeJS.Timeout | null = null;

  const launch = async (): Promise<Browser> => {
    const { chromium } = await import('playwright-core');
    const isRoot = process.getuid?.() === 0;
    return chromium.launch({
      executablePath,
      args: [
        ...(isRoot ? ['--no-sandbox'] : []),
        '--disable-gpu',
        '--disable-dev-shm-usage',
        '--disable-background-networking',
      ],
    });
  };

  const close = async (): Promise<void> => {
    if (idle) clearTimeout(idle);
    const open = browser;
    browser = null;
    await open?.then((one) => one.close()).catch(() => undefined);
  };

  const warm = async (): Promise<Browser> => {
    const open = await (browser ??= launch());
    if (open.isConnected()) return open;
    browser = launch();
    return browser;
  };

  const printOne = async (html: string): Promise<Buffer> => {
    if (idle) clearTimeout(idle);
    const context = await (await warm()).newContext({ javaScriptEnabled: false, offline: true });
    try {
      const page = await context.newPage();
      page.setDefaultTimeout(printTimeoutMs);
      await page.setContent(html, { waitUntil: 'load', timeout: printTimeoutMs });
      return await page.pdf({
        preferCSSPageSize: true,
        printBackground: true,
        tagged: true,
        outline: true,
      });
    } finally {
      await context.close().catch(() => undefined);
      idle = setTimeout(() => void close(), idleMs);
      idle.unref();
    }
  };

  return {
    close,
    print: (html) => {
      if (executablePath === '')
        return Promise.reject(
          new Problem(
            503,
            'no-printer',
            'This server cannot make PDF files. Open the letter and print the page.',
          ),
        );
      const next = queue.then(
        () => printOne(html),
        () => printOne(html),
      );
      queue = next.catch(() => {
        browser = null;
      });
      return next;
    },
  };
}
