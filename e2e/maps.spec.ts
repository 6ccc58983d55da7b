import { readFileSync } from 'node:fs';
import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { naiveElimination } from '../test/support/elimination.ts';
import { readReference } from '../test/support/reference.ts';
import { drop, figure, line, open, openExample, reference } from './support.ts';

const map = (page: Page, title: string) => page.getByRole('application', { name: new RegExp(`^Map of ${title}`) });
const reading = (page: Page) => page.getByRole('region', { name: 'Under the crosshair' });

/** The stiffness matrix with the map of its minimum degree trial beside it. */
async function openStiffness(page: Page): Promise<void> {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible();
  await expect(map(page, 'minimum degree')).toHaveAttribute('aria-label', /fill-in/);
}

test('the map says in words what it shows, and the words agree with the ledger', async ({ page }) => {
  await openStiffness(page);
  // 224 entries of the lower triangle (test/reference/figures.json: 400 entries, 48 on the diagonal)
  const label = (await map(page, 'minimum degree').getAttribute('aria-label')) ?? '';
  const [, own, fill] = /([\d,]+) entries of the matrix; ([\d,]+) of fill-in/.exec(label) ?? [];
  expect(Number(own)).toBe((400 + 48) / 2);
  expect(Number(own) + Number(fill)).toBe(await figure(page, 'minimum degree', 'factor entries'));
  await expect(map(page, 'as read')).toHaveAttribute('aria-label', /48 rows and 48 columns, 400 entries/);
});

test('by keys alone: go to an entry of fill-in, read it, ask why it is there', async ({ page }) => {
  await openStiffness(page);
  const letter = page.getByRole('button', { name: /^C, minimum degree/ });
  await letter.click();
  const order = await exportedOrder(page);
  const { columns } = naiveElimination(readReference('bcsstk01'), order);
  const matrix = readReference('bcsstk01');
  const stored = new Set<string>();
  for (let j = 0; j < matrix.columns; j++) {
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++)
      stored.add(`${matrix.rowIndex[p]},${j}`);
  }
  // a place of fill-in, found by plain elimination
  const [row, column] = columns.flatMap((rows, k) =>
    [...rows].filter((r) => r > k && !stored.has(`${order[r]},${order[k]}`)).map((r) => [r, k]),
  )[5];
  await page.getByRole('button', { name: 'go to…' }).click();
  const form = page.getByRole('form', { name: 'Go to' });
  await form.getByLabel(/^row/).fill(String(order[row] + 1));
  await form.getByLabel(/^column/).fill(String(order[column] + 1));
  await form.getByLabel('seen in').selectOption({ label: 'C minimum degree, Cholesky' });
  await form.getByRole('button', { name: 'Go there' }).click();
  await expect(reading(page)).toContainText('fill-in');
  await expect(reading(page)).toContainText(`${row + 1}, ${column + 1}`);
  await map(page, 'minimum degree').focus();
  await page.keyboard.press('Enter');
  await expect(reading(page)).toContainText('leaves an entry here');
  const path = /Path: ([\d –]+)\./.exec((await reading(page).textContent()) ?? '');
  const unknowns = (path?.[1] ?? '').split(' – ').map((text) => Number(text) - 1);
  // the fill path theorem (Rose, Tarjan & Lueker 1976), checked on the file: neighbours all along, inner ones eliminated before both ends
  expect(unknowns.length).toBeGreaterThan(2);
  for (let k = 0; k + 1 < unknowns.length; k++) {
    expect(stored.has(`${unknowns[k]},${unknowns[k + 1]}`) || stored.has(`${unknowns[k + 1]},${unknowns[k]}`)).toBe(
      true,
    );
  }
  const place = (u: number): number => order.indexOf(u);
  for (const u of unknowns.slice(1, -1)) expect(place(u)).toBeLessThan(Math.min(row, column));
  await page.keyboard.press('Escape');
  await expect(reading(page)).toContainText('Point into a map');
});

test('zoom and crosshair are linked, single entries are drawn as shapes', async ({ page }) => {
  await openStiffness(page);
  const read = map(page, 'as read');
  await read.focus();
  await page.keyboard.press('ArrowRight');
  for (let k = 0; k < 4; k++) await page.keyboard.press('+');
  await expect(page.getByText('every entry drawn singly')).toBeVisible();
  await expect(reading(page)).toContainText('row, column');
  const colours = await map(page, 'minimum degree').evaluate(async (element) => {
    await new Promise((done) => setTimeout(done, 600));
    const canvas = element.querySelector('canvas') as HTMLCanvasElement;
    const { data } = (canvas.getContext('2d') as CanvasRenderingContext2D).getImageData(
      0,
      0,
      canvas.width,
      canvas.height,
    );
    const seen = { fill: 0, ink: 0 };
    for (let k = 0; k < data.length; k += 4) {
      if (data[k + 3] < 200) continue;
      if (data[k] === 213 && data[k + 1] === 94 && data[k + 2] === 0) seen.fill++;
      if (data[k] === 30 && data[k + 1] === 27) seen.ink++;
    }
    return seen;
  });
  expect(colours.fill).toBeGreaterThan(50);
  expect(colours.ink).toBeGreaterThan(50);
});

test('a map shows exactly the entries of the file: every place against the matrix', async ({ page }) => {
  await open(page);
  await drop(page, [reference('bcsstk01.mtx')]);
  await expect(map(page, 'as read')).toHaveAttribute('aria-label', /400 entries/);
  const matrix = readReference('bcsstk01');
  const wanted = new Array(48 * 48).fill(false);
  for (let j = 0; j < 48; j++) {
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++)
      wanted[matrix.rowIndex[p] * 48 + j] = true;
  }
  await page.mouse.move(5, 5);
  const drawn = await map(page, 'as read').evaluate((element) => {
    const canvas = element.querySelector('canvas') as HTMLCanvasElement;
    const context = canvas.getContext('2d') as CanvasRenderingContext2D;
    return Array.from({ length: 48 * 48 }, (_, k) => {
      const x = Math.floor((((k % 48) + 0.5) * canvas.width) / 48);
      const y = Math.floor(((Math.floor(k / 48) + 0.5) * canvas.height) / 48);
      return context.getImageData(x, y, 1, 1).data[3] > 100;
    });
  });
  expect(drawn).toEqual(wanted);
});

test('the maps are saved as SVG and PNG', async ({ page }) => {
  await openStiffness(page);
  for (const form of ['SVG', 'PNG']) {
    const waiting = page.waitForEvent('download');
    await page.getByRole('button', { name: `Save the maps as ${form}` }).click();
    const download = await waiting;
    expect(download.suggestedFilename()).toBe(`bcsstk01-maps.${form.toLowerCase()}`);
    const bytes = readFileSync(await download.path());
    if (form === 'PNG') expect(bytes.subarray(1, 4).toString()).toBe('PNG');
    else {
      const text = bytes.toString('utf8');
      expect(text).toContain('of fill-in');
      expect(text.match(/<rect/g)?.length).toBeGreaterThan(100);
    }
  }
});

test('with a trial on the sheet the maps pass the accessibility scan, and on a narrow page one is shown at a time', async ({
  page,
}) => {
  await openStiffness(page);
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations).toEqual([]);
  await page.setViewportSize({ width: 390, height: 844 });
  await expect(map(page, 'minimum degree')).toBeVisible();
  await expect(map(page, 'as read')).toBeHidden();
  await page.getByRole('combobox', { name: 'map', exact: true }).selectOption('as read');
  await expect(map(page, 'as read')).toBeVisible();
  await expect(map(page, 'minimum degree')).toBeHidden();
});

test('a fact of the survey points into the maps', async ({ page }) => {
  await open(page);
  await openExample(page, 'Seepage under a weir');
  await expect(map(page, 'as read')).toHaveAttribute('aria-label', /entries of the matrix/);
  const show = page.getByRole('button', { name: /^show / }).first();
  await show.click();
  await expect(reading(page)).toContainText('row, column');
});

/** The order of trial C as the page exports it: new-to-old, 0-based. */
async function exportedOrder(page: Page): Promise<number[]> {
  await page.getByRole('tab', { name: 'Handover' }).click();
  await page.getByLabel('direction').selectOption('new-to-old');
  await page.getByLabel('first index').selectOption('1');
  const waiting = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save the permutation' }).click();
  const body = readFileSync(await (await waiting).path(), 'latin1')
    .trimEnd()
    .split('\n')
    .filter((l) => !l.startsWith('%'));
  return body.slice(1).map((text) => Number(text) - 1);
}
