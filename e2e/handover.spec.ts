/** The handover on the page: every file saved, read and held against the matrix and against the command line. */
import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { unzipSync } from 'fflate';
import { schemaFaults } from '../test/support/jsonSchema.ts';
import { drop, figure, line, open, openExample, reference } from './support.ts';

const root = join(import.meta.dirname, '..');
const python = ['/usr/bin/python3', 'python3'].find(
  (name) => spawnSync(name, ['-c', 'import scipy.sparse.linalg, scipy.io']).status === 0,
);

/** Runs the command line; its output and status. */
function fillcast(...words: string[]): { status: number; out: string } {
  const { status, stdout } = spawnSync(
    process.execPath,
    [join(root, 'node_modules/tsx/dist/cli.mjs'), join(root, 'engine/command/main.ts'), ...words],
    {
      encoding: 'utf8',
    },
  );
  return { status: status ?? 1, out: stdout };
}

async function handover(page: Page, matrix: string, ordering: string): Promise<void> {
  await open(page);
  await drop(page, [reference(matrix)]);
  const trial = line(page, ordering);
  await expect(trial.locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
  await trial.getByRole('rowheader').getByRole('button').first().click();
  await page.getByRole('tab', { name: 'Handover' }).click();
  await expect(page.getByRole('button', { name: 'Save all as one zip' })).toBeVisible({ timeout: 30_000 });
}

async function saved(page: Page, name: string): Promise<{ name: string; path: string; text: string }> {
  const coming = page.waitForEvent('download');
  await page.getByRole('button', { name: `Save ${name}`, exact: true }).click();
  const download = await coming;
  const path = join(mkdtempSync(join(tmpdir(), 'saved-')), download.suggestedFilename());
  await download.saveAs(path);
  return { name: download.suggestedFilename(), path, text: readFileSync(path, 'utf8') };
}

const numbers = (text: string): number[] =>
  text
    .split('\n')
    .filter((l) => l !== '' && !l.startsWith('%'))
    .map((l) => Number(l.split(' ')[0]));

test('each file is saved and says what the matrix and the ledger say', async ({ page }) => {
  await handover(page, 'lund_a.mtx', 'minimum degree');
  const entries = await figure(page, 'minimum degree', 'factor entries');
  const n = 147;

  const order = numbers((await saved(page, 'order.mtx')).text).slice(1);
  const position = numbers((await saved(page, 'position.mtx')).text).slice(1);
  expect(order.toSorted((a, b) => a - b)).toEqual(Array.from({ length: n }, (_, i) => i + 1));
  for (let k = 0; k < n; k++) expect(position[order[k] - 1]).toBe(k + 1);

  const sheet = JSON.parse((await saved(page, 'configuration-sheet.json')).text);
  const schema = await (await page.request.get('configuration-sheet.schema.json')).json();
  expect(schemaFaults(sheet, schema)).toEqual([]);
  expect(sheet.fill.factorEntries).toBe(entries);
  expect((await saved(page, 'configuration-sheet.txt')).text).toContain(entries.toLocaleString('en-US'));

  const csv = (await saved(page, 'comparison.csv')).text.split('\r\n').map((l) => l.split(','));
  const own = csv.find((l) => l[1] === 'minimum-degree') ?? [];
  expect(Number(own[csv[0].indexOf('factorEntries')])).toBe(entries);

  const columns = (await saved(page, 'columns.txt')).text.split('\n').filter((l) => l !== '' && !l.startsWith('%'));
  expect(columns.reduce((sum, l) => sum + Number(l.split(' ')[3]), 0)).toBe(entries);

  const [, lower] = [await saved(page, 'permuted.mtx'), await saved(page, 'L.mtx')];
  const size =
    lower.text
      .split('\n')
      .find((l) => !l.startsWith('%'))
      ?.split(' ')
      .map(Number) ?? [];
  expect(size.slice(0, 2)).toEqual([n, n]);
  expect(size[2]).toBeLessThanOrEqual(entries);
});

test('the recipe of the page is replayed by the command line to the same numbers, and by the page itself', async ({
  page,
}) => {
  await handover(page, 'bcsstk01.mtx', 'nested dissection');
  const entries = await figure(page, 'nested dissection', 'factor entries');
  const recipe = await saved(page, 'recipe.json');
  const { status, out } = fillcast('replay', reference('bcsstk01.mtx'), '--recipe', recipe.path, '--json');
  const replayed = JSON.parse(out);
  expect(replayed).toMatchObject({ same: true, matches: 'same-file' });
  expect(status).toBe(0);
  expect(replayed.trials.find((t: { ordering: string }) => t.ordering === 'nested-dissection').factorEntries).toBe(
    entries,
  );
  expect(
    fillcast('gate', reference('bcsstk01.mtx'), '--recipe', recipe.path, '--max-factor-bytes', '1KiB').status,
  ).toBe(5);

  await open(page);
  await drop(page, [reference('bcsstk01.mtx'), recipe.path]);
  await expect(page.getByText('every number is the recorded one')).toBeVisible({ timeout: 60_000 });
  const changed = JSON.parse(recipe.text);
  changed.trials[0].figures.operations++;
  await drop(page, [{ name: 'changed.json', content: JSON.stringify(changed) }]);
  await expect(page.getByText('not every number is the recorded one')).toBeVisible({ timeout: 60_000 });
  await open(page);
  await drop(page, [reference('lund_a.mtx'), recipe.path]);
  await expect(page.getByRole('dialog', { name: 'Is ' })).toContainText('another matrix', { timeout: 60_000 });
});

test('a recipe of the command line opens on the page; alone it asks for its matrix', async ({ page }) => {
  const path = join(mkdtempSync(join(tmpdir(), 'recipe-')), 'recipe.json');
  const words = ['--orderings', 'minimum-fill,sloan', '--seed', '4', '--recipe-out', path];
  expect(fillcast('compare', reference('lund_a.mtx'), ...words).status).toBe(0);
  await open(page);
  await drop(page, [path]);
  await expect(page.getByText('Drop it together with its matrix')).toBeVisible();
  await drop(page, [reference('lund_a.mtx'), path]);
  await expect(page.getByText('every number is the recorded one')).toBeVisible({ timeout: 60_000 });
  await expect(line(page, 'Sloan')).toBeVisible();
});

test('the report stands by itself: pictures inside, no request, no script', async ({ page, context }) => {
  await handover(page, 'lund_a.mtx', 'minimum degree');
  const { path, text } = await saved(page, 'report.html');
  expect(text).toContain('data:image/png;base64,');
  const alone = await context.newPage();
  const asked: string[] = [];
  alone.on('request', (request) => asked.push(request.url()));
  await alone.goto(`file://${path}`);
  await expect(alone.getByRole('heading', { name: 'lund_a.mtx' })).toBeVisible();
  await expect(alone.getByRole('heading', { name: 'Cautions' })).toBeVisible();
  await expect(alone.getByRole('heading', { name: 'Definitions and conventions' })).toBeVisible();
  const widths = await alone
    .locator('.pictures img')
    .evaluateAll((all) => all.map((i) => (i as HTMLImageElement).naturalWidth));
  expect(widths.length).toBeGreaterThan(1);
  for (const width of widths) expect(width).toBeGreaterThan(100);
  expect(asked.filter((url) => !url.startsWith('data:'))).toEqual([`file://${path}`]);
  for (const width of [1280, 390]) {
    await alone.setViewportSize({ width, height: 800 });
    expect(await alone.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
  }
  const { violations } = await new AxeBuilder({ page: alone }).analyze();
  expect(violations).toEqual([]);
});

test('all files in one archive; its script reproduces the forecast', async ({ page }) => {
  await handover(page, 'utm300.mtx', 'minimum degree');
  const coming = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save all as one zip' }).click();
  const folder = mkdtempSync(join(tmpdir(), 'zip-'));
  const path = join(folder, 'all.zip');
  await (await coming).saveAs(path);
  const members = unzipSync(new Uint8Array(readFileSync(path)));
  const names = Object.keys(members).map((n) => n.split('/')[1]);
  for (const name of [
    'report.html',
    'configuration-sheet.json',
    'recipe.json',
    'check.py',
    'order.mtx',
    'row-order.mtx',
    'U.mtx',
    'fronts.txt',
  ])
    expect(names).toContain(name);
  for (const [name, bytes] of Object.entries(members)) writeFileSync(join(folder, name.split('/')[1]), bytes);
  expect(fillcast('replay', reference('utm300.mtx'), '--recipe', join(folder, 'recipe.json')).status).toBe(0);
  test.skip(python === undefined, 'the script needs SciPy');
  expect(execFileSync(python as string, ['check.py'], { cwd: folder, encoding: 'utf8' })).toContain('found');
});

test('a worked example has no file, and its recipe says so; conventions and looks on the spot', async ({ page }) => {
  await open(page);
  await openExample(page, 'Seepage under a weir');
  await expect(line(page, 'minimum degree').locator('[data-cell]').first()).toBeVisible({ timeout: 60_000 });
  await line(page, 'minimum degree').getByRole('rowheader').getByRole('button').first().click();
  await page.getByRole('tab', { name: 'Handover' }).click();
  const recipe = JSON.parse((await saved(page, 'recipe.json')).text);
  expect(recipe.matrix.file).toBeNull();
  await page.getByRole('button', { name: 'look order.mtx' }).click();
  await expect(page.getByRole('region', { name: 'Beginning of order.mtx' })).toContainText('new-to-old, 1-based');
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations).toEqual([]);
  }
});
