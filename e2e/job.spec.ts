import { readFileSync } from 'node:fs';
import { expect, test } from '@playwright/test';
import { naiveElimination } from '../test/support/elimination.ts';
import { readReference } from '../test/support/reference.ts';
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
  expect(await figure(page, 'natural', 'operations')).toBe(20151);
  await page.getByRole('button', { name: 'Columns…' }).click();
  await page
    .getByRole('dialog')
    .getByRole('checkbox', { name: /^tree height/ })
    .check();
  await page.getByRole('dialog').getByRole('button', { name: 'Done' }).click();
  expect(await figure(page, 'natural', 'tree height')).toBe(46);
});

test('an unsymmetric matrix is told so, with its factorization and why', async ({ page }) => {
  await open(page);
  await drop(page, [reference('arc130.mtx')]);
  await expect(page.locator('.topline')).toContainText('unsymmetric');
  await expect(page.locator('.advice')).toContainText('LU is advised because the matrix is not symmetric');
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible();
});

test('the exported permutation reproduces the forecast, and its inverse does not', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  const forecast = await figure(page, 'minimum degree', 'factor entries');
  await page.getByRole('button', { name: /^C, minimum degree/ }).click();
  await page.getByRole('tab', { name: 'Handover' }).click();
  await page.getByLabel('direction').selectOption('new-to-old');
  await page.getByLabel('first index').selectOption('1');
  const waiting = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save the permutation' }).click();
  const download = await waiting;
  expect(download.suggestedFilename()).toBe('bcsstk01-minimum-degree-effective-new-to-old-1-based.mtx');
  const lines = readFileSync(await download.path(), 'latin1')
    .trimEnd()
    .split('\n');
  expect(lines[0]).toBe('%%MatrixMarket matrix array integer general');
  expect(lines.filter((l) => l.startsWith('%')).join('\n')).toContain('(P A P^T)(k,l) = A(p[k], p[l])');
  const body = lines.filter((l) => !l.startsWith('%'));
  expect(body[0]).toBe('48 1');
  const order = body.slice(1).map((text) => Number(text) - 1);
  const inverse = order.map((_, i) => order.indexOf(i));
  const matrix = readReference('bcsstk01');
  // counted by plain elimination, entry by entry
  expect(naiveElimination(matrix, order).factorEntries).toBe(forecast);
  expect(naiveElimination(matrix, inverse).factorEntries).not.toBe(forecast);
});

test('a proof of the stiffness matrix is green, and its peak is the forecast one', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible();
  await page.getByRole('button', { name: /^C, minimum degree/ }).click();
  await page.getByRole('tab', { name: 'Proof' }).click();
  await page.getByRole('button', { name: 'Run the proof' }).click();
  const proof = page.getByRole('region', { name: 'Proof' });
  await expect(proof).toContainText('Trust');
  const peak = proof.getByRole('row', { name: /^peak memory/ }).getByRole('cell');
  expect(await peak.nth(0).getAttribute('title')).toBe(await peak.nth(1).getAttribute('title'));
  // 1-norm condition number 1.5976e6 by a general-purpose dense library (test/reference/figures.json); an estimate from below
  const text =
    (await proof
      .getByRole('row', { name: /^condition estimate/ })
      .getByRole('cell')
      .textContent()) ?? '';
  expect(Number(text)).toBeGreaterThan(1.5976e6 / 3);
  expect(Number(text)).toBeLessThan(1.61e6);
});

test('three trials compared: sorted, marked, on the sheet and off', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(line(page, 'nested dissection').locator('[data-cell]').first()).toBeVisible();
  await page.getByRole('button', { name: 'factor entries', exact: true }).click();
  const entries = await page
    .locator('[data-head="factor entries"]')
    .evaluateAll((cells) =>
      cells.map((cell) => Number((cell.getAttribute('title') ?? '').split(', ')[0].replaceAll(',', ''))),
    );
  expect(entries).toEqual([...entries].sort((a, b) => a - b));
  await expect(page.locator('[data-head="factor entries"]').first()).toContainText('best');
  const box = page.getByRole('checkbox', { name: 'A on the sheet' });
  await box.check({ force: true });
  await expect(page.getByRole('figure').filter({ hasText: 'natural' })).toHaveCount(1);
  await box.uncheck({ force: true });
  await expect(page.getByRole('figure').filter({ hasText: 'natural' })).toHaveCount(0);
});

test('a trial is added, refused as a duplicate, struck and called back', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(line(page, 'nested dissection').locator('[data-cell]').first()).toBeVisible();
  await page.getByRole('button', { name: 'Add a trial…' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog.getByText('This is trial C already.')).toBeVisible();
  await dialog.getByRole('radio', { name: /^LDLᵀ/ }).check();
  await dialog.getByRole('checkbox', { name: /^natural/ }).uncheck();
  await dialog.getByRole('checkbox', { name: /^minimum degree/ }).check();
  await dialog.getByRole('button', { name: 'Add the trial' }).click();
  const added = page.getByRole('rowheader', { name: /minimum degree, LDLᵀ/ });
  await expect(added).toBeVisible();
  await page.getByRole('button', { name: 'Strike E from the ledger' }).click();
  await expect(added).toHaveCount(0);
  await page.getByRole('button', { name: 'Undo removing E' }).click();
  await expect(added).toBeVisible();
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
