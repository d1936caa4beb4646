import { defineConfig } from '@playwright/test';
import { CHROMIUM, CHROMIUM_ARGUMENTS } from './tests/browser/chromium';

const baseURL = process.env.BASE_URL;
if (!baseURL)
  throw new Error('BASE_URL is not set; run the browser tests with: npm test -- browser');

export default defineConfig({
  testDir: 'tests/browser',
  outputDir: 'test-results',
  // Two files at a time: while one waits for the worker pool the other looks at pages.
  workers: 2,
  forbidOnly: true,
  timeout: 180_000,
  expect: { timeout: 30_000 },
  use: {
    baseURL,
    // A trace keeps every element of every chart at each step and takes longer than the tests.
    trace: 'off',
    screenshot: 'only-on-failure',
    launchOptions: {
      executablePath: CHROMIUM,
      args: CHROMIUM_ARGUMENTS,
    },
  },
});
