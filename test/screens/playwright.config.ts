import { join } from 'node:path';
import { defineConfig } from '@playwright/test';
import endToEnd from '../e2e/playwright.config';

/** Pictures of every screen and state, by `npm run screens`; what they show is for people to judge. */
export default defineConfig({
  ...endToEnd,
  testDir: __dirname,
  projects: [{ name: 'screens' }],
  // In the order of their names: the clock of the one house moves forward only.
  testMatch: '**/*.screens.ts',
  outputDir: join(__dirname, '..', '..', 'test-results', 'screens-failures'),
  timeout: 240_000,
  use: { ...endToEnd.use, trace: 'off', screenshot: 'off' },
});
