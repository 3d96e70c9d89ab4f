import { defineConfig, devices } from '@playwright/test';

/**
 * Browser tests against the production build. Debian's Chromium is used as it is (CHROMIUM names another one);
 * each test worker starts servers of its own on free ports with data folders of its own.
 */
export default defineConfig({
  testDir: 'tests/e2e',
  globalSetup: './tests/e2e/support/build.mjs',
  outputDir: 'test-results',
  fullyParallel: true,
  workers: 2,
  retries: 0,
  forbidOnly: Boolean(process.env['CI']),
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: [['list', { printSteps: false }]],
  use: {
    ...devices['Desktop Chrome'],
    viewport: { width: 1440, height: 900 },
    locale: 'en-GB',
    timezoneId: 'Europe/Stockholm',
    screenshot: 'only-on-failure',
    trace: 'off',
    launchOptions: {
      executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
});
