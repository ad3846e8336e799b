import { defineConfig } from '@playwright/test';

const PORT = 4199;
const dataFolder = process.env.E2E_DATA_DIR ?? 'test-results/data';

/** One browser, one server of its own with fresh data; Debian's chromium, nothing downloaded. */
export default defineConfig({
  testDir: 'tests/e2e',
  testMatch: '**/*.spec.ts',
  timeout: 90_000,
  expect: { timeout: 15_000 },
  workers: 1,
  fullyParallel: false,
  retries: 0,
  outputDir: 'test-results/browser',
  use: {
    baseURL: `http://127.0.0.1:${PORT}`,
    viewport: { width: 1440, height: 900 },
    trace: 'off',
    actionTimeout: 15_000,
    launchOptions: {
      executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
        '--use-angle=swiftshader',
        '--enable-unsafe-swiftshader',
      ],
    },
  },
  webServer: {
    command: `rm -rf ${dataFolder} && node dist/server/main.js`,
    url: `http://127.0.0.1:${PORT}/api/ready`,
    timeout: 60_000,
    reuseExistingServer: false,
    env: {
      DEMO: '1',
      PORT: String(PORT),
      DATA_DIR: dataFolder,
      PUBLIC_URL: `http://127.0.0.1:${PORT}`,
      LOG_LEVEL: 'warn',
    },
  },
});
