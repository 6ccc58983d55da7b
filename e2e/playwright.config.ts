import { existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { defineConfig } from '@playwright/test';

/** The browser of the system, or undefined for the test tool's own download. The runner of all tests sees to it that there is one. */
function browserOnPath(): string | undefined {
  const names = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];
  const folders = (process.env.PATH ?? '').split(delimiter);
  return folders.flatMap((folder) => names.map((name) => join(folder, name))).find((path) => existsSync(path));
}

const executablePath = browserOnPath();
const port = Number(process.env.FILLCAST_PORT ?? 4173);
/** FILLCAST_DEV=1 tests the development server, which needs no build: for one spec while working on it. */
const server = process.env.FILLCAST_DEV === '1' ? '' : 'preview ';

export default defineConfig({
  testDir: '.',
  testMatch: '*.spec.ts',
  outputDir: 'results/traces',
  timeout: 120_000,
  expect: { timeout: 15_000 },
  workers: 1,
  reporter: [['list'], ['json', { outputFile: 'results/results.json' }]],
  use: {
    baseURL: `http://localhost:${port}/`,
    viewport: { width: 1280, height: 800 },
    acceptDownloads: true,
    launchOptions: {
      ...(executablePath === undefined ? {} : { executablePath }),
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
  webServer: {
    command: `node node_modules/vite/bin/vite.js ${server}--port ${port} --strictPort`,
    cwd: '..',
    url: `http://localhost:${port}/`,
    reuseExistingServer: false,
    timeout: 120_000,
  },
});
