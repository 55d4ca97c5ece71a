import {defineConfig} from '@playwright/test';

/** Debian's Chromium: as root it needs no-sandbox; it must find no other host and not call home. */
const CHROMIUM_FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-dev-shm-usage',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-quic',
  '--no-first-run',
  '--disable-extensions',
  '--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE 127.0.0.1',
];

export default defineConfig({
  testDir: '.',
  testMatch: '*.e2e.ts',
  outputDir: '../../test-results',
  globalSetup: './support/start-everything.ts',
  fullyParallel: true,
  workers: 2,
  retries: 0,
  forbidOnly: true,
  timeout: 90_000,
  expect: {timeout: 15_000},
  use: {
    browserName: 'chromium',
    headless: true,
    launchOptions: {executablePath: '/usr/bin/chromium', args: CHROMIUM_FLAGS},
    viewport: {width: 1440, height: 900},
    locale: 'en-GB',
    serviceWorkers: 'block',
    screenshot: 'only-on-failure',
  },
});
