import { expect, type Page, test } from '@playwright/test';
import { line, open, openExample } from './support.ts';

/** Keeps hold of every worker that the page makes, so that a test can end one behind the page's back. */
async function keepWorkers(page: Page): Promise<void> {
  await page.addInitScript(() => {
    const kept: Worker[] = [];
    Object.assign(window, { kept });
    const Own = window.Worker;
    window.Worker = class extends Own {
      constructor(url: string | URL, options?: WorkerOptions) {
        super(url, options);
        kept.push(this);
      }
    };
  });
}

/** Ends every worker in the middle of its work, silently: no error reaches the page. */
async function killWorkers(page: Page): Promise<void> {
  await page.evaluate(() => {
    for (const worker of (window as unknown as { kept: Worker[] }).kept) worker.terminate();
  });
}

/** A trial that takes long enough to be caught at work. */
async function startLongTrial(page: Page): Promise<void> {
  await open(page);
  await openExample(page, 'Heat sink', 48);
  await expect(line(page, 'nested dissection').getByRole('progressbar')).toBeVisible({ timeout: 60_000 });
}

test('a worker that dies is noticed, its trial says so and can be started again', async ({ page }) => {
  await keepWorkers(page);
  await startLongTrial(page);
  await killWorkers(page);
  const row = line(page, 'nested dissection');
  await expect(row).toContainText('stopped unexpectedly', { timeout: 30_000 });
  await row.getByRole('button', { name: 'Start again' }).click();
  await expect(row.locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
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
