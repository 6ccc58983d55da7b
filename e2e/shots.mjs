/**
 * Screenshots of the built page in its stages, at three sizes, light and dark, into a folder outside the repository.
 *   node e2e/shots.mjs FOLDER [stage …]
 *   node e2e/shots.mjs --readme [stage …]   those of the guides, one size, into public/screens
 * Serves the folder dist/ itself through the preview server, so build first.
 */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync } from 'node:fs';
import { delimiter, join, resolve } from 'node:path';
import { chromium } from '@playwright/test';
import { stages } from './stages.mjs';

const root = resolve(import.meta.dirname, '..');
const [first, ...wanted] = process.argv.slice(2);
if (first === undefined) {
  console.error('usage: node e2e/shots.mjs FOLDER [stage …]   or   node e2e/shots.mjs --readme [stage …]');
  process.exit(2);
}
const readme = first === '--readme';
const folder = readme ? join(root, 'public/screens') : first;
const port = 4183;
mkdirSync(folder, { recursive: true });

const server = spawn(
  process.execPath,
  [join(root, 'node_modules/vite/bin/vite.js'), 'preview', '--port', String(port), '--strictPort'],
  {
    cwd: root,
    stdio: ['ignore', 'pipe', 'inherit'],
  },
);
await new Promise((up) => server.stdout.on('data', (text) => String(text).includes(String(port)) && up()));

const executablePath = process.env.PATH.split(delimiter)
  .map((at) => join(at, 'chromium'))
  .find((path) => existsSync(path));
const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-quic'] });
const sizes = [
  { name: 'desk', width: 1280, height: 800, themes: ['light', 'dark'] },
  { name: 'wide', width: 1920, height: 1080, themes: ['light'] },
  { name: 'phone', width: 390, height: 844, themes: ['light', 'dark'] },
].slice(0, readme ? 1 : 3);
try {
  for (const { name, width, height, themes } of sizes) {
    for (const colorScheme of readme ? ['light'] : themes) {
      const context = await browser.newContext({ viewport: { width, height }, colorScheme, reducedMotion: 'reduce' });
      const page = await context.newPage();
      page.on('pageerror', (error) => console.error(`page error: ${error.message}`));
      page.on('console', (message) => message.type() === 'error' && console.error(`console: ${message.text()}`));
      for (const [stage, go] of Object.entries(stages)) {
        if (wanted.length > 0 && !wanted.includes(stage)) continue;
        await page.goto(`http://localhost:${port}/`);
        await go(page, root);
        const file = readme ? `${stage}.jpg` : `${stage}-${name}-${colorScheme}.png`;
        await page.screenshot({ path: join(folder, file), ...(readme ? { type: 'jpeg', quality: 80 } : {}) });
      }
      await context.close();
    }
  }
} finally {
  await browser.close();
  server.kill();
}
