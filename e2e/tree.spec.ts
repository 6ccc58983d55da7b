import AxeBuilder from '@axe-core/playwright';
import { expect, test } from '@playwright/test';
import { drop, figure, line, open, openExample, reference } from './support.ts';

test('the tree of the cheapest trial: its words agree with the ledger, keys walk it, a front leads into the maps', async ({
  page,
}) => {
  await open(page);
  await openExample(page, 'Heat sink', 22);
  await expect(line(page, 'nested dissection').locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
  const largest = await figure(page, 'minimum degree', 'largest front');
  await page.getByRole('tab', { name: 'Tree' }).click();
  await page.getByLabel('tree of').selectOption({ label: 'C minimum degree, Cholesky' });
  const tree = page.getByRole('application', { name: /^Assembly tree/ });
  await expect(tree).toBeVisible();
  const words = (await tree.getByRole('img').getAttribute('aria-label')) ?? '';
  // padding of amalgamated fronts may make the largest one larger, never smaller
  const order = Number((/order ([\d,]+)/.exec(words)?.[1] ?? '').replaceAll(',', ''));
  expect(order).toBeGreaterThanOrEqual(largest);
  expect(order).toBeLessThanOrEqual(1.5 * largest);
  await tree.focus();
  const reading = page.locator('.tree-reading');
  const root = await reading.textContent();
  await page.keyboard.press('ArrowUp');
  await expect(reading).not.toHaveText(root ?? '');
  await page.keyboard.press('ArrowDown');
  await expect(reading).toHaveText(root ?? '');
  await page.keyboard.press('Enter');
  await expect(page.getByRole('tab', { name: 'Maps' })).toHaveAttribute('aria-selected', 'true');
  await expect(page.getByRole('region', { name: 'Under the crosshair' })).toContainText('row, column');
});

test('the tree passes the accessibility scan, light and dark', async ({ page }) => {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    await open(page);
    await openExample(page, 'Seepage under a weir');
    await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
    await page.getByRole('tab', { name: 'Tree' }).click();
    await expect(page.getByRole('application', { name: /^Assembly tree/ })).toBeVisible();
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations).toEqual([]);
  }
});

test('a rectangular matrix has no fronts, and the page says so', async ({ page }) => {
  await open(page);
  await drop(page, [reference('lsq.mtx')]);
  await expect(page.getByRole('application', { name: /^Map of as read/ })).toBeVisible({ timeout: 60_000 });
  await expect(page.locator('[data-head="ordering"]').first()).toBeVisible({ timeout: 60_000 });
  await page.getByRole('tab', { name: 'Tree' }).click();
  await expect(page.getByText('it has no fronts')).toBeVisible();
});
