import { existsSync } from 'node:fs';
import { defineConfig } from '@playwright/test';

const ownStack = JSON.parse(process.env.OWN_STACK ?? '{}') as { BASE_URL?: string };
const inOwnStack = 'the-thin-whole.spec.ts';
const debianBrowsers = ['/usr/bin/chromium', '/usr/bin/chromium-headless-shell'];

export default defineConfig({
  testDir: 'specs',
  outputDir: 'test-results',
  timeout: 120_000,
  expect: { timeout: 15_000 },
  workers: 2,
  fullyParallel: true,
  forbidOnly: Boolean(process.env.CI),
  reporter: [['list']],
  projects: [
    // The longest first.
    { name: 'own stack', testMatch: inOwnStack, use: { baseURL: ownStack.BASE_URL } },
    { name: 'shared stack', testIgnore: inOwnStack },
  ],
  // Not webServer: journeys also need the addresses of the database, the stand-ins and the stack's controls, which the
  // setup puts into the environment before workers start and read this file again.
  globalSetup: './global-setup.mjs',
  use: {
    baseURL: process.env.BASE_URL,
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env.CHROMIUM ?? debianBrowsers.find((path) => existsSync(path)),
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--disable-background-networking',
        '--no-first-run',
        '--disable-sync',
        '--disable-component-update',
        '--disable-dev-shm-usage',
      ],
    },
  },
});
