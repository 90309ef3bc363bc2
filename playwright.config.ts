import { defineConfig } from '@playwright/test';

/** The running application; scripts/test.mjs starts one of its own and names it here. */
const address = process.env.PINLOOM_ADDRESS ?? 'http://127.0.0.1:3000';

export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: '.out/e2e',
  // A test that passes only now and then is a fault to be found, not to be tried again.
  retries: 0,
  workers: 1,
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 15_000 },
  reporter: [['list'], ['json', { outputFile: '.out/playwright.json' }]],
  use: {
    baseURL: address,
    viewport: { width: 1440, height: 900 },
    locale: 'en-GB',
    timezoneId: 'Europe/Zurich',
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
    contextOptions: { reducedMotion: 'reduce' },
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      // No sandbox: Chromium refuses to start as root with one. The rest keeps it from talking to anyone but us.
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-dev-shm-usage',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
});
