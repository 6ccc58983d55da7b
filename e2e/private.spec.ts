import { expect, test } from '@playwright/test';
import { line, open, openExample } from './support.ts';

test('nothing is asked of any other place, and nothing at all once the page is ready offline', async ({
  page,
  context,
}) => {
  const elsewhere: string[] = [];
  const afterReady: string[] = [];
  let ready = false;
  context.on('request', (request) => {
    const url = new URL(request.url());
    if (url.protocol.startsWith('http') && url.hostname !== 'localhost') elsewhere.push(request.url());
  });
  context.on('response', (response) => {
    if (ready && response.url().startsWith('http') && !response.fromServiceWorker()) afterReady.push(response.url());
  });
  await open(page);
  await expect(page.getByText('Ready offline')).toBeVisible();
  ready = true;
  await openExample(page, 'Heat sink');
  await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible();
  await page.getByRole('tab', { name: 'Comparison' }).click();
  expect(elsewhere).toEqual([]);
  expect(afterReady).toEqual([]);
});

test('without a network the page loads anew and does its job', async ({ page, context }) => {
  await open(page);
  await expect(page.getByText('Ready offline')).toBeVisible();
  await context.setOffline(true);
  await page.reload();
  expect(await page.evaluate(() => crossOriginIsolated)).toBe(true);
  await openExample(page, 'Heat sink');
  await expect(line(page, 'nested dissection').getByRole('gridcell').nth(3)).toBeVisible();
});

test('the policy forbids the page to send anything elsewhere', async ({ page }) => {
  await open(page);
  const outcome = await page.evaluate(() =>
    fetch('https://example.org/').then(
      () => 'sent',
      () => 'refused',
    ),
  );
  expect(outcome).toBe('refused');
});
