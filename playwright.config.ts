import { defineConfig } from '@playwright/test';
import { findProgram } from './server/setup/programs.mjs';

const sound = '**/listen*.spec.ts';

export default defineConfig({
  testDir: 'tests/browser',
  projects: [
    { name: 'pages', testMatch: '**/*.spec.ts', testIgnore: sound, outputDir: 'test-results/pages' },
    // A run of its own, so that each keeps what it has to show of failures.
    { name: 'sound', testMatch: sound, outputDir: 'test-results/sound' },
  ],
  globalSetup: './tests/support/browser-app.ts',
  // Two cores: one browser, so that sound and frame times mean something.
  workers: 1,
  retries: 0,
  forbidOnly: Boolean(process.env.CI),
  timeout: 60_000,
  use: {
    // Written by the global set-up; a test's process reads this file anew.
    baseURL: process.env.STEPWELL_TEST_ADDRESS,
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: findProgram('chromium'),
      args: [
        '--no-sandbox',
        '--disable-quic',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
        '--no-first-run',
        '--autoplay-policy=document-user-activation-required',
      ],
    },
  },
});
