import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { drop, line, open, reference } from './support.ts';

const panel = (page: Page) => page.getByRole('region', { name: 'Proof', exact: true });

/** Opens a matrix, chooses the trial of an ordering and shows its proof panel. */
async function openProof(
  page: Page,
  file: string | { name: string; content: string },
  ordering: string,
): Promise<void> {
  await open(page);
  await drop(page, [file]);
  await expect(line(page, ordering).locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
  await line(page, ordering).getByRole('rowheader').getByRole('button').first().click();
  await page.getByRole('tab', { name: 'Proof' }).click();
}

/** A small saddle point: two unknowns of three have no diagonal. */
const saddle = (scale: number): string =>
  `%%MatrixMarket matrix coordinate real symmetric\n3 3 4\n1 1 ${2 * scale}\n2 1 1\n3 2 ${scale}\n3 3 -1\n`;

test('the threshold is swept: a line for each, failures told, chart with words', async ({ page }) => {
  await openProof(page, reference('pores_1.mtx'), 'minimum degree');
  await page.getByRole('button', { name: 'Sweep the threshold' }).click();
  const sweep = page.getByRole('region', { name: 'Sweep of the pivot threshold' });
  for (const u of ['1', '0.5', '0.1', '0.01', '0.001', 'static']) {
    await expect(sweep.getByRole('rowheader', { name: u, exact: true })).toBeVisible();
  }
  await expect(sweep.getByRole('img', { name: /^Thresholds/ })).toHaveAttribute('aria-label', /backward error/);
  await expect(sweep.getByRole('img', { name: /^Pivot growth/ })).toBeVisible();
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations).toEqual([]);
});

test('a second matrix with the same pattern needs no new analysis', async ({ page }) => {
  await openProof(page, { name: 'first.mtx', content: saddle(1) }, 'minimum degree');
  await drop(page, [{ name: 'second.mtx', content: saddle(3) }]);
  await expect(page.locator('.topline')).toContainText('second');
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
  await line(page, 'minimum degree').getByRole('rowheader').getByRole('button').first().click();
  await page.getByRole('tab', { name: 'Proof' }).click();
  const reuse = page.getByRole('region', { name: 'New values on the same analysis' });
  await reuse.getByRole('button', { name: 'Factorize it' }).click();
  await expect(reuse).toContainText('Same pattern: yes.');
  await expect(reuse).toContainText('The analysis of the first matrix was enough.');
});

test('single precision is refined to double, and a transposed solve is green too', async ({ page }) => {
  await openProof(page, reference('bcsstk01.mtx'), 'minimum degree');
  await page.getByText('How it solves').click();
  await page.getByLabel('factors kept in').selectOption('single');
  await page.getByLabel('solves with').selectOption('transposed');
  await page.getByRole('button', { name: 'Run the proof' }).click();
  await expect(panel(page)).toContainText('Trust');
  await expect(panel(page).getByRole('img', { name: /^Refinement/ })).toBeVisible();
});
