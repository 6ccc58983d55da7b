import { expect, test } from '@playwright/test';
import { drop, figure, line, open, reference } from './support.ts';

test('a stiffness matrix: drop, survey, trials with exact counts', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(page.locator('.topline')).toContainText('48 × 48');
  await expect(page.locator('.topline')).toContainText('real symmetric');
  await expect(page.getByText('The pattern is symmetric.')).toBeVisible();
  for (const ordering of ['natural', 'reverse Cuthill–McKee', 'minimum degree', 'nested dissection']) {
    await expect(line(page, ordering).locator('[data-cell]').first()).toBeVisible();
  }
  // test/reference/figures.json: from a general-purpose library, diagonal counted once
  expect(await figure(page, 'natural', 'factor entries')).toBe(877);
  expect(await figure(page, 'natural', 'tree height')).toBe(46);
  expect(await figure(page, 'natural', 'operations')).toBe(20151);
});

test('an unsymmetric matrix is told so, with its factorization and why', async ({ page }) => {
  await open(page);
  await drop(page, [reference('arc130.mtx')]);
  await expect(page.locator('.topline')).toContainText('unsymmetric');
  await expect(page.locator('.advice')).toContainText('Advised: LU, because the matrix is not symmetric');
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible();
});

test.describe('bad files say where, what and what to do', () => {
  const bad = [
    {
      name: 'cut-off.mtx',
      content: '%%MatrixMarket matrix coordinate real general\n3 3 5\n1 1 1.0\n2 2 1.0\n',
      says: /5.*declared.*2/s,
      place: 'line',
    },
    {
      name: 'from-zero.mtx',
      content: '%%MatrixMarket matrix coordinate real general\n3 3 3\n0 0 1.0\n1 1 1.0\n2 2 1.0\n',
      says: /0-based/,
      place: 'line',
    },
    {
      name: 'word.mtx',
      content: '%%MatrixMarket matrix coordinate real general\n3 3 2\n1 1 1.0\n2 two 1.0\n',
      says: /two/,
      place: 'line',
    },
  ];
  for (const { name, content, says, place } of bad) {
    test(name, async ({ page }) => {
      await open(page);
      await drop(page, [{ name, content }]);
      const alert = page.getByRole('alert');
      await expect(alert).toContainText(`${name} was not read`);
      await expect(alert).toContainText(says);
      await expect(alert).toContainText(place);
      await alert.getByRole('button', { name: 'Put away' }).click();
      await expect(page.getByRole('heading', { name: 'Drop a matrix on this sheet' })).toBeVisible();
    });
  }

  test('a file counted from 0 is read after one press', async ({ page }) => {
    await open(page);
    await drop(page, [bad[1]]);
    await page.getByRole('alert').getByRole('button', { name: /0/ }).click();
    await expect(page.locator('.topline')).toContainText('3 × 3');
  });
});
