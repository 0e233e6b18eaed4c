import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { defineConfig } from '@playwright/test';

// The shell without a window starts twice as fast as the whole browser.
const browser = ['/usr/bin/chromium-headless-shell', '/usr/bin/chromium'].find((path) =>
  existsSync(path),
);

const isRoot = process.getuid?.() === 0;

export default defineConfig({
  testDir: __dirname,
  outputDir: join(__dirname, '..', '..', 'test-results', 'e2e'),
  globalSetup: join(__dirname, '..', 'support', 'e2e-house.mjs'),
  // Pictures that a person has looked at; a new one is approved by `npm run e2e -- letter-pictures -u`.
  snapshotPathTemplate: '{testDir}/approved/{arg}{ext}',
  updateSnapshots: 'none',
  forbidOnly: true,
  retries: 0,
  // One house with one clock that moves forward only: one test after the other.
  workers: 1,
  // The whole chain comes first: it begins on the morning of the demo families, which the others leave behind.
  projects: [
    { name: 'chain', testMatch: '**/chain.e2e.ts' },
    { name: 'others', testMatch: '**/*.e2e.ts', testIgnore: '**/chain.e2e.ts' },
  ],
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: 'list',
  use: {
    // Known only when the house stands; the workers read this file again after that.
    baseURL: process.env['THREEDAWN_ORIGIN'],
    actionTimeout: 15_000,
    navigationTimeout: 20_000,
    locale: 'en-US',
    timezoneId: 'America/Chicago',
    screenshot: 'only-on-failure',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: browser,
      args: [
        ...(isRoot ? ['--no-sandbox'] : []),
        '--disable-gpu',
        '--disable-quic',
        '--disable-sync',
        '--disable-background-networking',
        '--disable-component-update',
        '--no-first-run',
      ],
    },
  },
});
