import { createReadStream, existsSync, statSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { extname, join, normalize } from 'node:path';
import { expect, test } from '@playwright/test';
import { drop, figure, line, openExample, reference } from './support.ts';

const types: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.css': 'text/css',
  '.svg': 'image/svg+xml',
  '.woff2': 'font/woff2',
  '.webmanifest': 'application/manifest+json',
};
const dist = join(import.meta.dirname, '../dist');

let server: Server;
let address = '';

/** A host that serves the files and sends no header of its own. */
test.beforeAll(async () => {
  server = createServer((request, response) => {
    const path = normalize(new URL(request.url ?? '/', 'http://localhost').pathname);
    const file = join(dist, path === '/' ? 'index.html' : path);
    if (!file.startsWith(dist) || !existsSync(file) || !statSync(file).isFile()) {
      response.writeHead(404).end();
      return;
    }
    response.writeHead(200, { 'Content-Type': types[extname(file)] ?? 'application/octet-stream' });
    createReadStream(file).pipe(response);
  });
  await new Promise<void>((up) => server.listen(0, '127.0.0.1', () => up()));
  address = `http://127.0.0.1:${(server.address() as AddressInfo).port}/`;
});
test.afterAll(() => new Promise<void>((down) => server.close(() => down())));

test.use({ serviceWorkers: 'block' });

test.skip(process.env.FILLCAST_DEV === '1', 'the built page is needed');

test('needs 55: a host without isolation headers: everything works without shared memory, and the page says what is slower', async ({
  page,
}) => {
  await page.goto(address);
  await expect(page.getByRole('heading', { name: 'Drop a matrix on this sheet' })).toBeVisible();
  expect(await page.evaluate(() => crossOriginIsolated)).toBe(false);
  await drop(page, [reference('bcsstk01.mtx')]);
  // test/reference/figures.json: from a general-purpose library
  expect(await figure(page, 'natural', 'factor entries')).toBe(877);
  await page.getByRole('button', { name: /^target/ }).click();
  await expect(page.getByText('workers cannot share memory')).toBeVisible();
  await page.keyboard.press('Escape');
  await page.getByRole('button', { name: /^C, minimum degree/ }).click();
  await page.getByRole('tab', { name: 'Proof' }).click();
  await page.getByRole('button', { name: 'Run the proof' }).click();
  await expect(page.getByRole('region', { name: 'Proof', exact: true })).toContainText('Trust');
});

test('needs 55: without shared memory a stop ends the worker, and the trial can be run after all', async ({ page }) => {
  await page.goto(address);
  await openExample(page, 'Heat sink', 48);
  const row = line(page, 'nested dissection');
  await expect(row.getByRole('progressbar')).toBeVisible({ timeout: 60_000 });
  await row.getByRole('button', { name: 'stop' }).click();
  await expect(row).toContainText('Stopped.');
  await row.getByRole('button', { name: 'Start again' }).click();
  await expect(row.locator('[data-cell]').first()).toBeVisible({ timeout: 90_000 });
});
