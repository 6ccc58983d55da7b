import { expect, type Page, test } from '@playwright/test';
import { line, open, openExample } from './support.ts';

/** Ends every worker from inside, silently: no error reaches the page. */
async function killWorkers(page: Page): Promise<void> {
  for (const worker of page.workers()) await worker.evaluate(() => self.close()).catch(() => {});
}

/** A trial that takes long enough to be caught at work. */
async function startLongTrial(page: Page): Promise<void> {
  await open(page);
  await openExample(page, 'Heat sink', 48);
  await expect(line(page, 'nested dissection').getByRole('progressbar')).toBeVisible({ timeout: 60_000 });
}

test('a worker that dies is noticed, its trial says so and can be started again', async ({ page }) => {
  // one worker for trials: it is told to end while one trial is at work, so the next one dies with it
  await page.addInitScript(() => Object.defineProperty(navigator, 'hardwareConcurrency', { value: 2 }));
  await open(page);
  await openExample(page, 'Heat sink', 48);
  await expect(page.getByRole('progressbar').first()).toBeVisible();
  await killWorkers(page);
  const row = page.getByRole('row').filter({ hasText: 'stopped unexpectedly' });
  await expect(row).toHaveCount(1, { timeout: 30_000 });
  const name = (await row.getByRole('button', { name: /^[A-Z], / }).textContent()) ?? '';
  await row.getByRole('button', { name: 'Start again' }).click();
  const same = page.getByRole('row').filter({ hasText: name });
  await expect(same.locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
});

test('a trial stops on request, the others go on, and it can be run after all', async ({ page }) => {
  await startLongTrial(page);
  const row = line(page, 'nested dissection');
  await row.getByRole('button', { name: 'stop' }).click();
  await expect(row).toContainText('Stopped.');
  await row.getByRole('button', { name: 'Start again' }).click();
  await expect(row.getByRole('gridcell').nth(3)).toBeVisible({ timeout: 60_000 });
});

test('a sheet put away while its trials run leaves nothing behind', async ({ page }) => {
  await startLongTrial(page);
  await page.getByRole('button', { name: /^put away/ }).click();
  await expect(page.getByRole('heading', { name: 'Drop a matrix on this sheet' })).toBeVisible();
  await openExample(page, 'Seepage under a weir');
  await expect(line(page, 'minimum degree').getByRole('gridcell').nth(3)).toBeVisible({ timeout: 60_000 });
  await expect(page.getByRole('alert')).toHaveCount(0);
});
