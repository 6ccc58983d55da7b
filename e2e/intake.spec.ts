import { readFileSync } from 'node:fs';
import { expect, type Page, test } from '@playwright/test';
import { zipSync } from 'fflate';
import { drop, figure, open, reference } from './support.ts';

const head = (field = 'real', symmetry = 'general') => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;

/** A k × k grid, five points, symmetric: text of the file and of its node coordinates. */
function grid(k: number): { matrix: string; nodes: string } {
  const lines: string[] = [];
  const nodes: string[] = ['x,y'];
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      const at = i * k + j + 1;
      nodes.push(`${i},${j}`);
      lines.push(`${at} ${at} 4`);
      if (j + 1 < k) lines.push(`${at + 1} ${at} -1`);
      if (i + 1 < k) lines.push(`${at + k} ${at} -1`);
    }
  }
  return {
    matrix: `${head('real', 'symmetric')}${k * k} ${k * k} ${lines.length}\n${lines.join('\n')}\n`,
    nodes: nodes.join('\n'),
  };
}

/** A rotation by a stride: no inverse of itself. */
const stride = (n: number, step: number) => Array.from({ length: n }, (_, k) => ((k * step + 2) % n) + 1);

async function panel(page: Page, name: string): Promise<void> {
  await page.getByRole('tab', { name, exact: true }).click();
}

test('files dropped together: matrix, right-hand side, labels, coordinates, permutation; both directions are forecast', async ({
  page,
}) => {
  await open(page);
  const k = 7;
  const n = k * k;
  const { matrix, nodes } = grid(k);
  await drop(page, [
    { name: 'plate_rhs.txt', content: Array.from({ length: n }, (_, i) => `${i}`).join('\n') },
    { name: 'plate_labels.txt', content: Array.from({ length: n }, (_, i) => `node ${i} uz`).join('\n') },
    { name: 'plate.mtx', content: matrix },
    { name: 'plate_xy.csv', content: nodes },
    { name: 'plate_perm.txt', content: stride(n, 5).join('\n') },
  ]);
  const question = page.getByRole('dialog', { name: 'Which way does plate_perm.txt read?' });
  await expect(question.getByRole('button', { name: /New to old: .* factor entries/ })).toBeVisible({
    timeout: 30_000,
  });
  await question.getByRole('button', { name: /Old to new: .* factor entries/ }).click();
  await panel(page, 'Import');
  const beside = page.getByRole('region', { name: 'Import summary' });
  await expect(beside).toContainText('plate_rhs.txt: a right-hand side of 49 numbers');
  await expect(beside).toContainText('plate_labels.txt: a label for each of 49 rows');
  await expect(beside).toContainText('plate_xy.csv: coordinates of 49 nodes in 2 dimensions, 1 unknown each');
  await expect(beside).toContainText('plate_perm.txt: a permutation of 49, 1-based, read as old-to-new');
  await expect(beside).toContainText('symmetric exactly');
  expect(await figure(page, 'imported', 'factor entries')).toBeGreaterThan(n);
});

test('a table that may be several things is asked about; a permutation onto an open sheet', async ({ page }) => {
  await open(page);
  const { matrix, nodes } = grid(5);
  await drop(page, [{ name: 'plate.mtx', content: matrix }]);
  await expect(page.locator('.topline')).toContainText('25 × 25');
  await drop(page, [{ name: 'table.txt', content: nodes }]);
  await page
    .getByRole('dialog', { name: 'What is table.txt?' })
    .getByRole('button', { name: /coordinates/ })
    .click();
  await drop(page, [
    {
      name: 'p.txt',
      content: Array.from({ length: 25 }, (_, k) => `${((k * 3) % 25) + 1} ${((k * 7) % 25) + 1}`).join('\n'),
    },
  ]);
  await page
    .getByRole('dialog', { name: 'What is p.txt?' })
    .getByRole('button', { name: /a permutation/ })
    .click();
  await page
    .getByRole('dialog', { name: 'How is p.txt to be read?' })
    .getByRole('button', { name: 'Use the right column' })
    .click();
  await page
    .getByRole('dialog', { name: 'Which way does p.txt read?' })
    .getByRole('button', { name: /New to old/ })
    .click();
  await panel(page, 'Import');
  const beside = page.getByRole('region', { name: 'Import summary' });
  await expect(beside).toContainText('table.txt: coordinates of 25 nodes in 2 dimensions');
  await expect(beside).toContainText('the second was used');
  expect(await figure(page, 'imported', 'factor entries')).toBeGreaterThan(25);
});

test('an archive: members are listed with what they look like, the chosen ones are read', async ({ page }) => {
  await open(page);
  const bytes = zipSync({
    'run/k.mtx': new Uint8Array(readFileSync(reference('bcsstk01.mtx'))),
    'run/m.mtx': new TextEncoder().encode(grid(5).matrix),
    'run/load_rhs.txt': new TextEncoder().encode(Array.from({ length: 48 }, () => '1').join('\n')),
    'run/readme.md': new TextEncoder().encode('what this is\nand why\n'),
  });
  await drop(page, [{ name: 'run.zip', content: Buffer.from(bytes).toString('latin1') }]);
  const dialog = page.getByRole('dialog', { name: 'What is to be read from run.zip?' });
  await expect(dialog.getByRole('checkbox', { name: /run\/k\.mtx: a matrix/ })).toBeChecked();
  await expect(dialog.getByRole('checkbox', { name: /run\/load_rhs\.txt: right-hand sides/ })).toBeChecked();
  await expect(dialog.getByRole('checkbox', { name: /run\/readme\.md/ })).not.toBeChecked();
  await dialog.getByRole('checkbox', { name: /run\/m\.mtx: a matrix/ }).check();
  await dialog.getByRole('button', { name: 'Read them' }).click();
  // two matrices, one right-hand side whose name fits neither: the user says
  const which = page.getByRole('dialog', { name: 'Which matrix does load_rhs.txt belong to?' });
  await which.getByRole('button', { name: 'k.mtx' }).click();
  const chooser = page.getByRole('combobox', { name: 'Matrix in front' });
  await expect(chooser.locator('option')).toHaveText(['k.mtx', 'm.mtx']);
  await chooser.selectOption({ label: 'k.mtx' });
  await panel(page, 'Import');
  await expect(page.getByRole('region', { name: 'Import summary' })).toContainText(
    'load_rhs.txt: a right-hand side of 48',
  );
  await page.getByRole('button', { name: 'Compare with m.mtx' }).click();
  await expect(page.getByRole('status', { name: 'Compared with m.mtx' })).toContainText('The sizes differ.');
});

test('asked: two readings of one file are a choice, and the note says which was taken', async ({ page }) => {
  await open(page);
  await drop(page, [{ name: 'plain.txt', content: '0 0 4\n1 0 -1\n1 1 4\n2 1 -1\n2 2 4\n' }]);
  const alert = page.getByRole('alert');
  await expect(alert).toContainText('line 1');
  await alert.getByRole('button', { name: /one triangle of a symmetric matrix/ }).click();
  await panel(page, 'Import');
  const summary = page.getByRole('region', { name: 'Import summary' });
  await expect(summary).toContainText('counted from 0');
  await expect(summary.getByRole('row', { name: 'entries after expansion 7' })).toBeVisible();
});

test('other readings from the import summary: duplicates, zeros, synthetic values; the matrix is saved cleaned', async ({
  page,
}) => {
  await open(page);
  await drop(page, [{ name: 'twice.mtx', content: `${head()}2 2 5\n1 1 4\n2 2 3\n2 2 5\n2 1 0\n1 2 1\n` }]);
  await panel(page, 'Import');
  const summary = page.getByRole('region', { name: 'Import summary' });
  await expect(summary.getByRole('row', { name: 'duplicates merged 1' })).toBeVisible();
  await summary.getByRole('button', { name: 'Keep the last of them instead' }).click();
  await expect(summary).toContainText('replaced by the last one');
  await summary.getByRole('button', { name: 'Drop the exact zeros' }).click();
  await expect(summary.getByRole('row', { name: 'entries after expansion 3' })).toBeVisible();
  const saved = page.waitForEvent('download');
  await summary.getByRole('button', { name: 'Save the matrix' }).click();
  const text = readFileSync(await (await saved).path(), 'latin1');
  expect(text.replace(/^%.*\n/gm, '')).toBe('2 2 3\n1 1 4\n1 2 1\n2 2 5\n');
  await page.getByRole('button', { name: 'put away twice.mtx' }).click();
  await drop(page, [{ name: 'net.mtx', content: `${head('pattern', 'symmetric')}3 3 5\n1 1\n2 1\n2 2\n3 2\n3 3\n` }]);
  await panel(page, 'Import');
  await summary.getByRole('button', { name: /labelled synthetic/ }).click();
  await expect(page.getByRole('banner')).toContainText('net.mtx (synthetic values)');
});

test('three bad files say where, what was expected and what to do', async ({ page }) => {
  await open(page);
  const bad: readonly (readonly [string, string, RegExp])[] = [
    ['cut.mtx', `${head()}3 3 3\n1 1 1.5\n2 2 2.5           `, /line 4\b.*3 entries declared, 2 found.*last line cut/s],
    ['comma.mtx', `${head()}2 2 1\n1 1 3,14\n`, /line 3\b.*decimal comma.*decimal point/s],
    ['page.mtx', '<!DOCTYPE html><html><body>404</body></html>', /byte 0\b.*an HTML page.*mmwrite/s],
  ];
  for (const [name, content, message] of bad) {
    await drop(page, [{ name, content }]);
    const alert = page.getByRole('alert');
    await expect(alert.getByRole('heading', { name: `${name} was not read` })).toBeVisible();
    await expect(alert).toContainText(message);
    await alert.getByRole('button', { name: 'Put away' }).click();
  }
});
