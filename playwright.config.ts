import { defineConfig } from '@playwright/test';

/** `npm test -- e2e` builds, starts a server on a throw-away database and passes its address here. */
export default defineConfig({
  testDir: 'tests/e2e',
  testMatch: '**/*.spec.ts',
  globalSetup: './tests/e2e/global-set-up.ts',
  outputDir: 'test-results',
  workers: 1,
  forbidOnly: true,
  timeout: 120_000, // room for a slow machine: tests assert what happens, not how fast
  expect: { timeout: 20_000 },
  use: {
    baseURL: process.env.HUMMOCK_E2E_URL,
    locale: 'en-GB',
    timezoneId: 'Europe/Berlin',
    screenshot: 'only-on-failure',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env.HUMMOCK_CHROMIUM ?? '/usr/bin/chromium',
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
