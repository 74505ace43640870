import { defineConfig, devices } from '@playwright/test'

/** Debian's Chromium; `npm test` installs it. */
const launchOptions = {
  executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
  args: [
    '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run',
    '--disable-background-networking', '--disable-component-update', '--disable-sync',
  ],
}

const phoneOnly = /\.phone\.spec\.ts$/
const desktopOnly = /\.desktop\.spec\.ts$/

export default defineConfig({
  testDir: 'tests/browser',
  outputDir: 'test-results',
  globalSetup: './tests/support/browser-setup.ts',
  // A test that passes at the second try hides a fault.
  retries: 0,
  workers: 1,
  fullyParallel: false,
  forbidOnly: true,
  timeout: 60_000,
  expect: { timeout: 10_000 },
  reporter: process.env.PLAYWRIGHT_REPORT ? [['list'], ['json', { outputFile: process.env.PLAYWRIGHT_REPORT }]] : [['list']],
  use: {
    baseURL: process.env.BASE_URL,
    browserName: 'chromium',
    launchOptions,
    locale: 'en-GB',
    timezoneId: 'Asia/Kathmandu',
    screenshot: 'only-on-failure',
    // Recording every test costs a third of the time; to look into a failure: `--trace retain-on-failure`.
    trace: 'off',
  },
  projects: [
    { name: 'desktop', testIgnore: phoneOnly, grepInvert: /@phone/, use: { viewport: { width: 1440, height: 900 } } },
    {
      name: 'phone',
      testIgnore: desktopOnly,
      grepInvert: /@desktop/,
      use: { userAgent: devices['Pixel 7'].userAgent, viewport: { width: 390, height: 844 }, deviceScaleFactor: 2, hasTouch: true, isMobile: true },
    },
  ],
})
