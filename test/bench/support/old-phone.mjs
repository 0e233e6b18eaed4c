/* global window, PerformanceObserver, requestAnimationFrame -- of the page */
import { existsSync } from 'node:fs';
import { chromium } from 'playwright-core';

const browserFile = ['/usr/bin/chromium-headless-shell', '/usr/bin/chromium'].find((path) =>
  existsSync(path),
);

/** A phone of some years ago with bad signal: the profile that web benches usually take for "slow 4G". */
const profile = {
  cpuSlowdown: 4,
  latencyMs: 150,
  bytesPerSecond: 1_600_000 / 8,
};

export function openBrowser() {
  return chromium.launch({
    executablePath: browserFile,
    args: [
      ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
      '--disable-gpu',
      '--disable-background-networking',
      '--disable-component-update',
      '--no-first-run',
    ],
  });
}

/** A phone that has kept nothing; `remembers` lets it keep a worker. */
export async function newPhone(browser, { cookies = [], remembers = false } = {}) {
  const context = await browser.newContext({
    viewport: { width: 390, height: 844 },
    deviceScaleFactor: 2,
    isMobile: true,
    hasTouch: true,
    reducedMotion: 'reduce',
    serviceWorkers: remembers ? 'allow' : 'block',
  });
  await context.addCookies(cookies);
  await context.addInitScript(() => {
    window.largestPaints = [];
    new PerformanceObserver((list) => {
      window.largestPaints.push(...list.getEntries().map((entry) => entry.startTime));
    }).observe({ type: 'largest-contentful-paint', buffered: true });
  });
  return context;
}

/**
 * Opens an address on a slow phone; answers the largest paint in ms after the start and the bytes of script that came
 * for it, as transferred. `until` is what stands on the page when it is whole.
 */
export async function visit(context, address, until, { hasSignal = true } = {}) {
  const page = await context.newPage();
  const devtools = await context.newCDPSession(page);
  await devtools.send('Emulation.setCPUThrottlingRate', { rate: profile.cpuSlowdown });
  if (hasSignal)
    await devtools.send('Network.emulateNetworkConditions', {
      offline: false,
      latency: profile.latencyMs,
      downloadThroughput: profile.bytesPerSecond,
      uploadThroughput: profile.bytesPerSecond,
    });
  const scripts = scriptMeter(page);
  await page.goto(address, { waitUntil: 'commit' });
  await page.locator(until).first().waitFor();
  await page.waitForLoadState(hasSignal ? 'networkidle' : 'load');
  const largestPaintMs = await page.evaluate(async () => {
    // Two frames on, what stands on the page has been painted and told to the observer.
    await new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done)));
    await new Promise((done) => setTimeout(done, 0));
    return window.largestPaints.at(-1) ?? Number.NaN;
  });
  const scriptBytes = await scripts.bytes();
  await page.close();
  return { largestPaintMs, scriptBytes };
}

/** Bytes of every script of a page, as transferred, each address once. */
export function scriptMeter(page) {
  const sizes = new Map();
  page.on('response', (response) => {
    const request = response.request();
    if (request.resourceType() !== 'script' || sizes.has(request.url())) return;
    sizes.set(
      request.url(),
      request.sizes().then(({ responseBodySize }) => responseBodySize),
    );
  });
  return {
    bytes: async () => (await Promise.all(sizes.values())).reduce((sum, size) => sum + size, 0),
  };
}
