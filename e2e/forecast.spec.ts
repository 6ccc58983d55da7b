import { expect, test } from '@playwright/test';
import { drop, figure, line, open, openExample, reference } from './support.ts';

test('figures of another solver are reconciled: entries without the diagonal, operations with multiply–add as one', async ({
  page,
}) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  const entries = await figure(page, 'minimum degree', 'factor entries');
  await page.getByRole('button', { name: /^C, minimum degree/ }).click();
  await page.getByRole('tab', { name: 'Forecast' }).click();
  await page.getByText('Reconcile with what your solver reported').click();
  await page.getByLabel('factor entries it reported').fill(String(entries - 48));
  await page.getByRole('button', { name: 'Find the convention' }).click();
  await expect(
    page.getByRole('row', { name: /entries of L without its diagonal.*minimum degree.*exact/ }),
  ).toBeVisible();
  await page.getByLabel('factor entries it reported').fill('123456789');
  await page.getByRole('button', { name: 'Find the convention' }).click();
  await expect(page.getByText('no convention and none of the finished trials explains it')).toBeVisible();
});

test('the spread over renumberings says which differences are none', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(line(page, 'nested dissection').locator('[data-cell]').first()).toBeVisible();
  await page.getByRole('button', { name: /^C, minimum degree/ }).click();
  await page.getByRole('tab', { name: 'Forecast' }).click();
  await page.getByText('Which differences are real?').click();
  await page.getByRole('button', { name: 'Run the spread' }).click();
  const table = page.getByRole('table', { name: /factor entries over 5 numberings/ });
  await expect(table.getByRole('row', { name: /^A / })).toContainText('has but one run', { timeout: 30_000 });
  await expect(table.getByRole('row')).toHaveCount(5);
});

test('one press measures this browser; its rates are those of the target from then on', async ({ page }) => {
  await open(page);
  await page.getByRole('button', { name: /^target/ }).click();
  const before = await page.getByLabel('one core, large dense fronts').inputValue();
  await page.getByRole('button', { name: 'Measure this browser' }).click();
  await expect(page.getByText(/The time model met its own \d+ runs within a factor of/)).toBeVisible({
    timeout: 90_000,
  });
  expect(await page.getByLabel('one core, large dense fronts').inputValue()).not.toBe(before);
});

test('three sizes of one family: fits, local exponents, how large n can be', async ({ page }) => {
  await open(page);
  for (const size of [40, 80, 140]) {
    await openExample(page, 'Seepage under a weir', size);
    await expect(line(page, 'nested dissection').locator('[data-cell]').first()).toBeVisible({ timeout: 90_000 });
    if (size < 140) await page.getByRole('button', { name: 'open another' }).click();
  }
  await page.getByRole('tab', { name: 'Growth' }).click();
  const growth = page.getByRole('region', { name: 'Growth' });
  await expect(growth.getByRole('row', { name: /^factor entries/ })).toContainText('predicted within');
  await expect(growth).toContainText('GiB');
});
