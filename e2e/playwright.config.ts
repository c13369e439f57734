import { defineConfig } from '@playwright/test';

const baseURL = process.env.LAMPWRIGHT_URL;
if (!baseURL) {
  throw new Error('LAMPWRIGHT_URL is missing: "npm test -- e2e" starts the product and sets it.');
}
const report = process.env.PLAYWRIGHT_JSON_OUTPUT_FILE;

/** Debian's Chromium, kept from looking for hosts other than ours. */
const launchOptions = {
  executablePath: '/usr/bin/chromium',
  args: [
    '--headless',
    '--no-sandbox',
    '--disable-gpu',
    '--disable-quic',
    '--no-first-run',
    '--disable-background-networking',
    '--disable-component-update',
    '--disable-sync',
  ],
};

/** A person at a desk; tests of the phone layout set {@link phone} for themselves. */
export const desktop = { width: 1440, height: 900 };
export const phone = { width: 390, height: 844 };

export default defineConfig({
  testDir: '.',
  testMatch: '**/*.spec.ts',
  outputDir: '../test-results/e2e',
  // One product and one database serve all tests, in order.
  workers: 1,
  fullyParallel: false,
  retries: 0,
  forbidOnly: true,
  timeout: 120_000,
  expect: { timeout: 10_000 },
  reporter: report ? [['list'], ['json', { outputFile: report }]] : [['list']],
  use: {
    baseURL,
    // What a person would wait for a control before calling it broken.
    actionTimeout: 10_000,
    viewport: desktop,
    locale: 'en-US',
    timezoneId: 'America/New_York',
    colorScheme: 'light',
    reducedMotion: 'reduce',
    screenshot: 'only-on-failure',
    // Without its film, which costs a good part of the run; the picture of the failure is taken anyway.
    trace: { mode: 'retain-on-failure', screenshots: false },
    launchOptions,
  },
  projects: [{ name: 'desktop' }],
});
