import { defineConfig, devices } from '@playwright/test';

/** `npm test` serves a seeded build and tells its address; see scripts/e2e-servers.mjs for one test by hand. */
const results = process.env['E2E_RESULTS'];

const chromium = {
  browserName: 'chromium' as const,
  launchOptions: {
    executablePath: '/usr/bin/chromium',
    // The sandbox cannot start as root; the rest keeps the browser from calling its maker's hosts.
    args: [
      '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync',
    ],
  },
};

const desktop = { ...devices['Desktop Chrome'], ...chromium, viewport: { width: 1440, height: 900 } };
const phone = { ...devices['Desktop Chrome'], ...chromium, viewport: { width: 390, height: 844 }, isMobile: true, hasTouch: true };

export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: 'test-results',
  // One data base under all tests, one journey after the other.
  workers: 1,
  fullyParallel: false,
  retries: 0,
  forbidOnly: Boolean(results),
  timeout: 90_000,
  expect: { timeout: 15_000 },
  reporter: results ? [['list'], ['json', { outputFile: results }]] : [['list']],
  use: {
    baseURL: process.env['E2E_BASE_URL'] ?? 'http://127.0.0.1:3000',
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
  },
  projects: [
    { name: 'setup', testMatch: 'setup/**/*.setup.ts', use: desktop },
    { name: 'desktop', testMatch: '**/*.spec.ts', testIgnore: '**/*.phone.spec.ts', dependencies: ['setup'], use: desktop },
    { name: 'phone', testMatch: '**/*.phone.spec.ts', dependencies: ['setup'], use: phone },
  ],
});
